#include <nlohmann/json.hpp>
#include <stdexcept>

#include "dutygauge/report/explored.hpp"
#include "dutygauge/units.hpp"

// A result that was written as JSON, read again to be compared.

namespace dutygauge::report {
namespace {

using Json = nlohmann::json;

double kelvin(const Json& celsius) {
  return units::to_si(celsius.get<double>(), "degC", units::Kind::temperature);
}

std::optional<double> or_empty(const Json& value) {
  return value.is_number() ? std::optional(value.get<double>()) : std::nullopt;
}

double drop(const Json& side) {
  return or_empty(side.at("pressure_drop_Pa")).value_or(0.0);
}

Running running_of(const Json& result) {
  const Json &thermal = result.at("thermal"), &margins = result.at("margins");
  const Json& met = result.at("verdict").at("service_met");
  return {.duty = thermal.at("duty_W").get<double>(),
          .shell_outlet = kelvin(thermal.at("shell_side_outlet_degC")),
          .tube_outlet = kelvin(thermal.at("tube_side_outlet_degC")),
          .shell_drop = drop(result.at("shell_side")),
          .tube_drop = drop(result.at("tube_side")),
          .u_dirty = thermal.at("u_dirty_W_m2K").get<double>(),
          .duty_margin = or_empty(margins.at("duty")),
          .temperature_margin = or_empty(margins.at("temperature_K")),
          .met = met.is_boolean() ? std::optional(met.get<bool>()) : std::nullopt,
          .limited_by = result.at("verdict").at("limited_by").get<std::string>()};
}

Compared compared_of(const Json& result) {
  const Json& about = result.at("case");
  Compared one{.about = {.file = about.at("file").get<std::string>(),
                         .title = about.at("title").get<std::string>(),
                         .tag = about.at("tag").get<std::string>(),
                         .input_sha256 = result.at("input_sha256").get<std::string>()}};
  one.operating_case = result.at("operating_case").get<std::string>();
  for (const Json& input : result.at("inputs")) {
    const std::string origin = input.at("origin").get<std::string>();
    one.inputs[input.at("key").get<std::string>()] =
        input.at("as_typed").get<std::string>() + (origin == "typed" ? "" : " (" + origin + ")");
  }
  const std::string text = result.at("verdict").at("text").get<std::string>();
  if (result.at("thermal").is_null()) {
    one.no_result = text;
    return one;
  }
  one.running = running_of(result);
  one.verdict = text;
  return one;
}

}  // namespace

std::optional<Compared> recorded(std::string_view text) {
  const Json result = Json::parse(text, nullptr, false);
  if (!result.is_object() || !result.contains("schema_version")) return {};
  if (result.contains("error"))
    throw std::invalid_argument("it records that the case could not be rated, and no result");
  try {
    return compared_of(result);
  } catch (const Json::exception&) {
    throw std::invalid_argument("it is not a result that `rate --json` wrote");
  }
}

}  // namespace dutygauge::report
