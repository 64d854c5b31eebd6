#include "dutygauge/field/mapping.hpp"

#include <algorithm>
#include <cmath>

namespace dutygauge::field {
namespace {

constexpr std::string_view names[channel_count] = {"hot_flow", "cold_flow", "hot_in",   "hot_out", "cold_in",
                                                   "cold_out", "tube_dp",   "shell_dp", "valve"};
constexpr double celsius_zero = 273.15;

}  // namespace

std::string_view name(Channel channel) {
  return names[index_of(channel)];
}

std::optional<Channel> channel_named(std::string_view name) {
  const auto* found = std::ranges::find(names, name);
  if (found == std::end(names)) return {};
  return static_cast<Channel>(found - std::begin(names));
}

// Practice, one standard deviation of an installed instrument. Temperatures: a Pt100 of class B
// (IEC 60751: 0.30 K + 0.005 |t|, from memory) with its well and transmitter. Flows: a maintained orifice,
// else a meter of velocity or mass. Drops: a cell with a tenth of its span to spare.
Instrument usual_instrument(Channel channel, Principle principle, double temperature) {
  if (is_temperature(channel))
    return {.systematic = 0.25 + 0.003 * std::abs(temperature - celsius_zero), .random = 0.2};
  if (is_drop(channel)) return {.systematic = 0.01, .random = 0.015, .relative = true};
  const bool in_line = principle == Principle::velocity || principle == Principle::mass;
  if (in_line) return {.systematic = 0.0075, .random = 0.005, .relative = true};
  return {.systematic = 0.015, .random = 0.01, .relative = true};
}

}  // namespace dutygauge::field
