#include "balance.hpp"

#include <cmath>
#include <limits>

namespace dutygauge::field {
namespace {

double enthalpy(const rating::Stream& stream, double temperature) {
  return fluids::enthalpy(stream.fluid, temperature, stream.inlet_pressure);
}

bool inside(const fluids::TemperatureRange& range, double temperature) {
  return temperature >= range.low && temperature <= range.high;
}

/// Heat [J/kg] a stream gives off or takes up; NaN where an end is missing.
double heat_between(const rating::Stream& stream, double warm, double cool) {
  return enthalpy(stream, warm) - enthalpy(stream, cool);
}

/// The temperature at the other end of a stream that gains so much [J/kg].
double other_end(const rating::Stream& stream, double temperature, double gain) {
  return fluids::temperature_at(stream.fluid, enthalpy(stream, temperature) + gain, stream.inlet_pressure);
}

/// Puts in what the balance gives for the one that is missing.
void infer(const Plant& plant, Balance& b) {
  const rating::Stream &hot = hot_stream(plant), &cold = cold_stream(plant);
  switch (*b.missing) {
    case Channel::hot_flow:
      b.hot_flow = b.cold_duty / heat_between(hot, b.hot_in, b.hot_out);
      break;
    case Channel::hot_in:
      b.hot_in = other_end(hot, b.hot_out, b.cold_duty / b.hot_flow);
      break;
    case Channel::hot_out:
      b.hot_out = other_end(hot, b.hot_in, -b.cold_duty / b.hot_flow);
      break;
    case Channel::cold_flow:
      b.cold_flow = b.hot_duty / heat_between(cold, b.cold_out, b.cold_in);
      break;
    case Channel::cold_in:
      b.cold_in = other_end(cold, b.cold_out, -b.hot_duty / b.cold_flow);
      break;
    case Channel::cold_out:
      b.cold_out = other_end(cold, b.cold_in, b.hot_duty / b.cold_flow);
      break;
    default:
      break;
  }
}

void find_duties(const Plant& plant, Balance& b) {
  b.hot_duty = b.hot_flow * heat_between(hot_stream(plant), b.hot_in, b.hot_out);
  b.cold_duty = b.cold_flow * heat_between(cold_stream(plant), b.cold_out, b.cold_in);
}

/// Heat capacity [J/kg.K] at one temperature; cheaper than the whole state.
double heat_capacity(const rating::Stream& stream, double temperature) {
  constexpr double step = 0.01;  // [K]
  return heat_between(stream, temperature + step, temperature - step) / (2.0 * step);
}

void find_slopes(const Plant& plant, Balance& b) {
  const rating::Stream &hot = hot_stream(plant), &cold = cold_stream(plant);
  const double of_hot = b.hot_flow / b.hot_duty, of_cold = b.cold_flow / b.cold_duty;
  b.hot_in_slope = of_hot * heat_capacity(hot, b.hot_in);
  b.hot_out_slope = of_hot * heat_capacity(hot, b.hot_out);
  b.cold_in_slope = of_cold * heat_capacity(cold, b.cold_in);
  b.cold_out_slope = of_cold * heat_capacity(cold, b.cold_out);
}

bool is_possible(const Plant& plant, const Balance& b) {
  return b.hot_flow > 0.0 && b.cold_flow > 0.0 && b.hot_in > b.cold_in && b.hot_duty > 0.0 &&
         b.cold_duty > 0.0 && b.hot_change() > 0.0 && b.cold_change() > 0.0 && std::isfinite(b.hot_duty) &&
         std::isfinite(b.cold_duty) && inside(hot_range(plant), b.hot_in) &&
         inside(hot_range(plant), b.hot_out) && inside(cold_range(plant), b.cold_in) &&
         inside(cold_range(plant), b.cold_out);
}

}  // namespace

const rating::Stream& hot_stream(const Plant& plant) {
  const rating::Problem& problem = plant.prepared.problem();
  return plant.prepared.shell_side_is_hot() ? problem.shell_side : problem.tube_side;
}

const rating::Stream& cold_stream(const Plant& plant) {
  const rating::Problem& problem = plant.prepared.problem();
  return plant.prepared.shell_side_is_hot() ? problem.tube_side : problem.shell_side;
}

const fluids::TemperatureRange& hot_range(const Plant& plant) {
  return plant.prepared.shell_side_is_hot() ? plant.prepared.shell_range() : plant.prepared.tube_range();
}

const fluids::TemperatureRange& cold_range(const Plant& plant) {
  return plant.prepared.shell_side_is_hot() ? plant.prepared.tube_range() : plant.prepared.shell_range();
}

double drop_exponent(const Plant& plant, Channel flow) {
  const rating::Stream& stream = flow == Channel::hot_flow ? hot_stream(plant) : cold_stream(plant);
  return stream.drop_law ? stream.drop_law->flow_exponent : 1.8;
}

Spread spread_of(const Instrument& instrument, double reading) {
  const double scale = instrument.relative ? std::abs(reading) : 1.0;
  return {instrument.random * scale, instrument.systematic * scale};
}

std::optional<Balance> balance_of(const Plant& plant, const Channels& reading) {
  Balance b{};
  b.hot_flow = reading[index_of(Channel::hot_flow)], b.cold_flow = reading[index_of(Channel::cold_flow)];
  b.hot_in = reading[index_of(Channel::hot_in)], b.hot_out = reading[index_of(Channel::hot_out)];
  b.cold_in = reading[index_of(Channel::cold_in)], b.cold_out = reading[index_of(Channel::cold_out)];
  for (std::size_t i = 0; i < balance_channels; ++i) {
    if (!std::isnan(reading[i])) continue;
    if (b.missing) return {};
    b.missing = static_cast<Channel>(i);
  }
  find_duties(plant, b);
  if (b.missing) {
    infer(plant, b);
    find_duties(plant, b);
    // A temperature past the end of its fluid's range comes back as that end.
    if (!(std::abs(b.hot_duty - b.cold_duty) < 1e-6 * std::abs(b.hot_duty))) return {};
  }
  if (!is_possible(plant, b)) return {};
  find_slopes(plant, b);
  return b;
}

Gradient gradient_of_closure(const Balance& b) {
  return {{1.0 / b.hot_flow, -1.0 / b.cold_flow, b.hot_in_slope, -b.hot_out_slope, b.cold_in_slope,
           -b.cold_out_slope},
          1.0,
          -1.0};
}

Spread propagated(const Plant& plant, const Instruments& instruments, const Balance& b,
                  const Gradient& gradient) {
  const std::array<double, balance_channels> value = {b.hot_flow, b.cold_flow, b.hot_in,
                                                      b.hot_out,  b.cold_in,   b.cold_out};
  double random = 0.0, systematic = 0.0;
  for (std::size_t i = 0; i < balance_channels; ++i) {
    const Spread spread = spread_of(instruments[i], value[i]);
    random += std::pow(gradient.channel[i] * spread.random, 2);
    systematic += std::pow(gradient.channel[i] * spread.systematic, 2);
  }
  systematic += std::pow(gradient.hot_heat_capacity * plant.hot_heat_capacity_uncertainty, 2) +
                std::pow(gradient.cold_heat_capacity * plant.cold_heat_capacity_uncertainty, 2);
  return {std::sqrt(random), std::sqrt(systematic)};
}

}  // namespace dutygauge::field
