#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "march.hpp"
#include "outcome.hpp"

namespace dutygauge::rating {
namespace {

/// Integrals over the surface of one bank, each divided by the surface.
struct Means {
  double flux = 0, difference = 0;       ///< [W/m2], [K]
  overall::Resistances difference_over;  ///< temperature difference across each layer [K]
  tubeside::PressureDrop tube_drop;
  shellside::PressureDrop shell_drop;
};

void add(Means& means, const Unit& unit, const Meeting& meeting) {
  const Local& at = meeting.at;
  const double difference = at.shell_bulk.temperature - at.tube_bulk.temperature;
  const double flux = at.u_dirty * difference, w = meeting.weight;
  means.flux += w * flux;
  means.difference += w * difference;
  means.difference_over.tube_film += w * flux * at.resistances.tube_film;
  means.difference_over.tube_fouling += w * flux * at.resistances.tube_fouling;
  means.difference_over.wall += w * flux * at.resistances.wall;
  means.difference_over.shell_fouling += w * flux * at.resistances.shell_fouling;
  means.difference_over.shell_film += w * flux * at.resistances.shell_film;
  const auto tube = tube_drop(unit, at);
  const auto shell = shell_drop(unit, at);
  means.tube_drop.friction += w * tube.friction;
  means.tube_drop.turns += w * tube.turns;
  means.tube_drop.nozzles += w * tube.nozzles;
  means.shell_drop.crossflow += w * shell.crossflow;
  means.shell_drop.window += w * shell.window;
  means.shell_drop.ends += w * shell.ends;
  means.shell_drop.nozzles += w * shell.nozzles;
}

/// U of the whole [W/m2.K]: the one the arrangement's curve needs for the outlets found.
/// Past the maximum of that curve, or where properties bend it too far, the one of the
/// area-mean temperature difference.
double whole_u(const Unit& unit, const Means& means, const Outcome& outcome) {
  const double by_difference = means.flux / means.difference;
  const auto ntu = arrangement::ntu_for(unit.arrangement, outcome.r_tube, outcome.p_tube);
  if (!ntu) return by_difference;
  const double by_curve = *ntu * outcome.tube_capacity_rate / unit.problem->exchanger.area;
  return std::abs(by_curve / by_difference - 1.0) < 0.2 ? by_curve : by_difference;
}

/// Puts the films, resistances and U of the whole in the place of those at the means.
void show_whole(const Unit& unit, const Means& means, double u, Local& local) {
  // Resistances weighted with the flux add up to 1/(flux/difference); the small rest
  // between that and U belongs to all of them alike.
  const double scale = 1.0 / (u * means.difference);
  overall::Resistances& r = local.resistances;
  const double ideal_share = local.shell_film.ideal * r.shell_film;
  r = {.tube_film = means.difference_over.tube_film * scale,
       .tube_fouling = means.difference_over.tube_fouling * scale,
       .wall = means.difference_over.wall * scale,
       .shell_fouling = means.difference_over.shell_fouling * scale,
       .shell_film = means.difference_over.shell_film * scale};
  local.u_dirty = u;
  local.u_clean = 1.0 / r.clean_sum();
  local.walls = overall::wall_temperatures(r, local.tube_bulk.temperature, local.shell_bulk.temperature,
                                           u * (local.shell_bulk.temperature - local.tube_bulk.temperature));
  const double tube_film = unit.problem->exchanger.outside_per_inside / r.tube_film;
  local.tube_film.nusselt *= tube_film / local.tube_film.coefficient;
  local.tube_film.coefficient = tube_film;
  local.shell_film.coefficient = 1.0 / (r.shell_film * local.fin_effectiveness);
  local.shell_film.ideal = ideal_share / r.shell_film;
}

void fill_profile(const Unit& unit, const March& march, Outcome& outcome) {
  const Network& network = march.network();
  const int points = network.points();
  for (const Meeting& meeting : march.meetings()) {
    const Line& line = network.lines[static_cast<std::size_t>(meeting.tube_unknown / points)];
    const Local& at = meeting.at;
    outcome.profile.push_back({.shell = line.shell + 1,
                               .pass = line.pass,
                               .position = static_cast<double>(meeting.tube_unknown % points) / (points - 1),
                               .tube = at.tube_bulk.temperature,
                               .shell_side = at.shell_bulk.temperature,
                               .wall = at.walls.metal_mean,
                               .u = at.u_dirty,
                               .flux = at.u_dirty * (at.shell_bulk.temperature - at.tube_bulk.temperature)});
  }
  const auto in_series = static_cast<std::size_t>(unit.problem->exchanger.shells_in_series);
  for (std::size_t k = 0; k < network.shell_end.size(); ++k)
    outcome.between_shells.push_back(
        {.bank = static_cast<int>(k / in_series) + 1,
         .position = static_cast<int>(k % in_series) + 1,
         .shell_outlet = outlet_after(unit.problem->shell_side, march.mixed_enthalpy(network.shell_end[k]) *
                                                                    unit.problem->shell_side.mass_flow),
         .tube_outlet = outlet_after(unit.problem->tube_side, march.mixed_enthalpy(network.tube_end[k]) *
                                                                  unit.problem->tube_side.mass_flow)});
}

double duty_of(const Unit& unit, const March& march) {
  return unit.direction * unit.problem->tube_side.mass_flow *
         march.mixed_enthalpy(march.network().tube_outlet);
}

Outcome outcome_of(const Unit& unit, const March& march) {
  const Problem& problem = *unit.problem;
  const double duty = duty_of(unit, march);
  Trial trial = follow(unit, duty, {});
  Means means;
  for (const Meeting& meeting : march.meetings()) add(means, unit, meeting);
  Outcome outcome;
  outcome.solution = Solution::march;
  fill_streams(trial, duty, outcome);
  outcome.p_tube = duty / (trial.tube_capacity_rate * std::abs(problem.shell_side.inlet_temperature -
                                                               problem.tube_side.inlet_temperature));
  outcome.r_tube = trial.r;
  show_whole(unit, means, whole_u(unit, means, outcome), trial.local);
  trial.ntu = trial.local.u_dirty * problem.exchanger.area / trial.tube_capacity_rate;
  outcome.local = trial.local;
  fill_dimensionless(unit, trial, outcome);
  const double shell_gain = problem.shell_side.mass_flow * march.mixed_enthalpy(march.network().shell_outlet);
  outcome.balance_error = std::abs(std::abs(shell_gain) - std::abs(duty)) / duty;
  outcome.tube_drop = means.tube_drop;
  outcome.shell_drop = means.shell_drop;
  fill_profile(unit, march, outcome);
  return outcome;
}

std::string outside_fault(const Problem& problem, const March::Outside& outside) {
  const Stream& stream = outside.tube_side ? problem.tube_side : problem.shell_side;
  return fmt::format(
      "on its way through the exchanger the {} stream leaves the range of {}: {}; change its flow, its "
      "pressure or "
      "an inlet temperature, or describe the fluid further",
      outside.tube_side ? "tube-side" : "shell-side", stream.fluid.name,
      fluids::why_it_ends(stream.fluid, stream.inlet_pressure, outside.above));
}

}  // namespace

MarchResult march_through(const Unit& unit, const Local& start, const Refinement& refinement) {
  MarchResult result;
  double last_duty = 0;
  for (int slices = refinement.first_slices;; slices *= 2) {
    March march(unit, slices);
    if (!march.run(start)) {
      result.fault =
          "the temperatures along the exchanger do not settle: properties or films change too strongly";
      return result;
    }
    if (!march.inside_range()) {
      result.fault = outside_fault(*unit.problem, march.outside());
      return result;
    }
    const double duty = duty_of(unit, march);
    const bool settled =
        slices > refinement.first_slices && std::abs(duty - last_duty) <= refinement.tolerance * duty;
    last_duty = duty;
    if (settled || 2 * slices > refinement.most_slices) {
      result.outcome = outcome_of(unit, march);
      return result;
    }
  }
}

Rating rate_march(const Problem& problem, const Refinement& refinement) {
  Rating rating;
  rating.no_result = inlet_fault(problem.shell_side, "shell-side");
  if (rating.no_result.empty()) rating.no_result = inlet_fault(problem.tube_side, "tube-side");
  if (!rating.no_result.empty()) return rating;
  const Unit unit = prepare(problem);
  rating.largest_duty = duty_limit(problem).duty;
  const Bulk inlets{problem.tube_side.inlet_temperature, problem.shell_side.inlet_temperature};
  MarchResult result = march_through(unit, local(unit, inlets, {}), refinement);
  rating.no_result = result.fault;
  if (!result.outcome) return rating;
  rating.march_duty = result.outcome->duty;
  rating.findings = check_outcome(unit, *result.outcome);
  rating.outcome = std::move(result.outcome);
  return rating;
}

}  // namespace dutygauge::rating
