#include <algorithm>
#include <cmath>
#include <limits>
#include <stdexcept>

#include "blocks.hpp"
#include "dutygauge/arrangement.hpp"

namespace dutygauge::arrangement {
namespace {

/// E shell with an even number of passes: the shell stream well mixed across each
/// section, the passes alternating. The same whichever way the first pass runs.
double even_passes(int passes, double r, double ntu) {
  const double n = passes;
  if (passes == 2) return ntu / (0.5 * ntu * (1.0 + r) + blocks::xcoth(0.5 * ntu * std::hypot(r, 1.0)));
  const double g = std::hypot(r, 2.0 / n);
  return ntu /
         (0.5 * ntu * r + blocks::xcoth(0.5 * ntu * g) + 1.0 / blocks::phi(ntu) - blocks::xcoth(ntu / n));
}

double train(const Arrangement& arrangement, double r, double ntu) {
  if (arrangement.flow == Flow::parallel) return blocks::parallel(r, ntu);
  if (arrangement.tube_passes == 1) return blocks::counterflow(r, ntu);
  const int shells = arrangement.shells_in_series;
  return blocks::counterflow_chain(r, even_passes(arrangement.tube_passes, r, ntu / shells), shells);
}

}  // namespace

double effectiveness(const Arrangement& arrangement, double capacity_ratio, double ntu) {
  if (!is_built(arrangement)) throw std::invalid_argument("arrangement: not built, see objections()");
  if (capacity_ratio < 0.0 || ntu < 0.0) throw std::invalid_argument("arrangement: negative R or NTU");
  // Infinity, taken at a stand-in whose square still fits a double.
  constexpr double ample = 1e100;
  const double r = std::min(capacity_ratio, ample);
  const double p = train(arrangement, r, std::min(ntu, ample));
  return std::min(p, r > 1.0 ? 1.0 / r : 1.0);  // only rounding ever passes the limit
}

}  // namespace dutygauge::arrangement
