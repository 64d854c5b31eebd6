#include "nodes.hpp"

#include <boost/math/special_functions/legendre.hpp>

namespace dutygauge::arrangement::network {
namespace {

/// Ascending on [-1, 1].
std::vector<double> gauss_points(int count) {
  std::vector<double> points;
  const auto zeros = boost::math::legendre_p_zeros<double>(count);
  for (auto zero = zeros.rbegin(); zero != zeros.rend(); ++zero)
    if (*zero > 0.0) points.push_back(-*zero);
  points.insert(points.end(), zeros.begin(), zeros.end());
  return points;
}

}  // namespace

Nodes gauss_nodes(int count) {
  const std::vector<double> points = gauss_points(count);
  // By Legendre polynomials: the values give the coefficients, whose integrals are known,
  // (2k+1) int_-1^x P_k = P_k+1 - P_k-1. On the way to [0, 1] everything is halved.
  Matrix coefficients(count, count), integrals(count, count);
  Vector weight(count);
  for (int i = 0; i < count; ++i) {
    const double x = points[static_cast<std::size_t>(i)];
    const double slope = boost::math::legendre_p_prime(count, x);
    weight(i) = 1.0 / ((1.0 - x * x) * slope * slope);
    for (int k = 0; k < count; ++k) {
      coefficients(k, i) = (2 * k + 1) * boost::math::legendre_p(k, x) * weight(i);
      const double below = k == 0 ? -1.0 : boost::math::legendre_p(k - 1, x);
      integrals(i, k) = 0.5 * (boost::math::legendre_p(k + 1, x) - below) / (2 * k + 1);
    }
  }
  return {weight, integrals * coefficients};
}

Nodes stirred() {
  return {Vector::Ones(1), Matrix::Ones(1, 1)};
}

}  // namespace dutygauge::arrangement::network
