#include <algorithm>
#include <cmath>

#include "dutygauge/rating/scaled.hpp"
#include "sheet.hpp"

// Claims that another method may give differently: beside ours, within the methods' scatter.

namespace dutygauge::bids {
namespace {

// A question beyond, never a contradiction. This project's own choice, after the scatter
// published for such methods (shell side: Palen & Taborek 1969, recalled).
constexpr double film_scatter = 0.25, shell_drop_scatter = 0.40, tube_drop_scatter = 0.20;

struct Beside {
  std::string_view key;
  const std::optional<Stated>& claim;
  double ours, scatter;
  std::string_view source;
  std::vector<Cause> causes;
  std::string otherwise;
};

bool within(const Beside& one) {
  return std::abs(one.claim->value - one.ours) <= one.claim->rounding + one.scatter * std::abs(one.ours);
}

ClaimVerdict verdict_on(const Beside& one) {
  const bool agrees = within(one);
  return {.key = std::string(one.key),
          .stated = one.claim->value,
          .computed = one.ours,
          .kind = kind_of(one.key),
          .ratio = one.claim->value / one.ours,
          .ground = Ground::method,
          .verdict = agrees ? Agreement::agrees : Agreement::ask,
          .against = "our rating",
          .likely = agrees ? "" : likely_cause(*one.claim, one.causes, one.otherwise),
          .source = std::string(one.source)};
}

/// What a shell side scaled from the sheet was taken from: our rating gives it back.
bool is_origin(const Sheet& sheet, std::string_view key) {
  const auto& drop = sheet.problem().shell_side.drop_law;
  return (key == "u_dirty" && rating::is_scaled(sheet.problem())) ||
         (key == "shell_side_pressure_drop" && drop && drop->at_state);
}

/// A verdict of the sheet against itself stands, unless our rating has a question more.
void put(Sheet& sheet, const Beside& one) {
  if (!one.claim) return;
  const auto found = std::ranges::find(sheet.verdicts, one.key, &ClaimVerdict::key);
  if (is_origin(sheet, one.key)) {
    if (found != sheet.verdicts.end() && found->verdict != Agreement::not_checked) return;
    if (found != sheet.verdicts.end()) sheet.verdicts.erase(found);
    return leave_unchecked(sheet, one.key, one.claim, "our shell side is scaled from it");
  }
  if (found == sheet.verdicts.end())
    sheet.verdicts.push_back(verdict_on(one));
  else if (found->verdict == Agreement::not_checked || (found->verdict == Agreement::agrees && !within(one)))
    *found = verdict_on(one);
}

/// Scatter of U where both films scatter by themselves.
double coefficient_scatter(const overall::Resistances& r, double sum) {
  return film_scatter * std::hypot(r.tube_film, r.shell_film) / sum;
}

void check_films(Sheet& sheet, const rating::Outcome& outcome) {
  const Claims& claims = sheet.claims;
  const auto& tubes = sheet.problem().exchanger.tube_side;
  const double tube = outcome.local.tube_film.coefficient, shell = outcome.local.shell_film.coefficient;
  const double to_outside = tubes.inside_diameter / tubes.outside_diameter;
  put(sheet, {"tube_side_film_coefficient",
              claims.tube_side_film,
              tube,
              film_scatter,
              "gnielinski_1976",
              {{tube * to_outside, "film referred to the outside surface"}},
              "another correlation, or other properties"});
  Beside beside{"shell_side_film_coefficient",
                claims.shell_side_film,
                shell,
                film_scatter,
                "palen_taborek_1969",
                {{outcome.local.shell_film.ideal, "film of the ideal bank, without leakage and bypass"}},
                "another method, or leakage and bypass counted differently"};
  if (const auto& kern = sheet.ours.second_opinion)
    beside.causes.push_back({kern->local.shell_film.coefficient, "film by Kern's method"});
  put(sheet, beside);
  const auto& r = outcome.local.resistances;
  const std::string films = "films higher or lower than ours, or another fouling";
  put(sheet, {"u_dirty",
              claims.u_dirty,
              outcome.local.u_dirty,
              coefficient_scatter(r, r.sum()),
              "palen_taborek_1969",
              {{outcome.local.u_clean, "U clean printed as U dirty"}},
              films});
  put(sheet, {"u_clean",
              claims.u_clean,
              outcome.local.u_clean,
              coefficient_scatter(r, r.clean_sum()),
              "palen_taborek_1969",
              {{outcome.local.u_dirty, "U dirty printed as U clean"}},
              films});
}

void check_drops(Sheet& sheet, const rating::Outcome& outcome) {
  const Claims& claims = sheet.claims;
  const int series = sheet.problem().exchanger.shells_in_series;
  const double shell = outcome.shell_drop.total(), tube = outcome.tube_drop.total();
  const auto printed = [](const std::optional<double>& allowable) {
    return Cause{allowable.value_or(std::nan("")), "the allowable drop is printed as the calculated one"};
  };
  Beside on_shell{"shell_side_pressure_drop",
                  claims.shell_side_pressure_drop,
                  shell,
                  shell_drop_scatter,
                  "palen_taborek_1969",
                  {printed(sheet.ours.service.shell_side_allowable_drop),
                   {shell - outcome.shell_drop.nozzles, "nozzles left out"}},
                  "leakage, clearances or nozzles counted differently"};
  if (const auto& kern = sheet.ours.second_opinion)
    on_shell.causes.push_back({kern->shell_drop.total(), "drop by Kern's method"});
  Beside on_tubes{"tube_side_pressure_drop",
                  claims.tube_side_pressure_drop,
                  tube,
                  tube_drop_scatter,
                  "serth_2007",
                  {printed(sheet.ours.service.tube_side_allowable_drop),
                   {tube - outcome.tube_drop.nozzles, "nozzles left out"},
                   {outcome.tube_drop.friction, "friction alone, without turns and nozzles"}},
                  "turns, nozzles, roughness or wall counted differently"};
  if (series > 1) {
    on_shell.causes.push_back({shell / series, "drop is that of one shell"});
    on_tubes.causes.push_back({tube / series, "drop is that of one shell"});
  }
  put(sheet, on_shell);
  put(sheet, on_tubes);
}

}  // namespace

void check_against_methods(Sheet& sheet) {
  const Claims& claims = sheet.claims;
  if (const auto& outcome = sheet.ours.rating.outcome) {
    check_films(sheet, *outcome);
    check_drops(sheet, *outcome);
    return;
  }
  const std::string why = "our own rating has no result";
  leave_unchecked(sheet, "tube_side_film_coefficient", claims.tube_side_film, why);
  leave_unchecked(sheet, "shell_side_film_coefficient", claims.shell_side_film, why);
  leave_unchecked(sheet, "shell_side_pressure_drop", claims.shell_side_pressure_drop, why);
  leave_unchecked(sheet, "tube_side_pressure_drop", claims.tube_side_pressure_drop, why);
}

}  // namespace dutygauge::bids
