#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "dutygauge/numerics.hpp"
#include "dutygauge/units/mention.hpp"
#include "outcome.hpp"

namespace dutygauge::rating {
namespace {

/// The arrangement's duty at a trial less the trial duty: its root is the solution.
double excess(const Unit& unit, const Trial& trial, double duty) {
  const double p = arrangement::effectiveness(unit.arrangement, trial.r, trial.ntu);
  const double inlet_difference =
      std::abs(unit.problem->shell_side.inlet_temperature - unit.problem->tube_side.inlet_temperature);
  return p * trial.tube_capacity_rate * inlet_difference - duty;
}

Outcome outcome_of(const Unit& unit, const Trial& trial, double duty) {
  const Problem& problem = *unit.problem;
  Outcome outcome;
  fill_streams(trial, duty, outcome);
  outcome.local = trial.local;
  fill_dimensionless(unit, trial, outcome);
  const double shell_heat = std::abs(duty_to_reach(problem.shell_side, trial.shell_outlet, true));
  const double tube_heat = std::abs(duty_to_reach(problem.tube_side, trial.tube_outlet, true));
  outcome.balance_error = std::abs(shell_heat - tube_heat) / duty;
  outcome.tube_drop = tube_drop(unit, trial.local);
  outcome.shell_drop = shell_drop(unit, trial.local);
  return outcome;
}

std::string range_fault(const Problem& problem, const DutyLimit& limit) {
  const Stream& stream = limit.tube_side_governs ? problem.tube_side : problem.shell_side;
  const bool cooled = limit.tube_side_governs != shell_side_is_hot(problem);
  return fmt::format(
      "the {} stream would leave the range of {} at a duty of {}, before the exchanger reaches its balance: "
      "{}; "
      "change its flow, its pressure or an inlet temperature, or describe the fluid further",
      limit.tube_side_governs ? "tube-side" : "shell-side", stream.fluid.name,
      units::mention(limit.duty, units::Kind::power),
      fluids::why_it_ends(stream.fluid, stream.inlet_pressure, !cooled));
}

}  // namespace

Rating rate_mean(const Problem& problem) {
  Rating rating;
  rating.no_result = inlet_fault(problem.shell_side, "shell-side");
  if (rating.no_result.empty()) rating.no_result = inlet_fault(problem.tube_side, "tube-side");
  if (!rating.no_result.empty()) return rating;

  const Unit unit = prepare(problem);
  const DutyLimit limit = duty_limit(problem);
  rating.largest_duty = limit.duty;
  bool walls_found = true;
  const auto residual = [&](double duty) {
    const Trial trial = follow(unit, duty, {});
    // Resistances may be drawn below zero; a sum below zero is no exchanger.
    const bool is_one = trial.ntu > 0.0;
    walls_found = walls_found && trial.local.converged && is_one;
    return is_one ? excess(unit, trial, duty) : std::nan("");
  };
  std::optional<double> duty = numerics::find_root(residual, {0.0, limit.duty}, 1e-12 * limit.duty);
  // With a very large surface the root is the limit itself, to rounding.
  if (!duty && walls_found && !limit.fluid_ends) duty = limit.duty;
  if (!walls_found)
    rating.no_result = "the wall temperatures do not settle: the films change too strongly with the wall";
  else if (!duty)
    rating.no_result = range_fault(problem, limit);
  if (!rating.no_result.empty()) return rating;

  rating.outcome = outcome_of(unit, follow(unit, *duty, {}), *duty);
  rating.mean_duty = duty;
  rating.findings = check_outcome(unit, *rating.outcome);
  return rating;
}

}  // namespace dutygauge::rating
