#include <fmt/core.h>

#include <algorithm>
#include <array>
#include <stdexcept>

#include "bench/timing.hpp"
#include "dutygauge/geometry.hpp"
#include "dutygauge/service.hpp"

// The cost of one rating in memory: outlets, films, drops, margins and the second opinion, no text.
// Each figure is the median of five rounds.

namespace {

using namespace dutygauge;

constexpr double celsius = 273.15;

/// An invented two-pass cooler.
geometry::Exchanger exchanger() {
  geometry::Description d;
  d.front_head = 'A', d.rear_head = 'S';
  d.shell_inside_diameter = 0.489, d.shell_nozzle_in = 0.154, d.shell_nozzle_out = 0.154;
  d.tube_count = 208, d.tube_passes = 2;
  d.tube_outside_diameter = 0.01905, d.tube_wall = 0.00211, d.tube_length = 4.88;
  d.tubesheet_thickness = 0.045, d.tube_pitch = 0.0254, d.layout = 30;
  d.tube_material = "admiralty brass";
  d.tube_nozzle_in = 0.128, d.tube_nozzle_out = 0.128;
  d.baffle_cut = 0.25, d.baffle_spacing = 0.15, d.inlet_spacing = 0.295, d.outlet_spacing = 0.295;
  if (const auto objections = geometry::objections(d); !objections.empty())
    throw std::invalid_argument(objections.front().key + ": " + objections.front().what);
  return geometry::derive(d).value;
}

rating::Stream stream(const char* name, const fluids::Made& made, double mass_flow, double inlet) {
  if (!made.objections.empty()) throw std::invalid_argument(made.objections.front().what);
  return {.name = name,
          .fluid = made.fluid,
          .mass_flow = mass_flow,
          .inlet_temperature = inlet,
          .inlet_pressure = 5e5,
          .fouling_resistance = 0.00018};
}

rating::Problem with_constants() {
  return {
      .exchanger = exchanger(),
      .shell_side = stream("oil", fluids::make_constant({850.0, 2000.0, 0.13, 0.008}, fluids::Phase::liquid),
                           21.5, celsius + 68.0),
      .tube_side =
          stream("water", fluids::make_constant({995.0, 4180.0, 0.62, 0.8e-3}, fluids::Phase::liquid), 17.0,
                 celsius + 29.0),
      .methods = {.solution = rating::Solution::mean}};
}

rating::Problem with_water() {
  return {.exchanger = exchanger(),
          .shell_side = stream("hot water", fluids::make_water(celsius + 68.0, 5e5), 21.5, celsius + 68.0),
          .tube_side = stream("cold water", fluids::make_water(celsius + 29.0, 5e5), 17.0, celsius + 29.0),
          .methods = {.solution = rating::Solution::mean}};
}

/// Water against a lubricating oil, for one march.
rating::Problem with_oil() {
  return {.exchanger = exchanger(),
          .shell_side =
              stream("oil", fluids::make_oil({.iso_vg = 46, .density_15c = 872.0}), 21.5, celsius + 68.0),
          .tube_side = stream("cold water", fluids::make_water(celsius + 29.0, 5e5), 17.0, celsius + 29.0),
          .methods = {}};
}

void report_march(rating::Problem problem, double target) {
  const double inlet = problem.shell_side.inlet_temperature;
  std::array<double, 5> ratio{};
  for (double& one : ratio) {
    const double pow_seconds = bench::time_of_pow();
    one = bench::time_of(
              [&](double x) {
                problem.shell_side.inlet_temperature = inlet + x;
                return 1e-6 * rating::rate_march(problem).outcome->duty;
              },
              100) /
          pow_seconds;
  }
  std::ranges::sort(ratio);
  fmt::print("{:<32} {:>11} {:>8.0f} pow, target {:.0f}\n", "one march, water and oil", "", ratio[2], target);
}

void report(const char* what, rating::Problem problem, double target) {
  const service::Service service{.demands = {{service::Quantity::duty, true, 4e5},
                                             {service::Quantity::shell_side_outlet, false, celsius + 58.0}},
                                 .shell_side_allowable_drop = 1e5,
                                 .tube_side_allowable_drop = 7e4};
  const auto assessed = service::assess(problem, service);
  if (!assessed.rating.outcome || !assessed.second_opinion || !assessed.margins.surface_clean)
    throw std::runtime_error("the problem is not fully rated: " + assessed.rating.no_result);

  const double inlet = problem.shell_side.inlet_temperature;
  std::array<double, 5> seconds{}, ratio{};
  for (std::size_t round = 0; round < ratio.size(); ++round) {
    const double pow_seconds = bench::time_of_pow();
    seconds[round] = bench::time_of(
        [&](double x) {
          problem.shell_side.inlet_temperature = inlet + x;
          return 1e-6 * service::assess(problem, service).rating.outcome->duty;
        },
        1000);
    ratio[round] = seconds[round] / pow_seconds;
  }
  std::ranges::sort(seconds);
  std::ranges::sort(ratio);
  fmt::print("{:<32} {:>8.1f} us {:>8.0f} pow, target {:.0f}\n", what, 1e6 * seconds[2], ratio[2], target);
}

}  // namespace

int main() {
  fmt::print("{:<32} {:>8.4f} us\n", "std::pow", 1e6 * bench::time_of_pow());
  report("rating, constant properties", with_constants(), 2000.0);
  report("rating, water on both sides", with_water(), 15000.0);
  report_march(with_oil(), 100000.0);
}
