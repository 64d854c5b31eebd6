#pragma once
#include <map>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/findings.hpp"
#include "dutygauge/uncertainty.hpp"
#include "dutygauge/units.hpp"

/// A case varied and rated again, as tables: sweep, reach and compare.
namespace dutygauge::report {

/// Which case a table is about.
struct CaseName {
  std::string file;  ///< base name, "-" for standard input
  std::string title, tag, input_sha256;
  units::System display = units::System::metric;
  std::string shell_side = "shell side", tube_side = "tube side";  ///< what people call the streams
};

/// An input that is varied; values in SI.
struct Axis {
  std::string key;
  units::Kind kind = units::Kind::ratio;
  std::optional<double> own;  ///< what the case itself says
};

/// What one rating came to. Empty margins: no such line of the service.
struct Running {
  double duty = 0;                           ///< [W]
  double shell_outlet = 0, tube_outlet = 0;  ///< [K]
  double shell_drop = 0, tube_drop = 0;      ///< [Pa]
  double u_dirty = 0;                        ///< [W/m2.K]
  std::optional<double> duty_margin;         ///< [-]
  std::optional<double> temperature_margin;  ///< [K]
  std::optional<bool> met;                   ///< every line of the service holds
  std::string limited_by;                    ///< key of the tightest line
};

struct SweepRow {
  std::vector<double> at;  ///< one value an axis
  std::optional<Running> running;
  std::string no_result;  ///< why there is none
};

struct Sweep {
  CaseName about;
  std::vector<Axis> axes;
  std::vector<SweepRow> rows;
};

/// A value of the pushed input at which something begins or ceases to hold.
struct Limit {
  std::string name;              ///< "service.duty", "tube_side.allowable_pressure_drop", a finding's id ...
  std::string what;              ///< in words, with the limiting value
  double value = 0;              ///< of the pushed input
  bool fails_above = true;       ///< holds below the value and fails above it; else the other way round
  bool stops = true;             ///< false for a remark of the methods, which stops nothing
  std::string relieved_by = {};  ///< the lever that moves this limit most; empty where none does
};

/// Where everything holds, nearest to the case's own value. An open end was not met.
struct Room {
  std::optional<Limit> below, above;
};

struct ReachRow {
  double over = 0;           ///< value of the second input
  std::optional<Room> room;  ///< empty: nothing in the range holds
  std::string no_room;       ///< what stands in the way then
};

struct Reach {
  CaseName about;
  Axis pushed;
  double from = 0, to = 0;               ///< what was looked through
  std::vector<std::string> broken = {};  ///< in words: what does not hold at the case's own value
  std::vector<Limit> limits = {};        ///< from the own value upwards, then downwards, in the order met
  std::optional<Room> room = {};
  Inputs held = {};   ///< flows and inlets that stay as they are
  int unsettled = 0;  ///< points left out because the calculation did not settle
  std::optional<Axis> over = {};
  std::vector<ReachRow> map = {};  ///< over the second input
};

/// An input that differs between two cases; empty where a case does not have it.
struct InputChange {
  std::string key, before, after;
};

/// One of two that are compared: a case as rated, or the recorded result of one.
struct Compared {
  CaseName about;
  std::string operating_case = {};                 ///< that it is; empty where not said
  std::map<std::string, std::string> inputs = {};  ///< as typed, by key
  std::optional<Running> running = {};
  std::string no_result = {}, verdict = {};
};

struct Comparison {
  Compared before, after;
  std::vector<InputChange> inputs = {};
  /// Of after less before, with what both have wrong in common left out; empty where a side
  /// is a recorded result, whose methods cannot be run again.
  std::optional<uncertainty::Spreads> spread = {};
};

/// Reads what `rate --json` wrote of one file; empty where the text is no such object.
/// Throws std::invalid_argument with a sentence where it is one without a result to compare.
std::optional<Compared> recorded(std::string_view text);

/// Text pages: at most 100 columns, ASCII.
std::string text(const Sweep& sweep);
std::string text(const Reach& reach);
std::string text(const Comparison& comparison);

/// One JSON object on one line; SI, temperatures in degC.
std::string json(const Sweep& sweep);
std::string json(const Reach& reach);
std::string json(const Comparison& comparison);

/// Comma-separated, the unit of a column in brackets behind its name; as in JSON.
std::string csv(const Sweep& sweep);

}  // namespace dutygauge::report
