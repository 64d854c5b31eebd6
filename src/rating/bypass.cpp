#include "dutygauge/rating/bypass.hpp"

#include <cmath>

namespace dutygauge::rating {
namespace {

double enthalpy(const Stream& stream, double temperature) {
  return fluids::enthalpy(stream.fluid, temperature, stream.inlet_pressure);
}

/// The stream with its change of enthalpy multiplied.
double stretched(const Stream& stream, double temperature, double factor) {
  const double inlet = enthalpy(stream, stream.inlet_temperature);
  return fluids::temperature_at(stream.fluid, inlet + factor * (enthalpy(stream, temperature) - inlet),
                                stream.inlet_pressure);
}

}  // namespace

double after_mix(const Stream& stream, double outlet, double share) {
  return stretched(stream, outlet, 1.0 - share);
}

std::optional<double> before_mix(const Stream& stream, double mixed, double share) {
  const double outlet = stretched(stream, mixed, 1.0 / (1.0 - share));
  const double back = enthalpy(stream, after_mix(stream, outlet, share)) - enthalpy(stream, mixed);
  constexpr double nothing = 1.0;  // of a stream that changes by kelvins [J/kg]
  if (!(std::abs(back) < nothing)) return {};
  return outlet;
}

}  // namespace dutygauge::rating
