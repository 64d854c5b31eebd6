#include <fmt/format.h>

#include "dutygauge/rating/scaled.hpp"
#include "dutygauge/units/mention.hpp"
#include "parts.hpp"
#include "wording.hpp"

// A sheet without baffles: its shell side follows from what it states of one case.

namespace dutygauge::case_io {
namespace {

using units::Kind;

constexpr const char* u_key = "claims.u_dirty";
constexpr const char* drop_key = "claims.shell_side_pressure_drop";

Position position_of(const Document& document, const std::string& key) {
  const auto leaf = document.leaves.find(key);
  return leaf == document.leaves.end() ? Position{1, 1} : leaf->second.value_at;
}

std::string scaled_by(const char* exponent, const char* properties) {
  return fmt::format("; goes with flow^{} and {}", exponent, properties);
}

void list(const rating::ScaledShell& shell, const Case& stated_case, Assumptions& assumed) {
  const auto& r = shell.resistances;
  const auto& name = stated_case.claims.operating_case;
  const std::string where = name.empty() ? "" : " of case " + name;
  assumed.push_back({.key = "streams.shell_side.film_law.value",
                     .value = shell.film.value,
                     .kind = Kind::film_coefficient,
                     .why = fmt::format(
                         "left of the sheet's u_dirty{}, {}, once tube film, wall and both foulings ({}) are "
                         "taken off{}",
                         where, units::mention(stated_case.claims.u_dirty->value, Kind::film_coefficient),
                         units::mention(r.sum() - r.shell_film, Kind::fouling_resistance),
                         scaled_by("0.6", "k^(2/3) cp^(1/3) mu^(-4/15)")),
                     .look_in = "bundle drawing, for the baffles"});
  if (!shell.drop) return;
  assumed.push_back({.key = "streams.shell_side.pressure_drop_law.value",
                     .value = shell.drop->value,
                     .kind = Kind::pressure_difference,
                     .why = fmt::format("the sheet's shell_side_pressure_drop{}, {}{}", where,
                                        units::mention(stated_case.claims.shell_side_pressure_drop->value,
                                                       Kind::pressure_difference),
                                        scaled_by("1.8", "mu^0.2/rho")),
                     .look_in = "bundle drawing, for the baffles"});
}

}  // namespace

bool is_scaled(const Entries& entries) {
  return word(entries, "methods.shell_side") == "scaled";
}

void check_scaled(Reading& reading) {
  if (!is_scaled(reading.entries())) return;
  const bool has_drop_law = reading.has("streams.shell_side.pressure_drop_law");
  const auto need = [&](const char* key, const char* what, const char* example) {
    if (reading.entries().contains(key) || reading.is_at_fault(key)) return;
    reading.note(key,
                 fmt::format("is missing, and methods.shell_side: scaled takes the shell side's {}", what),
                 example, "add it from the sheet, or give the baffles and leave the method out");
  };
  need(u_key, "film out of it", "U with both foulings, such as 380 W/m2.K");
  if (!has_drop_law) need(drop_key, "drop from it", "the calculated drop, such as 60 kPa");
  for (const char* key : {"film_law", "film_coefficient", "film_multiplier"}) {
    const std::string given = joined("streams.shell_side", key);
    if (reading.has(given))
      reading.note(given, "stands beside methods.shell_side: scaled, which takes the film from the sheet",
                   "one of them", "leave the other out");
  }
}

void scale_shell_side(const Document& document, const Case& stated_case, Case& result) {
  const bool wants_drop = !result.problem.shell_side.drop_law;
  const auto& claimed_drop = stated_case.claims.shell_side_pressure_drop;
  const auto scaling = rating::scale_shell(
      stated_case.problem, {.u_dirty = stated_case.claims.u_dirty->value,
                            .pressure_drop = wants_drop ? std::optional(claimed_drop->value) : std::nullopt});
  if (!scaling.shell)
    throw InputError(document.file, {{position_of(document, u_key), u_key,
                                      "no shell-side film can be taken out of it: " + scaling.no_result,
                                      "a U with both foulings of the case claims.for, on the outside area",
                                      "check U, both foulings and the case it belongs to"}});
  result.problem.shell_side.film_law = scaling.shell->film;
  if (wants_drop) result.problem.shell_side.drop_law = scaling.shell->drop;
  list(*scaling.shell, stated_case, result.assumed);
  if (document.blocks.contains("exchanger.baffles"))
    result.findings.push_back(
        {.id = "case.baffles_unused",
         .severity = Severity::note,
         .text = "the shell side is scaled from the sheet: what the file says of the baffles is not used",
         .ground = Ground::method});
}

}  // namespace dutygauge::case_io
