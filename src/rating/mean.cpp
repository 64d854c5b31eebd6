#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "dutygauge/numerics.hpp"
#include "unit.hpp"

namespace dutygauge::rating {
namespace {

double enthalpy_at(const Stream& stream, double temperature) {
  return fluids::enthalpy(stream.fluid, temperature, stream.inlet_pressure);
}

/// Below this change of temperature [K] the secant capacity rate loses its digits.
constexpr double smallest_change = 1e-7;

double outlet_after(const Stream& stream, double heat_gained) {
  if (heat_gained == 0.0) return stream.inlet_temperature;
  return fluids::temperature_at(
      stream.fluid, enthalpy_at(stream, stream.inlet_temperature) + heat_gained / stream.mass_flow,
      stream.inlet_pressure);
}

double capacity_rate(const Stream& stream, double outlet, double duty) {
  const double change = std::abs(outlet - stream.inlet_temperature);
  if (change >= smallest_change) return duty / change;
  return stream.mass_flow *
         fluids::state(stream.fluid, stream.inlet_temperature, stream.inlet_pressure).heat_capacity;
}

/// The arrangement's duty at a trial less the trial duty: its root is the solution.
double excess(const Unit& unit, const Trial& trial, double duty) {
  const double p = arrangement::effectiveness(unit.arrangement, trial.r, trial.ntu);
  const double inlet_difference =
      std::abs(unit.problem->shell_side.inlet_temperature - unit.problem->tube_side.inlet_temperature);
  return p * trial.tube_capacity_rate * inlet_difference - duty;
}

void fill_dimensionless(const Unit& unit, const Trial& trial, Outcome& outcome) {
  const Problem& problem = *unit.problem;
  const double shell_in = problem.shell_side.inlet_temperature, tube_in = problem.tube_side.inlet_temperature;
  outcome.ntu_tube = trial.ntu;
  outcome.r_tube = trial.r;
  outcome.p_tube = arrangement::effectiveness(unit.arrangement, trial.r, trial.ntu);
  const double larger = std::max(1.0, trial.r);  // C_tube over the smaller of the two
  outcome.effectiveness = outcome.p_tube * larger;
  outcome.ntu = trial.ntu * larger;
  outcome.capacity_ratio = std::min(trial.r, 1.0 / trial.r);
  outcome.duty_ntu = outcome.p_tube * trial.tube_capacity_rate * std::abs(shell_in - tube_in);
  const double inlet_difference = unit.direction * (shell_in - tube_in);
  const double end_1 = unit.direction * (shell_in - trial.tube_outlet);
  const double end_2 = unit.direction * (trial.shell_outlet - tube_in);
  outcome.f_correction = arrangement::lmtd_correction(unit.arrangement, trial.r, trial.ntu).value_or(0.0);
  outcome.log_mean = arrangement::log_mean(end_1, end_2);
  // Where a stream all but reaches the other's inlet, the outlets have no digits left for
  // their difference; the dimensionless form has.
  if (std::min(end_1, end_2) < 1e-4 * inlet_difference && outcome.f_correction > 0.0)
    outcome.log_mean = inlet_difference * outcome.p_tube / (trial.ntu * outcome.f_correction);
  outcome.mean_difference = outcome.f_correction * outcome.log_mean;
  outcome.duty_lmtd = trial.local.u_dirty * problem.exchanger.area * outcome.mean_difference;
}

Outcome outcome_of(const Unit& unit, const Trial& trial, double duty) {
  const Problem& problem = *unit.problem;
  Outcome outcome;
  outcome.duty = duty;
  outcome.shell_outlet = trial.shell_outlet;
  outcome.tube_outlet = trial.tube_outlet;
  outcome.shell_mean = trial.means.shell;
  outcome.tube_mean = trial.means.tube;
  outcome.shell_capacity_rate = trial.shell_capacity_rate;
  outcome.tube_capacity_rate = trial.tube_capacity_rate;
  outcome.local = trial.local;
  fill_dimensionless(unit, trial, outcome);
  const double shell_heat = std::abs(duty_to_reach(problem.shell_side, trial.shell_outlet, true));
  const double tube_heat = std::abs(duty_to_reach(problem.tube_side, trial.tube_outlet, true));
  outcome.balance_error = std::abs(shell_heat - tube_heat) / duty;
  const int in_series = problem.exchanger.shells_in_series;
  outcome.tube_drop = tubeside::pressure_drop(problem.exchanger.tube_side, unit.tube_flow,
                                              trial.local.tube_bulk, trial.local.tube_wall)
                          .of_shells(in_series);
  outcome.shell_drop =
      shellside::pressure_drop(unit.bundle, unit.shell_flow, trial.local.shell_bulk, trial.local.shell_wall)
          .of_shells(in_series);
  return outcome;
}

void append(Findings& findings, Findings more) {
  findings.insert(findings.end(), std::make_move_iterator(more.begin()), std::make_move_iterator(more.end()));
}

void check_stream(const Stream& stream, std::string_view side, double outlet, double wall,
                  Findings& findings) {
  append(findings, fluids::check_bulk(stream.fluid, stream.inlet_temperature, stream.inlet_pressure,
                                      fmt::format("{} inlet", side)));
  append(findings,
         fluids::check_bulk(stream.fluid, outlet, stream.inlet_pressure, fmt::format("{} outlet", side)));
  append(findings,
         fluids::check_span(stream.fluid, {.inlet = stream.inlet_temperature, .outlet = outlet}, side));
  append(findings,
         fluids::check_wall(stream.fluid, wall, stream.inlet_pressure, fmt::format("{} wall", side)));
}

Findings check_outcome(const Unit& unit, const Outcome& outcome) {
  const Problem& problem = *unit.problem;
  Findings findings = shellside::check_bundle(unit.bundle);
  append(findings, shellside::check_film(unit.bundle, outcome.local.shell_film));
  append(findings, tubeside::check_film(problem.exchanger.tube_side, outcome.local.tube_film,
                                        outcome.local.tube_bulk, outcome.local.tube_wall));
  check_stream(problem.shell_side, "shell side", outcome.shell_outlet, outcome.local.walls.shell_wetted,
               findings);
  check_stream(problem.tube_side, "tube side", outcome.tube_outlet, outcome.local.walls.tube_wetted,
               findings);
  return findings;
}

/// Why a stream cannot even enter: its inlet lies where its fluid has no properties.
std::string inlet_fault(const Stream& stream, std::string_view side) {
  const auto usable = fluids::usable_temperatures(stream.fluid, stream.inlet_pressure);
  const bool above = stream.inlet_temperature > usable.high;
  if (!above && stream.inlet_temperature >= usable.low) return {};
  return fmt::format("the {} inlet, {}, lies outside what is known of {}: {}", side,
                     units::typed(stream.inlet_temperature, units::Kind::temperature), stream.fluid.name,
                     fluids::why_it_ends(stream.fluid, stream.inlet_pressure, above));
}

std::string range_fault(const Problem& problem, const DutyLimit& limit) {
  const Stream& stream = limit.tube_side_governs ? problem.tube_side : problem.shell_side;
  const bool cooled = limit.tube_side_governs != shell_side_is_hot(problem);
  return fmt::format(
      "the {} stream would leave the range of {} at a duty of {}, before the exchanger reaches its balance: "
      "{}; "
      "change its flow, its pressure or an inlet temperature, or describe the fluid further",
      limit.tube_side_governs ? "tube-side" : "shell-side", stream.fluid.name,
      units::typed(limit.duty, units::Kind::power, units::System::metric, 4),
      fluids::why_it_ends(stream.fluid, stream.inlet_pressure, !cooled));
}

}  // namespace

Unit prepare(const Problem& problem) {
  const geometry::Exchanger& exchanger = problem.exchanger;
  Unit unit;
  unit.problem = &problem;
  unit.bundle = shellside::prepare(exchanger.shell_side, problem.methods.shell_side);
  unit.tube = {exchanger.tube_side.outside_diameter, exchanger.tube_side.inside_diameter};
  unit.arrangement = arrangement_of(exchanger);
  unit.tube_flow = problem.tube_side.mass_flow / exchanger.shells_in_parallel;
  unit.shell_flow = problem.shell_side.mass_flow / exchanger.shells_in_parallel;
  unit.tube_wall_range =
      fluids::valid_temperatures(problem.tube_side.fluid, problem.tube_side.inlet_pressure);
  unit.shell_wall_range =
      fluids::valid_temperatures(problem.shell_side.fluid, problem.shell_side.inlet_pressure);
  unit.direction = shell_side_is_hot(problem) ? 1.0 : -1.0;
  return unit;
}

Trial follow(const Unit& unit, double duty, const FluxRule& rule) {
  const Problem& problem = *unit.problem;
  Trial trial;
  trial.tube_outlet = outlet_after(problem.tube_side, unit.direction * duty);
  trial.shell_outlet = outlet_after(problem.shell_side, -unit.direction * duty);
  trial.means = {0.5 * (problem.tube_side.inlet_temperature + trial.tube_outlet),
                 0.5 * (problem.shell_side.inlet_temperature + trial.shell_outlet)};
  trial.tube_capacity_rate = capacity_rate(problem.tube_side, trial.tube_outlet, duty);
  trial.shell_capacity_rate = capacity_rate(problem.shell_side, trial.shell_outlet, duty);
  trial.r = trial.tube_capacity_rate / trial.shell_capacity_rate;
  trial.local = local(unit, trial.means, rule);
  trial.ntu = trial.local.u_dirty * problem.exchanger.area / trial.tube_capacity_rate;
  return trial;
}

arrangement::Arrangement arrangement_of(const geometry::Exchanger& exchanger) {
  return {.shell_type = exchanger.as_described.shell_type,
          .tube_passes = exchanger.as_described.tube_passes,
          .shells_in_series = exchanger.shells_in_series,
          .flow = exchanger.flow_direction == geometry::FlowDirection::parallel ? arrangement::Flow::parallel
                                                                                : arrangement::Flow::counter};
}

bool shell_side_is_hot(const Problem& problem) {
  return problem.shell_side.inlet_temperature > problem.tube_side.inlet_temperature;
}

double duty_to_reach(const Stream& stream, double outlet_temperature, bool is_hot) {
  const double gained = stream.mass_flow * (enthalpy_at(stream, outlet_temperature) -
                                            enthalpy_at(stream, stream.inlet_temperature));
  return is_hot ? -gained : gained;
}

DutyLimit duty_limit(const Problem& problem) {
  struct Side {
    double duty;
    bool fluid_ends;
  };
  const auto side = [](const Stream& stream, double other_inlet) -> Side {
    const auto usable = fluids::usable_temperatures(stream.fluid, stream.inlet_pressure);
    const double reached = std::clamp(other_inlet, usable.low, usable.high);
    return {std::abs(duty_to_reach(stream, reached, true)), reached != other_inlet};
  };
  const Side tube = side(problem.tube_side, problem.shell_side.inlet_temperature);
  const Side shell = side(problem.shell_side, problem.tube_side.inlet_temperature);
  if (tube.duty < shell.duty) return {tube.duty, true, tube.fluid_ends};
  return {shell.duty, false, shell.fluid_ends};
}

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
    walls_found = walls_found && trial.local.converged;
    return excess(unit, trial, duty);
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
  rating.findings = check_outcome(unit, *rating.outcome);
  return rating;
}

}  // namespace dutygauge::rating
