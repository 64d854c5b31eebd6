#include <algorithm>
#include <cmath>

#include "unit.hpp"

namespace dutygauge::rating {
namespace {

constexpr int most_passes = 400;

/// Properties at a wall are taken at the end of the fluid's range beyond it; the
/// temperature itself stays, for the wall factors of gases.
fluids::State wall_state(const Stream& stream, const fluids::TemperatureRange& range, double temperature) {
  fluids::State state =
      fluids::state(stream.fluid, std::clamp(temperature, range.low, range.high), stream.inlet_pressure);
  state.temperature = temperature;
  return state;
}

overall::Resistances resistances_of(const Unit& unit, const Local& at, double metal_temperature) {
  const Problem& problem = *unit.problem;
  const geometry::Exchanger& exchanger = problem.exchanger;
  overall::Resistances r{.tube_film = exchanger.outside_per_inside / at.tube_film.coefficient,
                         .tube_fouling = exchanger.outside_per_inside * problem.tube_side.fouling_resistance,
                         .wall = exchanger.layer_resistance,
                         .shell_fouling = problem.shell_side.fouling_resistance / at.fin_effectiveness,
                         .shell_film = 1.0 / (at.shell_film.coefficient * at.fin_effectiveness)};
  if (exchanger.wall_length > 0.0)
    r.wall += exchanger.wall_length / exchanger.wall_conductivity.at(metal_temperature);
  return r;
}

/// Walls at the flux of the rule. With a fixed U the resistance still missing to
/// it counts as deposit on the shell side, and the wetted walls stay between the streams.
overall::WallTemperatures walls_of(const Local& at, const Bulk& bulk, const FluxRule& rule) {
  const double difference = bulk.shell - bulk.tube;
  if (!rule.fixed_u)
    return overall::wall_temperatures(at.resistances, bulk.tube, bulk.shell, at.u_dirty * difference);
  const double flux = *rule.fixed_u * difference;
  const auto [low, high] = std::minmax(bulk.tube, bulk.shell);
  overall::Resistances with_spare = at.resistances;
  with_spare.shell_fouling += 1.0 / *rule.fixed_u - at.resistances.sum();
  overall::WallTemperatures walls = overall::wall_temperatures(with_spare, bulk.tube, bulk.shell, flux);
  walls.tube_wetted = std::clamp(walls.tube_wetted, low, high);
  walls.shell_wetted = std::clamp(walls.shell_wetted, low, high);
  return walls;
}

}  // namespace

void start_walls(Local& at, const Bulk& bulk) {
  at.walls = {bulk.tube, bulk.shell, 0.5 * (bulk.tube + bulk.shell)};
}

double settle(const Unit& unit, const Bulk& bulk, const FluxRule& rule, int passes, Local& at) {
  const Problem& problem = *unit.problem;
  double relaxation = 1.0, last_step = HUGE_VAL;
  at.converged = false;
  for (int pass = 0; pass < passes && !at.converged; ++pass) {
    at.tube_wall = wall_state(problem.tube_side, unit.tube_wall_range, at.walls.tube_wetted);
    at.shell_wall = wall_state(problem.shell_side, unit.shell_wall_range, at.walls.shell_wetted);
    at.tube_film = tube_film(unit, at.tube_bulk, at.tube_wall);
    at.shell_film = shell_film(unit, at.shell_bulk, at.shell_wall);
    at.resistances = resistances_of(unit, at, at.walls.metal_mean);
    const double u_before = at.u_dirty;
    at.u_dirty = 1.0 / at.resistances.sum();
    at.u_clean = 1.0 / at.resistances.clean_sum();
    const overall::WallTemperatures next = walls_of(at, bulk, rule);
    const double step = std::max(std::abs(next.tube_wetted - at.walls.tube_wetted),
                                 std::abs(next.shell_wetted - at.walls.shell_wetted));
    at.converged = step < 1e-9 && std::abs(at.u_dirty - u_before) < 1e-12 * at.u_dirty;
    if (step >= last_step) relaxation = std::max(0.2, 0.7 * relaxation);
    last_step = step;
    at.walls.tube_wetted += relaxation * (next.tube_wetted - at.walls.tube_wetted);
    at.walls.shell_wetted += relaxation * (next.shell_wetted - at.walls.shell_wetted);
    at.walls.metal_mean += relaxation * (next.metal_mean - at.walls.metal_mean);
  }
  return last_step;
}

Local local(const Unit& unit, const Bulk& bulk, const FluxRule& rule) {
  const Problem& problem = *unit.problem;
  Local at;
  at.tube_bulk = fluids::state(problem.tube_side.fluid, bulk.tube, problem.tube_side.inlet_pressure);
  at.shell_bulk = fluids::state(problem.shell_side.fluid, bulk.shell, problem.shell_side.inlet_pressure);
  start_walls(at, bulk);
  settle(unit, bulk, rule, most_passes, at);
  return at;
}

}  // namespace dutygauge::rating
