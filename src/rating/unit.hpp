#pragma once
#include "dutygauge/rating.hpp"

/// Internal to rating: a problem with everything prepared that no trial changes.
namespace dutygauge::rating {

struct Unit {
  const Problem* problem = nullptr;
  shellside::Bundle bundle;
  arrangement::Arrangement arrangement;
  double tube_flow = 0, shell_flow = 0;                            ///< of one bank [kg/s]
  fluids::TemperatureRange tube_wall_range{}, shell_wall_range{};  ///< where wall properties are taken
  double direction = 1;                                            ///< +1 when the shell side is hot, else -1
};

/// Needs: a side that is not drawn has a film law; throws std::invalid_argument otherwise.
Unit prepare(const Problem& problem);

/// Films at one place, with the problem's factors; allocation-free.
tubeside::Film tube_film(const Unit& unit, const fluids::State& bulk, const fluids::State& wall);
shellside::Film shell_film(const Unit& unit, const fluids::State& bulk, const fluids::State& wall);

/// Drops of one bank, all its shells in series, if the whole were as at one place; with the
/// problem's factors. All zero where nothing is known of them.
tubeside::PressureDrop tube_drop(const Unit& unit, const Local& at);
shellside::PressureDrop shell_drop(const Unit& unit, const Local& at);

/// Bulk temperatures [K] of the two streams at one place.
struct Bulk {
  double tube, shell;
};

/// What drives the flux through the wall in `local`.
struct FluxRule {
  std::optional<double> fixed_u;  ///< flux = fixed_u (T_s - T_t); empty: the U found, fouled
};

/// Walls at the bulk temperatures: where the iteration of `settle` begins.
void start_walls(Local& at, const Bulk& bulk);

/// Improves films, walls and U at one place, bulk states given, by at most `passes` passes;
/// returns the last step of a wall [K].
double settle(const Unit& unit, const Bulk& bulk, const FluxRule& rule, int passes, Local& at);

/// Films, walls and U at one place, iterated until U and both walls stand still.
Local local(const Unit& unit, const Bulk& bulk, const FluxRule& rule);

/// One trial duty followed through the unit.
struct Trial {
  double tube_outlet = 0, shell_outlet = 0;
  Bulk means{};
  double tube_capacity_rate = 0, shell_capacity_rate = 0;
  Local local;
  double ntu = 0, r = 0;  ///< installed, referred to the tube side
};
Trial follow(const Unit& unit, double duty, const FluxRule& rule);

}  // namespace dutygauge::rating
