#pragma once
#include <fmt/core.h>

#include <algorithm>
#include <cmath>
#include <concepts>

#include "dutygauge/numerics.hpp"
#include "equations.hpp"

/// One policy for all built-in models: a range is followed past its ends by 5 % of its span
/// or 10 K, whichever is less, but never past a change of phase that is known.
namespace dutygauge::fluids {

inline double extension(TemperatureRange valid) {
  return std::min(0.05 * (valid.high - valid.low), 10.0);
}

inline Limits extended(TemperatureRange valid) {
  return {.valid = valid, .usable = {valid.low - extension(valid), valid.high + extension(valid)}};
}

template <class Model>
concept Searched = requires(const Model& model) {
  { reach_of(model) } -> std::same_as<Limits>;
};

/// The part of a range where the phase stands. Liquids end above, gases below; where the
/// phase stands nowhere the range shrinks to the end farthest from the boundary.
template <Searched Model>
TemperatureRange where_phase_stands(const Model& model, Phase phase, TemperatureRange range, double pressure,
                                    bool strict) {
  const auto margin = [&](double t) { return phase_margin(model, {t, pressure}, strict); };
  const bool liquid = phase == Phase::liquid;
  const double far = liquid ? range.low : range.high, near = liquid ? range.high : range.low;
  if (margin(near) >= 0.0) return range;
  const double end =
      margin(far) > 0.0 ? numerics::find_root(margin, {range.low, range.high}, 1e-9).value_or(far) : far;
  return liquid ? TemperatureRange{range.low, end} : TemperatureRange{end, range.high};
}

template <Searched Model>
Limits limits_of(const Model& model, Phase phase, double pressure) {
  const Limits reach = reach_of(model);
  const TemperatureRange valid = where_phase_stands(model, phase, reach.valid, pressure, true);
  const TemperatureRange usable = where_phase_stands(model, phase, reach.usable, pressure, false);
  // The same boundary, looked for twice, differs by rounding.
  return {.valid = {std::max(valid.low, usable.low), std::min(valid.high, usable.high)}, .usable = usable};
}

template <Searched Model>
double guess_temperature(const Model& model, Phase, double, double) {
  const TemperatureRange range = reach_of(model).usable;
  return 0.5 * (range.low + range.high);
}

/// Whether a change of phase stops the fluid at an end of its usable range.
template <Searched Model>
bool changes_phase_at_end(const Model& model, Phase phase, double pressure, bool upper) {
  if (upper != (phase == Phase::liquid)) return freezes_at_low_end(model) && !upper;
  const TemperatureRange reach = reach_of(model).usable, usable = limits_of(model, phase, pressure).usable;
  const double end = upper ? usable.high : usable.low;
  return end != (upper ? reach.high : reach.low) && phase_end(model, {end, pressure}).changes_phase;
}

template <Searched Model>
std::string end_of(const Model& model, Phase phase, double pressure, bool upper) {
  const Limits reach = reach_of(model);
  const TemperatureRange usable = limits_of(model, phase, pressure).usable;
  const double end = upper ? usable.high : usable.low;
  if (end != (upper ? reach.usable.high : reach.usable.low) || usable.low >= usable.high)
    return fmt::format("{} at {}", phase_end(model, {end, pressure}).what, said(end));
  if (!upper && freezes_at_low_end(model)) return fmt::format("it freezes at {}", said(end));
  return fmt::format("its data end at {} and are followed no further than {}",
                     said(upper ? reach.valid.high : reach.valid.low), said(end));
}

}  // namespace dutygauge::fluids
