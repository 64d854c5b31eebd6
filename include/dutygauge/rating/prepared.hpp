#pragma once
#include <memory>

#include "dutygauge/rating.hpp"

/// A problem made ready once, to be asked for its clean films at many flows.
namespace dutygauge::rating {

/// Where the films are asked for.
struct Place {
  double tube_flow = 0, shell_flow = 0;  ///< through the bundle, of the whole unit [kg/s]
  double tube_mean = 0, shell_mean = 0;  ///< bulk [K]
  double u = 0;                          ///< through which the heat flows to the walls [W/m2.K]
};

/// Resistances without deposits, on the outside area, and how their sum changes.
struct CleanFilms {
  double tube_film = 0, wall = 0, shell_film = 0;  ///< [m2.K/W]
  bool converged = false;
  double sum() const { return tube_film + wall + shell_film; }
};

/// Change of the clean sum, walls held: with the logarithm of a flow [m2.K/W], with a bulk
/// temperature [m2/W].
struct CleanSlopes {
  double tube_flow = 0, shell_flow = 0, tube_mean = 0, shell_mean = 0;
};

struct FilmsAndSlopes {
  CleanFilms films;
  CleanSlopes slopes;
};

/// Drops of the whole unit as if all of it were at one place [Pa]; zero where unknown.
struct PlaceDrops {
  double tube_bundle = 0, tube_nozzles = 0, shell_bundle = 0, shell_nozzles = 0;
};

/// Holds its own copy of the problem, without its fouling resistances: cheap to copy, safe
/// to share. Properties are those at the bulk means.
class Prepared {
 public:
  /// Throws std::invalid_argument where a side is neither drawn nor has a film law.
  explicit Prepared(Problem problem);

  const Problem& problem() const;
  const arrangement::Arrangement& arrangement() const;
  bool shell_side_is_hot() const;

  /// Where a stream's fluid can be used [K].
  const fluids::TemperatureRange& tube_range() const;
  const fluids::TemperatureRange& shell_range() const;

  CleanFilms films(const Place& place) const;
  FilmsAndSlopes films_and_slopes(const Place& place) const;
  PlaceDrops drops(const Place& place) const;

 private:
  struct Kept;
  std::shared_ptr<const Kept> kept_;
};

}  // namespace dutygauge::rating
