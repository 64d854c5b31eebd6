#include "oil.hpp"

#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "limits.hpp"

// Viscosity against temperature: ASTM D341 (Walther), kinematic viscosity in mm2/s.

namespace dutygauge::fluids {
namespace {

constexpr double reference = 288.15;  // [K], the 15 degC of the density tables
constexpr double enthalpy_zero = 273.15;

/// ln ln Z of a viscosity [m2/s].
double walther_ordinate(double viscosity) {
  const double nu = viscosity * 1e6;
  return std::log(std::log(nu + 0.7 + std::exp(-1.47 - 1.84 * nu - 0.51 * nu * nu)));
}

}  // namespace

void fit_walther(const ViscosityPoint& one, const ViscosityPoint& other, OilModel& model) {
  const double w1 = walther_ordinate(one.viscosity), w2 = walther_ordinate(other.viscosity);
  model.walther_b = (w1 - w2) / std::log(other.temperature / one.temperature);
  model.walther_a = w1 + model.walther_b * std::log(one.temperature);
}

double walther_viscosity(const OilModel& model, double temperature) {
  const double z = std::exp(std::exp(model.walther_a - model.walther_b * std::log(temperature))) - 0.7;
  // Above 10 mm2/s the correction is below 1e-100.
  const double correction = z > 10.0 ? 0.0 : std::exp(-0.7487 + z * (-3.295 + z * (0.6119 - 0.3193 * z)));
  return 1e-6 * (z - correction);
}

double oil_density(const OilModel& model, double temperature) {
  const double rise = model.expansion * (temperature - reference);
  return model.density_15c * std::exp(-rise * (1.0 + 0.8 * rise));
}

State state_of(const OilModel& model, Phase phase, double temperature, double pressure) {
  const Caloric caloric = caloric_of(model, phase, temperature, pressure);
  const double density = oil_density(model, temperature);
  return {.temperature = temperature,
          .density = density,
          .heat_capacity = caloric.heat_capacity,
          .conductivity = model.conductivity[0] + model.conductivity[1] * temperature,
          .viscosity = density * walther_viscosity(model, temperature),
          .enthalpy = caloric.enthalpy,
          .phase = phase};
}

Caloric caloric_of(const OilModel& model, Phase, double t, double) {
  const auto& c = model.heat_capacity;
  const auto integral = [&](double x) { return x * (c[0] + x * (c[1] / 2.0 + x * c[2] / 3.0)); };
  return {integral(t) - integral(enthalpy_zero), c[0] + t * (c[1] + t * c[2])};
}

Limits reach_of(const OilModel& model) {
  return extended(model.range);
}

/// Boiling of the mean cut; lighter parts boil earlier, which nothing here can know.
double phase_margin(const OilModel& model, Inlet at, bool) {
  if (model.critical_temperature <= 0.0) return 1.0;
  return std::log(at.pressure / model.critical_pressure) -
         log_reduced_vapour_pressure(at.temperature / model.critical_temperature, model.acentric_factor);
}

PhaseEnd phase_end(const OilModel&, Inlet) {
  return {"its mean boiling point is reached", true};
}

bool freezes_at_low_end(const OilModel&) {
  return false;
}

std::vector<PropertyNote> notes_of(const OilModel& model, Phase) {
  const TemperatureRange density{model.range.low, std::min(model.range.high, 423.15)};
  return {{"density", "api_mpms_11_1", density, 0.01},
          {"heat_capacity", model.heat_capacity_source, model.range, model.heat_capacity_uncertainty},
          {"conductivity", "cragoe_1929", model.range, model.conductivity_uncertainty},
          {"viscosity", model.viscosity_source, model.viscosity_range, model.viscosity_uncertainty}};
}

Objections object_to_points(const std::vector<ViscosityPoint>& points, const std::string& key) {
  Objections objections;
  const auto object = [&](std::string what, std::string expected, std::string remedy) {
    objections.push_back({key, std::move(what), std::move(expected), std::move(remedy)});
  };
  if (points.size() != 2) {
    object(fmt::format("{} viscosity points", points.size()), "two points, at least 20 K apart",
           "give the viscosity at two temperatures");
    return objections;
  }
  for (const auto& point : points)
    if (!(point.viscosity > 0.0 && std::isfinite(point.viscosity) && point.temperature > 1.0 &&
          std::isfinite(point.temperature)))
      object("a viscosity point is impossible", "a viscosity above zero at a temperature above absolute zero",
             "correct the value or its unit");
  if (!objections.empty()) return objections;
  const bool rising = points[1].temperature > points[0].temperature;
  const ViscosityPoint &cold = points[rising ? 0 : 1], &warm = points[rising ? 1 : 0];
  if (warm.temperature - cold.temperature < 20.0)
    object(fmt::format("the two temperatures are {:.3g} K apart", warm.temperature - cold.temperature),
           "two points at least 20 K apart", "give a second point farther away");
  else if (cold.dynamic == warm.dynamic && warm.viscosity >= cold.viscosity)
    object(fmt::format("the viscosity does not fall from {} to {}", said(cold.temperature),
                       said(warm.temperature)),
           "a lower viscosity at the higher temperature", "check whether the two values are exchanged");
  for (const auto& point : points) {
    const double least = point.dynamic ? 0.21e-6 * 500.0 : 0.21e-6, most = point.dynamic ? 20000.0 : 20.0;
    if (point.viscosity < least || point.viscosity > most)
      object(point.dynamic
                 ? fmt::format("a viscosity of {:.4g} mPa.s is outside ASTM D341", point.viscosity * 1e3)
                 : fmt::format("a viscosity of {:.4g} mm2/s is outside ASTM D341", point.viscosity * 1e6),
             "0.21 to 2e7 mm2/s", "check the unit (cSt is mm2/s, cP is mPa.s)");
  }
  return objections;
}

ViscosityPoint kinematic(const ViscosityPoint& point, const OilModel& model) {
  if (!point.dynamic) return point;
  return {point.temperature, point.viscosity / oil_density(model, point.temperature)};
}

}  // namespace dutygauge::fluids
