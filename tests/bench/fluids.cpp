#include <fmt/core.h>

#include "bench/timing.hpp"
#include "dutygauge/fluids.hpp"

namespace {

using namespace dutygauge;
using bench::time_of;

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
  const double pow_seconds = bench::time_of_pow();
  report("std::pow", pow_seconds, pow_seconds);
  report_fluid("water", fluids::make_water(320.0, 5e5).fluid, 320.0, pow_seconds);
  report_fluid("steam", fluids::make_water(460.0, 5e5).fluid, 460.0, pow_seconds);
  report_fluid("two points",
               fluids::make_two_point({300.0, 870.0, 1950.0, 0.13, 0.02},
                                      {350.0, 840.0, 2150.0, 0.125, 0.005}, fluids::Phase::liquid)
                   .fluid,
               320.0, pow_seconds);
  report_fluid("seawater", fluids::make_seawater(0.035).fluid, 300.0, pow_seconds);
  report_fluid("air", fluids::make_air().fluid, 350.0, pow_seconds);
  report_fluid("flue gas",
               fluids::make_gas_mixture({{"N2", 0.72}, {"CO2", 0.10}, {"H2O", 0.15}, {"O2", 0.03}}).fluid,
               450.0, pow_seconds);
  report_fluid("toluene", fluids::make_liquid("toluene").fluid, 320.0, pow_seconds);
  report_fluid("glycol", fluids::make_solution("ethylene_glycol_water", 0.4).fluid, 300.0, pow_seconds);
  report_fluid("petroleum", fluids::make_petroleum({.api = 35.0, .watson_k = 11.8}).fluid, 350.0,
               pow_seconds);
}
