#include <cmath>
#include <limits>
#include <utility>

#include "balance.hpp"

namespace dutygauge::field {
namespace {

constexpr double nothing = std::numeric_limits<double>::quiet_NaN();

/// The two duties made one, and how much of it each side has.
struct Weighted {
  double duty;
  double hot_share, cold_share;  ///< of the duty; sum 1
};

/// Relative variance of one side's duty.
struct SideSpread {
  const Instrument &flow, &in, &out;
  double mass_flow, inlet, outlet, heat_capacity;
  double variance() const {
    const double change = inlet - outlet;
    return spread_of(flow, mass_flow).variance() / (mass_flow * mass_flow) + heat_capacity * heat_capacity +
           (spread_of(in, inlet).variance() + spread_of(out, outlet).variance()) / (change * change);
  }
};

double hot_variance(const Plant& plant, const Instruments& at, const Balance& b) {
  return SideSpread{at[index_of(Channel::hot_flow)],
                    at[index_of(Channel::hot_in)],
                    at[index_of(Channel::hot_out)],
                    b.hot_flow,
                    b.hot_in,
                    b.hot_out,
                    plant.hot_heat_capacity_uncertainty}
      .variance();
}

double cold_variance(const Plant& plant, const Instruments& at, const Balance& b) {
  return SideSpread{at[index_of(Channel::cold_flow)],
                    at[index_of(Channel::cold_in)],
                    at[index_of(Channel::cold_out)],
                    b.cold_flow,
                    b.cold_in,
                    b.cold_out,
                    plant.cold_heat_capacity_uncertainty}
      .variance();
}

Weighted weigh(const Balance& b, double hot_relative_variance, double cold_relative_variance) {
  if (b.missing) return {b.hot_duty, 0.5, 0.5};  // both are the same
  const double hot = hot_relative_variance * b.hot_duty * b.hot_duty;
  const double cold = cold_relative_variance * b.cold_duty * b.cold_duty;
  const double hot_weight = hot + cold > 0.0 ? cold / (hot + cold) : 0.5;
  const double duty = hot_weight * b.hot_duty + (1.0 - hot_weight) * b.cold_duty;
  return {duty, hot_weight * b.hot_duty / duty, (1.0 - hot_weight) * b.cold_duty / duty};
}

/// Outlets moved so that both streams carry the weighted duty.
struct Consistent {
  double hot_out, cold_out;
  double hot_capacity_rate, cold_capacity_rate;
};

Consistent move_outlets(const Plant& plant, const Balance& b, double duty) {
  Consistent c{b.hot_out + (1.0 - duty / b.hot_duty) / b.hot_out_slope,
               b.cold_out + (duty / b.cold_duty - 1.0) / b.cold_out_slope, 0.0, 0.0};
  const auto heat = [](const rating::Stream& stream, double warm, double cool) {
    return fluids::enthalpy(stream.fluid, warm, stream.inlet_pressure) -
           fluids::enthalpy(stream.fluid, cool, stream.inlet_pressure);
  };
  c.hot_capacity_rate = b.hot_flow * heat(hot_stream(plant), b.hot_in, c.hot_out) / (b.hot_in - c.hot_out);
  c.cold_capacity_rate =
      b.cold_flow * heat(cold_stream(plant), c.cold_out, b.cold_in) / (c.cold_out - b.cold_in);
  return c;
}

rating::Place place_of(const Balance& b, const Consistent& ends, bool shell_is_hot, double u) {
  const double hot_mean = 0.5 * (b.hot_in + ends.hot_out), cold_mean = 0.5 * (b.cold_in + ends.cold_out);
  return shell_is_hot ? rating::Place{b.cold_flow, b.hot_flow, cold_mean, hot_mean, u}
                      : rating::Place{b.hot_flow, b.cold_flow, hot_mean, cold_mean, u};
}

/// NTU on the tube side and how its logarithm changes with those of P and R.
struct Ntu {
  double value, with_p, with_r;
};

/// Slopes are taken towards where the arrangement has an answer for certain: less P, less R.
std::optional<Ntu> ntu_of(const arrangement::Arrangement& arrangement, double r, double p) {
  constexpr double step = 1e-5;
  const auto value = arrangement::ntu_for(arrangement, r, p);
  if (!value || !(*value > 0.0)) return {};
  const auto less_p = arrangement::ntu_for(arrangement, r, p * (1.0 - step));
  const auto less_r = arrangement::ntu_for(arrangement, r * (1.0 - step), p);
  if (!less_p || !less_r) return {};
  const double unit = std::log1p(-step);
  return Ntu{*value, std::log(*less_p / *value) / unit, std::log(*less_r / *value) / unit};
}

/// Everything the fouling's gradient is made of.
struct Inversion {
  const Plant* plant;
  Balance balance;
  Weighted weighted;
  Consistent ends;
  Ntu ntu;
  double resistance;  ///< A/UA [m2.K/W]
  rating::CleanSlopes slopes;
};

/// Small changes of the inputs, relative of flows and heat capacities, else [K].
struct Changes {
  double hot_flow = 0, cold_flow = 0, hot_in = 0, hot_out = 0, cold_in = 0, cold_out = 0;
  double hot_heat_capacity = 0, cold_heat_capacity = 0;
};

/// What they do to the apparent fouling, to first order, weights and walls held.
double fouling_change(const Inversion& at, const Changes& d) {
  const Balance& b = at.balance;
  const double hot_gain = b.hot_in_slope * d.hot_in, cold_loss = b.cold_in_slope * d.cold_in;
  const double duty =
      at.weighted.hot_share * (d.hot_flow + d.hot_heat_capacity + hot_gain - b.hot_out_slope * d.hot_out) +
      at.weighted.cold_share *
          (d.cold_flow + d.cold_heat_capacity + b.cold_out_slope * d.cold_out - cold_loss);
  const double span = (d.hot_in - d.cold_in) / (b.hot_in - b.cold_in);
  // The outlets that carry the duty, and with them the capacity rates and means.
  const double of_hot = at.weighted.duty / b.hot_duty, of_cold = at.weighted.duty / b.cold_duty;
  const double hot_out = (hot_gain + of_hot * (d.hot_flow + d.hot_heat_capacity - duty)) / b.hot_out_slope;
  const double cold_out =
      (cold_loss + of_cold * (duty - d.cold_flow - d.cold_heat_capacity)) / b.cold_out_slope;
  const double hot_rate = duty - (d.hot_in - hot_out) / (b.hot_in - at.ends.hot_out);
  const double cold_rate = duty - (cold_out - d.cold_in) / (at.ends.cold_out - b.cold_in);
  const double hot_mean = 0.5 * (d.hot_in + hot_out), cold_mean = 0.5 * (d.cold_in + cold_out);
  const bool shell_is_hot = at.plant->prepared.shell_side_is_hot();
  const auto [tube_rate, shell_rate] =
      shell_is_hot ? std::pair{cold_rate, hot_rate} : std::pair{hot_rate, cold_rate};
  const double ua =
      at.ntu.with_p * (duty - tube_rate - span) + at.ntu.with_r * (tube_rate - shell_rate) + tube_rate;
  const rating::CleanSlopes& s = at.slopes;
  const double clean = shell_is_hot ? s.tube_flow * d.cold_flow + s.shell_flow * d.hot_flow +
                                          s.tube_mean * cold_mean + s.shell_mean * hot_mean
                                    : s.tube_flow * d.hot_flow + s.shell_flow * d.cold_flow +
                                          s.tube_mean * hot_mean + s.shell_mean * cold_mean;
  return -at.resistance * ua - at.plant->calibration.factor * clean;
}

/// A channel the balance gives passes its share on to the others.
void pass_on(const Balance& b, Gradient& gradient) {
  const Gradient closure = gradient_of_closure(b);
  const std::size_t missing = index_of(*b.missing);
  const double share = gradient.channel[missing] / closure.channel[missing];
  for (std::size_t i = 0; i < balance_channels; ++i) gradient.channel[i] -= share * closure.channel[i];
  gradient.channel[missing] = 0.0;
  gradient.hot_heat_capacity -= share * closure.hot_heat_capacity;
  gradient.cold_heat_capacity -= share * closure.cold_heat_capacity;
}

Gradient gradient_of_fouling(const Inversion& at) {
  const Balance& b = at.balance;
  Gradient gradient{{fouling_change(at, {.hot_flow = 1.0}) / b.hot_flow,
                     fouling_change(at, {.cold_flow = 1.0}) / b.cold_flow,
                     fouling_change(at, {.hot_in = 1.0}), fouling_change(at, {.hot_out = 1.0}),
                     fouling_change(at, {.cold_in = 1.0}), fouling_change(at, {.cold_out = 1.0})},
                    fouling_change(at, {.hot_heat_capacity = 1.0}),
                    fouling_change(at, {.cold_heat_capacity = 1.0})};
  if (b.missing) pass_on(b, gradient);
  return gradient;
}

}  // namespace

std::optional<Apparent> apparent(const Plant& plant, const Instruments& instruments,
                                 const Channels& reading) {
  const auto balance = balance_of(plant, reading);
  if (!balance) return {};
  const Balance& b = *balance;
  const double hot_spread = hot_variance(plant, instruments, b),
               cold_spread = cold_variance(plant, instruments, b);
  const Weighted weighted = weigh(b, hot_spread, cold_spread);
  const Consistent ends = move_outlets(plant, b, weighted.duty);
  if (!(ends.hot_capacity_rate > 0.0 && ends.cold_capacity_rate > 0.0)) return {};

  const bool shell_is_hot = plant.prepared.shell_side_is_hot();
  const auto [tube_rate, shell_rate] = shell_is_hot
                                           ? std::pair{ends.cold_capacity_rate, ends.hot_capacity_rate}
                                           : std::pair{ends.hot_capacity_rate, ends.cold_capacity_rate};
  const double p = weighted.duty / (tube_rate * (b.hot_in - b.cold_in));
  const auto ntu = ntu_of(plant.prepared.arrangement(), tube_rate / shell_rate, p);
  if (!ntu) return {};

  const double u = ntu->value * tube_rate / plant.prepared.problem().exchanger.area;
  const auto [films, slopes] = plant.prepared.films_and_slopes(place_of(b, ends, shell_is_hot, u));
  if (!films.converged) return {};

  const Inversion at{&plant, b, weighted, ends, *ntu, 1.0 / u, slopes};
  const Spread fouling = propagated(plant, instruments, b, gradient_of_fouling(at));
  const double clean = plant.calibration.factor * films.sum();
  // Flows past all bounds overflow on the way.
  if (!std::isfinite(clean + fouling.random + fouling.systematic + hot_spread + cold_spread)) return {};
  return Apparent{.hot_duty = b.missing && is_hot(*b.missing) ? nothing : b.hot_duty,
                  .cold_duty = b.missing && !is_hot(*b.missing) ? nothing : b.cold_duty,
                  .duty = weighted.duty,
                  .closure = b.missing ? nothing : b.hot_duty / b.cold_duty - 1.0,
                  .closure_uncertainty = b.missing ? nothing : std::sqrt(hot_spread + cold_spread),
                  .u = u,
                  .u_clean = 1.0 / clean,
                  .fouling = 1.0 / u - clean,
                  .fouling_random = fouling.random,
                  .fouling_systematic = fouling.systematic,
                  .noise_amplification = ntu->with_p};
}

std::optional<Apparent> apparent(const rating::Problem& problem, const Calibration& calibration,
                                 const Instruments& instruments, const Channels& reading) {
  return apparent(Plant(problem, calibration), instruments, reading);
}

std::optional<Inferred> inferred(const Plant& plant, const Instruments& instruments, const Channels& reading,
                                 Channel channel) {
  const std::size_t at = index_of(channel);
  if (at >= balance_channels) return {};
  Channels others = reading;
  others[at] = nothing;
  const auto balance = balance_of(plant, others);
  if (!balance) return {};
  const std::array<double, balance_channels> value = {balance->hot_flow, balance->cold_flow,
                                                      balance->hot_in,   balance->hot_out,
                                                      balance->cold_in,  balance->cold_out};
  Gradient gradient;
  gradient.channel[at] = 1.0;
  pass_on(*balance, gradient);
  const Spread spread = propagated(plant, instruments, *balance, gradient);
  return Inferred{value[at], spread.random, spread.systematic};
}

}  // namespace dutygauge::field
