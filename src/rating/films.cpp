#include <cmath>

#include "unit.hpp"

// Films and drops at one place: by the correlation where the side is drawn, by the law
// where one is known.

namespace dutygauge::rating {
namespace {

double whole(const Unit& unit, double flow_of_one_bank) {
  return flow_of_one_bank * unit.problem->exchanger.shells_in_parallel;
}

}  // namespace

double FilmLaw::at(double mass_flow, const fluids::State& bulk) const {
  double film = value * (1.0 + temperature_slope * (bulk.temperature - at_temperature));
  if (flow_exponent != 0.0) film *= std::pow(mass_flow / at_flow, flow_exponent);
  if (!at_state) return film;
  const double k = bulk.conductivity / at_state->conductivity;
  return film * std::cbrt(k * k * bulk.heat_capacity / at_state->heat_capacity) *
         std::pow(at_state->viscosity / bulk.viscosity, 4.0 / 15.0);
}

double DropLaw::at(double mass_flow, const fluids::State& bulk) const {
  double drop = value;
  if (flow_exponent != 0.0) drop *= std::pow(mass_flow / at_flow, flow_exponent);
  if (!at_state) return drop;
  return drop * at_state->density / bulk.density * std::pow(bulk.viscosity / at_state->viscosity, 0.2);
}

tubeside::Film tube_film(const Unit& unit, const fluids::State& bulk, const fluids::State& wall) {
  const Problem& problem = *unit.problem;
  const auto& law = problem.tube_side.film_law;
  tubeside::Film film;
  if (problem.exchanger.tubes_drawn)
    film = tubeside::film(problem.exchanger.tube_side, unit.tube_flow, bulk, wall);
  if (law) {
    film.coefficient = law->at(whole(unit, unit.tube_flow), bulk);
    film.nusselt = film.coefficient * problem.exchanger.tube_side.inside_diameter / bulk.conductivity;
  }
  film.coefficient *= problem.factors.tube_film;
  film.nusselt *= problem.factors.tube_film;
  return film;
}

shellside::Film shell_film(const Unit& unit, const fluids::State& bulk, const fluids::State& wall) {
  const Problem& problem = *unit.problem;
  const auto& law = problem.shell_side.film_law;
  shellside::Film film;
  if (problem.exchanger.shell_drawn) film = shellside::film(unit.bundle, unit.shell_flow, bulk, wall);
  if (law) film.coefficient = law->at(whole(unit, unit.shell_flow), bulk);
  film.coefficient *= problem.factors.shell_film;
  return film;
}

tubeside::PressureDrop tube_drop(const Unit& unit, const Local& at) {
  const Problem& problem = *unit.problem;
  const geometry::Exchanger& exchanger = problem.exchanger;
  const int in_series = exchanger.shells_in_series * (exchanger.shells_in_parallel / exchanger.tube_banks());
  if (const auto& law = problem.tube_side.drop_law)
    return {.friction = problem.factors.tube_drop * law->at(whole(unit, unit.tube_flow), at.tube_bulk)};
  if (!problem.exchanger.tubes_drawn) return {};
  return tubeside::pressure_drop(problem.exchanger.tube_side, unit.tube_flow, at.tube_bulk, at.tube_wall)
      .times(in_series * problem.factors.tube_drop);
}

shellside::PressureDrop shell_drop(const Unit& unit, const Local& at) {
  const Problem& problem = *unit.problem;
  const int in_series = problem.exchanger.shells_in_series;
  if (const auto& law = problem.shell_side.drop_law)
    return {.crossflow = problem.factors.shell_drop * law->at(whole(unit, unit.shell_flow), at.shell_bulk)};
  if (!problem.exchanger.shell_drawn) return {};
  return shellside::pressure_drop(unit.bundle, unit.shell_flow, at.shell_bulk, at.shell_wall)
      .times(in_series * problem.factors.shell_drop);
}

}  // namespace dutygauge::rating
