#include <algorithm>
#include <cmath>
#include <stdexcept>

#include "outcome.hpp"

namespace dutygauge::rating {
namespace {

double enthalpy_at(const Stream& stream, double temperature) {
  return fluids::enthalpy(stream.fluid, temperature, stream.inlet_pressure);
}

/// Below this change of temperature [K] the secant capacity rate loses its digits.
constexpr double smallest_change = 1e-7;

double capacity_rate(const Stream& stream, double outlet, double duty) {
  const double change = std::abs(outlet - stream.inlet_temperature);
  if (change >= smallest_change) return duty / change;
  return stream.mass_flow *
         fluids::state(stream.fluid, stream.inlet_temperature, stream.inlet_pressure).heat_capacity;
}

}  // namespace

double outlet_after(const Stream& stream, double heat_gained) {
  if (heat_gained == 0.0) return stream.inlet_temperature;
  return fluids::temperature_at(
      stream.fluid, enthalpy_at(stream, stream.inlet_temperature) + heat_gained / stream.mass_flow,
      stream.inlet_pressure);
}

Unit prepare(const Problem& problem) {
  const geometry::Exchanger& exchanger = problem.exchanger;
  Unit unit;
  unit.problem = &problem;
  if ((!exchanger.tubes_drawn && !problem.tube_side.film_law) ||
      (!exchanger.shell_drawn && !problem.shell_side.film_law))
    throw std::invalid_argument("a side that is not drawn needs its film as a law");
  if (exchanger.shell_drawn)
    unit.bundle = shellside::prepare(exchanger.shell_side, problem.methods.shell_side);
  unit.arrangement = arrangement_of(exchanger);
  unit.tube_flow = problem.tube_side.mass_flow / exchanger.tube_banks();
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
                                                                                : arrangement::Flow::counter,
          .first_tube_pass = exchanger.first_tube_pass == geometry::FirstTubePass::with_shell_flow
                                 ? arrangement::FirstTubePass::with_shell_flow
                                 : arrangement::FirstTubePass::against_shell_flow,
          .trains_in_turn = exchanger.shells_in_parallel / exchanger.tube_banks()};
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

}  // namespace dutygauge::rating
