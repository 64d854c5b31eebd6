#include "dutygauge/tubeside.hpp"

#include <fmt/core.h>

#include <cmath>
#include <string>

#include "published/published.hpp"
#include "support.hpp"

// Not compared, since the correlation is not offered: heat-transfer values printed by Sieder-Tate,
// Dittus-Boelter, Petukhov, Haaland or Dipprey-Sabersky as such. Where a source prints a film by one of
// these, ours stands beside it with the distance between the two correlations as the tolerance.

namespace published {
namespace {

using namespace dutygauge;

/// The mean Nu of the exact solution. At Pr 1e12 the term for a developing velocity profile, which the
/// exact solution does not have, has vanished. Beyond Gz 1 to 5e4 no accuracy is stated.
Rows graetz() {
  Rows rows;
  for (const auto& line : support::read_csv(TEST_DATA "/graetz.csv")) {
    const double gz = std::stod(line.at("Gz [-]"));
    if (gz < 1.0 || gz > 5e4) continue;
    constexpr double prandtl = 1e12, diameter_over_length = 0.01;
    rows.push_back(
        {.source = "Graetz problem, exact solution by eigenvalues",
         .known = Known::computed,
         .what = "mean Nu at constant wall temperature, Gz " + line.at("Gz [-]"),
         .unit = "-",
         .published = std::stod(line.at("Nu_T_mean [-]")),
         .ours = tubeside::nusselt(gz / (prandtl * diameter_over_length), prandtl, diameter_over_length),
         .tolerance = 0.01,
         .reason = "a blend of limits against the exact solution, stated -0.9 to +1.0 %"});
  }
  return rows;
}

Rows gnielinski() {
  struct Point {
    double reynolds, prandtl, diameter_over_length, nusselt;
  };
  const Point points[] = {
      {100, 1000, 0.003, 10.42406}, {500, 200, 0.004, 11.75576},    {1500, 50, 0.004, 10.92682},
      {2300, 5, 0.004, 6.06285},    {2800, 5, 0.004, 12.60710},     {3150, 0.7, 0.01, 9.23154},
      {4000, 20, 0.002, 45.53077},  {6000, 100, 0.005, 124.40849},  {10000, 5, 0.004, 70.55603},
      {30000, 3, 0.004, 148.99847}, {100000, 0.7, 0.01, 184.52714}, {1000000, 2, 0.002, 2285.32935},
  };
  Rows rows;
  for (const Point& p : points)
    rows.push_back({.source = "Gnielinski, Int. J. Heat Mass Transfer 63 (2013) 134, evaluated independently",
                    .known = Known::computed,
                    .what = fmt::format("Nu at Re {:g}, Pr {:g}, D/L {:g}", p.reynolds, p.prandtl,
                                        p.diameter_over_length),
                    .unit = "-",
                    .published = p.nusselt,
                    .ours = tubeside::nusselt(p.reynolds, p.prandtl, p.diameter_over_length),
                    .tolerance = 5.1e-6,  // five decimals
                    .relative = false,
                    .reason = {}});
  return rows;
}

/// Friction by Churchill's own equation (six decimals), and beside Colebrook's, which it
/// follows within 2.5 % from Re 5000 and up to eps/D 0.005.
Rows friction() {
  struct Point {
    double reynolds, relative_roughness, churchill, colebrook;
  };
  const Point points[] = {
      {500, 0, 0.128000, 0},           {2100, 0, 0.030706, 0},          {2300, 1e-3, 0.030848, 0},
      {4000, 1e-3, 0.041728, 0},       {1e4, 0, 0.031002, 0.030883},    {1e4, 1e-3, 0.032690, 0.032382},
      {5e4, 2e-3, 0.026772, 0.026506}, {1e5, 1e-4, 0.018463, 0.018514}, {1e6, 0, 0.011612, 0.011645},
  };
  Rows rows;
  for (const Point& p : points) {
    const double ours = tubeside::darcy_friction(p.reynolds, p.relative_roughness);
    const std::string what =
        fmt::format("Darcy friction at Re {:g}, eps/D {:g}", p.reynolds, p.relative_roughness);
    rows.push_back({.source = "Churchill, Chem. Eng. 84 (24), 91 (1977), evaluated independently",
                    .known = Known::computed,
                    .what = what,
                    .unit = "-",
                    .published = p.churchill,
                    .ours = ours,
                    .tolerance = 5.1e-7,
                    .relative = false,
                    .reason = {}});
    if (p.colebrook > 0.0)
      rows.push_back({.source = "Colebrook, J. Inst. Civ. Eng. 11, 133 (1939), evaluated independently",
                      .known = Known::computed,
                      .what = what,
                      .unit = "-",
                      .published = p.colebrook,
                      .ours = ours,
                      .tolerance = 0.025,
                      .reason = "Churchill's equation covers all regimes at this cost"});
  }
  rows.push_back({.source = "Hagen-Poiseuille, 64/Re",
                  .known = Known::computed,
                  .what = "Darcy friction at Re 500",
                  .unit = "-",
                  .published = 0.128,
                  .ours = tubeside::darcy_friction(500, 0),
                  .tolerance = 1e-6,
                  .reason = {}});
  return rows;
}

/// Largest Re taken as laminar, by bisection.
double laminar_limit() {
  geometry::TubeSide tubes;
  tubes.inside_diameter = 0.02, tubes.flow_area = 0.02, tubes.heated_length = 5.0;
  const fluids::State water{
      .temperature = 300, .density = 1000, .heat_capacity = 4200, .conductivity = 0.6, .viscosity = 1e-3};
  double low = 100.0, high = 1e5;
  while (high - low > 1e-6) {
    const double middle = 0.5 * (low + high);
    const bool laminar =
        tubeside::film(tubes, middle * 1e-3, water, water).regime == tubeside::Regime::laminar;
    (laminar ? low : high) = middle;
  }
  return low;
}

Rows practice() {
  const std::string source = "common practice, no source";
  return {
      {source,
       Known::practice,
       "hydrodynamic entry length 0.05 Re D, Re 1500, D 21 mm",
       "m",
       1.575,
       tubeside::hydrodynamic_entry_length(1500, 0.021),
       1e-12,
       true,
       {}},
      {source,
       Known::practice,
       "thermal entry length 0.05 Re Pr D, Re 1500, Pr 40, D 21 mm",
       "m",
       63.0,
       tubeside::thermal_entry_length(1500, 40, 0.021),
       1e-12,
       true,
       {}},
      {source, Known::practice, "laminar flow in tubes up to Re", "-", 2300, laminar_limit(), 1e-8, true, {}},
  };
}

/// Heads lost in channels and turns.
Rows turns() {
  struct Point {
    double reynolds;
    int passes;
    bool u_tubes;
    double heads;
  };
  const Point points[] = {
      {1e5, 1, false, 1.5},  {1e5, 2, false, 2.5}, {1e5, 4, false, 6.5},
      {1e5, 2, true, 1.7},   {1e5, 4, true, 4.9},  {1e3, 2, false, 5.0},
      {1e3, 4, false, 11.5}, {1e3, 2, true, 3.26}, {1e3, 4, true, 8.02},
  };
  const fluids::State water{
      .temperature = 300, .density = 1000, .heat_capacity = 4200, .conductivity = 0.6, .viscosity = 1e-3};
  Rows rows;
  for (const Point& p : points) {
    geometry::TubeSide tubes;
    tubes.inside_diameter = 0.02, tubes.flow_area = 0.02, tubes.friction_length = 5.0;
    tubes.passes = p.passes, tubes.u_tubes = p.u_tubes;
    const double mass_flow = p.reynolds * 1e-3, head = std::pow(mass_flow / 0.02, 2) / 2000.0;
    rows.push_back({.source = "Serth, Process Heat Transfer (2007), velocity heads in turns",
                    .known = Known::memory,
                    .what = fmt::format("{}, {}, passes: {}", p.reynolds > 2300 ? "turbulent" : "laminar",
                                        p.u_tubes ? "U-tubes" : "straight tubes", p.passes),
                    .unit = "heads",
                    .published = p.heads,
                    .ours = tubeside::pressure_drop(tubes, mass_flow, water, water).turns / head,
                    .tolerance = 1e-9,
                    .reason = {}});
  }
  return rows;
}

Rows rows_of_this_file() {
  Rows all;
  for (const auto& rows : {graetz(), gnielinski(), friction(), practice(), turns()})
    all.insert(all.end(), rows.begin(), rows.end());
  return all;
}

const Registration registration{&rows_of_this_file};

}  // namespace
}  // namespace published
