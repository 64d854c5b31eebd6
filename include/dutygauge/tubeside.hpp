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
  PressureDrop times(double factor) const { return {friction * factor, turns * factor, nozzles * factor}; }
};

/// Mean Nusselt number [-] without wall correction: laminar to turbulent, continuous in Re.
/// `diameter_over_length` is D/L of one heated length.
///
///     Re <= 2300  Nu^3 = 3.66^3 + 0.7^3 + (1.615 Gz^(1/3) - 0.7)^3 + [(2/(1+22 Pr))^(1/6) Gz^(1/2)]^3
///     Re >= 4000  Nu = (xi/8)(Re-1000) Pr/[1 + 12.7 sqrt(xi/8)(Pr^(2/3)-1)] [1 + (D/L)^(2/3)]
///     between     linear in Re between the two values at 2300 and 4000
///
/// with Gz = Re Pr D/L and xi = (1.8 log10 Re - 1.5)^-2 (Konakov 1946).
/// Valid:   Pr 0.5 to 2000, Re to 5e6. Outside: continued, with a finding from check_film.
/// Errors:  laminar within 1 % of the exact solution for Gz 1 to 5e4; turbulent about 10 %;
///          between 2300 and 4000 30 % and more.
/// Assumes: constant wall temperature; velocity and temperature profiles start at the tube's inlet.
/// Source:  Gnielinski, Int. J. Heat Mass Transfer 63, 134-140 (2013); Int. Chem. Eng. 16, 359 (1976).
double nusselt(double reynolds, double prandtl, double diameter_over_length);

/// Darcy friction factor [-], all regimes in one smooth equation.
///
///     f = 8 [(8/Re)^12 + (A+B)^-1.5]^(1/12)
///     A = (2.457 ln 1/[(7/Re)^0.9 + 0.27 eps/D])^16,  B = (37530/Re)^16
///
/// Source: Churchill, Chem. Eng. 84 (24), 91-92 (1977).
double darcy_friction(double reynolds, double relative_roughness);

/// Lengths [m] after which a laminar profile no longer changes: 0.05 Re D for the
/// velocity, 0.05 Re Pr D for the temperature. Source: common practice.
double hydrodynamic_entry_length(double reynolds, double diameter);
double thermal_entry_length(double reynolds, double prandtl, double diameter);

/// Film with `mass_flow` [kg/s] through one shell, bulk state and the state at the
/// wetted wall: Nu = K nusselt(), K = (Pr/Pr_w)^0.11 for liquids, (T/T_w)^0.45 for
/// a gas being heated, 1 for a gas being cooled (Gnielinski 1976).
/// Value function of the inner solve: no findings, no allocation.
Film film(const geometry::TubeSide& tubes, double mass_flow, const fluids::State& bulk,
          const fluids::State& wall);

/// Drop [Pa] of one shell: friction f (L/D) q (mu/mu_w)^-m over the full length between the
/// tubesheets' outer faces (m = 0.25 laminar to 0.14 turbulent; gases without), turns by
/// Serth 2007, nozzles 1.0 head in and 0.5 out. No static head, no acceleration.
PressureDrop pressure_drop(const geometry::TubeSide& tubes, double mass_flow, const fluids::State& bulk,
                           const fluids::State& wall);

/// What has to be said of a converged film: ranges of the correlations, transition, velocity.
Findings check_film(const geometry::TubeSide& tubes, const Film& film, const fluids::State& bulk,
                    const fluids::State& wall);

}  // namespace dutygauge::tubeside
