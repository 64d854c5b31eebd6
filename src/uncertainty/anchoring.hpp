#pragma once
#include "dutygauge/uncertainty.hpp"

/// Steps of tying a unit to a reading that sampling repeats with other values.
namespace dutygauge::uncertainty {

/// The heat of each side of a reading with the problem's fluids [W]; a flow that was not
/// read makes it empty.
struct ReadDuties {
  std::optional<double> shell, tube;
  double weighted = 0;
};
ReadDuties duties_of(const rating::Problem& problem, const SteadyReading& reading, double shell_weight);

/// The problem at the reading's flows and inlets; a missing flow is the one that balances.
rating::Problem at_reading(rating::Problem problem, const SteadyReading& reading, const ReadDuties& duties);

/// A problem with its foulings replaced by one resistance on the outside area, divided
/// between the sides as the foulings of `like` are; all in the shell where it has none.
rating::Problem with_resistance(rating::Problem problem, const rating::Problem& like, double resistance);

}  // namespace dutygauge::uncertainty
