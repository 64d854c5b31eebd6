#pragma once
#include <optional>

#include "dutygauge/findings.hpp"

/// Flow arrangement: P, R, NTU and F. Knows no fluid, no geometry, no file.
/// Everything is referred to the tube side: P = (t_out - t_in)/(T_in - t_in),
/// R = C_tube/C_shell, NTU = UA/C_tube. Never an eps(NTU, C_min/C_max) interface:
/// most shells are not symmetric in their two streams.
namespace dutygauge::arrangement {

enum class Flow { counter, parallel };

/// Which way the streams pass each other, for one train of shells.
struct Arrangement {
  char shell_type = 'E';  ///< TEMA letter
  int tube_passes = 1;    ///< per shell
  int shells_in_series = 1;
  Flow flow = Flow::counter;  ///< one-pass E shells
};

/// P [-] at capacity ratio R and total NTU of the train. 0 at NTU = 0.
double effectiveness(const Arrangement& arrangement, double capacity_ratio, double ntu);

/// The largest P [-] the arrangement reaches at R, at whatever NTU.
double largest_effectiveness(const Arrangement& arrangement, double capacity_ratio);

/// The smallest total NTU [-] with that P; empty when P cannot be reached.
std::optional<double> ntu_for(const Arrangement& arrangement, double capacity_ratio,
                              double temperature_effectiveness);

/// NTU [-] that pure counterflow needs for P at R; empty for P >= min(1, 1/R).
std::optional<double> counterflow_ntu(double capacity_ratio, double temperature_effectiveness);

/// LMTD correction factor F = counterflow NTU / NTU [-]; empty where undefined.
std::optional<double> lmtd_correction(const Arrangement& arrangement, double capacity_ratio, double ntu);

/// Log-mean [K] of the terminal differences of counterflow; 0 if either is <= 0.
double log_mean(double difference_1, double difference_2);

/// Whether the functions above answer for it; they throw std::invalid_argument where not.
bool is_built(const Arrangement& arrangement);

/// Whether this arrangement is built; if not, the objection says what is.
Objections objections(const Arrangement& arrangement);

}  // namespace dutygauge::arrangement
