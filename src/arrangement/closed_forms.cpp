#include <cmath>
#include <initializer_list>

#include "blocks.hpp"
#include "shells.hpp"

namespace dutygauge::arrangement::shells {
namespace {

using blocks::phi, blocks::xcoth;

/// A shell branch passing one quarter of a tube pass, then the next: `inside` and the
/// result are the P of what the tube stream meets between and around the two, `e` that of
/// one. Schindler & Bates, 1 - P = (1 - e)^2 (1 - inside)/(1 - R e^2 (1 - inside)), without
/// the difference that costs digits at small P.
double loop(double inside, double e, double r) {
  const double rest = 1.0 - inside, through = 1.0 - r * e * e * rest;
  return through > 0.0 ? (inside + rest * e * (2.0 - e * (1.0 + r))) / through : 1.0;
}

}  // namespace

double e_even(int passes, double r, double ntu) {
  if (passes == 2) return ntu / (0.5 * ntu * (1.0 + r) + xcoth(0.5 * ntu * std::hypot(r, 1.0)));
  const double n = passes, g = std::hypot(r, 2.0 / n);
  return ntu / (0.5 * ntu * r + xcoth(0.5 * ntu * g) + 1.0 / phi(ntu) - xcoth(ntu / n));
}

double g_one(double r, double ntu) {
  const double p = blocks::parallel(r, 0.5 * ntu), b = blocks::counterflow(r, 0.5 * ntu);
  return p + b - p * b * (1.0 + r) + r * p * b * b;
}

double g_two(double r, double ntu) {
  const double p = blocks::parallel(2.0 * r, 0.25 * ntu), b = blocks::counterflow(2.0 * r, 0.25 * ntu);
  return loop(loop(0.0, b, 2.0 * r), p, 2.0 * r);
}

double h_one(double r, double ntu) {
  const double branch = 2.0 * r;
  const double p = blocks::parallel(branch, 0.25 * ntu), b = blocks::counterflow(branch, 0.25 * ntu);
  double upper = 0.0, lower = 0.0;
  const double above[] = {b, p, b, p}, below[] = {p, b, p, b};
  for (int quarter = 0; quarter < 4; ++quarter) {
    const double shell = 1.0 - branch * above[quarter] * (1.0 - upper);
    upper += above[quarter] * (1.0 - upper);
    lower += below[quarter] * (shell - lower);
  }
  return 0.5 * (upper + lower);
}

double h_two(double r, double ntu) {
  const double branch = 4.0 * r;
  const double p = blocks::parallel(branch, 0.125 * ntu), b = blocks::counterflow(branch, 0.125 * ntu);
  double within = 0.0;
  for (double e : {b, p, b, p}) within = loop(within, e, branch);
  return within;
}

double j_one(double r, double ntu) {
  const double p = blocks::parallel(2.0 * r, 0.5 * ntu), b = blocks::counterflow(2.0 * r, 0.5 * ntu);
  return p + b - p * b;
}

/// With a = NTU/2n, s = NTU R/2, g = a sqrt(n^2 R^2 + 1), h = g coth g, k = g/sinh g:
/// P = a n/(h + s + a W - (k^2 + 2 s k e^s)/(2(s + h))), W = n/(1 - e^-NTU) - coth(NTU/n).
double j_even(int passes, double r, double ntu) {
  const double n = passes, a = 0.5 * ntu / n, s = 0.5 * ntu * r;
  const double root = std::hypot(n * r, 1.0), g = a * root, h = xcoth(g);
  const double k = std::exp(-g) / phi(2.0 * g);
  const double k_exp_s = std::exp(-a / (n * r + root)) / phi(2.0 * g);  // s - g without cancellation
  const double a_w = 0.5 * (1.0 / phi(ntu) - xcoth(ntu / n));
  return 0.5 * ntu / (h + s + a_w - (0.5 * k * k + s * k_exp_s) / (s + h));
}

double crossflow_shell_mixed(double r, double ntu) {
  const double e = -std::expm1(-ntu);
  return e * phi(r * e);
}

double k_pool(double r, double ntu) {
  const double e = -std::expm1(-ntu);
  return e / (1.0 + r * e);
}

}  // namespace dutygauge::arrangement::shells
