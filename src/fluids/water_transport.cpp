#include <algorithm>
#include <cmath>
#include <iterator>
#include <numbers>

#include "water.hpp"

// Viscosity and thermal conductivity of water and steam.
// Sources: IAPWS R12-08 (tables 1 and 2; mu2 = 1, the form for industrial use) and
// IAPWS R15-11 (tables 1, 2 and 6, equations 14 to 25 in the form for industrial use).

namespace dutygauge::fluids::water {
namespace {

constexpr double critical_temperature = 647.096, critical_pressure = 22.064e6, critical_density = 322.0;

// R12-08: H_i of the dilute gas, H_ij of the residual factor (row i, column j).
constexpr double viscosity_dilute[] = {1.67752, 2.20462, 0.6366564, -0.241605};

constexpr double viscosity_residual[6][7] = {
    {0.520094, 0.222531, -0.281378, 0.161913, -0.0325372, 0.0, 0.0},
    {0.0850895, 0.999115, -0.906851, 0.257399, 0.0, 0.0, 0.0},
    {-1.08374, 1.88797, -0.772479, 0.0, 0.0, 0.0, 0.0},
    {-0.289555, 1.26613, -0.489837, 0.0, 0.0698452, 0.0, -0.00435673},
    {0.0, 0.0, -0.25704, 0.0, 0.0, 0.00872102, 0.0},
    {0.0, 0.120573, 0.0, 0.0, 0.0, 0.0, -0.000593264}};

// R15-11: L_k of the dilute gas, L_ij of the residual factor (row i, column j).
constexpr double conductivity_dilute[] = {0.002443221, 0.01323095, 0.006770357, -0.003454586, 0.0004096266};

constexpr double conductivity_residual[5][6] = {
    {1.60397357, -0.646013523, 0.111443906, 0.102997357, -0.0504123634, 0.00609859258},
    {2.33771842, -2.78843778, 1.53616167, -0.463045512, 0.0832827019, -0.00719201245},
    {2.19650529, -4.54580785, 3.55777244, -1.40944978, 0.275418278, -0.0205938816},
    {-1.21051378, 1.60812989, -0.621178141, 0.0716373224, 0.0, 0.0},
    {-2.720337, 4.57586331, -3.18369245, 1.1168348, -0.19268305, 0.012913842}};

// R15-11: A_ij of the compressibility at 1.5 Tc, one row for each density band and their upper ends.
constexpr double band_end[] = {0.310559006, 0.776397516, 1.242236025, 1.863354037};
constexpr double reference_compressibility[5][6] = {{6.53786807199516, -5.61149954923348, 3.39624167361325,
                                                     -2.27492629730878, 10.2631854662709, 1.97815050331519},
                                                    {6.52717759281799, -6.30816983387575, 8.08379285492595,
                                                     -9.82240510197603, 12.1358413791395, -5.54349664571295},
                                                    {5.35500529896124, -3.96415689925446, 8.91990208918795,
                                                     -12.033872950579, 9.19494865194302, -2.16866274479712},
                                                    {1.55225959906681, 0.464621290821181, 8.93237374861479,
                                                     -11.0321960061126, 6.1678099993336, -0.965458722086812},
                                                    {1.11999926419994, 0.595748562571649, 9.8895256507892,
                                                     -10.325505114704, 4.66861294457414, -0.503243546373828}};

template <std::size_t Count>
double polynomial(const double (&coefficients)[Count], double x) {
  double result = 0.0;
  for (std::size_t k = Count; k-- > 0;) result = result * x + coefficients[k];
  return result;
}

template <std::size_t Rows, std::size_t Columns>
double polynomial(const double (&coefficients)[Rows][Columns], double x, double y) {
  double result = 0.0;
  for (std::size_t k = Rows; k-- > 0;) result = result * x + polynomial(coefficients[k], y);
  return result;
}

/// Z(y) of the critical enhancement.
double crossover(double y, double heat_capacity_ratio, double reduced_density) {
  if (y < 1.2e-7) return 0.0;
  const double inverse_ratio = 1.0 / heat_capacity_ratio;
  const double outer = (1.0 - inverse_ratio) * std::atan(y) + inverse_ratio * y;
  const double inner = -std::expm1(-1.0 / (1.0 / y + y * y / (3.0 * reduced_density * reduced_density)));
  return 2.0 / (std::numbers::pi * y) * (outer - inner);
}

}  // namespace

double viscosity(const Place& at) {
  const double t = at.temperature / critical_temperature, rho = at.density / critical_density;
  const double dilute = 100.0 * std::sqrt(t) / polynomial(viscosity_dilute, 1.0 / t);
  return 1e-6 * dilute * std::exp(rho * polynomial(viscosity_residual, 1.0 / t - 1.0, rho - 1.0));
}

double background_conductivity(const Place& at) {
  const double t = at.temperature / critical_temperature, rho = at.density / critical_density;
  const double dilute = std::sqrt(t) / polynomial(conductivity_dilute, 1.0 / t);
  return 1e-3 * dilute * std::exp(rho * polynomial(conductivity_residual, 1.0 / t - 1.0, rho - 1.0));
}

double critical_conductivity(const Thermal& thermal, double temperature, double viscosity) {
  const double t = temperature / critical_temperature, rho = thermal.density / critical_density;
  const double zeta = thermal.density_by_pressure * critical_pressure / critical_density;
  const auto band = std::lower_bound(std::begin(band_end), std::end(band_end), rho) - std::begin(band_end);
  const double reference = 1.0 / polynomial(reference_compressibility[band], rho);
  const double excess = rho * (zeta - reference * 1.5 / t);
  if (!(excess > 0.0)) return 0.0;
  const double correlation_length = 0.13 * std::pow(excess / 0.06, 0.63 / 1.239);  // [nm]
  const double heat_capacity = thermal.heat_capacity / 461.51805;                  // R of this release
  return 1e-3 * 177.8514 * rho * heat_capacity * t / (viscosity * 1e6) *
         crossover(correlation_length / 0.4, thermal.heat_capacity_ratio, rho);
}

}  // namespace dutygauge::fluids::water
