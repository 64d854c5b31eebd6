#include <array>
#include <cmath>

#include "gas.hpp"
#include "water.hpp"

namespace dutygauge::fluids {
namespace {

double dilute(const DiluteFit& fit, double temperature, double log_temperature) {
  return fit.c1 * std::exp(fit.c2 * log_temperature) /
         (1.0 + fit.c3 / temperature + fit.c4 / (temperature * temperature));
}

}  // namespace

Transport dilute_transport(const GasRow& row, double temperature) {
  if (row.viscosity.c1 == 0.0) {  // water vapour, which the handbook's fit does not cover well
    const water::Place place{temperature, 0.0};
    return {water::viscosity(place), water::background_conductivity(place)};
  }
  const double log_temperature = std::log(temperature);
  return {dilute(row.viscosity, temperature, log_temperature),
          dilute(row.conductivity, temperature, log_temperature)};
}

Transport mixed_transport(std::span<const Component> components) {
  if (components.size() == 1) return components[0].transport;
  Transport mixed{0.0, 0.0};
  for (const Component& i : components) {
    double weight = 0.0;
    for (const Component& j : components) {
      const double mass_ratio = i.molar_mass / j.molar_mass;
      const double root =
          1.0 + std::sqrt(i.transport.viscosity / j.transport.viscosity / std::sqrt(mass_ratio));
      weight += j.mole_fraction * root * root / std::sqrt(8.0 * (1.0 + mass_ratio));
    }
    mixed.viscosity += i.mole_fraction * i.transport.viscosity / weight;
    mixed.conductivity += i.mole_fraction * i.transport.conductivity / weight;
  }
  return mixed;
}

}  // namespace dutygauge::fluids
