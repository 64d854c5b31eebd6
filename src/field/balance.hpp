#pragma once
#include <optional>

#include "dutygauge/field/plant.hpp"

/// Internal to field: one reading's heat balance.
namespace dutygauge::field {

inline constexpr std::size_t balance_channels = 6;  ///< flows and temperatures, first in Channel

/// Whether one of the six belongs to the hot stream.
constexpr bool is_hot(Channel channel) {
  return channel == Channel::hot_flow || channel == Channel::hot_in || channel == Channel::hot_out;
}

const rating::Stream& hot_stream(const Plant& plant);
const rating::Stream& cold_stream(const Plant& plant);
const fluids::TemperatureRange& hot_range(const Plant& plant);
const fluids::TemperatureRange& cold_range(const Plant& plant);

/// How the drop of a flow's own side goes with it: the exponent of its law, else 1.8.
double drop_exponent(const Plant& plant, Channel flow);

/// Standard uncertainties of a channel at its reading, absolute.
struct Spread {
  double random, systematic;
  double variance() const { return random * random + systematic * systematic; }
};
Spread spread_of(const Instrument& instrument, double reading);

/// All six flows and temperatures, at most one of them from the balance.
struct Balance {
  double hot_flow, cold_flow, hot_in, hot_out, cold_in, cold_out;
  double hot_duty, cold_duty;  ///< [W]
  /// Relative change of a duty with the temperature at an end, both counted positive [1/K].
  double hot_in_slope, hot_out_slope, cold_in_slope, cold_out_slope;
  std::optional<Channel> missing;  ///< the one the balance gave

  double hot_change() const { return hot_in - hot_out; }
  double cold_change() const { return cold_out - cold_in; }
};

/// Empty where more than one is missing, the inlets or a stream's change have the wrong
/// sign, or a temperature lies outside what its fluid can be.
std::optional<Balance> balance_of(const Plant& plant, const Channels& reading);

/// Change of ln(hot duty/cold duty) with each input, absolute for channels, relative for
/// the heat capacities.
struct Gradient {
  std::array<double, balance_channels> channel{};
  double hot_heat_capacity = 0, cold_heat_capacity = 0;
};
Gradient gradient_of_closure(const Balance& balance);

/// Standard uncertainties of a quantity with this gradient.
Spread propagated(const Plant& plant, const Instruments& instruments, const Balance& balance,
                  const Gradient& gradient);

}  // namespace dutygauge::field
