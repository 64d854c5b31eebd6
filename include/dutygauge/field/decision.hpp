#pragma once
#include <cstdint>
#include <functional>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/field/forecast.hpp"

/// What to do about a deposit: when a cleaning pays, and when it cannot wait.
namespace dutygauge::field {

/// What a cleaning costs.
struct CleaningCost {
  double cleaning = 0;   ///< [money]
  double downtime = 0;   ///< [d]
  double down_rate = 0;  ///< loss while the unit is down [money/d]
};

/// How long to run between cleanings.
struct Interval {
  double days = 0;       ///< running, without the downtime
  double cost_rate = 0;  ///< average [money/d]
};

/// The interval with the least average cost
///
///     [C + p_d t_d + integral_0^t p dt]/(t + t_d),  least where p(t)(t + t_d) = C + p_d t_d + integral
///
/// for a loss p(t) [money/d] at t days after a cleaning that does not fall with time. Empty:
/// within a century cleaning never pays.
std::optional<Interval> best_interval(const CleaningCost& cost, const std::function<double(double)>& loss);

/// What money there is to lose.
struct Economics {
  CleaningCost cost;
  double heat_price = 0;  ///< of duty lost [money/J]
  std::string currency;   ///< as the user writes it
  /// Duty lost [W] at a fouling [m2.K/W] against the clean unit at the conditions that count.
  std::function<double(double)> duty_lost;
};

/// What can be done, and what is asked of it.
struct Plan {
  double horizon = 365;                  ///< looked ahead [d]
  std::optional<double> next_stop = {};  ///< [d] since the first reading; later than now
  bool stop_has_passed = false;          ///< the stop that was stated lies before the last reading
  double accepted_risk = 0.05;           ///< of losing the service [-]
  double residue = 0;                    ///< share of the deposit a cleaning leaves [-]
  std::optional<Economics> economics = {};
};

enum class Way : std::uint8_t { now, next_stop, never };
std::string_view name_of(Way way);

/// Money, on average over the courses.
struct Bill {
  double cleaning = 0, lost_duty = 0, outage = 0;
  double sum() const { return cleaning + lost_duty + outage; }
};

/// One way to go on until the horizon.
struct Option {
  Way way = Way::never;
  std::optional<double> at = {};  ///< day of the cleaning
  double risk = 0;                ///< of losing the service before it is cleaned, or the horizon [-]
  std::optional<Bill> bill = {};  ///< with economics only
  double cheapest_in = 0;         ///< share of the courses in which it costs least of those allowed [-]
  bool recommended = false;
};

enum class Advice : std::uint8_t { stop_now, next_stop, not_needed, settle_first };
/// "stop_now", ...
std::string_view name_of(Advice advice);

struct Decision {
  std::vector<Option> options = {};
  Advice advice = Advice::settle_first;
  std::string why = {};  ///< one clause
};

/// Each way over the courses of a forecast. Of those whose risk is accepted (of all, where none
/// is: the least risk) the one that costs least on average is recommended, if it does so in
/// nine of ten courses; without economics the latest whose risk is accepted.
/// Needs: courses. A day lost before now counts as a risk of 1 until a cleaning.
Decision decide(const Forecast& forecast, const Plan& plan);

}  // namespace dutygauge::field
