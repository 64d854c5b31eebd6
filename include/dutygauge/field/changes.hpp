#pragma once
#include <cstdint>
#include <map>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/field/laws.hpp"
#include "dutygauge/field/series.hpp"

/// What happened to a unit and when: steps of the daily series, which of them came together,
/// and what such a group is called.
namespace dutygauge::field {

/// A split of a series into two pieces with a straight line each.
struct Split {
  std::size_t index = 0;              ///< first point of the second piece
  double loss = 0, loss_unsplit = 0;  ///< sums of squared residuals
  double bic = 0, bic_unsplit = 0;    ///< n ln(loss/n) + 5 ln n; + 2 ln n
};

/// The split with the smallest loss, each piece at least `least` points; empty where there is none.
std::optional<Split> best_split(const Trend& series, std::size_t least);

/// A step of a series: where it jumps between the lines before and after.
struct Step {
  double at = 0;              ///< [d], between the last day before and the first day after
  double jump = 0;            ///< after - before, in the unit of the series
  double standard_error = 0;  ///< of the jump
};

/// Steps by binary segmentation (BIC falls by more than 10, pieces of 6 points or more),
/// each confirmed locally: the lines through the 10 days before and after, carried on to the split,
/// are further apart than 4 standard errors and than `floor`. A curved trend has no steps.
std::vector<Step> steps(const Trend& series, double floor);

/// What a series is of.
enum class Quantity : std::uint8_t {
  fouling,     ///< [m2.K/W]
  closure,     ///< hot/cold duty - 1 [-]
  tube_drop,   ///< ln(drop/flow^n) [-]
  shell_drop,  ///< ln(drop/flow^n) [-]
  hot_flow,    ///< ln of the flow [-]
  cold_flow,   ///< ln of the flow [-]
  hot_in,      ///< [K]
  hot_out,     ///< [K]
  cold_in,     ///< [K]
  cold_out,    ///< [K]
};

/// How the drops of a unit go with the flows.
struct DropLaws {
  bool hot_in_tubes = false;
  double tube_exponent = 1.8, shell_exponent = 1.8;
};

/// The daily series of each quantity; missing days are left out.
std::map<Quantity, Trend> series_of(const Days& days, const DropLaws& laws);

/// An event the user wrote down.
enum class What : std::uint8_t {
  cleaning,
  plugging,
  blockage,
  bypass,
  leak,
  sensor_shift,
  sensor_drift,
  load_change,
  outage,
  unexplained,
};
std::string_view name_of(What what);

struct Logged {
  double from = 0, to = 0;  ///< [d] since the first reading; equal: at a moment
  What what = What::cleaning;
};

/// Something that happened.
struct Event {
  double at = 0;  ///< [d] since the first reading
  What what = What::outage;
  std::optional<Channel> channel = {};  ///< where one stands out
  std::optional<double> fouling = {};   ///< change of the fouling resistance [m2.K/W]
  std::optional<double> closure = {};   ///< change of the closure, or its slope times the record [-]
  bool logged = false;                  ///< the user wrote it down
  bool seen = true;                     ///< the readings show it
};
using Events = std::vector<Event>;

/// A channel held to be wrong, from elsewhere.
struct Suspicion {
  std::vector<Channel> channels;
  double since = 0;  ///< [d]
};

/// All events, by time: steps that came within 2 days are one event, outages and what was
/// written down nearby say what it was.
Events events_of(const Days& days, const DropLaws& laws, const std::vector<Logged>& logged,
                 const std::vector<Suspicion>& suspicions);

}  // namespace dutygauge::field
