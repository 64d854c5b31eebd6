#pragma once
#include "dutygauge/findings.hpp"
#include "dutygauge/fluids.hpp"
#include "dutygauge/geometry.hpp"

/// Film coefficient and pressure drop inside the tubes of one shell.
namespace dutygauge::tubeside {

enum class Regime { laminar, transition, turbulent };

/// Film on the bore.
struct Film {
  double coefficient = 0;  ///< on the INSIDE surface, with the wall correction [W/m2.K]
  double nusselt = 0;      ///< [-]
  double reynolds = 0;     ///< on the bore, bulk viscosity [-]
  double prandtl = 0;      ///< bulk [-]
  double velocity = 0;     ///< [m/s]
  double mass_flux = 0;    ///< [kg/m2.s]
  Regime regime = Regime::laminar;
};

/// Pressure drop of one shell [Pa].
struct PressureDrop {
  double friction = 0, turns = 0, nozzles = 0;
  double total() const { return friction + turns + nozzles; }
};

/// Mean Nusselt number [-] without wall correction: laminar to turbulent, continuous in Re.
/// `diameter_over_length` is D/L of one heated length.
double nusselt(double reynolds, double prandtl, double diameter_over_length);

/// Darcy friction factor [-], all regimes (Churchill 1977).
double darcy_friction(double reynolds, double relative_roughness);

/// Film with `mass_flow` [kg/s] through one shell, bulk state and the state at
/// the wetted wall. Value function of the inner solve: no findings, no allocation.
Film film(const geometry::TubeSide& tubes, double mass_flow, const fluids::State& bulk,
          const fluids::State& wall);

PressureDrop pressure_drop(const geometry::TubeSide& tubes, double mass_flow, const fluids::State& bulk,
                           const fluids::State& wall);

/// What has to be said of a converged film: ranges of the correlations, transition, velocity.
Findings check_film(const geometry::TubeSide& tubes, const Film& film, const fluids::State& bulk,
                    const fluids::State& wall);

}  // namespace dutygauge::tubeside
