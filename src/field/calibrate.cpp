#include "calibrate.hpp"

#include <algorithm>
#include <cmath>

#include "dutygauge/uncertainty.hpp"

namespace dutygauge::field {
namespace {

constexpr std::size_t least_points = 6;
constexpr int rounds = 30;
constexpr double huber = 1.345;      ///< scale units
constexpr double to_sigma = 1.4826;  ///< of a median absolute deviation

/// Normal equations of two unknowns with weights.
struct Sums {
  double ff = 0, ft = 0, tt = 0, fy = 0, ty = 0;

  void add(const CleanPoint& p, double weight) {
    ff += weight * p.films * p.films;
    ft += weight * p.films * p.days;
    tt += weight * p.days * p.days;
    fy += weight * p.films * p.resistance;
    ty += weight * p.days * p.resistance;
  }
  double determinant() const { return ff * tt - ft * ft; }
};

struct Line {
  double factor = 1, rate = 0;
  double residual(const CleanPoint& p) const { return p.resistance - factor * p.films - rate * p.days; }
};

Line solved(const Sums& s) {
  // Without any span of time there is no rate to tell from the factor.
  if (s.determinant() <= 1e-9 * s.ff * s.tt) return {s.fy / s.ff, 0.0};
  return {(s.fy * s.tt - s.ty * s.ft) / s.determinant(), (s.ff * s.ty - s.ft * s.fy) / s.determinant()};
}

double scale_of(const std::vector<CleanPoint>& points, const Line& line) {
  std::vector<double> sizes;
  for (const CleanPoint& p : points) sizes.push_back(std::abs(line.residual(p)));
  const auto middle = sizes.begin() + static_cast<std::ptrdiff_t>(sizes.size() / 2);
  std::ranges::nth_element(sizes, middle);
  return to_sigma * *middle;
}

/// Correlation of neighbours, by which there are fewer independent readings than readings.
double correlation_of(const std::vector<CleanPoint>& points, const Line& line) {
  double product = 0, square = 0;
  for (std::size_t i = 0; i < points.size(); ++i) {
    const double r = line.residual(points[i]);
    square += r * r;
    if (i > 0) product += r * line.residual(points[i - 1]);
  }
  return square > 0.0 ? std::clamp(product / square, 0.0, 0.95) : 0.0;
}

}  // namespace

std::optional<Calibration> calibrated(const std::vector<CleanPoint>& points) {
  if (points.size() < least_points) return {};
  Sums sums;
  for (const CleanPoint& p : points) sums.add(p, 1.0);
  Line line = solved(sums);
  double scale = scale_of(points, line);
  for (int round = 0; round < rounds && scale > 0.0; ++round) {
    sums = {};
    for (const CleanPoint& p : points) {
      const double size = std::abs(line.residual(p)) / scale;
      sums.add(p, size <= huber ? 1.0 : huber / size);
    }
    line = solved(sums);
    scale = scale_of(points, line);
  }
  const double rho = correlation_of(points, line);
  const bool has_rate = sums.determinant() > 1e-9 * sums.ff * sums.tt;
  const double variance = has_rate ? sums.tt / sums.determinant() : 1.0 / sums.ff;
  return Calibration{.factor = line.factor,
                     .standard_uncertainty = scale * std::sqrt(variance * (1.0 + rho) / (1.0 - rho))};
}

std::optional<double> film_scatter(const rating::Problem& problem) {
  const auto rated = rating::rate_mean(problem);
  if (!rated.outcome) return {};
  const overall::Resistances& parts = rated.outcome->local.resistances;
  double variance = 0.0;
  for (const uncertainty::Source& source : uncertainty::sources_of(problem, *rated.outcome)) {
    double part = 0.0;
    if (source.varied == uncertainty::Varied::film)
      part = source.side == uncertainty::Side::tube ? parts.tube_film : parts.shell_film;
    if (source.varied == uncertainty::Varied::wall_conductivity) part = parts.wall;
    variance += part * part * source.sigma * source.sigma;
  }
  return std::sqrt(variance) / parts.clean_sum();
}

}  // namespace dutygauge::field
