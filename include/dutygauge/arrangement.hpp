#pragma once
#include <array>
#include <optional>
#include <span>

#include "dutygauge/findings.hpp"

/// Flow arrangement: P, R, NTU and F. Knows no fluid, no geometry, no file.
/// Everything is referred to the tube side: P = (t_out - t_in)/(T_in - t_in),
/// R = C_tube/C_shell, NTU = UA/C_tube. Never an eps(NTU, C_min/C_max) interface:
/// most shells are not symmetric in their two streams.
///
/// Assumes: constant U and heat capacities, steady, no loss to the surroundings, no
/// conduction along the streams, each stream spread evenly over its tubes or section.
namespace dutygauge::arrangement {

enum class Flow { counter, parallel };

enum class FirstTubePass { against_shell_flow, with_shell_flow };

/// How far a stream crossing the tubes evens out its temperature.
enum class Mixing {
  between_passes,  ///< X: neither stream inside a pass, the shell stream between passes
  nowhere,         ///< X: the shell stream on no part of its way
  shell_stream     ///< X: the shell stream along the tubes. H: the two streams meeting at mid-length mix
};

constexpr int most_unequal_passes = 16;

/// Which way the streams pass each other, for one train of equal shells.
struct Arrangement {
  char shell_type = 'E';  ///< TEMA letter: E F G H J K X
  int tube_passes = 1;    ///< per shell
  int shells_in_series = 1;
  /// One-pass E: of the whole train. X of several passes: counter when the shell
  /// stream meets the last pass first.
  Flow flow = Flow::counter;

  /// E: the direction of the first pass. F, G, H: against is the first half of the
  /// passes beside the shell stream's way out, with is beside its way in.
  FirstTubePass first_tube_pass = FirstTubePass::against_shell_flow;
  /// Such trains side by side, which share the shell stream evenly while the tube stream passes
  /// them one after another.
  int trains_in_turn = 1;
  Flow shells_order = Flow::counter;  ///< parallel: both streams enter the same shell first
  Mixing mixing = Mixing::between_passes;

  /// Relative surface of each pass; all 0 for equal passes. E, F, G, H, J.
  std::array<double, most_unequal_passes> pass_areas{};
  double baffle_conductance = 0;  ///< F: UA of the longitudinal baffle / UA of the tubes [-]
  double tube_inlet_share = 0.5;  ///< J: of the shell flow, to the end where the tube stream enters [-]
};

/// P [-] at capacity ratio R and total NTU of the train. 0 at NTU = 0.
///
/// Closed forms where there are any. Numerical: E with an odd number of passes, G and H
/// with four or more, J with an odd number, X with the shell stream mixed nowhere, and
/// everything unequal; X of that kind counts an NTU of at most 150 a pass. K is a pool
/// stirred to one temperature, isothermal at R = 0. NaN in, NaN out.
/// Source: Underwood (1934), Bowman (1936) and Bowman, Mueller & Nagle (1940) for E and
///         trains; Schindler & Bates (1960) G; Jaw (1964) J; Nusselt (1911) X.
double effectiveness(const Arrangement& arrangement, double capacity_ratio, double ntu);

/// The largest P [-] the arrangement reaches at R, at whatever NTU.
double largest_effectiveness(const Arrangement& arrangement, double capacity_ratio);

/// The NTU [-] beyond which more surface lowers P; infinite where P always rises.
double ntu_at_largest(const Arrangement& arrangement, double capacity_ratio);

/// The smallest total NTU [-] with that P; empty when P cannot be reached.
std::optional<double> ntu_for(const Arrangement& arrangement, double capacity_ratio,
                              double temperature_effectiveness);

/// NTU [-] that pure counterflow needs for P at R; empty for P >= min(1, 1/R).
std::optional<double> counterflow_ntu(double capacity_ratio, double temperature_effectiveness);

/// LMTD correction factor F = counterflow NTU / NTU [-]; empty where undefined.
std::optional<double> lmtd_correction(const Arrangement& arrangement, double capacity_ratio, double ntu);

/// Log-mean [K] of the terminal differences of counterflow; 0 if either is <= 0.
double log_mean(double difference_1, double difference_2);

/// One of several shells side by side, as fractions of the whole; each sums to 1.
struct BankShare {
  double tube_flow, shell_flow, area;
};

/// P [-] of equal arrangements side by side between the same inlets, the streams and
/// the surface split as given. R and NTU are those of the whole bank.
double effectiveness_of_bank(const Arrangement& arrangement, std::span<const BankShare> shares,
                             double capacity_ratio, double ntu);

/// What the shell stream does between two baffles: it crosses the tubes, mixed along
/// their length, or is stirred to one temperature (a lower bound).
enum class Compartment { crossed, stirred };

/// P [-] of E shells with a finite number of segmental baffles per shell. `effectiveness`
/// is the limit of many baffles; few lower P, except in parallel flow.
/// Needs:  an E shell with equal passes.
/// Source: the models of Gardner & Taborek (1977) and Caglayan & Buthod (1976), solved here.
double effectiveness_with_baffles(const Arrangement& arrangement, double capacity_ratio, double ntu,
                                  int baffles, Compartment compartment = Compartment::crossed);

/// An arrangement's answer to one question.
struct Solved {
  double p;                 ///< [-]
  std::optional<double> f;  ///< [-], empty where undefined
  double ntu;               ///< [-]
  double p_max;             ///< the largest P at this R [-]
  double ntu_at_max;        ///< where it is reached [-]; infinite where P always rises
};

/// P and F at an NTU, with a finding where more surface lowers the duty.
Checked<std::optional<Solved>> solve_for_p(const Arrangement& arrangement, double capacity_ratio, double ntu);

/// NTU and F at a P; empty, with the finding `arrangement.infeasible`, where no surface reaches it.
Checked<std::optional<Solved>> solve_for_ntu(const Arrangement& arrangement, double capacity_ratio,
                                             double temperature_effectiveness);

/// Whether the functions above answer for it; they throw std::invalid_argument where not.
bool is_built(const Arrangement& arrangement);

/// Whether this arrangement is built; if not, the objection says what is.
Objections objections(const Arrangement& arrangement);

}  // namespace dutygauge::arrangement
