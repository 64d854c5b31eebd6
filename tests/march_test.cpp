#include <doctest/doctest.h>
#include <fmt/core.h>

#include <cmath>
#include <string>
#include <vector>

#include "dutygauge/rating.hpp"
#include "laws.hpp"
#include "random_cases.hpp"
#include "support.hpp"

using namespace dutygauge;

namespace {

struct Shape {
  char shell;
  int passes;
  int in_series = 1;
  geometry::FirstTubePass first = geometry::FirstTubePass::against_shell_flow;
  geometry::FlowDirection flow = geometry::FlowDirection::counter;
};

constexpr auto with_flow = geometry::FirstTubePass::with_shell_flow;
constexpr auto against = geometry::FirstTubePass::against_shell_flow;
constexpr auto parallel = geometry::FlowDirection::parallel;

const Shape shapes[] = {{'E', 1},
                        {'E', 1, 1, against, parallel},
                        {'E', 2},
                        {'E', 2, 3},
                        {'E', 3},
                        {'E', 3, 1, with_flow},
                        {'E', 4, 2},
                        {'E', 6},
                        {'E', 16},
                        {'F', 2},
                        {'F', 4},
                        {'F', 4, 2},
                        {'F', 6},
                        {'G', 1},
                        {'G', 2},
                        {'G', 4},
                        {'H', 1},
                        {'H', 2},
                        {'H', 4},
                        {'J', 1},
                        {'J', 2},
                        {'J', 3},
                        {'J', 4},
                        {'J', 2, 2},
                        {'X', 1},
                        {'X', 2},
                        {'X', 3},
                        {'X', 2, 2},
                        {'G', 2, 1, with_flow}};

geometry::Exchanger exchanger_of(const Shape& shape) {
  geometry::Description d;
  d.shell_type = shape.shell;
  d.rear_head = 'S';
  d.shells_in_series = shape.in_series;
  d.first_tube_pass = shape.first;
  if (shape.passes == 1 && shape.shell == 'E') d.flow_direction = shape.flow;
  d.shell_inside_diameter = 0.8;
  d.tube_count = 480;
  d.tube_passes = shape.passes;
  d.tube_outside_diameter = 0.01905;
  d.tube_wall = 0.0016;
  d.tube_length = 6.0;
  d.tubesheet_thickness = 0.05;
  d.tube_pitch = 0.0254;
  d.layout = 30;
  d.tube_conductivity = 50.0;
  d.tube_roughness = 1.5e-6;
  d.baffle_spacing = 0.3;
  REQUIRE(geometry::objections(d).empty());
  return geometry::derive(d).value;
}

fluids::Fluid constant_liquid(double viscosity) {
  return fluids::make_constant(
             {.density = 900, .heat_capacity = 2300, .conductivity = 0.14, .viscosity = viscosity},
             fluids::Phase::liquid)
      .fluid;
}

/// Two liquids with constant properties, at an NTU chosen by the surface.
rating::Problem constant_problem(const Shape& shape, double ntu, double r) {
  rating::Problem problem;
  problem.exchanger = exchanger_of(shape);
  problem.shell_side = {"oil", constant_liquid(4e-3), 30.0 / r, 400.0, 5e5, 1e-4};
  problem.tube_side = {"solvent", constant_liquid(8e-4), 30.0, 300.0, 5e5, 1e-4};
  const auto first = rating::rate_mean(problem).outcome;
  REQUIRE(first.has_value());
  problem.exchanger.area *= ntu / first->ntu_tube;
  return problem;
}

std::string name_of(const Shape& shape) {
  return fmt::format("{} {} passes, {} in series{}", shape.shell, shape.passes, shape.in_series,
                     shape.first == with_flow ? ", first pass with the shell flow" : "");
}

}  // namespace

TEST_CASE("march: with constant properties it is the closed form of every arrangement") {
  for (const Shape& shape : shapes) {
    for (const auto& [ntu, r] : {std::pair{0.6, 0.8}, {1.5, 1.0}, {2.5, 0.4}, {1.2, 2.5}}) {
      CAPTURE(name_of(shape));
      CAPTURE(ntu);
      CAPTURE(r);
      const auto problem = constant_problem(shape, ntu, r);
      const auto mean = rating::rate_mean(problem).outcome;
      const auto march = rating::rate_march(problem);
      REQUIRE(mean.has_value());
      REQUIRE_MESSAGE(march.outcome.has_value(), march.no_result);
      CHECK(support::relative(march.outcome->duty, mean->duty) <= 1e-5);
      CHECK(support::relative(march.outcome->local.u_dirty, mean->local.u_dirty) <= 1e-4);
      laws::check_outcome(problem, *march.outcome);
    }
  }
}

TEST_CASE("march: the error falls with the fourth power of the slices") {
  for (const Shape& shape : {Shape{'E', 1}, Shape{'E', 2}, Shape{'J', 2}, Shape{'X', 1}}) {
    CAPTURE(name_of(shape));
    const auto problem = constant_problem(shape, 5.0, 0.9);
    const double exact = rating::rate_mean(problem).outcome->duty;
    const auto error = [&](int slices) {
      const auto march = rating::rate_march(problem, {.first_slices = slices, .most_slices = slices});
      return std::abs(march.outcome->duty / exact - 1.0);
    };
    const double order = std::log2(error(3) / error(6));
    CHECK(order > 3.5);
    CHECK(order < 4.8);
  }
}

TEST_CASE("march: temperatures between shells join the streams of a train") {
  const auto problem = constant_problem({'E', 2, 3}, 2.0, 0.8);
  const auto outcome = *rating::rate_march(problem).outcome;
  REQUIRE(outcome.between_shells.size() == 3);
  CHECK(outcome.between_shells.back().shell_outlet == doctest::Approx(outcome.shell_outlet));
  // The tube stream meets the shells in reverse order: it leaves the unit from the first.
  CHECK(outcome.between_shells.front().tube_outlet == doctest::Approx(outcome.tube_outlet));
  double before = problem.shell_side.inlet_temperature;
  for (const auto& shell : outcome.between_shells) {
    CHECK(shell.shell_outlet < before);
    before = shell.shell_outlet;
  }
}

namespace {

/// Rates random problems of all shells; returns how many gave a result.
int rate_random(unsigned seed, int count, const rating::Refinement& refinement) {
  random_cases::Generator generator(seed);
  int rated = 0;
  for (int i = 0; i < count; ++i) {
    CAPTURE(i);
    const rating::Problem problem = generator.next_of_any_shell();
    CAPTURE(problem.exchanger.as_described.shell_type);
    CAPTURE(problem.exchanger.as_described.tube_passes);
    const auto march = rating::rate_march(problem, refinement);
    if (!march.outcome) {
      CHECK(march.no_result.size() > 20);
      continue;
    }
    ++rated;
    CHECK(march.outcome->balance_error <= 1e-9);
    CHECK(std::isfinite(march.outcome->local.u_dirty));
    CHECK(march.outcome->f_correction <= 1.0 + 1e-9);
    laws::check_second_law(problem, *march.outcome);
  }
  return rated;
}

}  // namespace

TEST_CASE("march: 10 000 random cases over all shells are rated or refused with a reason") {
  // Coarse slices: what is asked for is a result or a reason, not digits.
  CHECK(rate_random(4711, 10000, {.first_slices = 2, .most_slices = 2}) > 7000);
  CHECK(rate_random(4712, 100, {}) > 70);
}
