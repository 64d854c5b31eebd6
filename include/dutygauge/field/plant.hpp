#pragma once
#include <optional>

#include "dutygauge/field/series.hpp"
#include "dutygauge/rating.hpp"
#include "dutygauge/rating/prepared.hpp"

/// The exchanger as its readings are held against it: what it should show, and what
/// resistance would explain what it shows.
namespace dutygauge::field {

/// What a reading does not depend on the exchanger for.
struct Conditions {
  double hot_flow = 0, cold_flow = 0;  ///< [kg/s] of the whole unit
  double hot_in = 0, cold_in = 0;      ///< [K]
};

/// What may be wrong with it, all zero: clean.
struct Ailment {
  double tube_deposit = 0, shell_deposit = 0;  ///< resistances on the outside area [m2.K/W]
  double plugged = 0;                          ///< share of the tubes
  double tube_bypass = 0, shell_bypass = 0;    ///< share of the flow that passes the bundle by
  double area_lost = 0;                        ///< share of the surface that takes no part
};

/// What it then shows.
struct Response {
  double duty = 0;                   ///< [W]
  double hot_out = 0, cold_out = 0;  ///< [K]
  double tube_dp = 0, shell_dp = 0;  ///< [Pa]; 0 where no drop is known
};

/// Factor on 1/u_clean of the films, found from a clean period; 1: as computed.
struct Calibration {
  double factor = 1;
  double standard_uncertainty = 0;  ///< of the factor [-]
};

/// What a deposit does to the drops. In the tubes it narrows the bore: drop times
/// (d/(d - 2 t))^exponent with t = conductivity x resistance; turbulent friction at a given
/// flow goes as d^-4.8. On the shell side it fills gaps: drop times (1 + rise x resistance).
struct DepositOnDrops {
  double conductivity = 0.8;        ///< of the deposit [W/m.K]
  double bore = 0.0157;             ///< of a tube nobody drew [m]
  double narrowing_exponent = 4.8;  ///< [-]
  double shell_rise = 500;          ///< [W/m2.K]
  /// Standard uncertainty of the logarithm of either factor, relative to it: deposits conduct
  /// some 0.2 (from oils) to 2 W/m.K (scale), and lie unevenly. For the ranking of causes.
  double spread = 0.75;
};

/// The factor a deposit [m2.K/W, outside area] puts on the drop of the tubes' friction.
double deposit_on_tube_drop(const DepositOnDrops& rule, const geometry::Exchanger& exchanger, double deposit);

/// A problem made ready for many readings. Its own flows, inlets and fouling do not count.
struct Plant {
  explicit Plant(const rating::Problem& problem, const Calibration& calibration = {});

  rating::Prepared prepared;
  Calibration calibration;
  DepositOnDrops deposit_on_drops;
  double hot_heat_capacity_uncertainty = 0;  ///< standard, relative, of the property's source [-]
  double cold_heat_capacity_uncertainty = 0;
};

/// What the unit shows under the conditions. A by-pass mixes again at the outlet; plugging
/// leaves 1 - x of the surface and drives each open tube with 1/(1 - x) of its flow. Films are
/// those of the flow through the bundle at the means of the whole streams, which are all that
/// readings show. Empty where the conditions or the ailment cannot be, or the films do not
/// settle.
std::optional<Response> respond(const Plant& plant, const Conditions& conditions, const Ailment& ailment);

/// The same, of a problem asked once.
std::optional<Response> respond(const rating::Problem& problem, const Calibration& calibration,
                                const Conditions& conditions, const Ailment& ailment);

/// What a reading says. Missing channels are inferred from the heat balance where they can
/// be; empty where they cannot, or where no resistance of this arrangement explains it.
///
/// Duties from the fluids' enthalpies; the two weighted by their variances, whether or not
/// they agree; outlets moved to that duty; NTU by the arrangement, films at the reading's
/// own flows and mean temperatures. Both uncertainties of the fouling follow the readings
/// through the whole inversion, those of the heat capacities among the systematic ones.
/// The films' own error is in neither. No allocation.
std::optional<Apparent> apparent(const Plant& plant, const Instruments& instruments, const Channels& reading);

/// The same, of a problem asked once.
std::optional<Apparent> apparent(const rating::Problem& problem, const Calibration& calibration,
                                 const Instruments& instruments, const Channels& reading);

/// A channel as the heat balance of the other five has it.
struct Inferred {
  double value = 0;
  double random = 0, systematic = 0;  ///< standard uncertainties, absolute
};

/// A flow or a temperature, its own reading left aside. Empty where another of the six is
/// missing too, or the balance gives nothing that can be.
std::optional<Inferred> inferred(const Plant& plant, const Instruments& instruments, const Channels& reading,
                                 Channel channel);

}  // namespace dutygauge::field
