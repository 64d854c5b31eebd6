#include "dutygauge/rating/scaled.hpp"

#include <fmt/core.h>

#include <cmath>
#include <utility>

#include "dutygauge/numerics.hpp"

namespace dutygauge::rating {
namespace {

constexpr double endless_film = 1e9;  // whose resistance no digit of a sheet shows [W/m2.K]

std::string in_metric(double value, units::Kind kind) {
  return units::typed(value, kind, units::System::metric, 3);
}

/// What stands in the way of a film: the other resistances alone are larger than the stated sum.
std::string no_film(const overall::Resistances& others, double u_dirty) {
  const auto in_words = [](double resistance) {
    return in_metric(resistance, units::Kind::fouling_resistance);
  };
  return fmt::format(
      "1/U = {} leaves nothing for the shell-side film: tube film {}, its fouling {}, wall {} and shell-side "
      "fouling {} are {} together",
      in_words(1.0 / u_dirty), in_words(others.tube_film), in_words(others.tube_fouling),
      in_words(others.wall), in_words(others.shell_fouling), in_words(others.sum() - others.shell_film));
}

}  // namespace

bool is_scaled(const Problem& problem) {
  const auto& law = problem.shell_side.film_law;
  return law && law->at_state;
}

Scaling scale_shell(const Problem& stated_case, const StatedShell& stated) {
  Problem problem = stated_case;
  problem.factors = {};
  problem.exchanger.shell_drawn = false;
  FilmLaw& film = problem.shell_side.film_law.emplace();
  film.at_flow = problem.shell_side.mass_flow;
  film.flow_exponent = scaled_film_exponent;
  problem.shell_side.drop_law.reset();
  Rating rating;
  const auto rate_with = [&](double coefficient) {
    film.value = coefficient;
    rating = rate(problem);
    return rating.outcome.has_value();
  };
  if (!rate_with(endless_film)) return {{}, rating.no_result};
  if (rating.outcome->local.u_dirty <= stated.u_dirty)
    return {{}, no_film(rating.outcome->local.resistances, stated.u_dirty)};

  const auto excess = [&](double resistance) {
    return rate_with(1.0 / resistance) ? rating.outcome->local.u_dirty / stated.u_dirty - 1.0 : std::nan("");
  };
  const auto find_film = [&] {
    const numerics::Bracket bracket{1.0 / endless_film, 1.0 / stated.u_dirty};
    const auto resistance = numerics::find_root(excess, bracket, 1e-10 / stated.u_dirty);
    return resistance && std::isfinite(excess(*resistance));
  };
  // First the same film everywhere, which tells the mean state; then one that follows the state.
  bool is_found = find_film();
  if (is_found) {
    film.at_state = rating.outcome->local.shell_bulk;
    is_found = find_film();
  }
  if (!is_found)
    return {{}, rating.no_result.empty() ? "no shell-side film gives the stated U" : rating.no_result};
  ScaledShell shell{.film = film, .drop = {}, .resistances = rating.outcome->local.resistances};
  if (!stated.pressure_drop) return {std::move(shell), {}};
  problem.shell_side.drop_law = DropLaw{.value = *stated.pressure_drop,
                                        .at_flow = film.at_flow,
                                        .flow_exponent = scaled_drop_exponent,
                                        .at_state = film.at_state};
  rate_with(film.value);
  shell.drop = problem.shell_side.drop_law;
  // A mean along the unit is not quite the drop at the mean state.
  shell.drop->value *= *stated.pressure_drop / rating.outcome->shell_drop.total();
  return {std::move(shell), {}};
}

}  // namespace dutygauge::rating
