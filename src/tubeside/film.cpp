#include <algorithm>
#include <cmath>

#include "dutygauge/tubeside.hpp"

namespace dutygauge::tubeside {
namespace {

constexpr double laminar_end = 2300.0, turbulent_start = 4000.0;

/// Laminar mean Nusselt number at constant wall temperature with both profiles
/// developing. Source: VDI Heat Atlas 2010, G1; Gnielinski 2013. The cubes are
/// multiplied out, which leaves three roots.
double laminar_nusselt(double reynolds, double prandtl, double diameter_over_length) {
  const double graetz = reynolds * prandtl * diameter_over_length;
  const double entry = 1.615 * std::cbrt(graetz) - 0.7;
  const double profile = std::sqrt(2.0 / (1.0 + 22.0 * prandtl)) * graetz * std::sqrt(graetz);
  constexpr double developed = 3.66 * 3.66 * 3.66 + 0.7 * 0.7 * 0.7;
  return std::cbrt(developed + entry * entry * entry + profile);
}

/// Turbulent Nusselt number. Source: Gnielinski 1976, with the friction factor of Konakov 1946.
double turbulent_nusselt(double reynolds, double prandtl, double diameter_over_length) {
  const double root = 1.8 * std::log10(reynolds) - 1.5;
  const double friction = 1.0 / (root * root) / 8.0;
  const double prandtl_root = std::cbrt(prandtl), length_root = std::cbrt(diameter_over_length);
  return friction * (reynolds - 1000.0) * prandtl /
         (1.0 + 12.7 * std::sqrt(friction) * (prandtl_root * prandtl_root - 1.0)) *
         (1.0 + length_root * length_root);
}

/// 0 in laminar flow, 1 in turbulent flow, linear in Re between.
double turbulence(double reynolds) {
  return std::clamp((reynolds - laminar_end) / (turbulent_start - laminar_end), 0.0, 1.0);
}

double wall_correction(const fluids::State& bulk, const fluids::State& wall) {
  if (bulk.phase == fluids::Phase::liquid) return std::pow(bulk.prandtl() / wall.prandtl(), 0.11);
  return wall.temperature > bulk.temperature ? std::pow(bulk.temperature / wall.temperature, 0.45) : 1.0;
}

/// Velocity heads lost in channels, turns and tube ends.
/// Source: Serth 2007; one pass: entry and exit only.
double velocity_heads(int passes, bool u_tubes, double share_turbulent) {
  const double laminar = passes == 1 ? 1.75 : (u_tubes ? 2.38 : 3.25) * passes - 1.5;
  const double turbulent = passes == 1 ? 1.5 : (u_tubes ? 1.6 : 2.0) * passes - 1.5;
  return laminar + share_turbulent * (turbulent - laminar);
}

double head_in_nozzle(double mass_flow, double area, double density) {
  if (area <= 0.0) return 0.0;
  const double mass_flux = mass_flow / area;
  return mass_flux * mass_flux / (2.0 * density);
}

}  // namespace

double nusselt(double reynolds, double prandtl, double diameter_over_length) {
  if (reynolds <= laminar_end) return laminar_nusselt(reynolds, prandtl, diameter_over_length);
  if (reynolds >= turbulent_start) return turbulent_nusselt(reynolds, prandtl, diameter_over_length);
  const double g = turbulence(reynolds);
  return (1.0 - g) * laminar_nusselt(laminar_end, prandtl, diameter_over_length) +
         g * turbulent_nusselt(turbulent_start, prandtl, diameter_over_length);
}

double darcy_friction(double reynolds, double relative_roughness) {
  const double a = -2.457 * std::log(std::pow(7.0 / reynolds, 0.9) + 0.27 * relative_roughness);
  const auto power_4 = [](double x) { return x * x * x * x; };
  const double a_16 = power_4(power_4(a));
  const double b_16 = power_4(power_4(37530.0 / reynolds));
  const double sum = a_16 + b_16;
  const double laminar = 8.0 / reynolds;
  const double laminar_12 = power_4(laminar) * power_4(laminar) * power_4(laminar);
  return 8.0 * std::pow(laminar_12 + 1.0 / (sum * std::sqrt(sum)), 1.0 / 12.0);
}

double hydrodynamic_entry_length(double reynolds, double diameter) {
  return 0.05 * reynolds * diameter;
}

double thermal_entry_length(double reynolds, double prandtl, double diameter) {
  return 0.05 * reynolds * prandtl * diameter;
}

Film film(const geometry::TubeSide& tubes, double mass_flow, const fluids::State& bulk,
          const fluids::State& wall) {
  Film result;
  result.mass_flux = mass_flow / tubes.flow_area;
  result.velocity = result.mass_flux / bulk.density;
  result.reynolds = result.mass_flux * tubes.inside_diameter / bulk.viscosity;
  result.prandtl = bulk.prandtl();
  result.regime = result.reynolds <= laminar_end       ? Regime::laminar
                  : result.reynolds >= turbulent_start ? Regime::turbulent
                                                       : Regime::transition;
  result.nusselt = wall_correction(bulk, wall) *
                   nusselt(result.reynolds, result.prandtl, tubes.inside_diameter / tubes.heated_length);
  result.coefficient = result.nusselt * bulk.conductivity / tubes.inside_diameter;
  return result;
}

PressureDrop pressure_drop(const geometry::TubeSide& tubes, double mass_flow, const fluids::State& bulk,
                           const fluids::State& wall) {
  const double mass_flux = mass_flow / tubes.flow_area;
  const double head = mass_flux * mass_flux / (2.0 * bulk.density);
  const double reynolds = mass_flux * tubes.inside_diameter / bulk.viscosity;
  const double share_turbulent = turbulence(reynolds);
  const double exponent = 0.25 + (0.14 - 0.25) * share_turbulent;
  const double wall_factor =
      bulk.phase == fluids::Phase::liquid ? std::pow(bulk.viscosity / wall.viscosity, -exponent) : 1.0;
  PressureDrop drop;
  drop.friction = darcy_friction(reynolds, tubes.roughness / tubes.inside_diameter) * tubes.friction_length /
                  tubes.inside_diameter * head * wall_factor;
  drop.turns = velocity_heads(tubes.passes, tubes.u_tubes, share_turbulent) * head;
  drop.nozzles = head_in_nozzle(mass_flow, tubes.nozzle_in_area, bulk.density) +
                 0.5 * head_in_nozzle(mass_flow, tubes.nozzle_out_area, bulk.density);
  return drop;
}

}  // namespace dutygauge::tubeside
