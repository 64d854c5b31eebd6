#pragma once
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

#include "dutygauge/field/causes.hpp"
#include "dutygauge/field/changes.hpp"
#include "dutygauge/field/cycles.hpp"
#include "dutygauge/field/decision.hpp"
#include "dutygauge/field/forecast.hpp"
#include "dutygauge/field/laws.hpp"
#include "dutygauge/field/mapping.hpp"
#include "dutygauge/field/series.hpp"

/// Readings of a unit in service: how dirty it is, until when it does its service, why, and
/// what to do. Knows no file and no page.
namespace dutygauge::field {

/// What became of the rows.
struct RowCounts {
  std::uint64_t read = 0, used = 0;
  std::vector<std::pair<std::string, std::uint64_t>> dropped = {};  ///< by reason
};

/// Channels that may be wrong, together or one of them, from some day on.
struct Doubt {
  std::vector<Channel> channels;
  double since = 0;  ///< [d] since the first reading
  std::string text;  ///< one sentence
};

/// What may have done it, with its weight [-]; all weights sum to 1.
struct WeighedCause {
  std::string name;
  double weight = 0;
};

/// The least and the greatest fouling that single readings of a day show.
struct DayRange {
  double day = 0;            ///< as Day::day
  double low = 0, high = 0;  ///< [m2.K/W]
};

/// One reading of the record: which instruments are held to be right.
struct Hypothesis {
  std::string name;  ///< "the hot meter is right"
  Days days;
};

/// What the required service leaves of the duty; 0.06: 6 % more than required.
struct Margin {
  std::string where;  ///< "as running", "at 31 degC water"
  double margin = 0;  ///< [-]
};

/// Everything the analysis stands on.
struct Evidence {
  std::int64_t start = 0;  ///< first reading [s] since 1970-01-01T00:00:00Z
  int offset = 0;          ///< of the plant's standard time from UTC [s]: its dates are shown in it
  RowCounts rows = {};
  std::vector<Hypothesis> hypotheses;  ///< at least one; the first is the one used
  DropLaws drop_laws = {};
  std::vector<Logged> logged = {};
  std::vector<Doubt> suspects = {};
  std::vector<WeighedCause> causes = {};
  std::optional<Allowed> allowed = {};  ///< empty: no service is stated
  double film_uncertainty = 0;          ///< standard, of 1/u_clean [m2.K/W]; most of it cancels in a change
  bool calibrated = false;              ///< on a clean period: the level is a change since then
  std::vector<Margin> margins = {};
  Plan plan = {};
  std::vector<DayRange> ranges = {};  ///< of the hypothesis used; may be empty
  Days as_read = {};                  ///< with every instrument; empty where a hypothesis has them so
};

/// How well the heat balance closes.
struct Closure {
  std::optional<double> median = {}, u95 = {};  ///< [-]; empty where a flow is missing
  std::string verdict = {};
};

struct FoulingNow {
  double now = 0;         ///< [m2.K/W]
  double u95_level = 0;   ///< of `now`, instruments and films included [m2.K/W]
  double change = 0;      ///< since the cycle began [m2.K/W]
  double u95_change = 0;  ///< of `change`, to which constant errors add little [m2.K/W]
  double rate = 0, rate_low = 0, rate_high = 0;  ///< and where it lies with 95 % [m2.K/W.d]
  double since = 0;                              ///< first day of the cycle [d]
  Choice choice = {};
  bool asymptote_known = false;
  std::optional<double> duty_lost = {};  ///< against the clean unit [W]; with economics only
};

/// What one hypothesis comes to.
struct Outcome {
  std::string name;
  std::optional<FoulingNow> fouling = {};
  std::optional<Forecast> forecast = {};
  Decision decision = {};
};

/// Everything a page is made from.
struct FieldResult {
  std::int64_t start = 0;  ///< first reading, in the plant's standard time [s] since 1970-01-01
  RowCounts rows = {};
  Closure closure = {};
  Events events = {};
  std::vector<Doubt> suspects = {};
  std::vector<WeighedCause> causes = {};  ///< the greatest weight first
  std::optional<Allowed> allowed;
  std::vector<Margin> margins;
  Plan plan;
  std::vector<Outcome> outcomes;             ///< by hypothesis, the first the one used
  std::optional<bool> same_either_way = {};  ///< empty with one hypothesis
  Advice advice = Advice::settle_first;
  std::string why = {};
  Days days = {};  ///< of the hypothesis used
  std::vector<DayRange> ranges = {};

  const Outcome& used() const { return outcomes.front(); }
};

/// Events, laws, forecast and decision of a record under each of its hypotheses.
/// Throws std::invalid_argument without a hypothesis.
FieldResult analyse(const Evidence& evidence);

/// The median over the days with what the instruments always show wrong:
/// |c| <= u "closes", <= 2 u "closes within uncertainty", <= 3 u "doubtful", else "does not close".
Closure closure_of(const Days& days);

}  // namespace dutygauge::field
