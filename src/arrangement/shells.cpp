#include "shells.hpp"

#include <algorithm>

#include "blocks.hpp"

namespace dutygauge::arrangement::shells {
namespace {

bool equal_passes(const Arrangement& shell) {
  return shell.pass_areas == decltype(shell.pass_areas){};
}

/// A stand-in for more, on the smaller capacity rate: each doubling is a step of the solution.
constexpr double ample_for_network = 1e12;

double e_shell(int passes, double r, double ntu) {
  return passes == 1 ? blocks::counterflow(r, ntu) : e_even(passes, r, ntu);
}

/// Without a leaking baffle, an F shell is two E shells with half of its passes each.
double f_shell(const Arrangement& shell, double r, double ntu) {
  if (shell.first_tube_pass == FirstTubePass::against_shell_flow)
    return blocks::counterflow_chain(r, e_shell(shell.tube_passes / 2, r, 0.5 * ntu), 2);
  const double one =
      shell.tube_passes == 2 ? blocks::parallel(r, 0.5 * ntu) : e_even(shell.tube_passes / 2, r, 0.5 * ntu);
  return blocks::parallel_chain(r, one, 2);
}

double x_shell(const Arrangement& shell, double r, double ntu) {
  const int passes = shell.tube_passes;
  if (shell.mixing == Mixing::nowhere && passes > 1) return crossflow_passes_unmixed(shell, r, ntu);
  const double pass = shell.mixing == Mixing::shell_stream ? crossflow_shell_mixed(r, ntu / passes)
                                                           : crossflow_unmixed(r, ntu / passes);
  return shell.flow == Flow::counter ? blocks::counterflow_chain(r, pass, passes)
                                     : blocks::parallel_chain(r, pass, passes);
}

}  // namespace

bool is_closed(const Arrangement& shell) {
  const int passes = shell.tube_passes;
  const bool against = shell.first_tube_pass == FirstTubePass::against_shell_flow;
  switch (shell.shell_type) {
    case 'E':
      return passes == 1 || (passes % 2 == 0 && equal_passes(shell));
    case 'F':
      return (passes == 2 || passes % 4 == 0) && equal_passes(shell) && shell.baffle_conductance == 0.0;
    case 'G':
      return passes == 1 || (passes == 2 && against && equal_passes(shell));
    case 'H':
      return (passes == 1 || (passes == 2 && against && equal_passes(shell))) &&
             shell.mixing != Mixing::shell_stream;
    case 'J':
      return (passes == 1 || passes % 2 == 0) && shell.tube_inlet_share == 0.5 && equal_passes(shell);
    case 'X':
      return passes == 1 || shell.mixing != Mixing::nowhere;
    default:
      return true;
  }
}

double effectiveness(const Arrangement& shell, double r, double ntu) {
  const int passes = shell.tube_passes;
  if (shell.shell_type == 'X') return x_shell(shell, r, ntu);
  if (!is_closed(shell)) return by_network(shell, r, std::min(ntu, ample_for_network / std::max(1.0, r)));
  switch (shell.shell_type) {
    case 'F':
      return f_shell(shell, r, ntu);
    case 'G':
      return passes == 1 ? g_one(r, ntu) : g_two(r, ntu);
    case 'H':
      return passes == 1 ? h_one(r, ntu) : h_two(r, ntu);
    case 'J':
      return passes == 1 ? j_one(r, ntu) : j_even(passes, r, ntu);
    case 'K':
      return k_pool(r, ntu);
    default:
      return shell.flow == Flow::parallel ? blocks::parallel(r, ntu) : e_shell(passes, r, ntu);
  }
}

}  // namespace dutygauge::arrangement::shells
