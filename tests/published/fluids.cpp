#include <cmath>
#include <cstdlib>
#include <functional>
#include <limits>
#include <map>
#include <sstream>
#include <stdexcept>
#include <string>

#include "../src/fluids/water.hpp"
#include "dutygauge/fluids.hpp"
#include "published/published.hpp"
#include "support.hpp"

// The rows of tests/data/fluid-checks.csv beside what our models give.

namespace {

using namespace dutygauge;
using fluids::State;

constexpr double missing = std::numeric_limits<double>::quiet_NaN();

/// One row of the file, its model text taken apart.
struct Check {
  std::string fluid, model, property, where;
  std::map<std::string, std::string> argument;
  double temperature = missing, pressure = missing;  // NaN where the row has none

  double number(const std::string& key) const { return std::stod(argument.at(key)); }
};

double number_or_missing(const std::string& text) {
  return text.empty() ? missing : std::stod(text);
}

Check check_of(const support::CsvRow& row) {
  Check check{
      .fluid = row.at("fluid"), .model = "", .property = row.at("property"), .where = "", .argument = {}};
  std::istringstream parts(row.at("model"));
  std::getline(parts, check.model, ';');
  for (std::string part; std::getline(parts, part, ';');)
    check.argument[part.substr(0, part.find('='))] = part.substr(part.find('=') + 1);
  check.temperature = number_or_missing(row.at("T_K"));
  check.pressure = number_or_missing(row.at("p_Pa"));
  return check;
}

double of_state(const State& state, const std::string& property) {
  if (property == "density") return state.density;
  if (property == "specific_volume") return 1.0 / state.density;
  if (property == "specific_heat") return state.heat_capacity;
  if (property == "thermal_conductivity") return state.conductivity;
  if (property == "viscosity") return state.viscosity;
  if (property == "enthalpy") return state.enthalpy;
  throw std::runtime_error("no state property " + property);
}

double if97(const Check& c) {
  const bool liquid = c.argument.at("region") == "1";
  const auto t = liquid ? fluids::water::region1(c.temperature, c.pressure)
                        : fluids::water::region2(c.temperature, c.pressure);
  return of_state({.density = t.density, .heat_capacity = t.heat_capacity, .enthalpy = t.enthalpy},
                  c.property);
}

double if97_saturation(const Check& c) {
  return c.property == "saturation_pressure" ? fluids::water::saturation_pressure(c.temperature)
                                             : fluids::water::saturation_temperature(c.pressure);
}

double if97_backward(const Check& c) {
  const double h = c.number("h");
  return h < 2e6 ? fluids::water::region1_backward(h, c.pressure)
                 : fluids::water::region2_backward(h, c.pressure);
}

double water_transport(const Check& c) {
  const fluids::water::Place place{c.temperature, c.number("rho")};
  return c.property == "viscosity" ? fluids::water::viscosity(place)
                                   : fluids::water::background_conductivity(place);
}

double water(const Check& c) {
  const auto made = fluids::make_water(c.temperature, c.pressure);
  return made.objections.empty() ? of_state(fluids::state(made.fluid, c.temperature, c.pressure), c.property)
                                 : missing;
}

double water_saturated(const Check& c) {
  const double t = fluids::water::saturation_temperature(c.pressure);
  const fluids::Fluid liquid{
      .model = fluids::WaterModel{}, .phase = fluids::Phase::liquid, .name = "", .source = ""};
  const fluids::Fluid steam{
      .model = fluids::WaterModel{}, .phase = fluids::Phase::gas, .name = "", .source = ""};
  if (c.property == "saturation_temperature") return t;
  if (c.property == "latent_heat") return enthalpy(steam, t, c.pressure) - enthalpy(liquid, t, c.pressure);
  return of_state(state(c.argument.at("phase") == "liquid" ? liquid : steam, t, c.pressure), c.property);
}

const std::map<std::string, std::function<double(const Check&)>> evaluators = {
    {"if97", if97},
    {"if97_saturation", if97_saturation},
    {"if97_backward", if97_backward},
    {"water_transport", water_transport},
    {"water", water},
    {"water_saturated", water_saturated},
};

published::Known known_of(const std::string& how) {
  if (how.starts_with("[seen]")) return published::Known::seen;
  if (how.starts_with("[memory")) return published::Known::memory;
  return published::Known::computed;
}

std::string place_of(const support::CsvRow& row) {
  std::string text = row.at("fluid") + " " + row.at("property");
  if (!row.at("T_K").empty()) text += " " + row.at("T_K") + " K";
  if (!row.at("p_Pa").empty()) text += " " + row.at("p_Pa") + " Pa";
  return text + " " + row.at("model");
}

published::Rows rows() {
  published::Rows result;
  for (const auto& row : support::read_csv(TEST_DATA "/fluid-checks.csv")) {
    const Check check = check_of(row);
    result.push_back({.source = row.at("source"),
                      .known = known_of(row.at("how")),
                      .what = place_of(row),
                      .unit = row.at("unit"),
                      .published = std::stod(row.at("value")),
                      .ours = evaluators.at(check.model)(check),
                      .tolerance = std::stod(row.at("tolerance_rel")),
                      .relative = true,
                      .reason = ""});
  }
  return result;
}

const published::Registration registration{&rows};

}  // namespace
