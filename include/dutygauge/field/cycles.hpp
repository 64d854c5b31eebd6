#pragma once
#include <optional>
#include <vector>

#include "dutygauge/field/changes.hpp"
#include "dutygauge/field/forecast.hpp"

/// A record cut at what resets or moves its fouling: the teeth of a saw.
namespace dutygauge::field {

/// The days between two resets, with the law they follow.
struct Cycle {
  Trend points;
  std::vector<Lift> lifts = {};  ///< steps taken out of the points
  std::optional<Choice> choice = {};  ///< empty: too short
  /// What was left of the deposit that the cycle before ended with [-]; empty for the first.
  std::optional<double> residue = {};
};
using Cycles = std::vector<Cycle>;

/// Cut at cleanings that were seen or written down. Another step of the fouling, such as that of
/// plugged tubes or of a sensor, is taken out: what lies before it in its cycle is moved to the
/// level after it, so that the deposit's growth goes on. Every cycle has points.
Cycles cycles_of(const Trend& fouling, const Events& events);

/// Forecast for the present cycle. While that is shorter than 15 days its level is its own and the
/// shape of its growth that of the cycle before.
std::optional<Forecast> forecast(const Cycles& cycles, const Allowed& allowed,
                                 const ForecastOptions& options = {});

}  // namespace dutygauge::field
