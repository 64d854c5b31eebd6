#pragma once
#include "dutygauge/arrangement.hpp"

/// P [-] of one shell, by type. R and NTU are those of the shell.
namespace dutygauge::arrangement::shells {

/// E shell with an even number of passes: the shell stream well mixed across each
/// section, the passes alternating. The same whichever way the first pass runs.
double e_even(int passes, double r, double ntu);

/// G shell: split flow with a horizontal baffle. One pass: half of the tubes above it.
/// Two passes: the first one below, by the shell outlet.
double g_one(double r, double ntu);
double g_two(double r, double ntu);

/// H shell: two G patterns along the length, the streams meeting between them kept apart.
double h_one(double r, double ntu);
double h_two(double r, double ntu);

/// J shell with an equal split.
double j_one(double r, double ntu);
double j_even(int passes, double r, double ntu);

/// One crossflow pass, both streams unmixed; or the shell stream mixed along the tubes.
double crossflow_unmixed(double r, double ntu);
double crossflow_shell_mixed(double r, double ntu);

/// A pool stirred to one temperature.
double k_pool(double r, double ntu);

/// E, F, G, H and J shells with any passes, by the boundary-value problem.
double by_network(const Arrangement& shell, double r, double ntu);

/// X shell whose shell stream mixes nowhere, the tube stream in the headers.
double crossflow_passes_unmixed(const Arrangement& shell, double r, double ntu);

/// One shell of any arrangement that is built.
double effectiveness(const Arrangement& shell, double r, double ntu);

/// Whether a closed form, good at any NTU, answers for it.
bool is_closed(const Arrangement& shell);

}  // namespace dutygauge::arrangement::shells
