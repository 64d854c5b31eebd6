#include <doctest/doctest.h>

#include <algorithm>
#include <string>

#include "dutygauge/sources.hpp"
#include "dutygauge/tubeside.hpp"

using namespace dutygauge;
using namespace dutygauge::tubeside;

namespace {

geometry::TubeSide some_tubes() {
  geometry::TubeSide tubes;
  tubes.inside_diameter = 0.02;
  tubes.heated_length = 5.0;
  return tubes;
}

fluids::State some_liquid() {
  return {.temperature = 300.0,
          .density = 1000.0,
          .heat_capacity = 2000.0,
          .conductivity = 0.5,
          .viscosity = 1e-3,
          .phase = fluids::Phase::liquid};
}

fluids::State some_gas(double temperature = 400.0) {
  return {.temperature = temperature,
          .density = 2.0,
          .heat_capacity = 1000.0,
          .conductivity = 0.03,
          .viscosity = 2.1e-5,
          .phase = fluids::Phase::gas};
}

/// A turbulent film nothing need be said of.
Film plain_film() {
  return {.coefficient = 1000.0,
          .nusselt = 100.0,
          .reynolds = 20000.0,
          .prandtl = 4.0,
          .velocity = 1.0,
          .mass_flux = 1000.0,
          .regime = Regime::turbulent};
}

Film laminar_film(double prandtl = 4.0) {
  Film film = plain_film();
  film.reynolds = 1000.0, film.prandtl = prandtl, film.regime = Regime::laminar;
  return film;
}

const Finding* find(const Findings& findings, const std::string& id) {
  const auto found = std::ranges::find(findings, id, &Finding::id);
  return found == findings.end() ? nullptr : &*found;
}

Findings of(const Film& film) {
  return check_film(some_tubes(), film, some_liquid(), some_liquid());
}

bool says(const Findings& findings, const std::string& id) {
  return find(findings, id) != nullptr;
}

}  // namespace

TEST_CASE("tubeside: nothing is said of a plain turbulent film of a liquid or a gas") {
  CHECK(of(plain_film()).empty());
  CHECK(check_film(some_tubes(), plain_film(), some_gas(), some_gas()).empty());
}

TEST_CASE("tubeside: the transition is said between Re 2300 and 4000 only") {
  geometry::TubeSide tubes = some_tubes();
  tubes.flow_area = 0.01;
  const auto at = [&](double reynolds) {
    const auto bulk = some_liquid();
    const double flow = reynolds * bulk.viscosity / tubes.inside_diameter * tubes.flow_area;
    return says(check_film(tubes, film(tubes, flow, bulk, bulk), bulk, bulk), "tubeside.transition");
  };
  CHECK(!at(2299.999));
  CHECK(at(2300.001));
  CHECK(at(3999.999));
  CHECK(!at(4000.001));
}

TEST_CASE(
    "tubeside: a laminar film still developing is said where one pass is shorter than its entry length") {
  // 0.05 x 1000 x Pr x 0.02 m = Pr m, against 5 m.
  CHECK(!says(of(laminar_film(4.999)), "tubeside.thermal_entry"));
  const auto findings = of(laminar_film(5.001));
  const Finding* finding = find(findings, "tubeside.thermal_entry");
  REQUIRE(finding);
  CHECK(finding->severity == Severity::note);
  CHECK(finding->value == doctest::Approx(5.001));
  CHECK(finding->limit == 5.0);
  Film turbulent = plain_film();
  turbulent.prandtl = 500.0;
  CHECK(!says(of(turbulent), "tubeside.thermal_entry"));
}

TEST_CASE(
    "tubeside: Pr is said below 0.5 and, unless laminar, above 2000; below 0.1 the result must not be used") {
  const auto at = [](double prandtl) {
    Film film = plain_film();
    film.prandtl = prandtl;
    return of(film);
  };
  CHECK(find(at(0.0999), "tubeside.liquid_metal")->severity == Severity::must);
  CHECK(!says(at(0.0999), "tubeside.prandtl_low"));
  CHECK(!says(at(0.1), "tubeside.liquid_metal"));
  CHECK(says(at(0.1), "tubeside.prandtl_low"));
  CHECK(says(at(0.4999), "tubeside.prandtl_low"));
  CHECK(at(0.5).empty());
  CHECK(at(2000.0).empty());
  CHECK(says(at(2000.1), "tubeside.prandtl_high"));
  CHECK(!says(of(laminar_film(2000.1)), "tubeside.prandtl_high"));
}

TEST_CASE("tubeside: Re is said above 5e6") {
  Film film = plain_film();
  film.reynolds = 5e6;
  CHECK(of(film).empty());
  film.reynolds = 5.001e6;
  CHECK(says(of(film), "tubeside.reynolds_high"));
}

TEST_CASE("tubeside: a liquid's wall correction is said outside Pr/Pr_wall 0.1 to 20") {
  const auto at = [](double ratio) {
    auto wall = some_liquid();
    wall.viscosity /= ratio;
    return says(check_film(some_tubes(), plain_film(), some_liquid(), wall), "tubeside.wall_correction");
  };
  CHECK(at(0.0999));
  CHECK(!at(0.1001));
  CHECK(!at(19.99));
  CHECK(at(20.01));
}

TEST_CASE("tubeside: a gas's wall correction is said where the wall is more than twice as hot") {
  const auto at = [](double wall) {
    return says(check_film(some_tubes(), plain_film(), some_gas(400.0), some_gas(wall)),
                "tubeside.wall_correction");
  };
  CHECK(!at(200.0));
  CHECK(!at(799.9));
  CHECK(at(800.1));
}

TEST_CASE(
    "tubeside: uneven flow through the tubes is said of a laminar liquid over three times thicker at the "
    "wall") {
  const auto at = [](const Film& film, double thickening) {
    auto wall = some_liquid();
    wall.viscosity *= thickening;
    return says(check_film(some_tubes(), film, some_liquid(), wall), "tubeside.maldistribution");
  };
  CHECK(!at(laminar_film(), 2.999));
  CHECK(at(laminar_film(), 3.001));
  CHECK(!at(plain_film(), 3.001));
}

TEST_CASE("tubeside: velocity is said above 3 m/s of a liquid, rho v2 above 5000 of a gas") {
  Film film = plain_film();
  film.velocity = 3.0;
  CHECK(of(film).empty());
  film.velocity = 3.001;
  CHECK(says(of(film), "tubeside.velocity_high"));
  film.velocity = 49.99;
  CHECK(check_film(some_tubes(), film, some_gas(), some_gas()).empty());
  film.velocity = 50.01;
  CHECK(says(check_film(some_tubes(), film, some_gas(), some_gas()), "tubeside.momentum_high"));
}

TEST_CASE("tubeside: every finding shows its value, has a limit and names a known source") {
  Film film = laminar_film(0.05);
  film.velocity = 100.0;
  auto thick = some_liquid();
  thick.viscosity *= 100.0;
  Findings all = check_film(some_tubes(), film, some_liquid(), thick);
  film = plain_film();
  film.reynolds = 1e7, film.prandtl = 3000.0, film.velocity = 100.0;
  Findings more = check_film(some_tubes(), film, some_gas(), some_gas(1000.0));
  all.insert(all.end(), more.begin(), more.end());
  film = plain_film();
  film.reynolds = 3000.0, film.prandtl = 0.3, film.regime = Regime::transition;
  more = of(film);
  all.insert(all.end(), more.begin(), more.end());
  more = of(laminar_film(100.0));
  all.insert(all.end(), more.begin(), more.end());
  CHECK(all.size() == 11);
  for (const Finding& finding : all) {
    CAPTURE(finding.id);
    CHECK(finding.id.starts_with("tubeside."));
    CHECK(finding.text.find("{value}") != std::string::npos);
    CHECK(finding.limit > 0.0);
    CHECK(!sources::citation(finding.source).empty());
  }
}

TEST_CASE("tubeside: roughness is remarked on from 5 % of the bore, with the unit as the likely slip") {
  geometry::TubeSide tubes = some_tubes();
  const auto checked = [&] { return check_film(tubes, plain_film(), some_liquid(), some_liquid()); };
  tubes.roughness = 0.05 * tubes.inside_diameter;
  CHECK(find(checked(), "tubeside.roughness") == nullptr);
  tubes.roughness = 0.0501 * tubes.inside_diameter;
  const Findings findings = checked();
  const Finding* rough = find(findings, "tubeside.roughness");
  REQUIRE(rough != nullptr);
  CHECK(rough->severity == Severity::should);
  CHECK(rough->limit == doctest::Approx(0.001));
  CHECK(rough->text.find("um typed as mm") != std::string::npos);
  CHECK(!sources::citation(rough->source).empty());
}
