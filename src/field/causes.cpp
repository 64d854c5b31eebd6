#include "dutygauge/field/causes.hpp"

#include <Eigen/Dense>
#include <algorithm>
#include <boost/math/distributions/chi_squared.hpp>
#include <boost/math/tools/minima.hpp>
#include <cmath>
#include <functional>
#include <limits>
#include <map>

#include "ailing.hpp"
#include "balance.hpp"

namespace dutygauge::field {
namespace {

constexpr double likely = 0.9, together = 0.95, acceptable = 0.01;

/// What a fit makes least.
double objective(const Comparison& days, std::span<const Part> parts) {
  const auto residuals = days.residuals(parts);
  return residuals ? residuals->objective() : HUGE_VAL;
}

double upper_tail(double chi_squared, int degrees_of_freedom) {
  if (degrees_of_freedom < 1) return 1.0;
  if (!std::isfinite(chi_squared)) return 0.0;
  const boost::math::chi_squared_distribution<double> distribution(degrees_of_freedom);
  return boost::math::cdf(boost::math::complement(distribution, chi_squared));
}

std::vector<Part> single_causes(const Comparison& days, Onset onset) {
  std::vector<Part> parts;
  for (const Cause cause : {Cause::tube_deposit, Cause::shell_deposit, Cause::tube_bypass})
    parts.push_back({.cause = cause});
  if (onset == Onset::sudden)
    for (const Cause cause : {Cause::plugging, Cause::shell_bypass, Cause::area_lost})
      parts.push_back({.cause = cause});
  for (std::size_t i = 0; i <= index_of(Channel::shell_dp); ++i) {
    const auto channel = static_cast<Channel>(i);
    const bool is_output = std::ranges::find(observables, channel) != observables.end();
    if (is_output ? days.is_observed(channel) : !days.is_inferred(channel))
      parts.push_back({.cause = Cause::instrument, .channel = channel});
  }
  return parts;
}

/// Change of the residuals with the magnitude of one part; empty at the edge of what can be.
std::optional<Eigen::VectorXd> slope(const Comparison& days, std::vector<Part> parts, std::size_t which) {
  const Limits limits = limits_of(parts[which], days.fouling_before());
  const double step = 1e-5 * (limits.high - limits.low);
  Part& part = parts[which];
  const double here = part.magnitude;
  part.magnitude = std::min(here + step, limits.high);
  const double up = part.magnitude;
  const auto more = days.residuals(parts);
  part.magnitude = std::max(up - 2.0 * step, limits.low);
  const auto less = days.residuals(parts);
  if (!more || !less) return {};
  const auto size = static_cast<Eigen::Index>(more->values.size());
  return (Eigen::Map<const Eigen::VectorXd>(more->values.data(), size) -
          Eigen::Map<const Eigen::VectorXd>(less->values.data(), size)) /
         (up - part.magnitude);
}

/// Fits one magnitude. A scan comes first, closer near zero, as a sum of squares over the
/// whole range may have more than one valley.
Part fitted(const Comparison& days, Part part) {
  const Limits limits = limits_of(part, days.fouling_before());
  constexpr int steps = 14;
  const auto at = [&](double t) {
    part.magnitude = t < 0.0 ? -limits.low * t * t * t : limits.high * t * t * t;
    return objective(days, {&part, 1});
  };
  const double first = limits.low < 0.0 ? -1.0 : 0.0, width = (1.0 - first) / steps;
  double best = first, least = HUGE_VAL;
  for (int i = 0; i <= steps; ++i) {
    const double t = first + width * i, value = at(t);
    if (value < least) best = t, least = value;
  }
  constexpr int half_the_digits = 26;
  const auto [t, value] = boost::math::tools::brent_find_minima(at, std::max(first, best - width),
                                                                std::min(1.0, best + width), half_the_digits);
  at(value <= least ? t : best);
  if (const auto change = slope(days, {part}, 0))
    part.standard_uncertainty = change->norm() > 0.0 ? 1.0 / change->norm() : HUGE_VAL;
  return part;
}

/// What a part alone does to the last day's outlets [K].
double effect_of(const Comparison& days, const Part& part) {
  const auto with = days.last_day({&part, 1}), without = days.last_day({});
  if (!with || !without) return 0.0;
  double sum = 0.0;
  for (const Channel channel : {Channel::hot_out, Channel::cold_out})
    if (const double moved = (*with)[index_of(channel)] - (*without)[index_of(channel)]; std::isfinite(moved))
      sum += std::abs(moved);
  return sum;
}

Explanation explained(const Comparison& days, std::vector<Part> parts) {
  Explanation e;
  const auto residuals = days.residuals(parts), unchanged = days.residuals({});
  e.chi_square = residuals ? residuals->chi_square() : HUGE_VAL;
  const int magnitudes = static_cast<int>(parts.size());
  e.p_value = upper_tail(e.chi_square, days.count() - magnitudes);
  e.bic = e.chi_square + magnitudes * std::log(static_cast<double>(days.count()));
  if (residuals && unchanged) e.bic += residuals->log_determinant - unchanged->log_determinant;
  if (const auto shown = days.last_day(parts)) e.predicted = *shown;
  for (const Part& part : parts) e.effects.push_back(effect_of(days, part));
  e.parts = std::move(parts);
  return e;
}

void sort_by_bic(std::vector<Explanation>& list) {
  std::ranges::stable_sort(list, {}, &Explanation::bic);
}

/// Weights of everything in `list`, the lowest BIC already among `best`.
void weigh(std::vector<Explanation>& list, double best) {
  double sum = 0.0;
  for (Explanation& e : list) sum += e.weight = std::exp(-0.5 * (e.bic - best));
  for (Explanation& e : list) e.weight /= sum;
}

std::vector<Explanation> ranked_singles(const Comparison& days, Onset onset) {
  std::vector<Explanation> singles = {explained(days, {})};
  for (const Part& part : single_causes(days, onset)) {
    Explanation e = explained(days, {fitted(days, part)});
    if (std::isfinite(e.chi_square)) singles.push_back(std::move(e));
  }
  sort_by_bic(singles);
  weigh(singles, singles.front().bic);
  return singles;
}

/// Gauss-Newton with damping inside the limits, from the magnitudes given.
std::vector<Part> fitted_together(const Comparison& days, std::vector<Part> parts) {
  const auto count = static_cast<Eigen::Index>(parts.size());
  double damping = 1e-3, value = objective(days, parts);
  for (int pass = 0; pass < 25 && damping < 1e6; ++pass) {
    const auto here = days.residuals(parts);
    if (!here) return parts;
    const auto size = static_cast<Eigen::Index>(here->values.size());
    Eigen::MatrixXd slopes(size, count);
    for (Eigen::Index i = 0; i < count; ++i) {
      const auto column = slope(days, parts, static_cast<std::size_t>(i));
      if (!column) return parts;
      slopes.col(i) = *column;
    }
    Eigen::MatrixXd normal = slopes.transpose() * slopes;
    const Eigen::VectorXd down =
        -slopes.transpose() * Eigen::Map<const Eigen::VectorXd>(here->values.data(), size);
    normal.diagonal() *= 1.0 + damping;
    const Eigen::VectorXd step = normal.fullPivLu().solve(down);
    std::vector<Part> next = parts;
    for (std::size_t i = 0; i < next.size(); ++i) {
      const Limits limits = limits_of(next[i], days.fouling_before());
      next[i].magnitude =
          std::clamp(next[i].magnitude + step[static_cast<Eigen::Index>(i)], limits.low, limits.high);
    }
    const double tried = objective(days, next);
    damping *= tried < value ? 0.2 : 5.0;
    if (!(tried < value)) continue;
    const bool stands = value - tried < 1e-7 * value;
    parts = std::move(next);
    value = tried;
    if (stands) break;
  }
  return parts;
}

bool is_physical(const Part& part) {
  return part.cause != Cause::none && part.cause != Cause::instrument;
}

/// Pairs of a physical cause with another cause, from the better of the two alone.
std::vector<Explanation> pairs_of(const Comparison& days, const std::vector<Explanation>& singles) {
  std::vector<Part> parts;
  for (const Explanation& e : singles)
    if (!e.parts.empty()) parts.push_back(e.parts.front());
  std::vector<Explanation> pairs;
  for (std::size_t i = 0; i < parts.size(); ++i)
    for (std::size_t j = i + 1; j < parts.size(); ++j) {
      if (!is_physical(parts[i]) && !is_physical(parts[j])) continue;
      // The list is sorted: the first of the two explains more by itself.
      const Part second{.cause = parts[j].cause, .channel = parts[j].channel};
      Explanation e = explained(days, fitted_together(days, {parts[i], second}));
      if (std::isfinite(e.chi_square)) pairs.push_back(std::move(e));
    }
  sort_by_bic(pairs);
  return pairs;
}

/// The first of a ranked list, until they hold nearly all of the weight.
std::vector<Explanation> remaining(const std::vector<Explanation>& ranked) {
  std::vector<Explanation> open;
  double weight = 0.0;
  for (const Explanation& e : ranked) {
    if (weight > together) break;
    open.push_back(e);
    weight += e.weight;
  }
  return open;
}

Ranked verdict_of(const Explanation& first) {
  if (!(first.p_value > acceptable)) return Ranked::unexplained;
  if (first.parts.empty()) return Ranked::no_change;
  return first.weight > likely ? Ranked::most_likely : Ranked::not_separable;
}

/// Where two explanations part most, in what the last day shows or would show.
std::optional<Separator> separator_of(const Comparison& days, const Explanation& first,
                                      const Explanation& second) {
  std::optional<Separator> best;
  const Channels uncertainty = days.last_uncertainty();
  for (const Channel channel : observables) {
    const std::size_t i = index_of(channel);
    const double distance = std::abs(first.predicted[i] - second.predicted[i]) / uncertainty[i];
    if (!std::isfinite(distance) || (best && distance <= best->distance)) continue;
    best = Separator{channel, days.is_observed(channel), distance};
  }
  return best;
}

/// A day with a flow or inlet that is missing taken from the balance; that side's outlet has
/// then been used up.
Observed filled(const Plant& plant, const Instruments& instruments, Day day) {
  for (const Channel channel : {Channel::hot_flow, Channel::cold_flow, Channel::hot_in, Channel::cold_in}) {
    if (!std::isnan(day.value[index_of(channel)])) continue;
    const auto value = inferred(plant, instruments, day.value, channel);
    if (!value) break;
    day.value[index_of(channel)] = value->value;
    day.value[index_of(is_hot(channel) ? Channel::hot_out : Channel::cold_out)] =
        std::numeric_limits<double>::quiet_NaN();
    Observed result = observed(day, instruments);
    result.inferred = channel;
    return result;
  }
  return observed(day, instruments);
}

}  // namespace

std::optional<Ranking> rank_causes(const Plant& plant, std::span<const Observed> before,
                                   std::span<const Observed> after, double fouling_before, Onset onset) {
  Comparison days(plant, before, after, fouling_before);
  if (days.count() == 0) return {};
  // What is left about the best explanation tells how much days differ by themselves.
  days.widen(ranked_singles(days, onset).front().parts);
  Ranking ranking;
  ranking.singles = ranked_singles(days, onset);
  const std::vector<Explanation>* ranked = &ranking.singles;
  const bool explains =
      std::ranges::any_of(ranking.singles, [](const Explanation& e) { return e.p_value > acceptable; });
  if (!explains) {
    ranking.pairs = pairs_of(days, ranking.singles);
    if (!ranking.pairs.empty()) {
      weigh(ranking.pairs, ranking.pairs.front().bic);
      ranked = &ranking.pairs;
    }
  }
  const Explanation& first = ranked->front();
  ranking.open = remaining(*ranked);
  ranking.verdict = verdict_of(first);
  if (ranked->size() > 1) ranking.separator = separator_of(days, first, (*ranked)[1]);
  return ranking;
}

Observed observed(const Day& day, const Instruments& instruments, const ModelError& error) {
  Observed result;
  result.value = day.value;
  // A median scatters by a quarter more than a mean.
  const double fewer = std::sqrt(1.57 / std::max(1, day.count));
  for (std::size_t i = 0; i < channel_count; ++i) {
    const Instrument& instrument = instruments[i];
    const auto channel = static_cast<Channel>(i);
    const bool is_drop = channel == Channel::tube_dp || channel == Channel::shell_dp;
    const double scale = instrument.relative ? std::abs(day.value[i]) : 1.0;
    const double model = is_drop ? error.drop * day.value[i] : error.temperature;
    result.scatter[i] = instrument.random * fewer * scale;
    result.shared[i] = model;
  }
  return result;
}

std::optional<Ranking> rank_over_days(const Plant& plant, const Instruments& instruments,
                                      std::span<const Day> before, std::span<const Day> after, Onset onset) {
  std::vector<double> fouling;
  std::vector<Observed> first, second;
  for (const Day& day : before) {
    first.push_back(filled(plant, instruments, day));
    fouling.push_back(day.apparent.fouling);
  }
  for (const Day& day : after) second.push_back(filled(plant, instruments, day));
  std::erase_if(fouling, [](double f) { return !std::isfinite(f); });
  if (fouling.empty()) return {};
  const auto middle = fouling.begin() + static_cast<std::ptrdiff_t>(fouling.size() / 2);
  std::ranges::nth_element(fouling, middle);
  return rank_causes(plant, first, second, *middle, onset);
}

std::string_view name_of(const Part& part, const Channels& seen) {
  const bool tube_drop = std::isfinite(seen[index_of(Channel::tube_dp)]);
  const bool shell_drop = std::isfinite(seen[index_of(Channel::shell_dp)]);
  switch (part.cause) {
    case Cause::none:
      return "none";
    case Cause::tube_deposit:
      return part.magnitude < 0.0 ? "tube-side deposit removed" : "tube-side deposit";
    case Cause::shell_deposit:
      return "shell-side deposit";
    case Cause::plugging:
      return "plugging";
    case Cause::tube_bypass:
      return tube_drop ? "partition leak" : "by-pass";
    case Cause::shell_bypass:
      return shell_drop ? "lost strips" : "by-pass";
    case Cause::area_lost:
      return "gas or vapour over the surface";
    case Cause::instrument:
      return "instrument";
  }
  return "none";
}

std::vector<NamedWeight> weights_of(const Ranking& ranking, const Channels& seen) {
  const auto& explanations = ranking.pairs.empty() ? ranking.singles : ranking.pairs;
  const auto has_instrument = [](const Explanation& e) {
    return std::ranges::any_of(e.parts, [](const Part& part) { return part.cause == Cause::instrument; });
  };
  // By kind of explanation: all with an instrument beside the same other cause are one.
  std::map<std::string, int> alike;
  const auto kind_of = [&](const Explanation& e) {
    std::string kind;
    for (const Part& part : e.parts) kind += std::string(name_of(part, seen)) + "|";
    return kind;
  };
  for (const Explanation& e : explanations)
    if (has_instrument(e)) ++alike[kind_of(e)];
  std::map<std::string, double> by_name;
  double sum = 0.0;
  for (const Explanation& e : explanations) {
    const double weight = has_instrument(e) ? e.weight / alike[kind_of(e)] : e.weight;
    sum += weight;
    if (e.parts.empty()) by_name["none"] += weight;
    double effects = 0.0;
    for (const double effect : e.effects) effects += effect;
    for (std::size_t i = 0; i < e.parts.size(); ++i)
      by_name[std::string(name_of(e.parts[i], seen))] +=
          weight * (effects > 0.0 ? e.effects[i] / effects : 1.0 / static_cast<double>(e.parts.size()));
  }
  std::vector<NamedWeight> weights;
  for (const auto& [name, weight] : by_name) weights.push_back({name, weight / sum});
  std::ranges::stable_sort(weights, std::ranges::greater{}, &NamedWeight::weight);
  return weights;
}

}  // namespace dutygauge::field
