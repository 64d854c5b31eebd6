#include <fmt/core.h>

#include <cmath>

#include "dutygauge/tubeside.hpp"
#include "dutygauge/units/mention.hpp"

namespace dutygauge::tubeside {
namespace {

std::string length(double si) {
  return units::mention(si, units::Kind::length);
}

void check_regime(const geometry::TubeSide& tubes, const Film& film, Findings& findings) {
  if (film.regime == Regime::transition)
    findings.push_back({.id = "tubeside.transition",
                        .severity = Severity::should,
                        .text =
                            "tube-side Re {value} lies between laminar (2300) and turbulent (4000) flow: "
                            "the film is uncertain by 30 % or more. Treat small margins as none; more flow "
                            "per tube would settle it",
                        .value = film.reynolds,
                        .limit = 4000,
                        .source = "gnielinski_2013"});
  if (film.regime != Regime::laminar) return;
  const double entry = thermal_entry_length(film.reynolds, film.prandtl, tubes.inside_diameter);
  if (entry > tubes.heated_length)
    findings.push_back({.id = "tubeside.thermal_entry",
                        .severity = Severity::note,
                        .text =
                            "the laminar tube-side film is still developing: it would need {value} of tube, "
                            "one pass has {limit}. The film is higher than in a long tube, and depends on "
                            "the flow being mixed again in the channels",
                        .value = entry,
                        .limit = tubes.heated_length,
                        .kind = units::Kind::length,
                        .source = "common_practice"});
}

void check_prandtl(const Film& film, Findings& findings) {
  if (film.prandtl < 0.1)
    findings.push_back({.id = "tubeside.liquid_metal",
                        .severity = Severity::must,
                        .text =
                            "tube-side Pr {value} is that of a liquid metal: the film correlation does not "
                            "hold below {limit} and the result must not be used; check the properties",
                        .value = film.prandtl,
                        .limit = 0.1,
                        .source = "gnielinski_1976"});
  else if (film.prandtl < 0.5)
    findings.push_back(
        {.id = "tubeside.prandtl_low",
         .severity = Severity::should,
         .text = "tube-side Pr {value} is below {limit}, where the correlation was fitted, and the "
                 "film reads somewhat high; check conductivity and viscosity",
         .value = film.prandtl,
         .limit = 0.5,
         .source = "gnielinski_1976"});
  else if (film.prandtl > 2000.0 && film.regime != Regime::laminar)
    findings.push_back({.id = "tubeside.prandtl_high",
                        .severity = Severity::should,
                        .text =
                            "tube-side Pr {value} is above {limit}, where the correlation was fitted; check "
                            "the viscosity first",
                        .value = film.prandtl,
                        .limit = 2000,
                        .source = "gnielinski_1976"});
}

void check_wall(const Film& film, const fluids::State& bulk, const fluids::State& wall, Findings& findings) {
  if (bulk.phase == fluids::Phase::gas) {
    const double ratio = bulk.temperature / wall.temperature;
    if (ratio < 0.5)
      findings.push_back({.id = "tubeside.wall_correction",
                          .severity = Severity::should,
                          .text =
                              "the tube-side gas is heated by a very hot wall (T/T_wall {value}, fitted down "
                              "to {limit}), and the film is uncertain; keep a wider margin",
                          .value = ratio,
                          .limit = 0.5,
                          .source = "gnielinski_1976"});
    return;
  }
  const double ratio = bulk.prandtl() / wall.prandtl();
  if (ratio < 0.1 || ratio > 20.0)
    findings.push_back(
        {.id = "tubeside.wall_correction",
         .severity = Severity::should,
         .text = "tube-side Pr at the bulk over Pr at the wall is {value}, beyond {limit}: the wall "
                 "correction is extrapolated; keep a wider margin",
         .value = ratio,
         .limit = ratio < 0.1 ? 0.1 : 20.0,
         .source = "gnielinski_1976"});
  const double thickening = wall.viscosity / bulk.viscosity;
  if (film.regime == Regime::laminar && thickening > 3.0)
    findings.push_back({.id = "tubeside.maldistribution",
                        .severity = Severity::should,
                        .text =
                            "the liquid in the tubes is {value} times thicker at the wall than in the bulk "
                            "(watch above {limit}) and flows laminar: cold tubes can slow down and stay "
                            "cold, and the unit then cools less than rated; ask for a higher velocity or a "
                            "warmer coolant",
                        .value = thickening,
                        .limit = 3.0,
                        .source = "common_practice"});
}

void check_velocity(const Film& film, const fluids::State& bulk, Findings& findings) {
  if (bulk.phase == fluids::Phase::liquid) {
    if (film.velocity > 3.0)
      findings.push_back({.id = "tubeside.velocity_high",
                          .severity = Severity::should,
                          .text = "tube-side velocity {value} is above {limit}: tube ends may erode, copper "
                                  "alloys in sea water already from half of that; ask the material's limit",
                          .ground = Ground::judgement,
                          .value = film.velocity,
                          .limit = 3.0,
                          .kind = units::Kind::velocity,
                          .source = "common_practice"});
    return;
  }
  const double momentum = bulk.density * film.velocity * film.velocity;
  if (momentum > 5000.0)
    findings.push_back({.id = "tubeside.momentum_high",
                        .severity = Severity::should,
                        .text =
                            "tube-side gas has rho v2 {value}, above {limit}: erosion, noise and vibration "
                            "become likely; ask for the maker's limit",
                        .ground = Ground::judgement,
                        .value = momentum,
                        .limit = 5000.0,
                        .kind = units::Kind::momentum_flux,
                        .source = "common_practice"});
}

/// The chart of friction factors ends at 5 % of the bore, and so does what Colebrook's equation was made
/// from.
void check_roughness(const geometry::TubeSide& tubes, Findings& findings) {
  constexpr double most = 0.05;
  if (tubes.roughness <= most * tubes.inside_diameter) return;
  findings.push_back(
      {.id = "tubeside.roughness",
       .severity = Severity::should,
       .text =
           fmt::format("the tube roughness {{value}} is more than {:.0f} % of the bore, {{limit}}, where "
                       "friction data end: the tube-side pressure drop is extrapolated. Check its "
                       "unit, as commercial tubes have {} (drawn) to {} (steel pipe): um typed as mm, or mm "
                       "as in, is the likely slip",
                       100.0 * most, length(1.5e-6), length(46e-6)),
       .value = tubes.roughness,
       .limit = most * tubes.inside_diameter,
       .kind = units::Kind::length,
       .source = "moody_1944"});
}

}  // namespace

Findings check_film(const geometry::TubeSide& tubes, const Film& film, const fluids::State& bulk,
                    const fluids::State& wall) {
  Findings findings;
  check_regime(tubes, film, findings);
  check_prandtl(film, findings);
  check_wall(film, bulk, wall, findings);
  check_velocity(film, bulk, findings);
  check_roughness(tubes, findings);
  if (film.reynolds > 5e6)
    findings.push_back(
        {.id = "tubeside.reynolds_high",
         .severity = Severity::should,
         .text = "tube-side Re {value} is above {limit}, where the correlation was fitted; check flow, "
                 "tube count and bore",
         .value = film.reynolds,
         .limit = 5e6,
         .source = "gnielinski_1976"});
  return findings;
}

}  // namespace dutygauge::tubeside
