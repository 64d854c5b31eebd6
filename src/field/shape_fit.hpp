#pragma once
#include <optional>
#include <vector>

#include "dutygauge/field/laws.hpp"

/// Internal to field: the linear part of a fit, and what is robust about it.
namespace dutygauge::field {

double median_of(std::vector<double> values);

/// Huber scale of a series: 1.4826 times the median distance from the best of some laws
/// through it by median slopes (Theil-Sen), so that bad days do not widen it.
double robust_scale(const Trend& trend);

/// Slope and level by the medians of all slopes (Sen 1968).
struct Line {
  double level = 0, slope = 0;
};
Line theil_sen(const std::vector<double>& x, const std::vector<double>& y);

/// Lag-1 correlation of residuals of points at `times`, neighbours only, corrected for what
/// a short record takes from it (Marriott & Pope, Biometrika 41, 390 (1954) [memory]); 0..0.95.
double lag_correlation(const std::vector<double>& times, const std::vector<double>& residuals);

/// r0 and rise at a fixed shape, by iteratively re-weighted least squares.
struct LinearFit {
  double r0 = 0, rise = 0;
  double loss = 0;                                        ///< as in Fit
  double inverse_00 = 0, inverse_01 = 0, inverse_11 = 0;  ///< of X'WX
};

/// Relative weights of the points: the median variance over each one's own; 1 where a sigma is missing.
std::vector<double> weights_of(const Trend& trend);

/// Needs: a scale above zero, and weights, one each point.
std::optional<LinearFit> fit_at_shape(const Trend& trend, const std::vector<double>& weights,
                                      const Law& shaped, double scale, double huber);

}  // namespace dutygauge::field
