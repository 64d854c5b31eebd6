#pragma once
#include <array>

#include "dutygauge/findings.hpp"
#include "dutygauge/fluids.hpp"
#include "dutygauge/geometry.hpp"

/// Film coefficient and pressure drop outside the tubes of one shell.
///
/// Default: the Bell-Delaware method in Taborek's form, for single-segmental baffles
/// and plain tubes. Other shells are rated as an E shell of full cross-section with a
/// share of the flow and several runs in sequence:
///
///     shell                 E    F    G    J    H    X
///     flow / given flow     1    2    1    1/2  1/2  1
///     runs in sequence      1    2    2    1    2    1
///
/// Source: J. Taborek, Heat Exchanger Design Handbook 3.3 (1983), as restated by
/// J. R. Thome, Engineering Data Book III, ch. 3. G, H and X: reasoning from it.
namespace dutygauge::shellside {

enum class Method { bell_delaware, kern };

/// Ideal tube bank: constants of one layout with what its pitch makes of them.
///
///     j = a1 (1.33 D_t/p_t)^a Re^a2,  a = a3/(1 + 0.14 Re^a4)
///     f = b1 (1.33 D_t/p_t)^b Re^b2,  b = b3/(1 + 0.14 Re^b4)
///
/// Valid:  10 < Re < 1e5, pitch ratio about 1.25 to 1.5. 60 deg takes the 30 deg set.
///         Rows meet at Re 10, 100, 1000, 10 000; there ln j and ln f go over from one
///         to the next by a smoothstep in ln Re, over a factor 1.25 to both sides.
/// Source: Taborek 1983, table of Thome ch. 3, with one print corrected (ideal_bank.cpp).
struct IdealBank {
  struct Row {
    double log_a1 = 0, a2 = 0, log_b1 = 0, b2 = 0;
  };
  std::array<Row, 5> rows;  ///< by rising Re
  double a3 = 0, a4 = 0, b3 = 0, b4 = 0;
  double log_pitch = 0;  ///< ln(1.33 D_t/p_t)
};
IdealBank ideal_bank(int layout, double pitch_ratio);

/// Heat transfer factor j [-] of an ideal bank; Needs: Re > 0.
double colburn_factor(const IdealBank& bank, double reynolds);

/// Friction factor f [-] of an ideal bank: the drop is 4 f N G^2/(2 rho) for N rows. Needs: Re > 0.
double bank_friction(const IdealBank& bank, double reynolds);

/// The terms of a method that depend on the drawing alone. Those that differ between
/// laminar and turbulent flow are evaluated once with either set of constants; between
/// Re 50 and 200 they are blended by a smoothstep in ln Re, so that neither film nor
/// drop steps at Re 100.
struct Bundle {
  geometry::ShellSide drawing;
  Method method = Method::bell_delaware;
  double flow_share = 1;                 ///< flow in the shell rated / flow given [-]
  int runs = 1;                          ///< baffled runs in sequence
  double centreline_area = 0;            ///< S_m of the shell rated (Kern: A_s) [m2]
  double crossflow_area = 0;             ///< that of one real stream [m2]
  double window_tube_fraction = 0;       ///< F_w [-]
  double rows_between_tips = 0;          ///< N_tcc [-], not rounded; X: all rows
  double rows_in_window = 0;             ///< N_tcw [-], not rounded
  double window_area = 0;                ///< S_w [m2]
  double window_hydraulic_diameter = 0;  ///< D_w [m]
  double leakage_area_ratio = 0;         ///< r_lm [-]
  double shell_leakage_share = 0;        ///< r_s [-]
  double bypass_area_ratio = 0;          ///< F_sbp [-]
  double j_cut = 1, j_leakage = 1;       ///< J_c, J_l [-]
  double j_laminar_20 = 1;               ///< J_r at Re <= 20, before its limits [-]
  double r_leakage = 1;                  ///< R_l [-]
  struct Constants {
    double j_bypass = 1, j_spacing = 1, r_bypass = 1, r_ends = 2;
  };
  Constants laminar, turbulent;  ///< the sets for Re <= 100 and above
  IdealBank bank;

  double crossflow_rows = 0;   ///< rows crossed in all inner spaces, times R_l [-]
  double end_rows = 0;         ///< rows crossed in one end space, all runs, R_s not in it [-]
  double window_heads = 0;     ///< N_b (1 + 0.3 N_tcw) R_l, all runs: times G_w^2/rho
  double window_turns = 0;     ///< N_b R_l, all runs: times G_w^2/rho in laminar flow
  double window_viscous = 0;   ///< 26 N_b R_l [N_tcw/(p_t - D_t) + L_bc/D_w^2]: times G_w mu/rho [1/m]
  double area_ratio_root = 0;  ///< G_w/G = sqrt(S_m/S_w) [-]
  double nozzle_factor = 0;    ///< drop of both nozzles = this x m^2/rho [1/m4]
  double kern_equivalent_diameter = 0;  ///< D_e [m]
  double kern_lengths = 0;              ///< D_s (N_b + 1)/(2 D_e), all runs [-]
};

/// Film on the outside of the tubes, plain-tube area.
struct Film {
  double coefficient = 0;     ///< with all factors and the wall correction [W/m2.K]
  double ideal = 0;           ///< ideal bank, without the wall correction; 0 with Kern [W/m2.K]
  double reynolds = 0;        ///< on the tube outside diameter (Kern: on D_e) [-]
  double prandtl = 0;         ///< bulk [-]
  double velocity = 0;        ///< G/rho in the crossflow area [m/s]
  double mass_flux = 0;       ///< [kg/m2.s]
  double crossflow_area = 0;  ///< of one stream, to which the flux belongs [m2]
  double j_cut = 1, j_leakage = 1, j_bypass = 1, j_spacing = 1, j_laminar = 1;  ///< [-]
};

/// Pressure drop of one shell [Pa].
struct PressureDrop {
  double crossflow = 0, window = 0, ends = 0, nozzles = 0;
  double total() const { return crossflow + window + ends + nozzles; }
  PressureDrop times(double factor) const {
    return {crossflow * factor, window * factor, ends * factor, nozzles * factor};
  }
};

/// Whether a method can rate a shell (key `methods.shell_side`).
Objections objections(const geometry::ShellSide& drawing, Method method);

/// Prepares a shell for a method. Needs: geometry::objections was empty and so are
/// `objections`; throws std::invalid_argument otherwise.
Bundle prepare(const geometry::ShellSide& drawing, Method method);

/// Film with `mass_flow` [kg/s] through one shell. No findings, no allocation.
///
///     Bell-Delaware:  h = j cp G Pr^(-2/3) J_c J_l J_b J_s J_r J_mu
///         J_c = 0.55 + 0.72 F_c, 1 without tubes in the windows
///         J_l = 0.44(1-r_s) + [1 - 0.44(1-r_s)] exp(-2.2 r_lm)
///         J_b = exp{-C F_sbp [1 - (2 r_ss)^(1/3)]}, C = 1.35 laminar, 1.25
///         J_s = [(N_b-1) + l_i^(1-n) + l_o^(1-n)]/[(N_b-1) + l_i + l_o], n = 1/3 laminar, 0.6
///         J_r = (10/N_c)^0.18 up to Re 20, linear to 1 at Re 100; within 0.4 and 1
///     Kern:           h = 0.36 (k/D_e) Re^0.55 Pr^(1/3) J_mu, 2e3 < Re < 1e6
///         D_e = 4 (pitch cell - pi D_t^2/4)/(pi D_t), G = m p_t/[D_s (p_t - D_t) L_bc]
///     both:           J_mu = (mu/mu_w)^0.14; gas (T/T_w)^0.25 if heated, else 1
///
/// The film of Re below 0.01 is that of Re = 0.01, so that no flow still has a film.
/// Source: Taborek 1983; Kern 1950, its chart as the usual equation.
Film film(const Bundle& bundle, double mass_flow, const fluids::State& bulk, const fluids::State& wall);

/// Pressure drop with `mass_flow` [kg/s] through one shell, flange to flange, no static head.
///
///     Bell-Delaware:  dp_i = 2 f N_tcc (G^2/rho) R_mu
///         crossflow = (N_b - 1) dp_i R_b R_l
///         window    = N_b (2 + 0.6 N_tcw) G_w^2/(2 rho) R_l, G_w = m/sqrt(S_m S_w); laminar:
///                     N_b {26 (G_w mu/rho)[N_tcw/(p_t - D_t) + L_bc/D_w^2] + G_w^2/rho} R_l
///         ends      = dp_i (1 + N_tcw/N_tcc) R_b R_s
///     Kern:           f G^2 D_s (N_b + 1)/(2 rho D_e (mu/mu_w)^0.14), f = exp(0.576 - 0.19 ln Re),
///                     400 < Re < 1e6; all of it in `crossflow`
///     both:           nozzles 1.5 heads in (2.5 with an impingement plate) + 0.5 out
///
/// R_mu = (mu/mu_w)^(-0.14) for liquids, 1 for gases; not in the windows: turning does not feel the wall.
/// Source: Taborek 1983; Kern 1950; nozzles Sinnott, Chemical Engineering Design (recalled).
PressureDrop pressure_drop(const Bundle& bundle, double mass_flow, const fluids::State& bulk,
                           const fluids::State& wall);

/// What has to be said of the drawing for this method (cut, spacing, areas out of range).
Findings check_bundle(const Bundle& bundle);

/// What has to be said of a converged film: ranges, blend zone between Re 50 and 200.
Findings check_film(const Bundle& bundle, const Film& film);

}  // namespace dutygauge::shellside
