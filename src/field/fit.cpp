#include <algorithm>
#include <boost/math/tools/minima.hpp>
#include <cmath>
#include <limits>

#define EIGEN_MPL2_ONLY
#include <Eigen/Dense>

#include "dutygauge/field/laws.hpp"
#include "shape_fit.hpp"

namespace dutygauge::field {
namespace {

constexpr double mad_to_sigma = 1.4826;
constexpr int shape_starts = 25;
// Shapes looked through, in lengths of the record. Beyond the last a law cannot be told from a line.
constexpr double shortest_shape = 0.01, longest_shape = 20.0;

double length_of(const Trend& trend) {
  return trend.back().time - trend.front().time;
}

Law start_of(const Trend& trend, LawKind kind, double shape) {
  return {.kind = kind, .origin = trend.front().time, .shape = shape};
}

double spread_about_medians(const Trend& trend, const Law& law) {
  std::vector<double> x, y;
  for (const TrendPoint& point : trend) {
    x.push_back(growth(law.kind, law.shape, point.time - law.origin));
    y.push_back(point.value);
  }
  const Line line = theil_sen(x, y);
  for (std::size_t i = 0; i < x.size(); ++i) y[i] = std::abs(y[i] - line.level - line.slope * x[i]);
  return mad_to_sigma * median_of(y);
}

double huber_weight(double distance, double huber) {
  return distance <= huber ? 1.0 : huber / distance;
}

double huber_loss(double distance, double huber) {
  return distance <= huber ? distance * distance : huber * (2.0 * distance - huber);
}

struct Prepared {
  const Trend& trend;
  std::vector<double> weights;
  double scale, huber;
};

Prepared prepare(const Trend& trend, const FitOptions& options) {
  return {trend, weights_of(trend), robust_scale(trend), options.huber};
}

std::optional<LinearFit> at_shape(const Prepared& p, const Law& law) {
  return fit_at_shape(p.trend, p.weights, law, p.scale, p.huber);
}

/// The best shape near each local minimum of a coarse look, on a log scale.
double best_shape(const Prepared& p, LawKind kind) {
  const double length = length_of(p.trend);
  const double low = std::log(shortest_shape * length), high = std::log(longest_shape * length);
  const auto loss = [&](double log_shape) {
    const auto fitted = at_shape(p, start_of(p.trend, kind, std::exp(log_shape)));
    return fitted ? fitted->loss : std::numeric_limits<double>::max();
  };
  std::vector<double> at, losses;
  for (int i = 0; i < shape_starts; ++i) {
    at.push_back(low + (high - low) * i / (shape_starts - 1));
    losses.push_back(loss(at.back()));
  }
  double best = at.front(), best_loss = losses.front();
  for (std::size_t i = 0; i < at.size(); ++i) {
    const bool below_left = i == 0 || losses[i] <= losses[i - 1];
    const bool below_right = i + 1 == at.size() || losses[i] <= losses[i + 1];
    if (!below_left || !below_right) continue;
    const auto [x, y] = boost::math::tools::brent_find_minima(loss, i == 0 ? at[i] : at[i - 1],
                                                              i + 1 == at.size() ? at[i] : at[i + 1], 26);
    if (y < best_loss) {
      best = x;
      best_loss = y;
    }
  }
  return std::exp(best);
}

std::vector<double> residuals_of(const Prepared& p, const Law& law) {
  std::vector<double> residuals;
  for (std::size_t i = 0; i < p.trend.size(); ++i)
    residuals.push_back((p.trend[i].value - law.at(p.trend[i].time)) * std::sqrt(p.weights[i]));
  return residuals;
}

/// Derivatives of the law with respect to r0, rise and shape.
std::array<double, 3> gradient(const Law& law, double time) {
  const double t = time - law.origin;
  const double step = 1e-5 * law.shape;
  const double by_shape =
      parameters_of(law.kind) < 3
          ? 0.0
          : law.rise * (growth(law.kind, law.shape + step, t) - growth(law.kind, law.shape - step, t)) /
                (2.0 * step);
  return {1.0, growth(law.kind, law.shape, t), by_shape};
}

/// Covariance of the parameters: the scatter's variance, widened for neighbours that are alike.
void set_covariance(Fit& fit, const Prepared& p) {
  const int k = parameters_of(fit.law.kind);
  Eigen::MatrixXd normal = Eigen::MatrixXd::Zero(k, k);
  for (std::size_t i = 0; i < p.trend.size(); ++i) {
    const auto g = gradient(fit.law, p.trend[i].time);
    for (int a = 0; a < k; ++a)
      for (int b = 0; b < k; ++b)
        normal(a, b) += p.weights[i] * g[static_cast<std::size_t>(a)] * g[static_cast<std::size_t>(b)];
  }
  const Eigen::MatrixXd inverse = normal.completeOrthogonalDecomposition().pseudoInverse();
  const double variance = fit.scatter * fit.scatter * (1.0 + fit.correlation) / (1.0 - fit.correlation);
  for (int a = 0; a < k; ++a)
    for (int b = 0; b < k; ++b)
      fit.covariance[static_cast<std::size_t>(a)][static_cast<std::size_t>(b)] = variance * inverse(a, b);
  for (std::size_t a = 0; a < 3; ++a) fit.standard_error[a] = std::sqrt(std::max(fit.covariance[a][a], 0.0));
}

/// What depends on how many points the series is worth.
void set_statistics(Fit& fit, const Prepared& p, double correlation) {
  const auto n = static_cast<double>(p.trend.size());
  const int k = parameters_of(fit.law.kind);
  fit.correlation = correlation;
  fit.n_effective = std::max(n * (1.0 - correlation) / (1.0 + correlation), k + 1.0);
  // A loss of exactly zero (a series without scatter) still needs a logarithm.
  const double floor = n * std::pow(1e-12 * p.scale, 2);
  fit.bic =
      fit.n_effective * std::log(std::max(fit.loss, floor) / fit.n_effective) + k * std::log(fit.n_effective);
  fit.scatter = std::sqrt(fit.loss / (n - k));
  set_covariance(fit, p);
}

std::optional<Fit> best_of_kind(const Prepared& p, LawKind kind) {
  if (p.trend.size() < static_cast<std::size_t>(parameters_of(kind)) + 2) return {};
  Law law = start_of(p.trend, kind, parameters_of(kind) == 3 ? best_shape(p, kind) : 0.0);
  const auto fitted = at_shape(p, law);
  if (!fitted) return {};
  law.r0 = fitted->r0;
  law.rise = fitted->rise;
  return Fit{.law = law, .loss = fitted->loss};
}

double correlation_of(const Prepared& p, const Law& law) {
  std::vector<double> times, residuals = residuals_of(p, law);
  for (const TrendPoint& point : p.trend) times.push_back(point.time);
  const double far = 3.0 * p.scale;  // one bad day is no sign of correlation, nor of its absence
  for (double& residual : residuals) residual = std::clamp(residual, -far, far);
  return lag_correlation(times, residuals);
}

double detectable(const Choice& choice, std::size_t points, double length) {
  const Fit& fit = choice.best();
  const double n = static_cast<double>(points);
  // For days on which nothing was read the spacing is wider than a day.
  const double spacing = length / (n - 1.0);
  const double error = slope_error(fit.scatter, n, fit.correlation) / spacing;
  // The line wins by 2 of BIC at t^2 = ln n + 2; 1.645 more and it does so in 95 of 100 records.
  return error * (std::sqrt(std::log(fit.n_effective) + 2.0) + 1.645);
}

}  // namespace

double median_of(std::vector<double> values) {
  const auto middle = values.begin() + static_cast<std::ptrdiff_t>(values.size() / 2);
  std::ranges::nth_element(values, middle);
  if (values.size() % 2 == 1) return *middle;
  return 0.5 * (*middle + *std::max_element(values.begin(), middle));
}

Line theil_sen(const std::vector<double>& x, const std::vector<double>& y) {
  std::vector<double> slopes;
  // Two years in full; of a longer record every second day, and so on: pairs go as the square.
  const std::size_t stride = x.size() / 731 + 1;
  for (std::size_t i = 0; i < x.size(); i += stride)
    for (std::size_t j = i + stride; j < x.size(); j += stride)
      if (x[j] != x[i]) slopes.push_back((y[j] - y[i]) / (x[j] - x[i]));
  Line line;
  if (!slopes.empty()) line.slope = median_of(slopes);
  std::vector<double> levels;
  for (std::size_t i = 0; i < x.size(); ++i) levels.push_back(y[i] - line.slope * x[i]);
  if (!levels.empty()) line.level = median_of(levels);
  return line;
}

double robust_scale(const Trend& trend) {
  double scale = std::numeric_limits<double>::max(), size = 0.0;
  for (const TrendPoint& point : trend) size = std::max(size, std::abs(point.value));
  scale = spread_about_medians(trend, start_of(trend, LawKind::linear, 0.0));
  for (const double shape : {0.1, 0.3, 1.0})
    scale = std::min(
        scale, spread_about_medians(trend, start_of(trend, LawKind::asymptotic, shape * length_of(trend))));
  scale = std::min(scale, spread_about_medians(trend, start_of(trend, LawKind::root_time, 0.0)));
  return std::max(scale, std::max(1e-9 * size, 1e-300));
}

double lag_correlation(const std::vector<double>& times, const std::vector<double>& residuals) {
  const std::size_t n = times.size();
  if (n < 8) return 0.0;
  std::vector<double> steps;
  for (std::size_t i = 1; i < n; ++i) steps.push_back(times[i] - times[i - 1]);
  const double neighbour = 1.5 * median_of(steps);
  double together = 0.0, alone = 0.0;
  std::size_t pairs = 0;
  for (std::size_t i = 1; i < n; ++i)
    if (times[i] - times[i - 1] <= neighbour) {
      together += residuals[i] * residuals[i - 1];
      alone += 0.5 * (residuals[i] * residuals[i] + residuals[i - 1] * residuals[i - 1]);
      ++pairs;
    }
  if (pairs < 4 || alone <= 0.0) return 0.0;
  const auto count = static_cast<double>(n);
  // About a fitted line the expected correlation is short by (2 + 4 rho)/n.
  return std::clamp((count * together / alone + 2.0) / (count - 4.0), 0.0, 0.95);
}

std::vector<double> weights_of(const Trend& trend) {
  std::vector<double> variances;
  for (const TrendPoint& point : trend) {
    if (!(point.sigma > 0.0)) return std::vector<double>(trend.size(), 1.0);
    variances.push_back(point.sigma * point.sigma);
  }
  const double middle = median_of(variances);
  std::vector<double> weights;
  for (const double variance : variances) weights.push_back(middle / variance);
  return weights;
}

std::optional<LinearFit> fit_at_shape(const Trend& trend, const std::vector<double>& weights,
                                      const Law& shaped, double scale, double huber) {
  LinearFit fit;
  std::vector<double> g, robust(trend.size(), 1.0);
  for (const TrendPoint& point : trend)
    g.push_back(growth(shaped.kind, shaped.shape, point.time - shaped.origin));
  const bool flat = shaped.kind == LawKind::constant;
  for (int round = 0; round < 60; ++round) {
    double s = 0, sx = 0, sy = 0, sxx = 0, sxy = 0;
    for (std::size_t i = 0; i < g.size(); ++i) {
      const double w = weights[i] * robust[i];
      s += w, sx += w * g[i], sy += w * trend[i].value;
    }
    const double mean_x = sx / s, mean_y = sy / s;
    for (std::size_t i = 0; i < g.size(); ++i) {
      const double w = weights[i] * robust[i];
      sxx += w * (g[i] - mean_x) * (g[i] - mean_x);
      sxy += w * (g[i] - mean_x) * (trend[i].value - mean_y);
    }
    if (!flat && !(sxx > 0.0)) return {};
    const double rise = flat ? 0.0 : sxy / sxx, r0 = mean_y - rise * mean_x;
    fit.inverse_11 = flat ? 0.0 : 1.0 / sxx;
    fit.inverse_00 = 1.0 / s + mean_x * mean_x * fit.inverse_11;
    fit.inverse_01 = -mean_x * fit.inverse_11;
    double loss = 0.0;
    for (std::size_t i = 0; i < g.size(); ++i) {
      const double distance = std::abs(trend[i].value - r0 - rise * g[i]) * std::sqrt(weights[i]) / scale;
      robust[i] = huber_weight(distance, huber);
      loss += scale * scale * huber_loss(distance, huber);
    }
    const bool settled =
        std::abs(r0 - fit.r0) + std::abs(rise - fit.rise) * std::abs(g.back()) < 1e-7 * scale;
    fit.r0 = r0, fit.rise = rise, fit.loss = loss;
    if (settled) break;
  }
  return fit;
}

std::optional<Fit> fit(const Trend& trend, LawKind kind, const FitOptions& options) {
  if (trend.size() < 3 || !(length_of(trend) > 0.0)) return {};
  const Prepared p = prepare(trend, options);
  auto fitted = best_of_kind(p, kind);
  if (!fitted) return {};
  set_statistics(*fitted, p, options.correlation ? *options.correlation : correlation_of(p, fitted->law));
  return fitted;
}

std::optional<Choice> choose_law(const Trend& trend, const FitOptions& options) {
  if (trend.size() < 5 || !(length_of(trend) > 0.0)) return {};
  const Prepared p = prepare(trend, options);
  Choice choice;
  for (const LawKind kind :
       {LawKind::constant, LawKind::linear, LawKind::root_time, LawKind::falling, LawKind::asymptotic})
    if (auto fitted = best_of_kind(p, kind)) choice.fits.push_back(*fitted);
  // One effective number for all laws, from the residuals of the closest: those of a wrong law
  // are correlated by the law's own error.
  const Fit& closest = *std::ranges::min_element(choice.fits, {}, &Fit::loss);
  const double correlation = options.correlation ? *options.correlation : correlation_of(p, closest.law);
  for (Fit& fitted : choice.fits) set_statistics(fitted, p, correlation);
  std::ranges::stable_sort(choice.fits, {}, &Fit::bic);
  while (choice.undecided < choice.fits.size() &&
         choice.fits[choice.undecided].bic - choice.fits[0].bic < 2.0)
    ++choice.undecided;
  for (std::size_t i = 1; i < choice.undecided; ++i)
    if (parameters_of(choice.fits[i].law.kind) < parameters_of(choice.best().law.kind)) choice.chosen = i;
  choice.trend = choice.best().law.kind != LawKind::constant;
  choice.detectable_rate = detectable(choice, trend.size(), length_of(trend));
  return choice;
}

}  // namespace dutygauge::field
