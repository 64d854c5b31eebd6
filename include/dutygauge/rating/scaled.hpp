#pragma once
#include <optional>
#include <string>

#include "dutygauge/overall.hpp"
#include "dutygauge/rating.hpp"

/// The shell side of a unit whose baffles nobody knows, backed out of what its sheet states.
namespace dutygauge::rating {

/// What a sheet states of one case.
struct StatedShell {
  double u_dirty = 0;                     ///< [W/m2.K], on the outside area
  std::optional<double> pressure_drop{};  ///< [Pa], flange to flange
};

/// How film and drop go with the flow where nothing else is known of the bundle: what tube
/// banks in turbulent crossflow have. Drop: that of friction; a nozzle's part goes with the square.
inline constexpr double scaled_film_exponent = 0.6, scaled_drop_exponent = 1.8;

struct ScaledShell {
  FilmLaw film;
  std::optional<DropLaw> drop;
  overall::Resistances resistances;  ///< of the stated case, rated with that film
};

/// The laws, or why there are none: a sentence without its full stop.
struct Scaling {
  std::optional<ScaledShell> shell;
  std::string no_result;
};

/// The shell film that gives the stated U in that case, rated by the solution it names with our
/// wall, tube-side film and the foulings it is given; and the stated drop. Both hold at the state
/// of the shell stream at its mean temperature there, and give this case its U and drop back.
/// Assumes: the stated U is on our area, and with both foulings.
Scaling scale_shell(const Problem& stated_case, const StatedShell& stated);

/// Whether the shell side of a problem is scaled from a sheet.
bool is_scaled(const Problem& problem);

}  // namespace dutygauge::rating
