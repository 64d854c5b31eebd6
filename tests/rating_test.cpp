#include <doctest/doctest.h>

#include <cmath>
#include <filesystem>
#include <string>

#include "dutygauge/case_io.hpp"
#include "dutygauge/service.hpp"
#include "laws.hpp"
#include "random_cases.hpp"
#include "support.hpp"

using namespace dutygauge;

namespace {

/// Problems of all case files of a folder that this version rates.
std::vector<case_io::Case> cases_of(const std::string& folder) {
  std::vector<case_io::Case> cases;
  for (const auto& entry : std::filesystem::directory_iterator(folder)) {
    if (entry.path().extension() != ".yaml") continue;
    try {
      cases.push_back(case_io::build(case_io::read_file(entry.path().string())));
    } catch (const case_io::InputError&) {
      // Refused with a message: nothing to rate.
    }
  }
  return cases;
}

rating::Problem with_area(rating::Problem problem, double factor) {
  problem.exchanger.area *= factor;
  return problem;
}

}  // namespace

TEST_CASE("rating: the balance laws hold for every case file") {
  int rated = 0;
  for (const std::string folder : {SOURCE_DIR "/cases", TEST_DATA "/rating-cases"})
    for (const auto& a_case : cases_of(folder)) {
      CAPTURE(a_case.file);
      const auto assessment = service::assess(a_case.problem, a_case.service);
      REQUIRE(assessment.rating.outcome.has_value());
      laws::check_outcome(a_case.problem, *assessment.rating.outcome);
      laws::check_second_law(a_case.problem, *assessment.rating.outcome);
      ++rated;
    }
  CHECK(rated >= 9);
}

TEST_CASE("rating: surface divided by one plus its margin gives exactly the required duty") {
  for (const auto& a_case : cases_of(TEST_DATA "/rating-cases")) {
    CAPTURE(a_case.file);
    const auto assessment = service::assess(a_case.problem, a_case.service);
    const auto& margins = assessment.margins;
    if (!margins.surface) continue;
    const auto rerated = rating::rate_mean(with_area(a_case.problem, 1.0 / (1.0 + *margins.surface)));
    REQUIRE(rerated.outcome.has_value());
    CHECK(support::relative(rerated.outcome->duty, *margins.required_duty) <= 1e-7);

    rating::Problem fouled = a_case.problem;
    fouled.shell_side.fouling_resistance += *margins.fouling_spare;
    const auto& tube = a_case.problem.exchanger.tube_side;
    const double all_fouling =
        fouled.shell_side.fouling_resistance +
        tube.outside_diameter / tube.inside_diameter * a_case.problem.tube_side.fouling_resistance;
    if (all_fouling < 0.0) continue;
    CHECK(support::relative(rating::rate_mean(fouled).outcome->duty, *margins.required_duty) <= 1e-7);
  }
}

TEST_CASE("rating: 10 000 random cases are rated or refused with a reason, and keep the laws") {
  random_cases::Generator generator(20260311);
  int rated = 0;
  for (int i = 0; i < 10000; ++i) {
    CAPTURE(i);
    const rating::Problem problem = generator.next();
    const rating::Rating result = rating::rate_mean(problem);
    if (!result.outcome) {
      CHECK(result.no_result.size() > 20);
      continue;
    }
    ++rated;
    laws::check_outcome(problem, *result.outcome);
    laws::check_second_law(problem, *result.outcome);
    for (const Finding& finding : result.findings) {
      CHECK(std::isfinite(finding.value));
      CHECK(std::isfinite(finding.limit));
    }
  }
  CHECK(rated > 7000);
}

TEST_CASE("rating: more fouling never gives more duty short of the maximum of P") {
  random_cases::Generator generator(77);
  for (int i = 0; i < 1500; ++i) {
    CAPTURE(i);
    rating::Problem problem = generator.next();
    const auto before = rating::rate_mean(problem).outcome;
    problem.shell_side.fouling_resistance += 2e-4;
    const auto after = rating::rate_mean(problem).outcome;
    if (!before || !after) continue;
    // Past the maximum of P (four and more passes) less surface can do more.
    const auto arrangement = rating::arrangement_of(problem.exchanger);
    const double largest = arrangement::largest_effectiveness(arrangement, before->r_tube);
    if (arrangement.tube_passes >= 4 && before->p_tube > 0.9 * largest) continue;
    CHECK(after->duty <= before->duty * (1.0 + 1e-9));
  }
}

TEST_CASE("rating: more surface and more flow on either side never give less duty") {
  random_cases::Generator generator(78);
  for (int i = 0; i < 800; ++i) {
    CAPTURE(i);
    const rating::Problem problem = generator.next();
    const auto before = rating::rate_mean(problem).outcome;
    const auto arrangement = rating::arrangement_of(problem.exchanger);
    if (!before || arrangement.tube_passes >= 4) continue;
    const auto larger = rating::rate_mean(with_area(problem, 1.1)).outcome;
    if (larger) CHECK(larger->duty >= before->duty * (1.0 - 1e-9));
  }
}

TEST_CASE("service: a duty that no surface reaches is explained, with what would change it") {
  auto problem = random_cases::Generator(5).next();
  problem.exchanger = geometry::derive([] {
                        geometry::Description d;
                        d.shell_inside_diameter = 0.591;
                        d.tube_count = 300;
                        d.tube_passes = 2;
                        d.tube_outside_diameter = 0.01905;
                        d.tube_wall = 0.0021;
                        d.tube_length = 4.88;
                        d.tube_pitch = 0.0254;
                        d.tube_conductivity = 50;
                        d.baffle_spacing = 0.25;
                        return d;
                      }())
                          .value;
  problem.shell_side.fluid = problem.tube_side.fluid =
      fluids::make_constant({.density = 900, .heat_capacity = 2000, .conductivity = 0.13, .viscosity = 1e-3},
                            fluids::Phase::liquid)
          .fluid;
  problem.shell_side.mass_flow = problem.tube_side.mass_flow = 10.0;
  problem.shell_side.inlet_temperature = 400.0;
  problem.tube_side.inlet_temperature = 300.0;
  // P = 0.7 at R = 1: one 1-2 shell reaches 0.586; two in series 0.739 (Bowman 1940).
  const auto crossed = rating::needed_for(problem, 0.7 * 10.0 * 2000.0 * 100.0);
  CHECK(!crossed.value.has_value());
  REQUIRE(crossed.findings.size() == 1);
  CHECK(crossed.findings[0].id == "arrangement.infeasible");
  CHECK(crossed.findings[0].text.find("2 such shells in series") != std::string::npos);
  CHECK(crossed.findings[0].limit == doctest::Approx(0.5858).epsilon(1e-4));
  // More than the streams hold.
  const auto beyond = rating::needed_for(problem, 1.01 * 10.0 * 2000.0 * 100.0);
  CHECK(!beyond.value.has_value());
  REQUIRE(beyond.findings.size() == 1);
  CHECK(beyond.findings[0].id == "service.beyond_streams");
}
