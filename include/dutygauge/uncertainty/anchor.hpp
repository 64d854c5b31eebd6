#pragma once
#include <optional>
#include <string>

#include "dutygauge/findings.hpp"
#include "dutygauge/rating.hpp"

/// A rating tied to one steady reading of the running unit.
namespace dutygauge::uncertainty {

enum class Side { shell, tube };

/// What was read of one stream.
struct ReadStream {
  std::optional<double> mass_flow;  ///< of the whole unit [kg/s]; empty: from the other side's duty
  double inlet = 0, outlet = 0;     ///< [K]
};

/// Flows and temperatures of one moment, and how far the instruments may be off: one
/// standard deviation each, independent of one another.
struct SteadyReading {
  std::string taken = {};  ///< when, as typed
  ReadStream shell_side, tube_side;
  double temperature_sigma = 0.5;  ///< [K]
  double flow_sigma = 0.03;        ///< relative
};

/// How the two duties of a reading agree: within one, two, three standard deviations of
/// what the instruments and heat capacities allow, or not.
enum class Closing { untested, closes, within_uncertainty, doubtful, does_not_close };

/// What a reading says of the unit.
struct Anchor {
  SteadyReading reading;
  rating::Problem unit;                           ///< at the flows and inlets read, fouled as designed
  rating::Problem at_reading;                     ///< the same clean, with the film factor found
  double duty = 0;                                ///< weighted by their uncertainties [W]
  std::optional<double> shell_duty{}, tube_duty{};  ///< where a flow is known [W]
  double shell_weight = 0.5;                      ///< of the shell side's duty in `duty`
  double closure = 0, closure_sigma = 0;          ///< hot/cold - 1, and what it may be
  Closing closing = Closing::untested;
  double resistance = 0;   ///< that explains the duty beside clean films, outside area [m2.K/W]
  double resistance_sigma = 0;  ///< of a fouling that was given, beside what the reading leaves [m2.K/W]
  double film_factor = 1;  ///< above 1: the clean unit does less than was read; films are better
  Side film_side = Side::shell;  ///< whose film it multiplies: the one that is known less well
};

/// Ties a unit to a reading. Each side's duty is its heat from inlet to outlet; the two are
/// weighted by their variances. The extra resistance is that which gives the duty at the
/// reading's flows and inlets; where even the clean unit would give less, a film is
/// multiplied instead, with a finding. Empty with a `must` finding where the two duties are
/// further apart than three standard deviations, or where nothing explains the duty.
/// Needs: at least one flow; each stream's temperatures inside its fluid's range.
Checked<std::optional<Anchor>> anchor_to(const rating::Problem& unit, const SteadyReading& reading);

/// Ties a unit to a fouling that its record has shown (outside area, [m2.K/W]) and one standard
/// deviation of it: as if read, without error, at the unit's own flows and inlets. The films'
/// own errors are in the fouling found with them and drop out there. Empty with a `must`
/// finding where the unit has no result with it.
Checked<std::optional<Anchor>> anchor_to_fouling(const rating::Problem& unit, double fouling, double sigma);

/// A problem of the same unit as it is today: clean films with the factor found, the
/// resistance found in the place of its foulings and divided between the sides as they are.
rating::Problem today(const Anchor& anchor, rating::Problem problem);

}  // namespace dutygauge::uncertainty
