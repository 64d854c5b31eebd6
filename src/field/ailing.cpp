#include "ailing.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <utility>

namespace dutygauge::field {
namespace {

constexpr double nothing = std::numeric_limits<double>::quiet_NaN();

bool is_drop(Channel channel) {
  return channel == Channel::tube_dp || channel == Channel::shell_dp;
}

bool is_flow(Channel channel) {
  return channel == Channel::hot_flow || channel == Channel::cold_flow;
}

double& value(Channels& channels, Channel channel) {
  return channels[index_of(channel)];
}

void add(const Part& part, Ailment& ailment) {
  switch (part.cause) {
    case Cause::tube_deposit:
      ailment.tube_deposit += part.magnitude;
      break;
    case Cause::shell_deposit:
      ailment.shell_deposit += part.magnitude;
      break;
    case Cause::plugging:
      ailment.plugged += part.magnitude;
      break;
    case Cause::tube_bypass:
      ailment.tube_bypass += part.magnitude;
      break;
    case Cause::shell_bypass:
      ailment.shell_bypass += part.magnitude;
      break;
    case Cause::area_lost:
      ailment.area_lost += part.magnitude;
      break;
    case Cause::none:
    case Cause::instrument:
      break;
  }
}

bool is_relative(Channel channel) {
  return is_flow(channel) || is_drop(channel);
}

/// From a reading to the truth, and back, where the instrument shows wrong.
double truth(double reading, const Part& part) {
  return is_relative(*part.channel) ? reading / (1.0 + part.magnitude) : reading - part.magnitude;
}

double shown(double truth, const Part& part) {
  return is_relative(*part.channel) ? truth * (1.0 + part.magnitude) : truth + part.magnitude;
}

/// The flow that makes a drop.
Channel flow_of(const Plant& plant, Channel drop) {
  const bool is_hot = plant.prepared.shell_side_is_hot() == (drop == Channel::shell_dp);
  return is_hot ? Channel::hot_flow : Channel::cold_flow;
}

double uncertainty_unread(const Channels& predicted, Channel channel) {
  const ModelError error;
  return is_drop(channel) ? error.drop * predicted[index_of(channel)] : error.temperature;
}

/// Mean of some days; their variance where they are enough to tell it.
struct Sample {
  double mean = nothing, variance = 0;
};

Sample sample_of(const std::vector<double>& values) {
  constexpr std::size_t enough = 5;
  Sample sample;
  if (values.empty()) return sample;
  double sum = 0.0, squares = 0.0;
  for (const double v : values) sum += v;
  sample.mean = sum / static_cast<double>(values.size());
  for (const double v : values) squares += std::pow(v - sample.mean, 2);
  if (values.size() >= enough) sample.variance = squares / static_cast<double>(values.size() - 1);
  return sample;
}

}  // namespace

Limits limits_of(const Part& part, double fouling_before) {
  constexpr double thickest = 0.02;  // [m2.K/W]
  switch (part.cause) {
    case Cause::tube_deposit:
      return {-std::max(0.0, fouling_before), thickest};
    case Cause::shell_deposit:
      return {0.0, thickest};
    case Cause::instrument:
      return is_flow(*part.channel)   ? Limits{-0.5, 1.0}
             : is_drop(*part.channel) ? Limits{-0.9, 3.0}
                                      : Limits{-30.0, 30.0};
    default:
      return {0.0, 0.7};
  }
}

std::optional<Channels> predict(const Plant& plant, const Channels& reading, double fouling_before,
                                std::span<const Part> parts) {
  Channels real = reading;
  Ailment ailment{.tube_deposit = fouling_before};
  for (const Part& part : parts) {
    add(part, ailment);
    if (part.channel) value(real, *part.channel) = truth(value(real, *part.channel), part);
  }
  const auto response = respond(plant,
                                {real[index_of(Channel::hot_flow)], real[index_of(Channel::cold_flow)],
                                 real[index_of(Channel::hot_in)], real[index_of(Channel::cold_in)]},
                                ailment);
  if (!response) return {};
  Channels result;
  result.fill(nothing);
  value(result, Channel::hot_out) = response->hot_out;
  value(result, Channel::cold_out) = response->cold_out;
  value(result, Channel::tube_dp) = response->tube_dp > 0.0 ? response->tube_dp : nothing;
  value(result, Channel::shell_dp) = response->shell_dp > 0.0 ? response->shell_dp : nothing;
  for (const Part& part : parts)
    if (part.channel) value(result, *part.channel) = shown(value(result, *part.channel), part);
  return result;
}

/// Misses made independent and of unit variance: the square root of the inverse of the
/// covariance I + qq', q the shared error over the scatter.
template <class Misses>
void add_independent(const Misses& misses, Residuals& residuals) {
  double square = 0.0, along = 0.0, owed = 0.0;
  for (const auto& miss : misses) {
    const double q = miss.shared / miss.scatter;
    square += q * q;
    owed += std::pow(miss.owed / miss.scatter, 2);
    along += q * miss.value / miss.scatter;
  }
  const double share = square > 0.0 ? (1.0 - 1.0 / std::sqrt(1.0 + square)) * along / square : 0.0;
  for (const auto& miss : misses)
    residuals.values.push_back(miss.value / miss.scatter - share * miss.shared / miss.scatter);
  residuals.log_determinant += std::log1p(owed);
}

double Residuals::chi_square() const {
  double sum = 0.0;
  for (const double r : values) sum += r * r;
  return sum;
}

Comparison::Comparison(const Plant& plant, std::span<const Observed> before, std::span<const Observed> after,
                       double fouling_before)
    : plant_(&plant), fouling_before_(fouling_before) {
  for (const Observed& day : after)
    if (predict(plant, day.value, fouling_before, {})) after_.push_back(day);
  std::array<std::vector<double>, channel_count> misses, flows;
  Channels variance{};
  for (const Observed& day : before) {
    const auto predicted = predict(plant, day.value, fouling_before, {});
    if (!predicted) continue;
    for (const Channel channel : observables) {
      const std::size_t i = index_of(channel);
      const double scale = is_drop(channel) ? (*predicted)[i] : 1.0;
      const double miss = is_drop(channel) ? day.value[i] / scale : day.value[i] - (*predicted)[i];
      if (!std::isfinite(miss)) continue;
      misses[i].push_back(miss);
      if (is_drop(channel)) flows[i].push_back(std::log(day.value[index_of(flow_of(plant, channel))]));
      variance[i] += std::pow(day.scatter[i] / scale, 2);
    }
  }
  for (const Channel channel : observables) {
    const std::size_t i = index_of(channel);
    const Sample sample = sample_of(misses[i]);
    const auto days = static_cast<double>(misses[i].size());
    offset_[i] = sample.mean;
    flow_[i] = sample_of(flows[i]).mean;
    scatter_[i] = sample.variance;
    variance_[i] = std::max(variance[i] / days, sample.variance) / days;
  }
  if (const auto all = residuals({})) count_ = static_cast<int>(all->values.size());
}

Channels Comparison::carried_over(const Channels& predicted) const {
  Channels result = predicted;
  for (const Channel channel : observables) {
    const std::size_t i = index_of(channel);
    result[i] = is_drop(channel) ? predicted[i] * offset_[i] : predicted[i] + offset_[i];
  }
  return result;
}

bool Comparison::is_observed(Channel channel) const {
  const std::size_t i = index_of(channel);
  return std::isfinite(offset_[i]) &&
         std::ranges::any_of(after_, [i](const Observed& day) { return std::isfinite(day.value[i]); });
}

bool Comparison::is_inferred(Channel channel) const {
  return std::ranges::any_of(after_, [channel](const Observed& day) { return day.inferred == channel; });
}

/// Standard uncertainty of a prediction that is alike on all days of the same flow.
double Comparison::model_spread(const Observed& day, Channel channel) const {
  const std::size_t i = index_of(channel);
  const double scale = is_drop(channel) ? day.value[i] : 1.0;
  double exponent = 0.0;
  if (is_drop(channel))
    exponent =
        ModelError{}.drop_exponent * (std::log(day.value[index_of(flow_of(*plant_, channel))]) - flow_[i]);
  return std::sqrt(std::pow(day.shared[i], 2) + (variance_[i] + exponent * exponent) * scale * scale);
}

/// What the parts' deposit does to a drop, as a logarithm.
double Comparison::deposit_rise(std::span<const Part> parts, Channel channel) const {
  const DepositOnDrops& rule = plant_->deposit_on_drops;
  double change = 0.0;
  for (const Part& part : parts) {
    if (part.cause == Cause::shell_deposit && channel == Channel::shell_dp)
      change += std::log1p(rule.shell_rise * part.magnitude);
    if (part.cause == Cause::tube_deposit && channel == Channel::tube_dp) {
      const geometry::Exchanger& exchanger = plant_->prepared.problem().exchanger;
      change += std::log(deposit_on_tube_drop(rule, exchanger, fouling_before_ + part.magnitude) /
                         deposit_on_tube_drop(rule, exchanger, fouling_before_));
    }
  }
  return change;
}

/// Whether a drop came out lower than it would be without what the parts' deposit does to it.
bool Comparison::is_lower_than_clean(const std::vector<Channels>& expected, Channel channel,
                                     double rise) const {
  const std::size_t i = index_of(channel);
  double above = 0.0;
  for (std::size_t d = 0; d < after_.size(); ++d)
    if (const double ratio = after_[d].value[i] / expected[d][i]; std::isfinite(ratio) && ratio > 0.0)
      above += std::log(ratio) + rise;
  return above < 0.0;
}

std::optional<Comparison::Misses> Comparison::misses(std::span<const Part> parts) const {
  std::vector<Channels> expected;
  for (const Observed& day : after_) {
    const auto predicted = predict(*plant_, day.value, fouling_before_, parts);
    if (!predicted) return {};
    expected.push_back(carried_over(*predicted));
  }
  Misses result;
  for (std::size_t k = 0; k < observables.size(); ++k) {
    const Channel channel = observables[k];
    const std::size_t i = index_of(channel);
    double rise = deposit_rise(parts, channel), taken_off = 0.0;
    // However little a deposit narrows, it opens nothing: no rise at the least, and that is sure. Having
    // foretold one is still owed.
    if (rise > 0.0 && plant_->deposit_on_drops.spread > 0.0 && is_lower_than_clean(expected, channel, rise))
      taken_off = std::exchange(rise, 0.0);
    for (std::size_t d = 0; d < after_.size(); ++d) {
      const Observed& day = after_[d];
      const double known = expected[d][i] * std::exp(-taken_off);
      if (!std::isfinite(day.value[i]) || !std::isfinite(known)) continue;
      const double scale = is_drop(channel) ? day.value[i] : 1.0;
      const double model = model_spread(day, channel), spread = plant_->deposit_on_drops.spread * scale;
      result[k].push_back({.value = day.value[i] - known,
                           .scatter = std::max(day.scatter[i], std::sqrt(scatter_[i]) * scale),
                           .shared = std::hypot(model, spread * std::abs(rise)),
                           .owed = std::hypot(model, spread * (std::abs(rise) + taken_off))});
    }
  }
  return result;
}

std::optional<Residuals> Comparison::residuals(std::span<const Part> parts) const {
  const auto all = misses(parts);
  if (!all) return {};
  Residuals result;
  for (const auto& of_channel : *all) add_independent(of_channel, result);
  return result;
}

void Comparison::widen(std::span<const Part> parts) {
  const auto all = misses(parts);
  if (!all) return;
  for (std::size_t k = 0; k < observables.size(); ++k) {
    const std::size_t i = index_of(observables[k]);
    std::vector<double> values;
    for (const Miss& miss : (*all)[k]) values.push_back(miss.value);
    double scale = 1.0;
    if (is_drop(observables[k])) scale = after_.back().value[i];
    if (std::isfinite(scale))
      scatter_[i] = std::max(scatter_[i], sample_of(values).variance / (scale * scale));
  }
}

std::optional<Channels> Comparison::last_day(std::span<const Part> parts) const {
  const auto predicted = predict(*plant_, after_.back().value, fouling_before_, parts);
  if (!predicted) return {};
  Channels expected = carried_over(*predicted);
  // A drop nobody read before is as the model has it.
  for (const Channel channel : observables)
    if (std::isnan(offset_[index_of(channel)])) value(expected, channel) = (*predicted)[index_of(channel)];
  return expected;
}

Channels Comparison::last_uncertainty() const {
  const Observed& day = after_.back();
  Channels result{};
  for (const Channel channel : observables)
    value(result, channel) = std::hypot(day.scatter[index_of(channel)], model_spread(day, channel));
  const auto predicted = predict(*plant_, day.value, fouling_before_, {});
  for (const Channel channel : observables)
    if (!is_observed(channel) && predicted) value(result, channel) = uncertainty_unread(*predicted, channel);
  return result;
}

}  // namespace dutygauge::field
