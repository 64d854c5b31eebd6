#include <array>
#include <cmath>

#include "gas.hpp"
#include "limits.hpp"

// Dry air. Viscosity and conductivity: Lemmon & Jacobsen, Int. J. Thermophys. 25, 21-69 (2004),
// without the critical enhancement, which vanishes above 200 K. Composition (0.7812 N2, 0.2096 O2,
// 0.0092 Ar) and molar mass: Lemmon, Jacobsen, Penoncello & Friend, J. Phys. Chem. Ref. Data 29 (2000).

namespace dutygauge::fluids {
namespace {

constexpr double molar_mass = 28.9586;                                               // [kg/kmol]
constexpr double critical_temperature = 132.6312, critical_molar_density = 10447.7;  // [K], [mol/m3]
constexpr double collision_diameter = 0.36, collision_energy = 103.3;                // [nm], [K]
constexpr double collision_coefficients[] = {0.431, -0.4623, 0.08406, 0.005341, -0.00331};

/// N tau^t delta^d exp(-delta^l); no exponential where l is 0.
struct Term {
  double n, t;
  int d, l;
};
constexpr Term viscosity_terms[] = {{1.072e-05, 0.2, 1, 0},  // [Pa.s]
                                    {1.122e-06, 0.05, 4, 0},
                                    {2.019e-09, 2.4, 9, 0},
                                    {-8.876e-06, 0.6, 1, 1},
                                    {-2.916e-08, 3.6, 8, 1}};
constexpr Term conductivity_terms[] = {{0.008743, 0.1, 1, 0},  // [W/m.K]
                                       {0.01476, 0.0, 2, 0},   {-0.01662, 0.5, 3, 2},   {0.003793, 2.7, 7, 2},
                                       {-0.006142, 0.3, 7, 2}, {-0.0003778, 1.3, 11, 2}};

double whole_power(double x, int exponent) {
  double result = 1.0;
  for (int k = 0; k < exponent; ++k) result *= x;
  return result;
}

template <std::size_t Count>
double residual(const Term (&terms)[Count], double log_tau, double delta) {
  const double damping[] = {1.0, std::exp(-delta), std::exp(-delta * delta)};
  double sum = 0.0;
  for (const Term& term : terms)
    sum += term.n * std::exp(term.t * log_tau) * whole_power(delta, term.d) * damping[term.l];
  return sum;
}

/// Viscosity at zero density [uPa.s].
double dilute_viscosity(double temperature) {
  const double x = std::log(temperature / collision_energy);
  double exponent = 0.0;
  for (int k = 4; k >= 0; --k) exponent = exponent * x + collision_coefficients[k];
  return 0.0266958 * std::sqrt(molar_mass * temperature) /
         (collision_diameter * collision_diameter * std::exp(exponent));
}

/// Thermodynamics of the mixture, with the pseudo-critical constants of air itself.
GasThermal air_thermal() {
  const GasRow* rows[3] = {};
  for (const GasRow& row : gas_rows()) {
    if (row.formula == "N2") rows[0] = &row;
    if (row.formula == "O2") rows[1] = &row;
    if (row.formula == "Ar") rows[2] = &row;
  }
  GasThermal thermal = mixed_thermal(rows, std::array{0.7812, 0.2096, 0.0092});
  thermal.molar_mass = molar_mass * 1e-3;
  thermal.critical_temperature = 132.5306;
  thermal.critical_pressure = 3.786e6;
  thermal.acentric_factor = 0.0335;
  return thermal;
}

}  // namespace

Transport air_transport(const AirPlace& at) {
  const double log_tau = std::log(critical_temperature / at.temperature);
  const double delta = at.molar_density / critical_molar_density;
  const double dilute = dilute_viscosity(at.temperature);
  const double dilute_conductivity =
      0.001308 * dilute + 0.001405 * std::exp(-1.1 * log_tau) - 0.001036 * std::exp(-0.3 * log_tau);
  return {1e-6 * dilute + residual(viscosity_terms, log_tau, delta),
          dilute_conductivity + residual(conductivity_terms, log_tau, delta)};
}

State state_of(const AirModel& model, Phase phase, double temperature, double pressure) {
  const GasState thermal = gas_state(model.thermal, {temperature, pressure});
  const Transport transport = air_transport({temperature, thermal.density / model.thermal.molar_mass});
  return {.temperature = temperature,
          .density = thermal.density,
          .heat_capacity = thermal.heat_capacity,
          .conductivity = transport.conductivity,
          .viscosity = transport.viscosity,
          .enthalpy = thermal.enthalpy,
          .phase = phase};
}

Caloric caloric_of(const AirModel& model, Phase, double temperature, double pressure) {
  const GasState thermal = gas_state(model.thermal, {temperature, pressure});
  return {thermal.enthalpy, thermal.heat_capacity};
}

Limits reach_of(const AirModel& model) {
  return extended(model.thermal.range);
}

double phase_margin(const AirModel& model, Inlet at, bool strict) {
  return virial_margin(model.thermal, at, strict);
}

PhaseEnd phase_end(const AirModel&, Inlet) {
  return {"it departs too far from an ideal gas (give a table)", false};
}

bool freezes_at_low_end(const AirModel&) {
  return false;
}

std::vector<PropertyNote> notes_of(const AirModel& model, Phase) {
  const TemperatureRange range = model.thermal.range;
  return {{"density", "smith_van_ness_abbott", range, 0.005},
          {"heat_capacity", "nasa_tm4513", range, 0.01},
          {"conductivity", "lemmon_jacobsen_2004", range, 0.02},
          {"viscosity", "lemmon_jacobsen_2004", range, 0.01}};
}

Made make_air() {
  Made made;
  made.fluid.model = AirModel{air_thermal()};
  made.fluid.phase = Phase::gas;
  made.fluid.name = "air";
  made.fluid.source = "lemmon_jacobsen_2004";
  return made;
}

}  // namespace dutygauge::fluids
