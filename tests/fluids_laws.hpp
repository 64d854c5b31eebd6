#pragma once
#include <doctest/doctest.h>

#include <array>
#include <cmath>
#include <string>

#include "dutygauge/fluids.hpp"
#include "dutygauge/units/mention.hpp"
#include "support.hpp"

/// What every fluid keeps, whatever its model; and what its making answers.
namespace fluids_laws {

using namespace dutygauge;

inline std::array<double, 4> properties(const fluids::State& s) {
  return {s.density, s.heat_capacity, s.conductivity, s.viscosity};
}

/// No property jumps: between neighbours of 2000 states each leaves the straight line
/// (of its logarithm) through the two before by less than 0.5 %.
inline void check_smooth(const fluids::Fluid& fluid, double pressure) {
  const auto range = fluids::usable_temperatures(fluid, pressure);
  std::array<double, 4> before{}, last{};
  for (int i = 0; i < 2000; ++i) {
    const double t = range.low + (range.high - range.low) * i / 1999.0;
    CAPTURE(t);
    auto now = properties(fluids::state(fluid, t, pressure));
    for (double& value : now) value = std::log(value);
    for (std::size_t k = 0; k < 4 && i > 1; ++k) {
      const double jump = now[k] - 2.0 * last[k] + before[k];
      CAPTURE(k);
      if (!(std::abs(jump) < 0.005)) CHECK(std::abs(jump) < 0.005);
    }
    before = last;
    last = now;
  }
}

/// `slope_tolerance`: of the heat capacity against the slope of the enthalpy.
inline void check_laws(const fluids::Fluid& fluid, double pressure, double slope_tolerance = 2e-6) {
  const auto range = fluids::usable_temperatures(fluid, pressure);
  CAPTURE(fluid.name);
  CAPTURE(pressure);
  REQUIRE(range.low < range.high);
  const auto valid = fluids::valid_temperatures(fluid, pressure);
  CHECK(valid.low >= range.low);
  CHECK(valid.high <= range.high);
  double last = -INFINITY;
  for (int i = 0; i <= 200; ++i) {
    const double t = range.low + (range.high - range.low) * i / 200.0;
    CAPTURE(t);
    const fluids::State s = fluids::state(fluid, t, pressure);
    for (double value : properties(s)) CHECK((std::isfinite(value) && value > 0.0));
    CHECK(s.temperature == t);
    CHECK(s.phase == fluid.phase);
    CHECK(s.enthalpy > last);
    CHECK(fluids::enthalpy(fluid, t, pressure) == s.enthalpy);
    last = s.enthalpy;
    CHECK(support::relative(fluids::temperature_at(fluid, s.enthalpy, pressure), t) < 1e-10);
    const double step = 1e-3;
    if (t - step < range.low || t + step > range.high) continue;
    const double slope =
        (fluids::enthalpy(fluid, t + step, pressure) - fluids::enthalpy(fluid, t - step, pressure)) /
        (2.0 * step);
    CHECK(support::relative(slope, s.heat_capacity) < slope_tolerance);
  }
  const double first = fluids::enthalpy(fluid, range.low, pressure);
  for (double above : {last + 1e5, 1e12}) CHECK(fluids::temperature_at(fluid, above, pressure) == range.high);
  for (double below : {first - 1e5, -1e12})
    CHECK(fluids::temperature_at(fluid, below, pressure) == range.low);
  check_smooth(fluid, pressure);
}

inline bool objects(const fluids::Made& made, const std::string& key) {
  for (const auto& objection : made.objections)
    if (objection.key == key) return true;
  return false;
}

inline bool found(const Findings& findings, const std::string& id) {
  for (const auto& finding : findings)
    if (finding.id == id) return true;
  return false;
}

/// A message with its mentions in metric units.
inline std::string metric(const std::string& text) {
  return dutygauge::units::spoken(text, dutygauge::units::System::metric);
}

}  // namespace fluids_laws
