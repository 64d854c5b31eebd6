#pragma once
#include <optional>

#include "dutygauge/field/series.hpp"
#include "dutygauge/rating.hpp"

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
  double duty = 0;                         ///< [W]
  double hot_out = 0, cold_out = 0;        ///< [K]
  double tube_dp = 0, shell_dp = 0;        ///< [Pa]; 0 where no drop is known
};

/// Factor on 1/u_clean of the films, found from a clean period; 1: as computed.
struct Calibration {
  double factor = 1;
  double standard_uncertainty = 0;  ///< of the factor [-]
};

/// What the unit shows under the conditions. Empty where the films do not settle.
std::optional<Response> respond(const rating::Problem& problem, const Calibration& calibration,
                                const Conditions& conditions, const Ailment& ailment);

/// What a reading says. Missing channels are inferred from the heat balance where they can
/// be; empty where they cannot, or where no resistance of this arrangement explains it.
std::optional<Apparent> apparent(const rating::Problem& problem, const Calibration& calibration,
                                 const Instruments& instruments, const Channels& reading);

}  // namespace dutygauge::field
