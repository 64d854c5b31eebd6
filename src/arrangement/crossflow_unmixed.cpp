#include <algorithm>
#include <boost/math/special_functions/gamma.hpp>
#include <cmath>
#include <numbers>

#include "shells.hpp"

namespace dutygauge::arrangement::shells {
namespace {

/// Mean of |X - Y| of two Poisson counts, as of a normal difference: the relative error
/// falls as 1/(x + y).
double mean_distance(double x, double y) {
  const double spread = std::sqrt(x + y), middle = x - y, z = middle / spread;
  return spread * std::sqrt(2.0 / std::numbers::pi) * std::exp(-0.5 * z * z) +
         middle * std::erf(z / std::numbers::sqrt2);
}

double poisson_weight(double count, double mean) {
  return boost::math::gamma_p_derivative(count + 1.0, mean);
}

/// Mean of the smaller of two Poisson counts with means `less` <= `more`: the sum over
/// m >= 0 of the chances that both exceed m.
double mean_of_smaller(double less, double more) {
  constexpr double beyond_the_series = 1e6;
  if (less > beyond_the_series) return 0.5 * (less + more - mean_distance(less, more));
  // Below `first` both exceed m for certain.
  const double first = std::max(0.0, std::floor(less - 9.0 * std::sqrt(less)));
  double weight_less = poisson_weight(first, less), weight_more = poisson_weight(first, more);
  double over_less = first > 0.0 ? 1.0 - weight_less : -std::expm1(-less);
  double over_more = first > 0.0 ? 1.0 - weight_more : -std::expm1(-more);
  double sum = first;
  // The tails end in rounding, not in 0: the terms of the lesser count say when to stop.
  for (double m = first + 1.0; m <= less + 2.0 || weight_less > 1e-18 * less; m += 1.0) {
    sum += over_less * over_more;
    weight_less *= less / m, weight_more *= more / m;
    over_less = std::max(0.0, over_less - weight_less), over_more = std::max(0.0, over_more - weight_more);
  }
  return sum;
}

}  // namespace

/// Mason's series, P = sum over m of the two Poisson tails beyond m, over R NTU.
double crossflow_unmixed(double r, double ntu) {
  if (r * ntu < 1e-300) return -std::expm1(-ntu);
  return mean_of_smaller(std::min(ntu, r * ntu), std::max(ntu, r * ntu)) / (r * ntu);
}

}  // namespace dutygauge::arrangement::shells
