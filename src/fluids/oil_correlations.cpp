#include <algorithm>
#include <cmath>
#include <iterator>

#include "oil.hpp"

// Density: API MPMS 11.1 / ASTM D1250-80, tables 54A, B and D. Heat capacity: Kesler & Lee (1976) where the
// Watson factor is known, Cragoe (1929) where it is not. Conductivity: Cragoe, and the API form for light
// fractions. Viscosity without measurement: Twu, Ind. Eng. Chem. Process Des. Dev. 24, 1287-1293 (1985).

namespace dutygauge::fluids {
namespace {

constexpr double calorie = 4186.8;  // [J/kg.K] of one Btu/lb.degF
constexpr double ice_point = 273.15;

/// alpha = k0/rho^2 + k1/rho + k2, up to a density at 15 degC [kg/m3].
struct ExpansionBand {
  double up_to, k0, k1, k2;
};
constexpr ExpansionBand product_bands[] = {{770.9, 346.4228, 0.4388, 0.0},
                                           {788.0, 2680.3206, 0.0, -0.00336312},
                                           {838.7, 594.5418, 0.0, 0.0},
                                           {1163.9, 186.9696, 0.4862, 0.0}};
constexpr ExpansionBand crude_band{1163.9, 613.9723, 0.0, 0.0};
constexpr ExpansionBand lubricating_band{1163.9, 0.0, 0.6278, 0.0};

const ExpansionBand& band_of(OilGroup group, double density_15c) {
  if (group == OilGroup::crude) return crude_band;
  if (group == OilGroup::lubricating) return lubricating_band;
  const auto* band =
      std::ranges::find_if(product_bands, [&](const auto& b) { return density_15c <= b.up_to; });
  return band == std::end(product_bands) ? product_bands[3] : *band;
}

/// k = 0.13114 - 1.2773e-4 (t + 17.78), the form of the API data book.
constexpr std::array<double, 2> api_conductivity{0.13114 - 1.2773e-4 * (17.78 - ice_point), -1.2773e-4};

}  // namespace

double expansion_15c(OilGroup group, double density_15c) {
  const ExpansionBand& band = band_of(group, density_15c);
  return band.k0 / (density_15c * density_15c) + band.k1 / density_15c + band.k2;
}

std::array<double, 3> kesler_lee_heat_capacity(const Basis& basis) {
  const auto [sg, k] = basis;
  const double a1 = -1.17126 + (0.023722 + 0.024907 * sg) * k + (1.14982 - 0.046535 * k) / sg;
  const double a2 = 1e-4 * (1.0 + 0.82463 * k) * (1.12172 - 0.27634 / sg);
  const double a3 = -1e-8 * (1.0 + 0.82463 * k) * (2.9027 - 0.70958 / sg);
  return {calorie * a1, calorie * a2 * 1.8, calorie * a3 * 1.8 * 1.8};
}

std::array<double, 3> cragoe_heat_capacity(double specific_gravity) {
  const double root = std::sqrt(specific_gravity);
  return {(1684.8 - 3.391 * ice_point) / root, 3.391 / root, 0.0};
}

std::array<double, 2> cragoe_conductivity(double specific_gravity) {
  const double scale = 0.1172 / specific_gravity;
  return {scale * (1.0 + 0.00054 * ice_point), -scale * 0.00054};
}

std::array<double, 2> petroleum_conductivity(double specific_gravity) {
  // The API form is the better one for light fractions, Cragoe's for heavy ones.
  const double share = std::clamp((specific_gravity - 0.80) / 0.05, 0.0, 1.0);
  const auto cragoe = cragoe_conductivity(specific_gravity);
  return {share * cragoe[0] + (1.0 - share) * api_conductivity[0],
          share * cragoe[1] + (1.0 - share) * api_conductivity[1]};
}

double boiling_point(const Basis& basis) {
  const double root = basis.watson_k * basis.specific_gravity;
  return root * root * root / 1.8;
}

std::array<ViscosityPoint, 2> twu_viscosities(const BoilingCut& cut) {
  const double tb = cut.boiling_point * 1.8;  // [degR]
  const double tc = tb / (0.533272 + 0.191017e-3 * tb + 0.779681e-7 * tb * tb - 0.284376e-10 * tb * tb * tb +
                          0.959468e28 / std::pow(tb, 13));
  const double a = 1.0 - tb / tc;
  const double gravity = 0.843593 - 0.128624 * a - 3.36159 * a * a * a - 13749.5 * std::pow(a, 12);
  const double log_210 =
      std::log(std::exp(4.73227 - 27.0975 * a + 49.4491 * a * a - 50.4706 * a * a * a * a) - 1.5);
  const double log_100 = 0.801621 + 1.37179 * log_210;
  const double dsg = cut.specific_gravity - gravity, root = std::sqrt(tb);
  const double x = std::abs(1.99873 - 56.7394 / root);
  const double f_100 = 1.33932 * x * dsg - 21.1141 * dsg * dsg / root;
  const double f_210 = x * dsg - 21.1141 * dsg * dsg / root;
  const auto corrected = [&](double log_viscosity, double f) {
    const double ratio = (1.0 + 2.0 * f) / (1.0 - 2.0 * f);
    return 1e-6 * (std::exp(std::log(std::exp(log_viscosity) + 450.0 / tb) * ratio * ratio) - 450.0 / tb);
  };
  return {{{559.67 / 1.8, corrected(log_100, f_100)}, {669.67 / 1.8, corrected(log_210, f_210)}}};
}

}  // namespace dutygauge::fluids
