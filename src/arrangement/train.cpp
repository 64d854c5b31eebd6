#include "train.hpp"

#include <cmath>
#include <stdexcept>

#include "blocks.hpp"
#include "shells.hpp"

namespace dutygauge::arrangement::train {

void require(const Arrangement& arrangement, double r) {
  if (!is_built(arrangement)) throw std::invalid_argument("arrangement: not built, see objections()");
  if (r < 0.0) throw std::invalid_argument("arrangement: negative R");
}

Arrangement simplest(const Arrangement& arrangement) {
  const bool against = arrangement.first_tube_pass == FirstTubePass::against_shell_flow;
  Arrangement same = arrangement;
  if (same.shell_type == 'F' && shells::is_closed(same) && against && same.shells_order == Flow::counter) {
    same.shell_type = 'E';
    same.tube_passes /= 2;
    same.shells_in_series *= 2;
  }
  const bool one_way = same.shell_type == 'E' && same.tube_passes == 1;
  if (one_way && (same.flow == Flow::parallel || same.shells_order == Flow::counter))
    same.shells_in_series = 1;
  return same;
}

Arrangement one_train_of(const Arrangement& arrangement) {
  Arrangement one = arrangement;
  one.trains_in_turn = 1;
  return one;
}

double in_turn(double one_train, int trains) {
  return -std::expm1(trains * std::log1p(-one_train));
}

double one_in_turn(double p, int trains) {
  return -std::expm1(std::log1p(-p) / trains);
}

Arrangement one_shell_of(const Arrangement& arrangement) {
  Arrangement shell = arrangement;
  shell.shells_in_series = 1;
  return shell;
}

double effectiveness(const Arrangement& arrangement, double r, double one_shell) {
  const int shells = arrangement.shells_in_series;
  if (shells == 1) return one_shell;
  return arrangement.shells_order == Flow::counter ? blocks::counterflow_chain(r, one_shell, shells)
                                                   : blocks::parallel_chain(r, one_shell, shells);
}

double share_of(const Arrangement& arrangement, double r, double p) {
  const int shells = arrangement.shells_in_series;
  if (shells == 1) return p;
  return arrangement.shells_order == Flow::counter ? blocks::one_of_counterflow_chain(r, p, shells)
                                                   : blocks::one_of_parallel_chain(r, p, shells);
}

}  // namespace dutygauge::arrangement::train
