#include <algorithm>
#include <cmath>

#include "flow.hpp"

namespace dutygauge::shellside {
namespace {

/// Below this the film stands still, so that no flow still has one.
constexpr double least_reynolds = 0.01;

/// J_mu: what the wall's temperature does to the film.
double wall_factor(const fluids::State& bulk, const fluids::State& wall) {
  if (bulk.phase == fluids::Phase::gas)
    return wall.temperature > bulk.temperature ? std::sqrt(std::sqrt(bulk.temperature / wall.temperature))
                                               : 1.0;
  return std::pow(viscosity_ratio(bulk, wall), 0.14);
}

/// J_r: an adverse temperature gradient builds up over many rows in deep laminar flow.
double laminar_factor(const Bundle& bundle, double reynolds) {
  if (reynolds >= 100.0 || bundle.drawing.shell_type == 'X') return 1.0;
  const double at_20 = bundle.j_laminar_20;
  const double factor = reynolds <= 20.0 ? at_20 : at_20 + (reynolds - 20.0) * (1.0 - at_20) / 80.0;
  return std::clamp(factor, 0.4, 1.0);
}

/// Low fins lose their gaps to slow flow: 0.58 + 0.42 log10(Re/20)/log10(50), 1 from Re 1000 on.
/// Source: Taborek, HEDH 3.3 (1983), as restated by Thome, Engineering Data Book III, ch. 3.
double fin_factor(const Bundle& bundle, double reynolds) {
  if (!bundle.drawing.blocked_diameter || reynolds >= 1000.0) return 1.0;
  return 0.58 + 0.42 * std::log(std::max(reynolds, 20.0) / 20.0) / std::log(50.0);
}

void set_flow(const Bundle& bundle, double mass_flux, const fluids::State& bulk, Film& film) {
  film.prandtl = bulk.prandtl();
  film.mass_flux = mass_flux;
  film.velocity = mass_flux / bulk.density;
  film.crossflow_area = bundle.crossflow_area;
}

Film kern_film(const Bundle& bundle, double mass_flow, const fluids::State& bulk, const fluids::State& wall) {
  const double diameter = bundle.kern_equivalent_diameter;
  Film film;
  set_flow(bundle, mass_flux(bundle, mass_flow), bulk, film);
  film.reynolds = diameter * film.mass_flux / bulk.viscosity;
  film.coefficient = 0.36 * bulk.conductivity / diameter *
                     std::pow(std::max(film.reynolds, least_reynolds), 0.55) * std::cbrt(film.prandtl) *
                     wall_factor(bulk, wall);
  return film;
}

}  // namespace

Film film(const Bundle& bundle, double mass_flow, const fluids::State& bulk, const fluids::State& wall) {
  if (bundle.method == Method::kern) return kern_film(bundle, mass_flow, bulk, wall);
  const double diameter = bundle.drawing.flow_diameter();
  Film film;
  set_flow(bundle, mass_flux(bundle, mass_flow), bulk, film);
  film.reynolds = diameter * film.mass_flux / bulk.viscosity;

  const double reynolds = std::max(film.reynolds, least_reynolds);
  const double turbulent = turbulent_share(reynolds);
  film.j_cut = bundle.j_cut;
  film.j_leakage = bundle.j_leakage;
  film.j_bypass = numerics::log_blend(bundle.laminar.j_bypass, bundle.turbulent.j_bypass, turbulent);
  film.j_spacing = numerics::log_blend(bundle.laminar.j_spacing, bundle.turbulent.j_spacing, turbulent);
  film.j_laminar = laminar_factor(bundle, reynolds);

  const double root = std::cbrt(film.prandtl);
  const double mass_flux_used = reynolds * bulk.viscosity / diameter;
  film.ideal = colburn_factor(bundle.bank, reynolds) * fin_factor(bundle, reynolds) * bulk.heat_capacity *
               mass_flux_used / (root * root);
  film.coefficient = film.ideal * film.j_cut * film.j_leakage * film.j_bypass * film.j_spacing *
                     film.j_laminar * wall_factor(bulk, wall);
  return film;
}

}  // namespace dutygauge::shellside
