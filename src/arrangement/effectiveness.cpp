#include <algorithm>
#include <cmath>
#include <stdexcept>

#include "shells.hpp"
#include "train.hpp"

namespace dutygauge::arrangement {
namespace {

double within_balance(double p, double r) {
  return std::clamp(p, 0.0, r > 1.0 ? 1.0 / r : 1.0);  // only rounding ever passes a limit
}

/// P of an unequal bank's shell; one without its shell stream gives nothing.
double share_of_bank(const Arrangement& arrangement, const BankShare& share, double r, double ntu) {
  if (!(share.tube_flow > 0.0 && share.area > 0.0 && share.shell_flow > 0.0)) return 0.0;
  const double p =
      effectiveness(arrangement, r * share.tube_flow / share.shell_flow, ntu * share.area / share.tube_flow);
  return share.tube_flow * p;
}

bool is_whole(double sum) {
  return std::abs(sum - 1.0) < 1e-9;
}

}  // namespace

double effectiveness(const Arrangement& arrangement, double capacity_ratio, double ntu) {
  train::require(arrangement, capacity_ratio);
  if (ntu < 0.0) throw std::invalid_argument("arrangement: negative NTU");
  if (std::isnan(ntu) || std::isnan(capacity_ratio)) return capacity_ratio + ntu;
  if (const int trains = arrangement.trains_in_turn; trains > 1)
    return train::in_turn(
        effectiveness(train::one_train_of(arrangement), trains * capacity_ratio, ntu / trains), trains);
  // Infinity, taken at a stand-in whose powers still fit a double.
  constexpr double ample = 1e60;
  const Arrangement same = train::simplest(arrangement);
  const double r = std::min(capacity_ratio, ample), share = std::min(ntu, ample) / same.shells_in_series;
  const double one = within_balance(shells::effectiveness(train::one_shell_of(same), r, share), r);
  return within_balance(train::effectiveness(same, r, one), r);
}

double effectiveness_of_bank(const Arrangement& arrangement, std::span<const BankShare> shares,
                             double capacity_ratio, double ntu) {
  double tube_flow = 0.0, shell_flow = 0.0, area = 0.0, p = 0.0;
  for (const BankShare& share : shares) {
    tube_flow += share.tube_flow, shell_flow += share.shell_flow, area += share.area;
    p += share_of_bank(arrangement, share, capacity_ratio, ntu);
  }
  if (!is_whole(tube_flow) || !is_whole(shell_flow) || !is_whole(area))
    throw std::invalid_argument("arrangement: the shares of a bank do not sum to 1");
  return p;
}

}  // namespace dutygauge::arrangement
