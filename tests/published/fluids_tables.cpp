#include "dutygauge/fluids.hpp"
#include "published/published.hpp"

// Interpolation of user rows beside the same rows interpolated by scipy.

namespace {

using namespace dutygauge;

published::Rows rows() {
  const auto made = fluids::make_table({{300.0, 900.0, 1900.0, 0.13, 0.05},
                                        {350.0, 870.0, 2100.0, 0.125, 0.01},
                                        {400.0, 840.0, 2300.0, 0.12, 0.003}},
                                       fluids::Phase::liquid);
  const auto at = fluids::state(made.fluid, 325.0, 1e5);
  const double rise = at.enthalpy - fluids::enthalpy(made.fluid, 300.0, 1e5);
  const std::string source = "scipy PchipInterpolator through the same three rows";
  const auto row = [&](const char* what, const char* unit, double expected, double ours, double tolerance) {
    return published::Row{.source = source,
                          .known = published::Known::computed,
                          .what = std::string("table at 325 K: ") + what,
                          .unit = unit,
                          .published = expected,
                          .ours = ours,
                          .tolerance = tolerance,
                          .relative = true,
                          .reason = ""};
  };
  return {row("density", "kg/m3", 885.0, at.density, 1e-12),
          row("heat capacity", "J/kg.K", 2000.0, at.heat_capacity, 1e-12),
          row("conductivity", "W/m.K", 0.1275, at.conductivity, 1e-12),
          row("viscosity", "Pa.s", 0.0210067, at.viscosity, 3e-6),  // printed to six digits
          row("enthalpy above 300 K", "J/kg", 48750.0, rise, 1e-12)};
}

const published::Registration registration{&rows};

}  // namespace
