#pragma once
#include <cmath>
#include <functional>

#include "dutygauge/field/series.hpp"
#include "field_series.hpp"

/// A made-up year of days: a quiet unit whose parts a test changes from some day on.
namespace series {

struct Settings {
  double hot_flow = 80, cold_flow = 110;                              ///< [kg/s]
  double hot_in = 328, hot_out = 315, cold_in = 300, cold_out = 310;  ///< [K]
  double tube_factor = 1, shell_factor = 1;                           ///< on the drops at their flows
  double fouling = 5e-5;                                              ///< [m2.K/W]
  double closure = 0;
  bool running = true;
};

/// Days of a unit with the cold stream in the tubes; `change` sets what differs on a day.
inline dutygauge::field::Days days(int count, const std::function<void(int, Settings&)>& change,
                                   std::uint64_t seed = 5) {
  using dutygauge::field::Channel;
  using dutygauge::field::index_of;
  Noise fouling(seed, 3e-6, 0.2), closure(seed + 1, 0.003, 0.0), drop(seed + 2, 0.005, 0.0),
      flow(seed + 3, 0.01, 0.3), temperature(seed + 4, 0.25, 0.3);
  dutygauge::field::Days days;
  for (int i = 0; i < count; ++i) {
    Settings s;
    change(i, s);
    if (!s.running) continue;
    dutygauge::field::Day day{.day = i + 0.5, .count = 20};
    const auto set = [&day](Channel channel, double value) { day.value[index_of(channel)] = value; };
    const double hot = s.hot_flow * std::exp(flow()), cold = s.cold_flow * std::exp(flow());
    set(Channel::hot_flow, hot);
    set(Channel::cold_flow, cold);
    set(Channel::hot_in, s.hot_in + temperature());
    set(Channel::hot_out, s.hot_out + temperature());
    set(Channel::cold_in, s.cold_in + temperature());
    set(Channel::cold_out, s.cold_out + temperature());
    set(Channel::tube_dp, 38e3 * s.tube_factor * std::pow(cold / 110.0, 1.8) * std::exp(drop()));
    set(Channel::shell_dp, 45e3 * s.shell_factor * std::pow(hot / 80.0, 1.8) * std::exp(drop()));
    set(Channel::valve, std::nan(""));
    day.apparent.fouling = s.fouling + fouling();
    day.apparent.fouling_random = 15e-6;
    day.apparent.fouling_systematic = 2e-5;
    day.apparent.closure = s.closure + closure();
    day.apparent.closure_uncertainty = 0.03;
    day.apparent.noise_amplification = 2;
    days.push_back(day);
  }
  return days;
}

}  // namespace series
