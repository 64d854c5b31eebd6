#include <array>
#include <cmath>

#include "water.hpp"

// The basic equations of regions 1 and 2 and the saturation line of IAPWS-IF97.
// Source of every number: IAPWS R7-97(2012), tables 2, 10, 11, 34 and equations 5 and 6.

namespace dutygauge::fluids::water {
namespace {

constexpr double gas_constant = 461.526;  // [J/kg.K]

struct Term {
  int i, j;
  double n;
};

// Region 1: gamma = sum n (7.1 - pi)^I (tau - 1.222)^J, pi = p/16.53 MPa, tau = 1386 K/T.
constexpr Term region1_terms[] = {
    {0, -2, 0.14632971213167},      {0, -1, -0.84548187169114},      {0, 0, -3.756360367204},
    {0, 1, 3.3855169168385},        {0, 2, -0.95791963387872},       {0, 3, 0.15772038513228},
    {0, 4, -0.016616417199501},     {0, 5, 0.00081214629983568},     {1, -9, 0.00028319080123804},
    {1, -7, -0.00060706301565874},  {1, -1, -0.018990068218419},     {1, 0, -0.032529748770505},
    {1, 1, -0.021841717175414},     {1, 3, -5.283835796993e-05},     {2, -3, -0.00047184321073267},
    {2, 0, -0.00030001780793026},   {2, 1, 4.7661393906987e-05},     {2, 3, -4.4141845330846e-06},
    {2, 17, -7.2694996297594e-16},  {3, -4, -3.1679644845054e-05},   {3, 0, -2.8270797985312e-06},
    {3, 6, -8.5205128120103e-10},   {4, -5, -2.2425281908e-06},      {4, -2, -6.5171222895601e-07},
    {4, 10, -1.4341729937924e-13},  {5, -8, -4.0516996860117e-07},   {8, -11, -1.2734301741641e-09},
    {8, -6, -1.7424871230634e-10},  {21, -29, -6.8762131295531e-19}, {23, -31, 1.4478307828521e-20},
    {29, -38, 2.6335781662795e-23}, {30, -39, -1.1947622640071e-23}, {31, -40, 1.8228094581404e-24},
    {32, -41, -9.3537087292458e-26}};

// Region 2, ideal part: ln pi + sum n tau^J, pi = p/1 MPa, tau = 540 K/T.
constexpr Term region2_ideal_terms[] = {
    {0, 0, -9.6927686500217},   {0, 1, 10.086655968018},    {0, -5, -0.005608791128302},
    {0, -4, 0.071452738081455}, {0, -3, -0.40710498223928}, {0, -2, 1.4240819171444},
    {0, -1, -4.383951131945},   {0, 2, -0.28408632460772},  {0, 3, 0.021268463753307}};

// Region 2, residual part: sum n pi^I (tau - 0.5)^J.
constexpr Term region2_residual_terms[] = {
    {1, 0, -0.0017731742473213},    {1, 1, -0.017834862292358},     {1, 2, -0.045996013696365},
    {1, 3, -0.057581259083432},     {1, 6, -0.05032527872793},      {2, 1, -3.3032641670203e-05},
    {2, 2, -0.00018948987516315},   {2, 4, -0.0039392777243355},    {2, 7, -0.043797295650573},
    {2, 36, -2.6674547914087e-05},  {3, 0, 2.0481737692309e-08},    {3, 1, 4.3870667284435e-07},
    {3, 3, -3.227767723857e-05},    {3, 6, -0.0015033924542148},    {3, 35, -0.040668253562649},
    {4, 1, -7.8847309559367e-10},   {4, 2, 1.2790717852285e-08},    {4, 3, 4.8225372718507e-07},
    {5, 7, 2.2922076337661e-06},    {6, 3, -1.6714766451061e-11},   {6, 16, -0.0021171472321355},
    {6, 35, -23.895741934104},      {7, 0, -5.905956432427e-18},    {7, 11, -1.2621808899101e-06},
    {7, 25, -0.038946842435739},    {8, 8, 1.1256211360459e-11},    {8, 36, -8.2311340897998},
    {9, 13, 1.9809712802088e-08},   {10, 4, 1.0406965210174e-19},   {10, 10, -1.0234747095929e-13},
    {10, 14, -1.0018179379511e-09}, {16, 29, -8.0882908646985e-11}, {16, 50, 0.10693031879409},
    {18, 57, -0.33662250574171},    {20, 20, 8.9185845355421e-25},  {20, 35, 3.0629316876232e-13},
    {20, 48, -4.2002467698208e-06}, {21, 21, -5.9056029685639e-26}, {22, 53, 3.7826947613457e-06},
    {23, 39, -1.2768608934681e-15}, {24, 26, 7.3087610595061e-29},  {24, 40, 5.5414715350778e-17},
    {24, 58, -9.436970724121e-07}};

// Region 4, the saturation line.
constexpr double saturation[] = {1167.0521452767,   -724213.16703206, -17.073846940092, 12020.82470247,
                                 -3232555.0322333,  14.91510861353,   -4823.2657361591, 405113.40542057,
                                 -0.23855557567849, 650.17534844798};

// Boundary between regions 2 and 3.
constexpr double boundary[] = {348.05185628969, -1.1671859879975, 0.0010192970039326, 572.54459862746,
                               13.91883977887};

/// x^Low ... x^High by multiplication: the exponents are whole and known, so no std::pow is needed.
template <int Low, int High>
class Powers {
 public:
  explicit Powers(double x) {
    table_[-Low] = 1.0;
    for (int k = 1; k <= High; ++k) table_[k - Low] = table_[k - 1 - Low] * x;
    const double inverse = 1.0 / x;
    for (int k = -1; k >= Low; --k) table_[k - Low] = table_[k + 1 - Low] * inverse;
  }
  double operator[](int k) const { return table_[k - Low]; }

 private:
  double table_[High - Low + 1];
};

/// Dimensionless Gibbs energy: its derivatives by reduced pressure and temperature.
struct Gibbs {
  double pi, tau;
  double by_pi, by_pi_pi, by_tau, by_tau_tau, by_pi_tau;
};

/// Sums of the terms weighted by I, I(I-1), J, J(J-1) and IJ: divided by the bases
/// they are the derivatives, so one pass over the terms gives all of them.
template <std::size_t Count, class PowersI, class PowersJ>
Gibbs weighted_sums(const Term (&terms)[Count], const PowersI& a, const PowersJ& b) {
  Gibbs sums{};
  for (const Term& term : terms) {
    const double value = term.n * a[term.i] * b[term.j];
    const double by_i = term.i * value, by_j = term.j * value;
    sums.by_pi += by_i;
    sums.by_pi_pi += (term.i - 1) * by_i;
    sums.by_tau += by_j;
    sums.by_tau_tau += (term.j - 1) * by_j;
    sums.by_pi_tau += term.i * by_j;
  }
  return sums;
}

Gibbs region1_gibbs(double temperature, double pressure) {
  const double pi = pressure / region1_pressure, tau = 1386.0 / temperature;
  const double a = 7.1 - pi, b = tau - 1.222;
  const Gibbs sums = weighted_sums(region1_terms, Powers<0, 32>(a), Powers<-41, 17>(b));
  return {.pi = pi,
          .tau = tau,
          .by_pi = -sums.by_pi / a,
          .by_pi_pi = sums.by_pi_pi / (a * a),
          .by_tau = sums.by_tau / b,
          .by_tau_tau = sums.by_tau_tau / (b * b),
          .by_pi_tau = -sums.by_pi_tau / (a * b)};
}

Gibbs region2_gibbs(double temperature, double pressure) {
  const double pi = pressure / region2_pressure, tau = 540.0 / temperature;
  const double b = tau - 0.5;
  const Gibbs residual = weighted_sums(region2_residual_terms, Powers<0, 24>(pi), Powers<0, 58>(b));
  const Gibbs ideal = weighted_sums(region2_ideal_terms, Powers<0, 0>(1.0), Powers<-5, 3>(tau));
  return {.pi = pi,
          .tau = tau,
          .by_pi = (1.0 + residual.by_pi) / pi,
          .by_pi_pi = (residual.by_pi_pi - 1.0) / (pi * pi),
          .by_tau = ideal.by_tau / tau + residual.by_tau / b,
          .by_tau_tau = ideal.by_tau_tau / (tau * tau) + residual.by_tau_tau / (b * b),
          .by_pi_tau = residual.by_pi_tau / (pi * b)};
}

Caloric caloric_from(const Gibbs& g, double temperature) {
  return {.enthalpy = gas_constant * temperature * g.tau * g.by_tau,
          .heat_capacity = -gas_constant * g.tau * g.tau * g.by_tau_tau};
}

Thermal thermal_from(const Gibbs& g, double temperature, double reducing_pressure) {
  const Caloric caloric = caloric_from(g, temperature);
  const double mixed = g.by_pi - g.tau * g.by_pi_tau;
  const double isochoric = caloric.heat_capacity + gas_constant * mixed * mixed / g.by_pi_pi;
  const double density = reducing_pressure / (gas_constant * temperature * g.by_pi);
  return {.density = density,
          .heat_capacity = caloric.heat_capacity,
          .enthalpy = caloric.enthalpy,
          .heat_capacity_ratio = caloric.heat_capacity / isochoric,
          .density_by_pressure = -density * g.by_pi_pi / (g.by_pi * reducing_pressure)};
}

}  // namespace

Thermal region1(double temperature, double pressure) {
  return thermal_from(region1_gibbs(temperature, pressure), temperature, region1_pressure);
}

Thermal region2(double temperature, double pressure) {
  return thermal_from(region2_gibbs(temperature, pressure), temperature, region2_pressure);
}

Caloric region1_caloric(double temperature, double pressure) {
  return caloric_from(region1_gibbs(temperature, pressure), temperature);
}

Caloric region2_caloric(double temperature, double pressure) {
  return caloric_from(region2_gibbs(temperature, pressure), temperature);
}

double saturation_pressure(double temperature) {
  const auto& n = saturation;
  const double theta = temperature + n[8] / (temperature - n[9]);
  const double a = (theta + n[0]) * theta + n[1];
  const double b = (n[2] * theta + n[3]) * theta + n[4];
  const double c = (n[5] * theta + n[6]) * theta + n[7];
  const double root = 2.0 * c / (-b + std::sqrt(b * b - 4.0 * a * c));
  return 1e6 * (root * root) * (root * root);
}

double saturation_temperature(double pressure) {
  const auto& n = saturation;
  const double beta = std::sqrt(std::sqrt(pressure * 1e-6));
  const double e = (beta + n[2]) * beta + n[5];
  const double f = (n[0] * beta + n[3]) * beta + n[6];
  const double g = (n[1] * beta + n[4]) * beta + n[7];
  const double d = 2.0 * g / (-f - std::sqrt(f * f - 4.0 * e * g));
  const double sum = n[9] + d;
  return 0.5 * (sum - std::sqrt(sum * sum - 4.0 * (n[8] + n[9] * d)));
}

double boundary_temperature(double pressure) {
  return boundary[3] + std::sqrt((pressure * 1e-6 - boundary[4]) / boundary[2]);
}

}  // namespace dutygauge::fluids::water
