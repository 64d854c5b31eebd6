#include <algorithm>
#include <boost/math/tools/minima.hpp>
#include <cmath>
#include <stdexcept>
#include <utility>

#include "blocks.hpp"
#include "dutygauge/arrangement.hpp"
#include "dutygauge/numerics.hpp"

namespace dutygauge::arrangement {
namespace {

Arrangement one_shell_of(Arrangement train) {
  train.shells_in_series = 1;
  return train;
}

/// A lone stream pair, without a limit below min(1, 1/R).
bool is_counterflow(const Arrangement& a) {
  return a.tube_passes == 1 && a.flow == Flow::counter;
}

struct Peak {
  double ntu, p;
};

/// Where more surface stops helping: the maximum of P over ln NTU. With four and more
/// passes P falls again behind it. A coarse scan comes first, since P is level to
/// rounding far from the maximum; its ends scale with the smaller capacity rate.
Peak peak_of_shell(const Arrangement& shell, double r) {
  constexpr double first = -2.5, last = 6.0, step = 0.34;
  const double shift = std::log(std::max(1.0, r));
  const auto loss = [&](double log_ntu) { return -effectiveness(shell, r, std::exp(log_ntu - shift)); };
  double best = first, least = 0.0;
  for (double at = first; at <= last; at += step) {
    const double value = loss(at);
    if (value < least) best = at, least = value;
  }
  constexpr int half_the_digits = 26;
  const auto [at, value] =
      boost::math::tools::brent_find_minima(loss, best - step, best + step, half_the_digits);
  return {std::exp(at - shift), -std::min(value, least)};
}

/// The largest P one shell with an even number of passes comes near.
double largest_of_shell(const Arrangement& shell, double r) {
  if (shell.tube_passes == 2) return 2.0 / (1.0 + r + std::hypot(r, 1.0));
  return peak_of_shell(shell, r).p;
}

std::optional<double> two_pass_ntu(double r, double p) {
  const double g = std::hypot(r, 1.0);
  const double left = 2.0 - p * (1.0 + r + g);
  if (!(left > 0.0)) return {};
  return std::log1p(2.0 * g * p / left) / g;
}

std::optional<double> bracketed_ntu(const Arrangement& shell, double r, double p) {
  const auto target = counterflow_ntu(r, p);
  const Peak peak = peak_of_shell(shell, r);
  if (!target || !(p <= peak.p)) return {};
  // The counterflow equivalent is nearly straight in NTU; P itself is flat near its peak.
  const auto excess = [&](double ntu) {
    return counterflow_ntu(r, effectiveness(shell, r, ntu)).value_or(2.0 * *target) - *target;
  };
  if (!(excess(*target) < 0.0)) return *target;
  if (!(excess(peak.ntu) > 0.0)) return peak.ntu;
  return numerics::find_root(excess, {*target, peak.ntu}, 1e-13 * peak.ntu);
}

}  // namespace

double largest_effectiveness(const Arrangement& arrangement, double capacity_ratio) {
  if (!is_built(arrangement)) throw std::invalid_argument("arrangement: not built, see objections()");
  const double r = capacity_ratio;
  if (arrangement.flow == Flow::parallel) return 1.0 / (1.0 + r);
  const double limit = r > 1.0 ? 1.0 / r : 1.0;
  if (is_counterflow(arrangement)) return limit;
  const double shell = largest_of_shell(one_shell_of(arrangement), r);
  return std::min(limit, blocks::counterflow_chain(r, shell, arrangement.shells_in_series));
}

std::optional<double> ntu_for(const Arrangement& arrangement, double capacity_ratio,
                              double temperature_effectiveness) {
  if (!is_built(arrangement)) throw std::invalid_argument("arrangement: not built, see objections()");
  const double r = capacity_ratio, p = temperature_effectiveness;
  if (arrangement.flow == Flow::parallel) {
    if (!(p >= 0.0 && p * (1.0 + r) < 1.0)) return {};
    return -std::log1p(-p * (1.0 + r)) / (1.0 + r);
  }
  const auto counter = counterflow_ntu(r, p);
  if (!counter || *counter == 0.0 || is_counterflow(arrangement)) return counter;
  const int shells = arrangement.shells_in_series;
  const double one = blocks::one_of_counterflow_chain(r, p, shells);
  const auto ntu =
      arrangement.tube_passes == 2 ? two_pass_ntu(r, one) : bracketed_ntu(one_shell_of(arrangement), r, one);
  if (!ntu) return {};
  return *ntu * shells;
}

std::optional<double> counterflow_ntu(double capacity_ratio, double temperature_effectiveness) {
  const double r = capacity_ratio, p = temperature_effectiveness;
  if (!(r >= 0.0 && p >= 0.0 && p < 1.0 && p * r < 1.0)) return {};
  const double gained = p / (1.0 - p);
  const double u = gained * (1.0 - r);
  if (!(u > -1.0)) return {};
  return gained * numerics::log1p_ratio(u);
}

std::optional<double> lmtd_correction(const Arrangement& arrangement, double capacity_ratio, double ntu) {
  if (!(ntu >= 0.0 && capacity_ratio >= 0.0)) return {};
  const Arrangement shell = one_shell_of(arrangement);
  // An isothermal shell stream makes every arrangement counterflow.
  if (ntu == 0.0 || capacity_ratio == 0.0 || is_counterflow(arrangement)) return 1.0;
  // Counterflow NTUs of shells in counterflow add up, so a train has the F of one shell;
  // this keeps digits where the train's P nears its limit.
  const int shells = arrangement.flow == Flow::parallel ? 1 : arrangement.shells_in_series;
  const double share = ntu / shells;
  const auto counter = counterflow_ntu(capacity_ratio, effectiveness(shell, capacity_ratio, share));
  if (!counter) return {};
  return std::min(1.0, *counter / share);
}

double log_mean(double difference_1, double difference_2) {
  const double smaller = std::min(difference_1, difference_2), larger = std::max(difference_1, difference_2);
  if (!(smaller > 0.0)) return 0.0;
  if (larger > 2.0 * smaller) return (larger - smaller) / std::log(larger / smaller);
  return smaller / numerics::log1p_ratio((larger - smaller) / smaller);
}

}  // namespace dutygauge::arrangement
