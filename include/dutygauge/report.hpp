#pragma once
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/bids.hpp"
#include "dutygauge/findings.hpp"
#include "dutygauge/service.hpp"
#include "dutygauge/service/control.hpp"
#include "dutygauge/uncertainty.hpp"

/// Results to text and JSON. Knows no file format of the input; no physics.
namespace dutygauge::report {

/// A state that a reading of the running unit has made known.
struct Today {
  service::Assessment assessment;
  std::optional<uncertainty::Result> spread{};
  std::optional<service::Holding> held{};        ///< where a control holds the duty
  std::optional<uncertainty::Spreads> change{};  ///< of the outcome less that under the reading's conditions
};

/// One operating case in the states that are rated.
struct RatedCase {
  std::string name;
  service::Assessment design_fouling, clean;
  Findings findings;  ///< of the case as read and as rated at design fouling
  std::optional<uncertainty::Result> spread{}, spread_clean{};  ///< at design fouling, and clean
  std::optional<service::Holding> held{}, held_clean{};         ///< where a control holds the duty
  std::optional<Today> today{};                                 ///< where an anchor says what that is
};

/// The reading a unit is tied to, and what the unit of today shows under its conditions.
struct Anchored {
  uncertainty::Anchor anchor;
  rating::Outcome outcome;
};

/// A finding somebody has decided on: shown as such, without effect on the exit status.
struct AcceptedFinding {
  Finding finding;
  std::string because, by;
};

/// What an assumption is worth: how far a margin moves when the value lies at an end of
/// its span.
struct Effect {
  /// Duty margin [-], distance of the governing outlet from its limit [K], or what is left of
  /// an allowable pressure drop (of the drop itself where none is allowed) [-].
  enum class Margin { duty, temperature, pressure_drop };
  Margin margin = Margin::duty;
  std::optional<double> at_low, at_high;  ///< change of the margin; empty: no result there
  double size = 0;                        ///< largest change of the duty or the drop, relative
  bool changes_answer = false;            ///< a line or a drop holds at one end and not at the other
};

/// Something that can be done, and what it buys and costs.
struct Lever {
  std::string what;                              ///< "10 % more cooling water"
  std::string key;                               ///< input that is changed; empty for several
  bool in_kelvin = false;                        ///< `gain` is of an outlet's distance from its limit [K]
  double gain = 0;                               ///< else of the duty, relative to the duty now [-]
  double shell_drop = 0, tube_drop = 0;          ///< with it [Pa]
  bool costs_shell = false, costs_tube = false;  ///< that drop rises by more than 1 %
};

/// Everything a page or a JSON object is made from.
struct Result {
  std::string file;  ///< base name, "-" for standard input
  std::string title, tag, input_sha256;
  units::System display = units::System::metric;
  service::Assessment assessment;               ///< of the governing operating case at design fouling
  std::optional<uncertainty::Result> spread{};  ///< of that assessment
  std::vector<bids::ClaimVerdict> claims{};     ///< of the sheet, as built
  Inputs inputs;                                ///< of that case
  Assumptions assumed;                          ///< of that case, and what only others needed
  Findings findings;                            ///< of all cases but those accepted, the gravest first
  std::vector<AcceptedFinding> accepted = {};
  std::vector<RatedCase> cases = {};  ///< in file order
  std::size_t governing = 0;          ///< of `cases`
  std::string present_since = {};     ///< the unit is rated as it is since that day; empty: as built
  std::vector<std::optional<Effect>> effects = {};  ///< one for each of `assumed`, or none at all
  std::vector<Lever> levers = {};                   ///< the strongest first
  std::optional<Anchored> anchored = {};            ///< where the case has an anchor that can be believed
};

struct TextOptions {
  bool all = false;  ///< every finding and assumption, resistances and factors (-v)
};

/// The text page: at most 100 columns, ASCII.
std::string text(const Result& result, const TextOptions& options);

/// The JSON object of one file, schema_version 1, on one line, without newline.
/// Throws std::logic_error where a number is not finite: null means "not defined".
std::string json(const Result& result);

/// The finding's text with its numbers in a system of units.
std::string sentence(const Finding& finding, units::System system);

/// The same for where an assumed value comes from.
std::string reason(const Assumption& assumption, units::System system);

std::string_view word(Severity severity);

/// The JSON object that stands for a file without a result: its base name and
/// the messages, so that a reader of several files sees every one of them.
std::string error_json(const std::string& file, const std::vector<std::string>& messages);

}  // namespace dutygauge::report
