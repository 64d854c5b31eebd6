#include <fmt/core.h>

#include <algorithm>
#include <cmath>
#include <utility>

#include "outcome.hpp"

namespace dutygauge::rating {
namespace {

constexpr double worth_saying = 0.01;

/// What changes along the way so much that properties at the means mislead.
std::string cause(const Problem& problem, const Outcome& outcome) {
  const auto ends = [](const Stream& stream, double outlet) {
    return std::pair{fluids::state(stream.fluid, stream.inlet_temperature, stream.inlet_pressure),
                     fluids::state(stream.fluid, outlet, stream.inlet_pressure)};
  };
  const auto [tube_in, tube_out] = ends(problem.tube_side, outcome.tube_outlet);
  const auto [shell_in, shell_out] = ends(problem.shell_side, outcome.shell_outlet);
  const auto ratio = [](double a, double b) { return std::max(a / b, b / a); };
  const double re = outcome.local.tube_film.reynolds * outcome.local.tube_bulk.viscosity;
  const auto [re_low, re_high] = std::minmax({re / tube_in.viscosity, re / tube_out.viscosity});
  if (re_low < 4000.0 && re_high > 2300.0)
    return fmt::format("the tube flow changes its regime on the way (Re {:.0f} to {:.0f})", re_low, re_high);
  const double tube_ratio = ratio(tube_in.viscosity, tube_out.viscosity);
  const double shell_ratio = ratio(shell_in.viscosity, shell_out.viscosity);
  if (std::max(tube_ratio, shell_ratio) > 2.0)
    return fmt::format("the viscosity on the {} side changes {:.1f} times between inlet and outlet",
                       tube_ratio > shell_ratio ? "tube" : "shell", std::max(tube_ratio, shell_ratio));
  if (std::max(ratio(tube_in.heat_capacity, tube_out.heat_capacity),
               ratio(shell_in.heat_capacity, shell_out.heat_capacity)) > 1.1)
    return "a heat capacity changes by more than 10 % between inlet and outlet";
  return "the films change along the exchanger";
}

}  // namespace

Rating rate(const Problem& problem) {
  return problem.methods.solution == Solution::march ? rate_march(problem) : rate_mean(problem);
}

Findings compare_solutions(const Problem& problem, Rating& rating) {
  if (!rating.mean_duty) rating.mean_duty = rate_mean(problem).mean_duty;
  if (!rating.march_duty) rating.march_duty = rate_march(problem).march_duty;
  Findings findings;
  if (!rating.outcome) return findings;
  check_few_baffles(prepare(problem), *rating.outcome, findings);
  if (!rating.mean_duty || !rating.march_duty) return findings;
  const double difference = *rating.mean_duty / *rating.march_duty - 1.0;
  if (std::abs(difference) <= worth_saying) return findings;
  findings.push_back(
      {.id = "rating.mean_misleads",
       .severity = Severity::should,
       .text =
           fmt::format("properties at the mean temperatures give {{value}}, {:+.1f} % against the {{limit}} "
                       "found along the exchanger, because {}. Trust the march, and compare with sheets "
                       "made by mean properties only with that in mind",
                       100.0 * difference, cause(problem, *rating.outcome)),
       .ground = Ground::method,
       .value = *rating.mean_duty,
       .limit = *rating.march_duty,
       .kind = units::Kind::power});
  return findings;
}

}  // namespace dutygauge::rating
