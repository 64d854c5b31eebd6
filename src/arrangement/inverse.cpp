#include <algorithm>
#include <boost/math/tools/minima.hpp>
#include <cmath>
#include <limits>
#include <utility>

#include "dutygauge/numerics.hpp"
#include "train.hpp"

/// From P back to NTU, and how far P goes.
namespace dutygauge::arrangement {
namespace {

constexpr double infinity = std::numeric_limits<double>::infinity();

struct Peak {
  double ntu, p;
};

/// Where the search for a maximum ends, on the smaller capacity rate: the flattest ones
/// known lie below 120.
constexpr double last_ntu = 400.0;

bool is_two_pass(const Arrangement& shell) {
  return shell.shell_type == 'E' && shell.tube_passes == 2 &&
         shell.pass_areas == decltype(shell.pass_areas){};
}

/// The maximum of P over ln NTU. A coarse scan comes first, since P is level to rounding
/// far from the maximum.
Peak peak_of_shell(const Arrangement& shell, double r) {
  const double everywhere = effectiveness(shell, r, infinity);
  if (is_two_pass(shell) || std::isnan(everywhere)) return {infinity, everywhere};
  constexpr double first = -2.5, step = 0.34;
  const double shift = std::log(std::max(1.0, r)), last = std::log(last_ntu);
  const auto loss = [&](double log_ntu) { return -effectiveness(shell, r, std::exp(log_ntu - shift)); };
  double best = first, least = 0.0;
  for (double at = first; at <= last; at += step) {
    const double value = loss(at);
    if (value < least) best = at, least = value;
  }
  constexpr double rounding = 1e-12;
  if (everywhere >= -least * (1.0 - rounding)) return {infinity, std::max(everywhere, -least)};
  constexpr int half_the_digits = 26;
  const auto [at, value] =
      boost::math::tools::brent_find_minima(loss, best - step, best + step, half_the_digits);
  return value < least ? Peak{std::exp(at - shift), -value} : Peak{std::exp(best - shift), -least};
}

/// Of a train: with an even number of shells in parallel order, P is largest where the
/// outlets of the shells meet, not where each shell does most.
Peak peak_of(const Arrangement& train, double r) {
  const Arrangement shell = train::one_shell_of(train);
  const int shells = train.shells_in_series;
  const Peak one = peak_of_shell(shell, r);
  const double meeting = 1.0 / (1.0 + r);
  if (train.shells_order == Flow::parallel && shells % 2 == 0 && one.p > meeting)
    return {shells * ntu_for(shell, r, meeting).value_or(one.ntu), meeting};
  return {shells * one.ntu, train::effectiveness(train, r, one.p)};
}

/// Whether any surface reaches P: what counterflow does not reach, nothing does.
bool counterflow_reaches(double r, double p) {
  return r >= 0.0 && p >= 0.0 && p < 1.0 && p * r < 1.0 && p / (1.0 - p) * (1.0 - r) > -1.0;
}

std::optional<double> two_pass_ntu(double r, double p) {
  const double g = std::hypot(r, 1.0), left = 2.0 - p * (1.0 + r + g);
  if (!(left > 0.0)) return {};
  return std::log1p(2.0 * g * p / left) / g;
}

/// Steps up from the NTU of counterflow, below which no arrangement reaches P, to the
/// first one that does, then closes in. A maximum between two steps is looked for last.
std::optional<double> searched_ntu(const Arrangement& shell, double r, double p, double counterflow) {
  double low = counterflow, high = infinity;
  constexpr double farthest = 1e9;
  const double scale = std::max(1.0, r);
  for (double ntu = low; ntu * scale < farthest; ntu *= ntu * scale < last_ntu ? 1.25 : 8.0) {
    if (effectiveness(shell, r, ntu) >= p) {
      high = ntu;
      break;
    }
    low = ntu;
  }
  if (high == infinity) {
    const Peak peak = peak_of_shell(shell, r);
    if (!(p <= peak.p) || peak.ntu == infinity) return {};
    low = counterflow, high = peak.ntu;
  }
  if (!(low < high)) return high;
  // The counterflow equivalent is nearly straight in NTU, P itself flat near its peak.
  const auto excess = [&](double ntu) {
    const auto reached = counterflow_ntu(r, effectiveness(shell, r, ntu));
    return reached ? *reached - counterflow : counterflow;
  };
  if (!(excess(high) > 0.0)) return high;
  return numerics::find_root(excess, {low, high}, 1e-13 * high);
}

std::optional<double> ntu_of_shell(const Arrangement& shell, double r, double p) {
  if (is_two_pass(shell)) return two_pass_ntu(r, p);
  const auto counterflow = counterflow_ntu(r, p);
  if (!counterflow || *counterflow == 0.0) return counterflow;
  if (shell.shell_type != 'E' || shell.tube_passes > 1) return searched_ntu(shell, r, p, *counterflow);
  if (shell.flow == Flow::counter) return counterflow;
  if (!(p * (1.0 + r) < 1.0)) return {};
  return -std::log1p(-p * (1.0 + r)) / (1.0 + r);
}

}  // namespace

double largest_effectiveness(const Arrangement& arrangement, double capacity_ratio) {
  train::require(arrangement, capacity_ratio);
  if (const int trains = arrangement.trains_in_turn; trains > 1)
    return train::in_turn(largest_effectiveness(train::one_train_of(arrangement), trains * capacity_ratio),
                          trains);
  return peak_of(train::simplest(arrangement), capacity_ratio).p;
}

double ntu_at_largest(const Arrangement& arrangement, double capacity_ratio) {
  train::require(arrangement, capacity_ratio);
  if (const int trains = arrangement.trains_in_turn; trains > 1)
    return trains * ntu_at_largest(train::one_train_of(arrangement), trains * capacity_ratio);
  return peak_of(train::simplest(arrangement), capacity_ratio).ntu;
}

std::optional<double> ntu_for(const Arrangement& arrangement, double capacity_ratio,
                              double temperature_effectiveness) {
  train::require(arrangement, capacity_ratio);
  const double r = capacity_ratio, p = temperature_effectiveness;
  if (!counterflow_reaches(r, p)) return {};
  if (const int trains = arrangement.trains_in_turn; trains > 1) {
    const auto one = ntu_for(train::one_train_of(arrangement), trains * r, train::one_in_turn(p, trains));
    return one ? std::optional(trains * *one) : std::nullopt;
  }
  const Arrangement same = train::simplest(arrangement);
  const auto share = ntu_of_shell(train::one_shell_of(same), r, train::share_of(same, r, p));
  if (!share) return {};
  return *share * same.shells_in_series;
}

std::optional<double> counterflow_ntu(double capacity_ratio, double temperature_effectiveness) {
  const double r = capacity_ratio, p = temperature_effectiveness;
  if (!counterflow_reaches(r, p)) return {};
  const double gained = p / (1.0 - p);
  return gained * numerics::log1p_ratio(gained * (1.0 - r));
}

std::optional<double> lmtd_correction(const Arrangement& arrangement, double capacity_ratio, double ntu) {
  train::require(arrangement, capacity_ratio);
  if (!(ntu >= 0.0 && capacity_ratio >= 0.0)) return {};
  const bool in_turn = arrangement.trains_in_turn > 1;
  Arrangement same = in_turn ? arrangement : train::simplest(arrangement);
  const bool counterflow = !in_turn && same.shell_type == 'E' && same.tube_passes == 1 &&
                           same.flow == Flow::counter && same.shells_in_series == 1;
  // An isothermal shell stream makes every arrangement counterflow.
  if (ntu == 0.0 || capacity_ratio == 0.0 || counterflow) return 1.0;
  // Counterflow NTUs of shells in counterflow add up, so a train has the F of one shell;
  // this keeps digits where the train's P nears its limit.
  double share = ntu;
  if (!in_turn && same.shells_order == Flow::counter) {
    share /= same.shells_in_series;
    same = train::one_shell_of(same);
  }
  const auto needed = counterflow_ntu(capacity_ratio, effectiveness(same, capacity_ratio, share));
  if (!needed) return {};
  return std::min(1.0, *needed / share);
}

double log_mean(double difference_1, double difference_2) {
  const double smaller = std::min(difference_1, difference_2), larger = std::max(difference_1, difference_2);
  if (!(smaller > 0.0)) return 0.0;
  if (larger > 2.0 * smaller) return (larger - smaller) / std::log(larger / smaller);
  return smaller / numerics::log1p_ratio((larger - smaller) / smaller);
}

}  // namespace dutygauge::arrangement
