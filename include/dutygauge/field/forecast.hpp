#pragma once
#include <cstdint>
#include <optional>
#include <vector>

#include "dutygauge/field/laws.hpp"

/// When a deposit takes the service away, and how sure that is.
namespace dutygauge::field {

/// The fouling at which the required service is just met, at the conditions that count.
struct Allowed {
  double fouling = 0;               ///< [m2.K/W]
  double standard_uncertainty = 0;  ///< of films and instruments together [m2.K/W]
};

/// One way in which things may go.
struct Course {
  Law law;
  double allowed = 0;               ///< [m2.K/W]
  std::optional<double> lost = {};  ///< [d] since the first reading; empty: never
};

/// 5, 50 and 95 % of the courses have lost the service by these days; empty: never.
struct LossDays {
  std::optional<double> early = {}, middle = {}, late = {};
};

struct Forecast {
  std::vector<Course> courses = {};
  LossDays lost = {};
  double as_of = 0;            ///< last day of the series [d]
  double record = 0;           ///< length of the cycle it stands on [d]
  bool lost_already = false;   ///< more likely than not
  bool beyond_record = false;  ///< the middle day is more than one record after the last

  /// Share of the courses that have lost the service by a day.
  double lost_by(double day) const;
};

/// A step that was taken out of a cycle: before it the fouling was lower by so much than its points say.
struct Lift {
  double at = 0;    ///< [d]
  double jump = 0;  ///< [m2.K/W]
};

struct ForecastOptions {
  int courses = 4000;
  std::uint64_t seed = 20210101;  ///< the same courses every run
  std::vector<Lift> lifts = {};   ///< by time, all within the cycle
};

/// The days on which the service is lost, from the readings of one cycle, cleaning to now.
///
/// Each course takes a law and its shape by weight (loss/loss_min)^(-n/2), n the effective
/// number of points, shapes evenly on a log scale; level and rise from their covariance at
/// that shape, with the scatter's own uncertainty; the allowed fouling from its own. Laws and
/// shapes which the record cannot part so share the courses, and a band is as wide as that.
/// Empty with fewer than 6 points.
std::optional<Forecast> forecast(const Trend& cycle, const Allowed& allowed,
                                 const ForecastOptions& options = {});

/// A steady deposit whose rate is normal between units or campaigns: median day and days at risk.
///
///     P(lost by t) = Phi((1 - M/t)/cv),  M = allowed/rate
struct SteadyRisk {
  double allowed = 0;    ///< [m2.K/W], from clean
  double mean_rate = 0;  ///< [m2.K/W.d]
  double variation = 0;  ///< coefficient of variation of the rate [-]

  double lost_by(double day) const;
  /// Day by which the service is lost with a probability in (0, 1); empty: never.
  std::optional<double> day_at(double risk) const;
};

}  // namespace dutygauge::field
