#include "gas.hpp"

#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "catalogue.hpp"
#include "limits.hpp"
#include "water.hpp"

namespace dutygauge::fluids {
namespace {

/// ln of the pressure at which a component condenses alone; only below its critical temperature.
double log_condensing_pressure(const GasRow& row, double temperature) {
  if (row.formula == "H2O") return std::log(water::saturation_pressure(std::max(temperature, 273.15)));
  return std::log(row.critical.pressure) +
         log_reduced_vapour_pressure(temperature / row.critical.temperature, row.critical.acentric_factor);
}

/// How far the components are from condensing, each at its own partial pressure.
double dew_margin(const GasModel& model, Inlet at) {
  double margin = 1e3;
  for (int i = 0; i < model.count; ++i) {
    const auto k = static_cast<std::size_t>(i);
    const GasRow& row = *model.component[k];
    if (at.temperature < row.critical.temperature)
      margin = std::min(margin, log_condensing_pressure(row, at.temperature) -
                                    std::log(model.mole_fraction[k] * at.pressure));
  }
  return margin;
}

bool is_mixture(const GasModel& model) {
  return model.count > 1;
}

Made gas_of(GasModel model, std::string name) {
  Made made;
  const auto count = static_cast<std::size_t>(model.count);
  model.thermal = mixed_thermal(std::span(model.component).first(count),
                                std::span<const double>(model.mole_fraction).first(count));
  made.fluid.model = model;
  made.fluid.phase = Phase::gas;
  made.fluid.name = std::move(name);
  made.fluid.source = "nasa_tm4513";
  return made;
}

const GasRow* gas_row(std::string_view name) {
  for (const GasRow& row : gas_rows())
    if (same_name(row.name, name) || same_name(row.formula, name)) return &row;
  return same_name(name, "steam") || same_name(name, "water_vapour") ? gas_row("water") : nullptr;
}

std::string known_gases() {
  std::string names;
  for (const GasRow& row : gas_rows()) names += (names.empty() ? "" : ", ") + std::string(row.name);
  return names;
}

void object_to_share(const GasShare& share, const std::string& key, Objections& objections) {
  if (gas_row(share.name) == nullptr)
    objections.push_back({key, fmt::format("'{}' is not a gas known here", share.name),
                          "one of " + known_gases(), "correct the name, or give the mixture as a table"});
  if (!(share.mole_fraction >= 0.0 && share.mole_fraction <= 1.0))
    objections.push_back({key, fmt::format("a mole fraction of {:.4g} is impossible", share.mole_fraction),
                          "a fraction from 0 to 1", "correct the value"});
}

/// Objections to the shares; `sum` is what they add up to.
Objections object_to_shares(const std::vector<GasShare>& shares, double sum) {
  Objections objections;
  std::vector<const GasRow*> seen;
  for (const GasShare& share : shares) {
    const std::string key = "gas_mixture.mole_fractions." + share.name;
    object_to_share(share, key, objections);
    const GasRow* row = gas_row(share.name);
    if (row != nullptr && std::ranges::find(seen, row) != seen.end())
      objections.push_back({key, "the gas is given twice", "each gas once", "add the two fractions"});
    seen.push_back(row);
  }
  if (objections.empty() && !(std::abs(sum - 1.0) <= 0.01))
    objections.push_back({"gas_mixture.mole_fractions", fmt::format("the fractions add up to {:.4g}", sum),
                          "mole fractions that add up to 1",
                          "look for a missing gas, or for volume per cent of the dry gas"});
  return objections;
}

}  // namespace

State state_of(const GasModel& model, Phase phase, double temperature, double pressure) {
  const GasState thermal = gas_state(model.thermal, {temperature, pressure});
  std::array<Component, 13> components;
  const auto count = static_cast<std::size_t>(model.count);
  for (std::size_t i = 0; i < count; ++i)
    components[i] = {model.mole_fraction[i], model.component[i]->molar_mass,
                     dilute_transport(*model.component[i], temperature)};
  const Transport transport = mixed_transport(std::span<const Component>(components).first(count));
  return {.temperature = temperature,
          .density = thermal.density,
          .heat_capacity = thermal.heat_capacity,
          .conductivity = transport.conductivity,
          .viscosity = transport.viscosity,
          .enthalpy = thermal.enthalpy,
          .phase = phase};
}

Caloric caloric_of(const GasModel& model, Phase, double temperature, double pressure) {
  const GasState thermal = gas_state(model.thermal, {temperature, pressure});
  return {thermal.enthalpy, thermal.heat_capacity};
}

Limits reach_of(const GasModel& model) {
  return extended(model.thermal.range);
}

double phase_margin(const GasModel& model, Inlet at, bool strict) {
  return std::min(virial_margin(model.thermal, at, strict), dew_margin(model, at));
}

PhaseEnd phase_end(const GasModel& model, Inlet at) {
  if (virial_margin(model.thermal, at, false) < dew_margin(model, at))
    return {"it departs too far from an ideal gas (give a table)", false};
  return {is_mixture(model) ? "one of its gases begins to condense" : "it condenses", true};
}

bool freezes_at_low_end(const GasModel&) {
  return false;
}

std::vector<PropertyNote> notes_of(const GasModel& model, Phase) {
  bool hydrogen = false;
  for (int i = 0; i < model.count; ++i) {
    const auto k = static_cast<std::size_t>(i);
    hydrogen = hydrogen || (model.component[k]->formula == "H2" && model.mole_fraction[k] > 0.2);
  }
  const bool mixture = is_mixture(model);
  const TemperatureRange range = model.thermal.range;
  const double conductivity = mixture ? (hydrogen ? 0.10 : 0.05) : (hydrogen ? 0.05 : 0.04);
  const double viscosity = mixture ? (hydrogen ? 0.05 : 0.04) : 0.03;
  return {{"density", "smith_van_ness_abbott", range, 0.005},
          {"heat_capacity", "nasa_tm4513", range, 0.01},
          {"conductivity", mixture ? "mason_saxena_1958" : "perry_2008", range, conductivity},
          {"viscosity", mixture ? "wilke_1950" : "perry_2008", range, viscosity}};
}

Made make_gas(std::string_view name) {
  const GasRow* row = gas_row(name);
  if (row == nullptr || row->formula == "H2O")
    return refused("", fmt::format("'{}' is not a gas known here", name), "one of " + known_gases(),
                   "correct the name, or give the properties as a table");
  GasModel model{};
  model.count = 1;
  model.component[0] = row;
  model.mole_fraction[0] = 1.0;
  return gas_of(model, spoken(row->name));
}

Made make_gas_mixture(const std::vector<GasShare>& shares) {
  double sum = 0.0;
  for (const GasShare& share : shares) sum += share.mole_fraction;
  Objections objections = object_to_shares(shares, sum);
  if (!objections.empty()) {
    Made made;
    made.objections = std::move(objections);
    return made;
  }
  GasModel model{};
  for (const GasShare& share : shares) {
    if (share.mole_fraction <= 0.0) continue;
    const auto k = static_cast<std::size_t>(model.count++);
    model.component[k] = gas_row(share.name);
    model.mole_fraction[k] = share.mole_fraction / sum;
  }
  Made made = gas_of(model, "gas mixture");
  if (std::abs(sum - 1.0) > 1e-9)
    made.findings.push_back(
        {.id = "fluids.fractions_scaled",
         .severity = Severity::note,
         .text = fmt::format("the mole fractions of the gas mixture add up to {:.5g}; they "
                             "were divided by that sum",
                             sum),
         .ground = Ground::arithmetic,
         .value = sum,
         .limit = 1.0,
         .source = ""});
  return made;
}

}  // namespace dutygauge::fluids
