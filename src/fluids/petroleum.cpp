#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "oil.hpp"

namespace dutygauge::fluids {
namespace {

std::string said_viscosity(const ViscosityPoint& point) {
  return units::mention(point.viscosity, units::Kind::kinematic_viscosity);
}

constexpr double coldest = 223.15, density_tables_end = 423.15;  // [K]
constexpr double viscosity_reach = 30.0;                         // [K] past measured points, ASTM D341

/// Pseudo-critical constants by Kesler & Lee (1976); the acentric factor makes the
/// vapour pressure of Lee & Kesler (1975) one atmosphere at the boiling point.
void set_critical(const Basis& basis, OilModel& model) {
  const double sg = basis.specific_gravity, boiling = boiling_point(basis), tb = boiling * 1.8;
  const double critical =
      (341.7 + 811.1 * sg + (0.4244 + 0.1174 * sg) * tb + (0.4669 - 3.26238 * sg) * 1e5 / tb) / 1.8;
  const double log_psi = 8.3634 - 0.0566 / sg - (0.24244 + 2.2898 / sg + 0.11857 / (sg * sg)) * 1e-3 * tb +
                         (1.4685 + 3.648 / sg + 0.47227 / (sg * sg)) * 1e-7 * tb * tb -
                         (0.42019 + 1.6977 / (sg * sg)) * 1e-10 * tb * tb * tb;
  model.critical_temperature = critical;
  model.critical_pressure = std::exp(log_psi) * 6894.757293168;
  const double target = std::log(101325.0 / model.critical_pressure), reduced = boiling / critical;
  const double simple = log_reduced_vapour_pressure(reduced, 0.0);
  model.acentric_factor = (target - simple) / (log_reduced_vapour_pressure(reduced, 1.0) - simple);
}

std::optional<double> gravity_of(const PetroleumData& data) {
  if (data.specific_gravity) return data.specific_gravity;
  if (data.api) return 141.5 / (*data.api + 131.5);
  return {};
}

void object_to_gravity(const PetroleumData& data, Objections& objections) {
  const auto gravity = gravity_of(data);
  if (!gravity)
    objections.push_back({"petroleum", "neither api nor specific_gravity is given", "one of the two",
                          "take it from the sheet"});
  else if (data.api && data.specific_gravity &&
           std::abs(141.5 / (*data.api + 131.5) / *data.specific_gravity - 1.0) > 0.002)
    objections.push_back(
        {"petroleum.specific_gravity",
         fmt::format("{:.4g} does not agree with {:.4g} API", *data.specific_gravity, *data.api),
         fmt::format("{:.4f}, or no api", 141.5 / (*data.api + 131.5)), "leave one of them out"});
  // The density tables run from 611.2 to 1163.9 kg/m3 at 15 degC.
  else if (!(*gravity >= 0.612 && *gravity <= 1.165))
    objections.push_back({data.api ? "petroleum.api" : "petroleum.specific_gravity",
                          data.api ? fmt::format("{:.4g} API is no petroleum", *data.api)
                                   : fmt::format("a specific gravity of {:.4g} is no petroleum", *gravity),
                          "-10 to 99.7 API (specific gravity 0.612 to 1.165)", "correct the value"});
}

Objections object_to(const PetroleumData& data) {
  Objections objections;
  object_to_gravity(data, objections);
  if (data.watson_k && !(*data.watson_k >= 9.5 && *data.watson_k <= 13.5))
    objections.push_back({"petroleum.watson_k", fmt::format("{:.4g} is no Watson factor", *data.watson_k),
                          "9.5 to 13.5 (aromatic 10 to 11, mixed 11.5 to 12.2, paraffinic 12.5 to 13)",
                          "correct the value"});
  if (!data.viscosity.empty()) {
    const Objections points = object_to_points(data.viscosity, "petroleum.viscosity");
    objections.insert(objections.end(), points.begin(), points.end());
  } else if (!data.watson_k)
    objections.push_back({"petroleum.viscosity", "neither two viscosities nor watson_k is given",
                          "two viscosity points, or watson_k to estimate them",
                          "measured points are much better than an estimate"});
  return objections;
}

void set_viscosity(const PetroleumData& data, double gravity, Made& made, OilModel& model) {
  if (!data.viscosity.empty()) {
    const ViscosityPoint one = kinematic(data.viscosity[0], model),
                         other = kinematic(data.viscosity[1], model);
    fit_walther(one, other, model);
    model.viscosity_range = {std::min(one.temperature, other.temperature) - viscosity_reach,
                             std::max(one.temperature, other.temperature) + viscosity_reach};
    model.viscosity_source = "astm_d341";
    model.viscosity_uncertainty = 0.05;
    return;
  }
  const auto points = twu_viscosities({boiling_point({gravity, *data.watson_k}), gravity});
  fit_walther(points[0], points[1], model);
  model.viscosity_range = model.range;
  model.viscosity_source = "twu_1985";
  model.viscosity_uncertainty = 0.30;
  made.findings.push_back(
      {.id = "fluids.viscosity_estimated",
       .severity = Severity::should,
       .text = fmt::format("the viscosity of the petroleum is estimated from its gravity and Watson factor "
                           "({} at {}, {} at {}); it may be 30 to 50 % wrong; "
                           "give two measured points, above all for crude and residue",
                           said_viscosity(points[0]), said(points[0].temperature), said_viscosity(points[1]),
                           said(points[1].temperature)),
       .ground = Ground::method,
       .value = points[0].viscosity,
       .kind = units::Kind::kinematic_viscosity,
       .source = "twu_1985"});
}

void set_heat_capacity(const PetroleumData& data, double gravity, OilModel& model) {
  if (!data.watson_k) {
    model.heat_capacity = cragoe_heat_capacity(gravity);
    model.heat_capacity_source = "cragoe_1929";
    model.heat_capacity_uncertainty = 0.07;
    return;
  }
  const Basis basis{gravity, *data.watson_k};
  model.heat_capacity = kesler_lee_heat_capacity(basis);
  model.heat_capacity_source = "kesler_lee_1976";
  model.heat_capacity_uncertainty = 0.03;
  set_critical(basis, model);
  // Up to there the density agrees with Rackett's equation within 4 %.
  model.range.high = std::max(density_tables_end, 0.75 * model.critical_temperature);
}

void assume_kind(const PetroleumData& data, Made& made) {
  if (data.kind) return;
  made.assumed.push_back({.key = "petroleum.kind",
                          .value = 0.0,
                          .kind = units::Kind::ratio,
                          .word = "product",
                          .why = "the sheet does not say; crude expands up to 2 % more",
                          .low = {},
                          .high = {},
                          .look_in = "material balance"});
}

Finding phase_not_checked() {
  return {.id = "fluids.phase_not_checked",
          .severity = Severity::note,
          .text =
              "petroleum boils over a range: its lightest parts or dissolved gas and water may evaporate "
              "before its mean boiling point; check the bubble point at the lowest pressure",
          .ground = Ground::method,
          .source = "common_practice"};
}

}  // namespace

Made make_petroleum(const PetroleumData& data) {
  Made made;
  made.objections = object_to(data);
  if (!made.objections.empty()) return made;
  const double gravity = *gravity_of(data);
  OilModel model{};
  model.density_15c = 999.016 * gravity;
  model.expansion = expansion_15c(data.kind == PetroleumKind::crude ? OilGroup::crude : OilGroup::product,
                                  model.density_15c);
  model.range = {coldest, density_tables_end};
  model.conductivity = petroleum_conductivity(gravity);
  model.conductivity_uncertainty = 0.12;
  set_heat_capacity(data, gravity, model);
  set_viscosity(data, gravity, made, model);
  assume_kind(data, made);
  made.findings.push_back(phase_not_checked());
  made.fluid.model = model;
  made.fluid.name = "petroleum";
  made.fluid.source = "api_mpms_11_1";
  return made;
}

}  // namespace dutygauge::fluids
