#pragma once
#include "dutygauge/findings.hpp"
#include "dutygauge/fluids.hpp"
#include "dutygauge/geometry.hpp"

/// Film coefficient and pressure drop outside the tubes of one shell.
namespace dutygauge::shellside {

enum class Method { bell_delaware, kern };

/// The terms of the Bell-Delaware method that depend on the drawing alone,
/// evaluated once with the laminar and once with the turbulent constants.
struct Bundle {
  geometry::ShellSide drawing;
  Method method = Method::bell_delaware;
  double crossflow_area = 0;             ///< S_m, at the centreline [m2]
  double window_tube_fraction = 0;       ///< F_w [-]
  double rows_between_tips = 0;          ///< N_tcc [-], not rounded
  double rows_in_window = 0;             ///< N_tcw [-], not rounded
  double window_area = 0;                ///< S_w [m2]
  double window_hydraulic_diameter = 0;  ///< D_w [m]
  double leakage_area_ratio = 0;         ///< r_lm [-]
  double shell_leakage_share = 0;        ///< r_s [-]
  double bypass_area_ratio = 0;          ///< F_sbp [-]
  double j_cut = 1, j_leakage = 1;       ///< J_c, J_l [-]
  double r_leakage = 1;                  ///< R_l [-]
  struct Constants {
    double j_bypass = 1, j_spacing = 1, r_bypass = 1, r_ends = 2;
  };
  Constants laminar, turbulent;  ///< the sets for Re <= 100 and above
};

/// Film on the outside of the tubes, plain-tube area.
struct Film {
  double coefficient = 0;  ///< with all factors and the wall correction [W/m2.K]
  double ideal = 0;        ///< ideal bank, without the wall correction; 0 with Kern [W/m2.K]
  double reynolds = 0;     ///< on the tube outside diameter (Kern: on D_e) [-]
  double prandtl = 0;      ///< bulk [-]
  double velocity = 0;     ///< G/rho in the crossflow area [m/s]
  double mass_flux = 0;    ///< [kg/m2.s]
  double j_cut = 1, j_leakage = 1, j_bypass = 1, j_spacing = 1, j_laminar = 1;  ///< [-]
};

/// Pressure drop of one shell [Pa].
struct PressureDrop {
  double crossflow = 0, window = 0, ends = 0, nozzles = 0;
  double total() const { return crossflow + window + ends + nozzles; }
  PressureDrop of_shells(int count) const {
    return {crossflow * count, window * count, ends * count, nozzles * count};
  }
};

/// Prepares a shell for a method. Needs: geometry::objections was empty.
Bundle prepare(const geometry::ShellSide& drawing, Method method);

/// Film with `mass_flow` [kg/s] through one shell. No findings, no allocation.
Film film(const Bundle& bundle, double mass_flow, const fluids::State& bulk, const fluids::State& wall);

PressureDrop pressure_drop(const Bundle& bundle, double mass_flow, const fluids::State& bulk,
                           const fluids::State& wall);

/// What has to be said of the drawing for this method (cut, spacing, areas out of range).
Findings check_bundle(const Bundle& bundle);

/// What has to be said of a converged film: ranges, blend zone between Re 50 and 200.
Findings check_film(const Bundle& bundle, const Film& film);

}  // namespace dutygauge::shellside
