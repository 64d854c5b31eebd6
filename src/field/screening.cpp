#include "dutygauge/field/screening.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

namespace dutygauge::field {
namespace {

constexpr double missing = std::numeric_limits<double>::quiet_NaN();
constexpr std::int64_t long_ago = std::numeric_limits<std::int64_t>::min() / 4;
constexpr std::size_t measured = index_of(Channel::valve);   ///< a valve may stand still
constexpr std::size_t balance = index_of(Channel::tube_dp);  ///< flows and temperatures come first
constexpr std::size_t enough = 7;                            ///< of 13
constexpr int least_on_a_line = 3;                           ///< channels
constexpr double longest_step = 2.5;                         ///< intervals between neighbours in time

double median_of(double* begin, std::size_t count) {
  std::nth_element(begin, begin + count / 2, begin + count);
  return begin[count / 2];
}

}  // namespace

Steady steady_limits(const Survey& survey, const Limits& limits) {
  const double habit = limits.steady_habit;
  return {.hot_flow = std::max(limits.steady_flow, habit * survey.hot_flow_change),
          .cold_flow = std::max(limits.steady_flow, habit * survey.cold_flow_change),
          .hot_in = std::max(limits.steady_inlet, habit * survey.hot_in_change),
          .cold_in = std::max(limits.steady_inlet, habit * survey.cold_in_change)};
}

Screen::Screen(const Mapping& mapping, const Survey& survey, const Channels& resolution, Tally& tally,
               Sink sink, const Limits& limits)
    : mapping_(mapping),
      survey_(survey),
      resolution_(resolution),
      tally_(tally),
      sink_(std::move(sink)),
      limits_(limits),
      steady_(steady_limits(survey, limits)),
      slots_(ring),
      restart_(long_ago),
      step_(long_ago) {}

void Screen::push(const Reading& reading) {
  const std::int64_t row = in_++;
  slot(row) = Slot{.raw = reading, .value = reading.value};
  find_frozen(row);
  if (row >= 2) find_straight(row - 1);
  // What is frozen is known `frozen` rows later, and a spike needs its neighbours free of it.
  while (spiked_ + reach + limits_.frozen <= row) find_spikes(spiked_++);
  while (out_ + 1 < spiked_) emit(out_++);
}

void Screen::finish() {
  while (spiked_ < in_) find_spikes(spiked_++);
  while (out_ < in_) emit(out_++);
}

void Screen::find_frozen(std::int64_t row) {
  const Channels& now = slot(row).raw.value;
  for (std::size_t c = 0; c < measured; ++c) {
    const bool same = row > 0 && now[c] == slot(row - 1).raw.value[c];
    alike_[c] = std::isnan(now[c]) ? 0 : same ? alike_[c] + 1 : 1;
  }
  const auto others_move = [&](std::size_t channel) {
    for (std::size_t c = 0; c < measured; ++c)
      if (c != channel && alike_[c] > 0 && alike_[c] < limits_.frozen) return true;
    return false;
  };
  for (std::size_t c = 0; c < measured; ++c) {
    // Zero is what a meter shows at rest.
    if (alike_[c] < limits_.frozen || now[c] == 0.0 || !others_move(c)) continue;
    const std::int64_t first = alike_[c] == limits_.frozen ? row - limits_.frozen + 1 : row;
    for (std::int64_t i = std::max(first, out_); i <= row; ++i) {
      double& value = slot(i).value[c];
      if (!std::isnan(value)) ++tally_.frozen;
      value = missing;
    }
  }
}

bool Screen::is_straight(std::int64_t row) {
  const Reading &before = slot(row - 1).raw, &here = slot(row).raw, &after = slot(row + 1).raw;
  if (std::abs(after.time - 2 * here.time + before.time) > 1) return false;
  int on_a_line = 0;
  for (std::size_t c = 0; c < measured; ++c) {
    const double a = before.value[c], b = here.value[c], d = after.value[c];
    if (std::isnan(a) || std::isnan(b) || std::isnan(d)) continue;
    // Rounding of three values; where it is as coarse as the noise only equality tells.
    const double rounding = 2.0 * resolution_[c];
    const double allowed = (rounding < random_of(c, b) ? rounding : 0.0) + 1e-9 * std::abs(b);
    if (std::abs(a - 2.0 * b + d) > allowed) return false;
    ++on_a_line;
  }
  return on_a_line >= least_on_a_line;
}

void Screen::find_straight(std::int64_t row) {
  straight_ = is_straight(row) ? straight_ + 1 : 0;
  if (straight_ < limits_.straight) return;
  const std::int64_t first = straight_ == limits_.straight ? row - limits_.straight + 1 : row;
  for (std::int64_t i = std::max(first, out_); i <= row; ++i) slot(i).filled = true;
}

/// Whether the median of 13 is near for certain: seven of them lie on either side of a value no
/// further away than half of what a spike is. Cheaper than the median, and nearly always so.
bool Screen::is_near_median(std::size_t channel, std::int64_t row, const Window& window) {
  const double value = slot(row).value[channel], distance = 0.5 * limits_.spike * random_of(channel, value);
  std::size_t below = 0, above = 0;
  for (std::int64_t i = window.first; i <= window.last && (below < enough || above < enough); ++i) {
    const double other = slot(i).value[channel];
    below += other <= value + distance ? 1 : 0;
    above += other >= value - distance ? 1 : 0;
  }
  return below >= enough && above >= enough;
}

void Screen::find_spikes(std::int64_t row) {
  Slot& at = slot(row);
  const std::int64_t first = std::max<std::int64_t>({row - reach, 0, in_ - static_cast<std::int64_t>(ring)});
  const std::int64_t last = std::min(row + reach, in_ - 1);
  std::array<double, 2 * reach + 1> window;
  for (std::size_t c = 0; c < measured; ++c) {
    if (std::isnan(at.value[c]) || is_near_median(c, row, {first, last})) continue;
    std::size_t count = 0;
    for (std::int64_t i = first; i <= last; ++i)
      if (const double value = slot(i).value[c]; !std::isnan(value)) window[count++] = value;
    if (count < enough) continue;
    const double middle = median_of(window.data(), count);
    // Nearly all readings are too close to be a spike whatever the others scatter.
    const double distance = std::abs(at.value[c] - middle), least = random_of(c, middle);
    if (!(distance > limits_.spike * least)) continue;
    for (std::size_t i = 0; i < count; ++i) window[i] = std::abs(window[i] - middle);
    at.spike[c] = distance > limits_.spike * std::max(median_of(window.data(), count), least);
  }
}

double Screen::random_of(std::size_t channel, double value) const {
  const Instrument& instrument = mapping_.instruments[channel];
  return instrument.relative ? instrument.random * std::abs(value) : instrument.random;
}

bool Screen::is_in_outage(std::int64_t time) const {
  return std::ranges::any_of(mapping_.events, [time](const Done& event) {
    return event.kind == Doing::outage && time >= event.when.from && time < event.when.to;
  });
}

bool Screen::is_low(const Slot& at, bool with_spikes) const {
  const auto shown = [&](Channel channel) {
    const std::size_t c = index_of(channel);
    return at.spike[c] && !with_spikes ? missing : at.raw.value[c];
  };
  return shown(Channel::hot_flow) < limits_.off_line_flow * survey_.hot_flow ||
         shown(Channel::cold_flow) < limits_.off_line_flow * survey_.cold_flow ||
         shown(Channel::hot_in) - shown(Channel::cold_in) < limits_.least_difference;
}

/// One row that is low in a single spike is no stop; two are.
bool Screen::is_off_line(std::int64_t row) {
  if (!is_low(slot(row), true)) return false;
  if (is_low(slot(row), false)) return true;
  return (row > 0 && is_low(slot(row - 1), true)) || (row + 1 < in_ && is_low(slot(row + 1), true));
}

bool Screen::is_unphysical(const Channels& value) const {
  const double hot_in = value[index_of(Channel::hot_in)], hot_out = value[index_of(Channel::hot_out)];
  const double cold_in = value[index_of(Channel::cold_in)], cold_out = value[index_of(Channel::cold_out)];
  // A missing one compares as false.
  return hot_out >= hot_in || cold_out <= cold_in || cold_out >= hot_in || hot_out <= cold_in;
}

bool Screen::has_moved(std::int64_t row, std::int64_t other) {
  const Slot &a = slot(row), &b = slot(other);
  const auto seconds = static_cast<double>(std::abs(a.raw.time - b.raw.time));
  if (survey_.interval > 0.0 && seconds > longest_step * survey_.interval) return false;
  // What is missing compares as false.
  const double difference = a.value[index_of(Channel::hot_in)] - a.value[index_of(Channel::cold_in)];
  const auto is_beyond = [&](Channel channel, double limit) {
    const std::size_t c = index_of(channel);
    return !a.spike[c] && !b.spike[c] && std::abs(a.value[c] - b.value[c]) > limit;
  };
  const double share = std::isnan(difference) ? 0.0 : limits_.steady_share * difference;
  return is_beyond(Channel::hot_flow, steady_.hot_flow * std::abs(a.value[index_of(Channel::hot_flow)])) ||
         is_beyond(Channel::cold_flow, steady_.cold_flow * std::abs(a.value[index_of(Channel::cold_flow)])) ||
         is_beyond(Channel::hot_in, std::max(steady_.hot_in, share)) ||
         is_beyond(Channel::cold_in, std::max(steady_.cold_in, share));
}

bool Screen::is_unsteady(std::int64_t row) {
  const bool since_before = row > 0 && has_moved(row, row - 1);
  const bool until_after = row + 1 < in_ && has_moved(row, row + 1);
  const std::int64_t time = slot(row).raw.time;
  if (since_before) step_ = time;
  return since_before || until_after || time - step_ <= limits_.after_step;
}

Drop Screen::judge(std::int64_t row) {
  const Slot& at = slot(row);
  const std::int64_t time = at.raw.time;
  const bool unsteady = is_unsteady(row);  // keeps account of steps, whatever else is found
  if (is_off_line(row) || is_in_outage(time)) {
    was_off_line_ = true;
    return Drop::off_line;
  }
  if (was_off_line_) restart_ = time;
  was_off_line_ = false;
  if (time - restart_ < limits_.after_restart) return Drop::after_restart;
  if (at.filled) return Drop::filled;
  for (std::size_t c = 0; c < balance; ++c)
    if (at.spike[c]) return Drop::spike;
  if (is_unphysical(at.value)) return Drop::unphysical;
  return unsteady ? Drop::unsteady : Drop::none;
}

void Screen::emit(std::int64_t row) {
  Screened screened{{slot(row).raw.time, slot(row).value}, judge(row)};
  for (std::size_t c = balance; c < measured; ++c)
    if (slot(row).spike[c]) {
      screened.reading.value[c] = missing;
      if (screened.drop == Drop::none) ++tally_.drop_spikes;
    }
  sink_(screened);
}

}  // namespace dutygauge::field
