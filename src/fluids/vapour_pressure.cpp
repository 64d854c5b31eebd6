#include <cmath>

#include "equations.hpp"

namespace dutygauge::fluids {

double log_reduced_vapour_pressure(double reduced_temperature, double acentric_factor) {
  const double t = reduced_temperature, log_t = std::log(t), t6 = t * t * t * t * t * t;
  const double simple = 5.92714 - 6.09648 / t - 1.28862 * log_t + 0.169347 * t6;
  const double correction = 15.2518 - 15.6875 / t - 13.4721 * log_t + 0.43577 * t6;
  return simple + acentric_factor * correction;
}

}  // namespace dutygauge::fluids
