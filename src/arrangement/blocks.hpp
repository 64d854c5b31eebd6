#pragma once
#include <algorithm>
#include <cmath>
#include <limits>

#include "dutygauge/numerics.hpp"

/// The pieces every arrangement is made of, in forms that have no singular case
/// at R = 0, R = 1, NTU = 0 or very large NTU. R and NTU as in the public header.
namespace dutygauge::arrangement::blocks {

/// (1 - exp(-x))/x, 1 at x = 0.
inline double phi(double x) {
  return std::abs(x) < 1e-9 ? 1.0 - 0.5 * x : -std::expm1(-x) / x;
}

/// x coth x, 1 at x = 0; x >= 0. Written with expm1 so that nothing overflows.
inline double xcoth(double x) {
  return x < 1e-4 ? 1.0 + x * x / 3.0 : x + 2.0 * x / std::expm1(2.0 * x);
}

/// P [-] of parallel flow.
inline double parallel(double r, double ntu) {
  return ntu * phi(ntu * (1.0 + r));
}

/// P [-] of counterflow. The textbook (1-D)/(1-RD) loses its digits near R = 1 and is
/// 0/0 there; this form does not. Above R = 1 the streams change places, so that no
/// exponential of a positive number appears.
inline double counterflow(double r, double ntu) {
  const bool swap = r > 1.0;
  const double ratio = swap ? 1.0 / r : r;
  const double f = (swap ? ntu * r : ntu) * phi((swap ? ntu * r : ntu) * (1.0 - ratio));
  const double p = f / (1.0 + ratio * f);
  return swap ? p * ratio : p;
}

/// P [-] of a train of equal shells in overall counterflow, each with `one_shell`.
/// The powers of (1-P)/(1-RP) are summed as a geometric series instead of dividing by
/// 1 - R. Source: Bowman, Mueller & Nagle (1940).
inline double counterflow_chain(double r, double one_shell, int shells) {
  const double tube = 1.0 - one_shell;                      // what the tube stream leaves undone
  const double shell = std::max(0.0, 1.0 - r * one_shell);  // and the shell stream
  if (!(tube > 0.0)) return one_shell;
  const bool tube_leads = tube <= shell;
  const double ratio = tube_leads ? tube / shell : shell / tube;
  double sum = 0.0, power = 1.0, last = 1.0;
  for (int i = 0; i < shells; ++i) {
    sum += power;
    last = power;
    power *= ratio;
  }
  const double gained = one_shell * sum;
  return gained / (gained + tube * (tube_leads ? last : 1.0));
}

/// P [-] each of `shells` equal shells must reach for the train to reach `train`;
/// needs train < 1 and R train < 1.
inline double one_of_counterflow_chain(double r, double train, int shells) {
  const double gained = train / (1.0 - train);
  const double u = gained * (1.0 - r);
  const double slope = gained * numerics::log1p_ratio(u) / shells;
  const double share = slope * phi(slope * (r - 1.0));
  return share / (1.0 + share);
}

/// P [-] of a train whose streams both enter the same shell first.
inline double parallel_chain(double r, double one_shell, int shells) {
  const double left = 1.0 - (1.0 + r) * one_shell;  // of the difference between the streams
  double sum = 0.0, power = 1.0;
  for (int i = 0; i < shells; ++i) {
    sum += power;
    power *= left;
  }
  return one_shell * sum;
}

/// The smallest P of one shell with which such a train reaches `train`; beyond equal
/// outlets only an odd number of crossing shells does, so NaN with an even number.
inline double one_of_parallel_chain(double r, double train, int shells) {
  const double left = 1.0 - (1.0 + r) * train;
  if (left > 0.0) return -std::expm1(std::log(left) / shells) / (1.0 + r);
  if (shells % 2 == 0 && left < 0.0) return std::numeric_limits<double>::quiet_NaN();
  return (1.0 + std::pow(-left, 1.0 / shells)) / (1.0 + r);
}

}  // namespace dutygauge::arrangement::blocks
