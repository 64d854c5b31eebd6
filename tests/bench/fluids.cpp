#include <fmt/core.h>

#include <chrono>
#include <cmath>

#include "dutygauge/fluids.hpp"

// The cost of fluid properties in units of one std::pow call, measured in the same run:
// a measure that hardly depends on the machine.

namespace {

using namespace dutygauge;

/// Mean time of one call [s]; each call waits for the one before.
template <class Step>
double time_of(Step&& step, int calls) {
  double x = 1.5;
  const auto start = std::chrono::steady_clock::now();
  for (int i = 0; i < calls; ++i) x = step(x);
  const std::chrono::duration<double> elapsed = std::chrono::steady_clock::now() - start;
  if (!std::isfinite(x)) fmt::print("not finite\n");
  return elapsed.count() / calls;
}

void report(const char* what, double seconds, double pow_seconds) {
  fmt::print("{:<44} {:>8.1f} ns {:>6.1f} pow\n", what, seconds * 1e9, seconds / pow_seconds);
}

void report_fluid(const char* name, const fluids::Fluid& fluid, double temperature, double pow_seconds) {
  constexpr double pressure = 5e5;
  constexpr int calls = 1'000'000;
  const double h = fluids::enthalpy(fluid, temperature, pressure);
  const auto small = [](double value) { return 1.5 + 1e-9 * value; };
  report(fmt::format("{}: state", name).c_str(),
         time_of([&](double x) { return small(fluids::state(fluid, temperature + x, pressure).viscosity); },
                 calls),
         pow_seconds);
  report(fmt::format("{}: enthalpy", name).c_str(),
         time_of([&](double x) { return small(fluids::enthalpy(fluid, temperature + x, pressure)); }, calls),
         pow_seconds);
  report(
      fmt::format("{}: temperature at an enthalpy", name).c_str(),
      time_of([&](double x) { return small(fluids::temperature_at(fluid, h + 1e3 * x, pressure)); }, calls),
      pow_seconds);
}

}  // namespace

int main() {
  const double pow_seconds = time_of([](double x) { return 1.0 + 0.1 * std::pow(x, 0.613); }, 1'000'000);
  report("std::pow", pow_seconds, pow_seconds);
  report_fluid("water", fluids::make_water(320.0, 5e5).fluid, 320.0, pow_seconds);
  report_fluid("steam", fluids::make_water(460.0, 5e5).fluid, 460.0, pow_seconds);
  report_fluid("two points",
               fluids::make_two_point({300.0, 870.0, 1950.0, 0.13, 0.02},
                                      {350.0, 840.0, 2150.0, 0.125, 0.005}, fluids::Phase::liquid)
                   .fluid,
               320.0, pow_seconds);
}
