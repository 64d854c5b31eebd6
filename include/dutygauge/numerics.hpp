#pragma once
#include <algorithm>
#include <boost/math/tools/toms748_solve.hpp>
#include <cmath>
#include <cstdint>
#include <optional>

/// Small numerical tools used by the physics. Every iteration stays inside the
/// interval it was given.
namespace dutygauge::numerics {

/// w^2 (3 - 2w), 0 below w = 0 and 1 above w = 1: continuous in value and slope.
inline double smoothstep(double w) {
  const double c = std::clamp(w, 0.0, 1.0);
  return c * c * (3.0 - 2.0 * c);
}

/// exp((1-s) ln low + s ln high): between two positive values on a log scale.
inline double log_blend(double low, double high, double s) {
  if (s <= 0.0) return low;
  if (s >= 1.0) return high;
  return low * std::pow(high / low, s);
}

/// log1p(u)/u, continued to 1 at u = 0.
inline double log1p_ratio(double u) {
  return std::abs(u) < 1e-8 ? 1.0 - 0.5 * u : std::log1p(u) / u;
}

struct Bracket {
  double low, high;
};

/// The root of a continuous `f` in a bracket at whose ends it has opposite signs
/// (or is zero), to an absolute `width`; empty when the signs agree or f is not
/// finite there. TOMS 748 (Alefeld, Potra & Shi 1995) by Boost.Math, which
/// throws on NaN and only returns when its evaluation limit is hit: both are
/// turned into an empty result here.
template <class F>
std::optional<double> find_root(F&& f, Bracket bracket, double width) {
  const double f_low = f(bracket.low), f_high = f(bracket.high);
  if (!std::isfinite(f_low) || !std::isfinite(f_high)) return {};
  if (f_low == 0.0) return bracket.low;
  if (f_high == 0.0) return bracket.high;
  if ((f_low > 0.0) == (f_high > 0.0)) return {};
  std::uintmax_t evaluations = 200;
  const auto narrow = [width](double a, double b) { return std::abs(b - a) <= width; };
  try {
    const auto [a, b] =
        boost::math::tools::toms748_solve(f, bracket.low, bracket.high, f_low, f_high, narrow, evaluations);
    if (!narrow(a, b) && evaluations >= 200) return {};
    return 0.5 * (a + b);
  } catch (const boost::math::evaluation_error&) {
    return {};
  }
}

}  // namespace dutygauge::numerics
