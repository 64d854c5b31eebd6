#include "dutygauge/rating/prepared.hpp"

#include <utility>

#include "unit.hpp"

namespace dutygauge::rating {
namespace {

Problem without_deposits(Problem problem) {
  problem.tube_side.fouling_resistance = problem.shell_side.fouling_resistance = 0.0;
  return problem;
}

Unit with_flows(const Unit& unit, const Place& place) {
  Unit there = unit;
  const int banks = unit.problem->exchanger.shells_in_parallel;
  there.tube_flow = place.tube_flow / banks;
  there.shell_flow = place.shell_flow / banks;
  return there;
}

Local local_at(const Unit& unit, const Place& place) {
  return local(unit, {place.tube_mean, place.shell_mean}, {.fixed_u = place.u});
}

double tube_resistance(const Unit& unit, const Local& at) {
  return unit.problem->exchanger.outside_per_inside / tube_film(unit, at.tube_bulk, at.tube_wall).coefficient;
}

double shell_resistance(const Unit& unit, const Local& at) {
  return 1.0 / (shell_film(unit, at.shell_bulk, at.shell_wall).coefficient * at.fin_effectiveness);
}

void move_bulk(const Stream& stream, double step, fluids::State& bulk) {
  bulk = fluids::state(stream.fluid, bulk.temperature + step, stream.inlet_pressure);
}

CleanFilms films_of(const Local& at) {
  return {at.resistances.tube_film, at.resistances.wall, at.resistances.shell_film, at.converged};
}

CleanSlopes slopes_of(const Unit& unit, const Local& at) {
  constexpr double flow_step = 1e-4, temperature_step = 0.01;  // [-], [K]
  const double tube = at.resistances.tube_film, shell = at.resistances.shell_film;
  Unit faster = unit;
  faster.tube_flow *= 1.0 + flow_step;
  faster.shell_flow *= 1.0 + flow_step;
  Local warmer = at;
  move_bulk(unit.problem->tube_side, temperature_step, warmer.tube_bulk);
  move_bulk(unit.problem->shell_side, temperature_step, warmer.shell_bulk);
  return {(tube_resistance(faster, at) - tube) / flow_step,
          (shell_resistance(faster, at) - shell) / flow_step,
          (tube_resistance(unit, warmer) - tube) / temperature_step,
          (shell_resistance(unit, warmer) - shell) / temperature_step};
}

}  // namespace

struct Prepared::Kept {
  Problem problem;
  Unit unit;
  fluids::TemperatureRange tube_range, shell_range;

  explicit Kept(Problem given)
      : problem(without_deposits(std::move(given))),
        unit(prepare(problem)),
        tube_range(fluids::usable_temperatures(problem.tube_side.fluid, problem.tube_side.inlet_pressure)),
        shell_range(
            fluids::usable_temperatures(problem.shell_side.fluid, problem.shell_side.inlet_pressure)) {}
};

Prepared::Prepared(Problem problem) : kept_(std::make_shared<Kept>(std::move(problem))) {}

const Problem& Prepared::problem() const {
  return kept_->problem;
}

const arrangement::Arrangement& Prepared::arrangement() const {
  return kept_->unit.arrangement;
}

bool Prepared::shell_side_is_hot() const {
  return kept_->unit.direction > 0.0;
}

const fluids::TemperatureRange& Prepared::tube_range() const {
  return kept_->tube_range;
}

const fluids::TemperatureRange& Prepared::shell_range() const {
  return kept_->shell_range;
}

CleanFilms Prepared::films(const Place& place) const {
  return films_of(local_at(with_flows(kept_->unit, place), place));
}

FilmsAndSlopes Prepared::films_and_slopes(const Place& place) const {
  const Unit unit = with_flows(kept_->unit, place);
  const Local at = local_at(unit, place);
  return {films_of(at), slopes_of(unit, at)};
}

PlaceDrops Prepared::drops(const Place& place) const {
  const Unit unit = with_flows(kept_->unit, place);
  const Local at = local_at(unit, place);
  const tubeside::PressureDrop tube = tube_drop(unit, at);
  const shellside::PressureDrop shell = shell_drop(unit, at);
  return {tube.total() - tube.nozzles, tube.nozzles, shell.total() - shell.nozzles, shell.nozzles};
}

}  // namespace dutygauge::rating
