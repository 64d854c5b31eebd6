#include <cmath>
#include <cstdlib>
#include <functional>
#include <limits>
#include <map>
#include <sstream>
#include <stdexcept>
#include <string>

#include "../src/fluids/gas.hpp"
#include "../src/fluids/liquid_data.hpp"
#include "../src/fluids/oil.hpp"
#include "../src/fluids/water.hpp"
#include "dutygauge/fluids.hpp"
#include "dutygauge/numerics.hpp"
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

double of_made(const fluids::Made& made, const Check& c) {
  return made.objections.empty() ? of_state(fluids::state(made.fluid, c.temperature, c.pressure), c.property)
                                 : missing;
}

double seawater(const Check& c) {
  const fluids::Made made = fluids::make_seawater(c.number("S"));
  if (c.property == "saturation_pressure") {
    // The pressure whose boiling point is the row's temperature.
    const auto boils_below = [&](double log_pressure) {
      return fluids::usable_temperatures(made.fluid, std::exp(log_pressure)).high - c.temperature;
    };
    return std::exp(
        numerics::find_root(boils_below, {std::log(500.0), std::log(1e5)}, 1e-9).value_or(missing));
  }
  if (c.property == "enthalpy_above_283.15K")
    return fluids::enthalpy(made.fluid, c.temperature, c.pressure) -
           fluids::enthalpy(made.fluid, 283.15, c.pressure);
  return of_made(made, c);
}

double of_transport(const fluids::Transport& transport, const std::string& property) {
  return property == "viscosity" ? transport.viscosity : transport.conductivity;
}

double air_transport(const Check& c) {
  return of_transport(fluids::air_transport({c.temperature, c.number("rho_molar")}), c.property);
}

fluids::Made single_gas(const std::string& name) {
  return name == "air" ? fluids::make_air() : fluids::make_gas(name);
}

double gas(const Check& c) {
  return of_made(single_gas(c.argument.at("gas")), c);
}

double gas_ideal_cp(const Check& c) {
  const auto made = fluids::make_gas(c.argument.at("gas"));
  return fluids::ideal_heat_capacity(std::get<fluids::GasModel>(made.fluid.model).thermal, c.temperature);
}

double gas_dilute(const Check& c) {
  if (c.argument.at("gas") == "air")
    return of_transport(fluids::air_transport({c.temperature, 0.0}), c.property);
  for (const fluids::GasRow& row : fluids::gas_rows())
    if (row.formula == c.argument.at("gas"))
      return of_transport(fluids::dilute_transport(row, c.temperature), c.property);
  return missing;
}

double wilke(const Check& c) {
  const double y1 = c.number("y1");
  const fluids::Component components[] = {{y1, c.number("M1"), {c.number("mu1"), 1.0}},
                                          {1.0 - y1, c.number("M2"), {c.number("mu2"), 1.0}}};
  return fluids::mixed_transport(components).viscosity;
}

/// These rows are of ideal gases: taken at a hundredth of the pressure, where ours nearly are.
double gas_mixture(const Check& c) {
  std::vector<fluids::GasShare> shares;
  for (const auto& [name, value] : c.argument) shares.push_back({name, std::stod(value)});
  Check thin = c;
  thin.pressure = 0.01 * c.pressure;
  const double value = of_made(fluids::make_gas_mixture(shares), thin);
  return c.property == "density" ? 100.0 * value : value;
}

double pure_liquid(const Check& c) {
  const std::string& name = c.argument.at("fluid");
  if (c.property == "vapour_pressure")
    return fluids::vapour_pressure(*fluids::liquid_row(name), c.temperature);
  Check pressed = c;  // saturated values, used at any pressure
  pressed.pressure = 1e7;
  return of_made(fluids::make_liquid(name), pressed);
}

double solution(const Check& c) {
  const fluids::Made made = fluids::make_solution(c.argument.at("fluid"), c.number("x"));
  if (c.property == "freezing_point") return fluids::usable_temperatures(made.fluid, 1e6).low;
  return of_made(made, c);
}

double petroleum_twu(const Check& c) {
  const auto points = fluids::twu_viscosities({c.number("Tb"), c.number("SG")});
  fluids::OilModel model{};
  fluids::fit_walther(points[0], points[1], model);
  return 1e6 * fluids::walther_viscosity(model, c.temperature);
}

fluids::OilGroup group_of(const std::string& name) {
  if (name == "crude oil") return fluids::OilGroup::crude;
  return name == "product" ? fluids::OilGroup::product : fluids::OilGroup::lubricating;
}

double api11(const Check& c) {
  fluids::OilModel model{};
  model.density_15c = c.number("rho15");
  model.expansion = fluids::expansion_15c(group_of(c.argument.at("group")), model.density_15c);
  return fluids::oil_density(model, c.temperature);
}

double petroleum_cp(const Check& c) {
  const auto a = fluids::kesler_lee_heat_capacity({c.number("SG"), c.number("Kw")});
  return a[0] + c.temperature * (a[1] + c.temperature * a[2]);
}

double walther(const Check& c) {
  fluids::OilModel model{};
  fluids::fit_walther({c.number("T1"), c.number("nu1") * 1e-6}, {c.number("T2"), c.number("nu2") * 1e-6},
                      model);
  return 1e6 * fluids::walther_viscosity(model, c.temperature);
}

std::vector<fluids::ViscosityPoint> points_of(const Check& c) {
  if (!c.argument.contains("nu1")) return {};
  return {{c.number("T1"), c.number("nu1") * 1e-6}, {c.number("T2"), c.number("nu2") * 1e-6}};
}

double petroleum(const Check& c) {
  if (c.property == "thermal_conductivity") {  // the rows are of Cragoe's form alone
    const auto k = fluids::cragoe_conductivity(141.5 / (c.number("API") + 131.5));
    return k[0] + k[1] * c.temperature;
  }
  return of_made(
      fluids::make_petroleum({.api = c.number("API"),
                              .watson_k = c.number("Kw"),
                              .viscosity = points_of(c),
                              .kind = c.argument.at("group") == "product" ? fluids::PetroleumKind::product
                                                                          : fluids::PetroleumKind::crude}),
      c);
}

double oil(const Check& c) {
  return of_made(fluids::make_oil({.viscosity = points_of(c), .density_15c = c.number("rho15")}), c);
}

const std::map<std::string, std::function<double(const Check&)>> evaluators = {
    {"if97", if97},
    {"if97_saturation", if97_saturation},
    {"if97_backward", if97_backward},
    {"water_transport", water_transport},
    {"water", water},
    {"water_saturated", water_saturated},
    {"seawater", seawater},
    {"air_transport", air_transport},
    {"gas", gas},
    {"gas_ideal_cp", gas_ideal_cp},
    {"gas_dilute", gas_dilute},
    {"wilke", wilke},
    {"gas_mixture", gas_mixture},
    {"pure_liquid", pure_liquid},
    {"solution", solution},
    {"petroleum_twu", petroleum_twu},
    {"api11", api11},
    {"petroleum_cp", petroleum_cp},
    {"walther", walther},
    {"petroleum", petroleum},
    {"oil", oil},
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
