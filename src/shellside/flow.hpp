#pragma once
#include <algorithm>
#include <cmath>

#include "dutygauge/numerics.hpp"
#include "dutygauge/shellside.hpp"

/// What film and pressure drop share.
namespace dutygauge::shellside {

/// In the crossflow area of the shell rated, which is that of one real stream [kg/m2.s].
inline double mass_flux(const Bundle& bundle, double mass_flow) {
  return bundle.flow_share * std::max(mass_flow, 0.0) / bundle.centreline_area;
}

/// mu/mu_w [-]; kept within what any wall property can mean.
inline double viscosity_ratio(const fluids::State& bulk, const fluids::State& wall) {
  return std::clamp(bulk.viscosity / wall.viscosity, 0.01, 100.0);
}

/// Weight of the turbulent constants: 0 up to Re 50, 1 from Re 200 on.
inline double turbulent_share(double reynolds) {
  if (reynolds <= 50.0) return 0.0;
  if (reynolds >= 200.0) return 1.0;
  return numerics::smoothstep(std::log(reynolds / 50.0) / std::log(4.0));
}

}  // namespace dutygauge::shellside
