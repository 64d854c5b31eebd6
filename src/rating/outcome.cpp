#include "outcome.hpp"

#include <fmt/core.h>

#include <algorithm>
#include <cmath>
#include <iterator>

#include "dutygauge/units/mention.hpp"

namespace dutygauge::rating {
namespace {

void append(Findings& findings, Findings more) {
  findings.insert(findings.end(), std::make_move_iterator(more.begin()), std::make_move_iterator(more.end()));
}

/// What a stream meets on its way.
struct Met {
  double outlet;  ///< [K]
  double mean;    ///< bulk [K]
  double wall;    ///< wetted, where the bulk is at its mean [K]
};

/// The wetted wall at the end where a stream leaves and the other one enters: a cooled stream's
/// coldest, a heated one's hottest. The wall keeps the place between the streams that it has at the
/// means; with several passes no wall is farther out than this.
double extreme_wall(const Met& own, double other_inlet, double other_mean) {
  const double share = (own.wall - other_mean) / (own.mean - other_mean);
  return other_inlet + share * (own.outlet - other_inlet);
}

/// A phase change at the extreme wall, else what is to be said of the mean one.
Findings check_walls(const Stream& stream, std::string_view side, double wall, double extreme) {
  Findings at_end =
      fluids::check_wall(stream.fluid, extreme, stream.inlet_pressure, fmt::format("{} at its outlet", side));
  const bool changes = std::ranges::find(at_end, "fluids.wall_changes_phase", &Finding::id) != at_end.end();
  return changes
             ? at_end
             : fluids::check_wall(stream.fluid, wall, stream.inlet_pressure, fmt::format("{} wall", side));
}

void check_stream(const Stream& stream, std::string_view side, const Met& met, double extreme,
                  Findings& findings) {
  append(findings, fluids::check_bulk(stream.fluid, stream.inlet_temperature, stream.inlet_pressure,
                                      fmt::format("{} inlet", side)));
  append(findings,
         fluids::check_bulk(stream.fluid, met.outlet, stream.inlet_pressure, fmt::format("{} outlet", side)));
  append(findings,
         fluids::check_span(stream.fluid, {.inlet = stream.inlet_temperature, .outlet = met.outlet}, side));
  append(findings, check_walls(stream, side, met.wall, extreme));
}

}  // namespace

void fill_streams(const Trial& trial, double duty, Outcome& outcome) {
  outcome.duty = duty;
  outcome.shell_outlet = trial.shell_outlet;
  outcome.tube_outlet = trial.tube_outlet;
  outcome.shell_mean = trial.means.shell;
  outcome.tube_mean = trial.means.tube;
  outcome.shell_capacity_rate = trial.shell_capacity_rate;
  outcome.tube_capacity_rate = trial.tube_capacity_rate;
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

/// Why a stream cannot even enter: its inlet lies where its fluid has no properties.
std::string inlet_fault(const Stream& stream, std::string_view side) {
  const auto usable = fluids::usable_temperatures(stream.fluid, stream.inlet_pressure);
  const bool above = stream.inlet_temperature > usable.high;
  if (!above && stream.inlet_temperature >= usable.low) return {};
  return fmt::format("the {} inlet, {}, lies outside what is known of {}: {}", side,
                     units::mention(stream.inlet_temperature, units::Kind::temperature), stream.fluid.name,
                     fluids::why_it_ends(stream.fluid, stream.inlet_pressure, above));
}

Findings check_outcome(const Unit& unit, const Outcome& outcome) {
  const Problem& problem = *unit.problem;
  Findings findings;
  if (problem.exchanger.shell_drawn) findings = shellside::check_bundle(unit.bundle);
  if (problem.exchanger.shell_drawn && !problem.shell_side.film_law)
    append(findings, shellside::check_film(unit.bundle, outcome.local.shell_film));
  if (problem.exchanger.tubes_drawn)
    append(findings, tubeside::check_film(problem.exchanger.tube_side, outcome.local.tube_film,
                                          outcome.local.tube_bulk, outcome.local.tube_wall));
  const Met shell{outcome.shell_outlet, outcome.shell_mean, outcome.local.walls.shell_wetted};
  const Met tube{outcome.tube_outlet, outcome.tube_mean, outcome.local.walls.tube_wetted};
  check_stream(problem.shell_side, "shell side", shell,
               extreme_wall(shell, problem.tube_side.inlet_temperature, tube.mean), findings);
  check_stream(problem.tube_side, "tube side", tube,
               extreme_wall(tube, problem.shell_side.inlet_temperature, shell.mean), findings);
  check_arrangement(unit, outcome, findings);
  return findings;
}

}  // namespace dutygauge::rating
