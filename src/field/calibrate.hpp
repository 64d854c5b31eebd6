#pragma once
#include <cstdint>
#include <optional>
#include <vector>

#include "dutygauge/field/plant.hpp"

/// The factor on the clean resistance that makes the unit clean when it was.
namespace dutygauge::field {

/// One reading of the time when the unit was clean, or nearly.
struct CleanPoint {
  double days = 0;        ///< since its beginning
  double resistance = 0;  ///< 1/u [m2.K/W]
  double films = 0;       ///< 1/u_clean as computed [m2.K/W]
};

/// 1/u = factor/u_clean + rate t by least absolute-like squares (Huber), so that a unit that fouls
/// from its first day is clean at its beginning. Empty with fewer than 6 points.
std::optional<Calibration> calibrated(const std::vector<CleanPoint>& points);

/// Standard uncertainty of 1/u_clean as the methods give it, relative [-]; empty where the
/// case's own state cannot be rated.
std::optional<double> film_scatter(const rating::Problem& problem);

}  // namespace dutygauge::field
