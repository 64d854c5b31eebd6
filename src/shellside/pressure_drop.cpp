#include <cmath>

#include "flow.hpp"

namespace dutygauge::shellside {
namespace {

/// R_mu of liquids; gases have none.
double wall_factor(const fluids::State& bulk, const fluids::State& wall) {
  return bulk.phase == fluids::Phase::gas ? 1.0 : std::pow(viscosity_ratio(bulk, wall), -0.14);
}

double kern_drop(const Bundle& bundle, double flux, const fluids::State& bulk, const fluids::State& wall) {
  const double reynolds = bundle.kern_equivalent_diameter * flux / bulk.viscosity;
  const double friction = std::exp(0.576 - 0.19 * std::log(reynolds));
  return friction * flux * flux / bulk.density * bundle.kern_lengths * wall_factor(bulk, wall);
}

double window_drop(const Bundle& bundle, double flux, const fluids::State& bulk, double turbulent) {
  const double window_flux = flux * bundle.area_ratio_root;
  const double head = window_flux * window_flux / bulk.density;
  const double by_heads = head * bundle.window_heads;
  if (turbulent >= 1.0) return by_heads;
  const double by_friction = window_flux * bulk.viscosity / bulk.density * bundle.window_viscous;
  return numerics::log_blend(by_friction + head * bundle.window_turns, by_heads, turbulent);
}

}  // namespace

PressureDrop pressure_drop(const Bundle& bundle, double mass_flow, const fluids::State& bulk,
                           const fluids::State& wall) {
  PressureDrop drop;
  const double flux = mass_flux(bundle, mass_flow);
  if (!(flux > 0.0)) return drop;
  drop.nozzles = bundle.nozzle_factor * mass_flow * mass_flow / bulk.density;
  if (bundle.method == Method::kern) {
    drop.crossflow = kern_drop(bundle, flux, bulk, wall);
    return drop;
  }
  const double reynolds = bundle.drawing.flow_diameter() * flux / bulk.viscosity;
  const double turbulent = turbulent_share(reynolds);
  const double bypass = numerics::log_blend(bundle.laminar.r_bypass, bundle.turbulent.r_bypass, turbulent);
  const double fins = bundle.drawing.blocked_diameter ? 1.4 : 1.0;  // Taborek 1983, low fins
  const double per_row = 2.0 * fins * bank_friction(bundle.bank, reynolds) * flux * flux / bulk.density *
                         wall_factor(bulk, wall) * bypass;
  drop.crossflow = per_row * bundle.crossflow_rows;
  if (bundle.end_rows == 0.0) return drop;  // pure crossflow: no windows, no ends
  drop.ends = per_row * bundle.end_rows *
              numerics::log_blend(bundle.laminar.r_ends, bundle.turbulent.r_ends, turbulent);
  drop.window = window_drop(bundle, flux, bulk, turbulent);
  return drop;
}

}  // namespace dutygauge::shellside
