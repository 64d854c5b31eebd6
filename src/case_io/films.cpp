#include <fmt/format.h>

#include "parts.hpp"
#include "wording.hpp"

// Films and drops that the case gives instead of leaving them to the methods.

namespace dutygauge::case_io {
namespace {

using units::Kind;

constexpr const char* trust =
    " The result is no better than this value, which caps whatever is said of how sure it is; see that "
    "the reason still holds";

/// The reason, which an overriding key needs.
std::string reason(Reading& reading, const std::string& block, const std::string& key) {
  const auto because = word(reading.entries(), joined(block, "because"));
  if (because && !because->empty()) return std::string(*because);
  reading.note(key, "overrides the method, and nothing says why", "because: ... beside it",
               "say where the value comes from, or leave the key out");
  return {};
}

void take_fixed(Reading& reading, const std::string& block, GivenFilm& given) {
  const std::string key = joined(block, "film_coefficient");
  const auto value = si(reading.entries(), key);
  if (!value) return;
  if (reading.has(joined(block, "film_law")))
    return reading.note(key, "stands beside film_law", "one of them", "leave the other out");
  given.film = rating::FilmLaw{.value = *value};
  given.findings.push_back(
      {.id = "case.film_given",
       .severity = Severity::should,
       .text = fmt::format("the film of {} is given as {{value}} instead of being computed, because: {}. It "
                           "does not follow flow or temperature.{}",
                           last_segment(block), shown(reason(reading, block, key), 200), trust),
       .ground = Ground::judgement,
       .value = *value,
       .limit = *value,
       .kind = Kind::film_coefficient});
}

void take_multiplier(Reading& reading, const std::string& block, GivenFilm& given) {
  const std::string key = joined(block, "film_multiplier");
  const auto value = si(reading.entries(), key);
  if (!value) return;
  given.multiplier = *value;
  given.findings.push_back(
      {.id = "case.film_multiplied",
       .severity = Severity::should,
       .text = fmt::format("the film of {} is multiplied by {:.4g}, because: {}.{}", last_segment(block),
                           *value, shown(reason(reading, block, key), 200), trust),
       .ground = Ground::judgement,
       .value = *value,
       .limit = 1.0});
}

void take_film_law(Reading& reading, const std::string& block, GivenFilm& given) {
  const Entries& entries = reading.entries();
  const std::string law = joined(block, "film_law");
  const auto value = si(entries, joined(law, "value")), at_flow = si(entries, joined(law, "at_flow")),
             exponent = si(entries, joined(law, "flow_exponent")),
             slope = si(entries, joined(law, "temperature_slope")),
             at_temperature = si(entries, joined(law, "at_temperature"));
  if (!value || !at_flow || !exponent) return;
  if (slope && !at_temperature)
    return reading.note(law, "temperature_slope needs at_temperature, where the value holds",
                        "at_temperature: 46 degC beside it", "add it, or leave the slope out");
  given.film = rating::FilmLaw{.value = *value,
                               .at_flow = *at_flow,
                               .flow_exponent = *exponent,
                               .temperature_slope = slope.value_or(0.0),
                               .at_temperature = at_temperature.value_or(0.0)};
  const bool is_shell = block.ends_with("shell_side");
  const auto surface = word(entries, joined(law, "surface"));
  given.on_other_surface = surface && (*surface == "outside") != is_shell;
}

void take_drop_law(const Entries& entries, const std::string& block, GivenFilm& given) {
  const std::string law = joined(block, "pressure_drop_law");
  const auto value = si(entries, joined(law, "value")), at_flow = si(entries, joined(law, "at_flow")),
             exponent = si(entries, joined(law, "flow_exponent"));
  if (value && at_flow && exponent)
    given.drop = rating::DropLaw{.value = *value, .at_flow = *at_flow, .flow_exponent = *exponent};
}

}  // namespace

GivenFilm given_film_of(Reading& reading, const std::string& side) {
  const std::string block = "streams." + side;
  GivenFilm given;
  take_fixed(reading, block, given);
  take_multiplier(reading, block, given);
  take_film_law(reading, block, given);
  take_drop_law(reading.entries(), block, given);
  const bool is_from_sheet = side == "shell_side" && is_scaled(reading.entries());
  if (reading.has("exchanger.area") && !is_from_sheet && !reading.has(joined(block, "film_law")) &&
      !reading.has(joined(block, "film_coefficient")))
    reading.note(block, "without dimensions of the exchanger its film cannot be computed",
                 "film_law or film_coefficient", "add either, or give tubes, shell and baffles");
  return given;
}

void put_film(const GivenFilm& given, bool is_shell_side, rating::Problem& problem) {
  rating::Stream& stream = is_shell_side ? problem.shell_side : problem.tube_side;
  (is_shell_side ? problem.factors.shell_film : problem.factors.tube_film) = given.multiplier;
  stream.drop_law = given.drop;
  stream.film_law = given.film;
  if (!given.film || !given.on_other_surface) return;
  const double ratio = problem.exchanger.outside_per_inside;
  stream.film_law->value *= is_shell_side ? 1.0 / ratio : ratio;
}

}  // namespace dutygauge::case_io
