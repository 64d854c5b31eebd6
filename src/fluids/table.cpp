#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "equations.hpp"

// Monotone cubic interpolation of user rows, and its exact integral for the enthalpy.
// Slopes: Fritsch & Butland, SIAM J. Sci. Stat. Comput. 5, 300-304 (1984), one-sided at the ends.

namespace dutygauge::fluids {
namespace {

/// Where a temperature lies among the rows: an interval, or beyond an end.
struct Position {
  std::size_t row;  ///< lower row of the interval, or the end row itself
  bool beyond;      ///< outside the rows: the end slope holds
};

Position locate(const std::vector<double>& temperature, double t) {
  if (t <= temperature.front()) return {0, true};
  if (t >= temperature.back()) return {temperature.size() - 1, true};
  const auto above = std::upper_bound(temperature.begin(), temperature.end(), t);
  return {static_cast<std::size_t>(above - temperature.begin()) - 1, false};
}

/// One interval of a cubic by its end values and slopes; s runs from 0 to 1.
struct Cubic {
  double width, value, next, slope, next_slope;

  double at(double s) const {
    const double c = 1.0 - s;
    return (1.0 + 2.0 * s) * c * c * value + s * s * (3.0 - 2.0 * s) * next +
           width * s * c * (c * slope - s * next_slope);
  }
  /// Integral from the lower end to s.
  double integral(double s) const {
    const double s2 = s * s, s3 = s2 * s, s4 = s2 * s2;
    return width *
           (value * (s - s3 + 0.5 * s4) + next * (s3 - 0.5 * s4) +
            width * (slope * (0.5 * s2 - 2.0 / 3.0 * s3 + 0.25 * s4) - next_slope * (s3 / 3.0 - 0.25 * s4)));
  }
};

double interpolate(const std::vector<double>& value, const std::vector<double>& slope, Position at,
                   double offset, double width) {
  const std::size_t i = at.row;
  if (at.beyond) return value[i] + slope[i] * offset;
  return Cubic{width, value[i], value[i + 1], slope[i], slope[i + 1]}.at(offset / width);
}

Caloric caloric_at(const TableModel& model, Position at, double offset, double width) {
  const std::size_t i = at.row;
  const auto &cp = model.heat_capacity, &slope = model.heat_capacity_slope;
  if (at.beyond)
    return {model.enthalpy[i] + offset * (cp[i] + 0.5 * slope[i] * offset), cp[i] + slope[i] * offset};
  const Cubic cubic{width, cp[i], cp[i + 1], slope[i], slope[i + 1]};
  return {model.enthalpy[i] + cubic.integral(offset / width), cubic.at(offset / width)};
}

/// Slope at an end by the parabola through three rows, limited so that nothing overshoots.
double end_slope(double width, double next_width, double secant, double next_secant) {
  const double slope = ((2.0 * width + next_width) * secant - width * next_secant) / (width + next_width);
  if (slope * secant <= 0.0) return 0.0;
  if (secant * next_secant <= 0.0 && std::abs(slope) > 3.0 * std::abs(secant)) return 3.0 * secant;
  return slope;
}

}  // namespace

std::vector<double> monotone_slopes(const std::vector<double>& x, const std::vector<double>& y) {
  const std::size_t n = x.size();
  std::vector<double> width(n - 1), secant(n - 1), slope(n);
  for (std::size_t i = 0; i + 1 < n; ++i) {
    width[i] = x[i + 1] - x[i];
    secant[i] = (y[i + 1] - y[i]) / width[i];
  }
  if (n == 2) return {secant[0], secant[0]};
  slope[0] = end_slope(width[0], width[1], secant[0], secant[1]);
  slope[n - 1] = end_slope(width[n - 2], width[n - 3], secant[n - 2], secant[n - 3]);
  for (std::size_t i = 1; i + 1 < n; ++i) {
    if (secant[i - 1] * secant[i] <= 0.0) continue;
    const double before = 2.0 * width[i] + width[i - 1], after = width[i] + 2.0 * width[i - 1];
    slope[i] = (before + after) / (before / secant[i - 1] + after / secant[i]);
  }
  return slope;
}

void fill_enthalpies(TableModel& model) {
  const auto &t = model.temperature, &cp = model.heat_capacity, &slope = model.heat_capacity_slope;
  model.enthalpy.assign(t.size(), 0.0);
  for (std::size_t i = 0; i + 1 < t.size(); ++i)
    model.enthalpy[i + 1] =
        model.enthalpy[i] + Cubic{t[i + 1] - t[i], cp[i], cp[i + 1], slope[i], slope[i + 1]}.integral(1.0);
  const double zero = caloric_of(model, Phase::liquid, 273.15, 0.0).enthalpy;
  for (double& h : model.enthalpy) h -= zero;
}

State state_of(const TableModel& model, Phase phase, double temperature, double) {
  const Position at = locate(model.temperature, temperature);
  const double row = model.temperature[at.row];
  const double next = at.beyond ? row : model.temperature[at.row + 1];
  const double offset = temperature - row, width = next - row;
  const Caloric caloric = caloric_at(model, at, offset, width);
  return {.temperature = temperature,
          .density = interpolate(model.density, model.density_slope, at, offset, width),
          .heat_capacity = caloric.heat_capacity,
          .conductivity = interpolate(model.conductivity, model.conductivity_slope, at, offset, width),
          .viscosity = std::exp(interpolate(model.log_viscosity, model.log_viscosity_slope, at,
                                            1.0 / temperature - 1.0 / row, 1.0 / next - 1.0 / row)),
          .enthalpy = caloric.enthalpy,
          .phase = phase};
}

Caloric caloric_of(const TableModel& model, Phase, double temperature, double) {
  const Position at = locate(model.temperature, temperature);
  const double row = model.temperature[at.row];
  const double width = at.beyond ? 0.0 : model.temperature[at.row + 1] - row;
  return caloric_at(model, at, temperature - row, width);
}

Limits limits_of(const TableModel& model, Phase, double) {
  return {.valid = {model.temperature.front(), model.temperature.back()}, .usable = model.usable};
}

double guess_temperature(const TableModel& model, Phase, double enthalpy, double) {
  const Position at = locate(model.enthalpy, enthalpy);
  const std::size_t i = at.row;
  const double beyond = enthalpy - model.enthalpy[i];
  if (at.beyond) return model.temperature[i] + beyond / model.heat_capacity[i];
  return model.temperature[i] + beyond * (model.temperature[i + 1] - model.temperature[i]) /
                                    (model.enthalpy[i + 1] - model.enthalpy[i]);
}

std::string end_of(const TableModel& model, Phase, double, bool upper) {
  return fmt::format("{} at {} and can be continued no further than {}",
                     model.temperature.size() == 2 ? "the two given points end" : "the table ends",
                     said(upper ? model.temperature.back() : model.temperature.front()),
                     said(upper ? model.usable.high : model.usable.low));
}

bool changes_phase_at_end(const TableModel&, Phase, double, bool) {
  return false;
}

std::vector<PropertyNote> notes_of(const TableModel& model, Phase) {
  const TemperatureRange rows{model.temperature.front(), model.temperature.back()};
  std::vector<PropertyNote> notes;
  for (const char* property : {"density", "heat_capacity", "conductivity", "viscosity"})
    notes.push_back({property, "", rows, 0.0});
  return notes;
}

}  // namespace dutygauge::fluids
