#include <algorithm>
#include <cmath>

#include "dutygauge/field/changes.hpp"
#include "shape_fit.hpp"

namespace dutygauge::field {
namespace {

constexpr std::size_t least_piece = 6;
constexpr double bic_gain = 10.0;
constexpr double near = 10.0;  // days of the lines on either side
constexpr double clear = 4.0;  // standard errors
constexpr std::size_t least_near = 4;

/// Sums from which the line through any stretch follows.
class Sums {
 public:
  explicit Sums(const Trend& series) {
    parts_.resize(series.size() + 1);
    // Centred, as squares of large numbers would eat the digits of their differences.
    const double x0 = series.front().time, y0 = series.front().value;
    for (std::size_t i = 0; i < series.size(); ++i) {
      const double x = series[i].time - x0, y = series[i].value - y0;
      const Part& p = parts_[i];
      parts_[i + 1] = {p.x + x, p.y + y, p.xx + x * x, p.xy + x * y, p.yy + y * y};
    }
  }

  /// Sum of squared residuals of the line through points [from, to).
  double loss(std::size_t from, std::size_t to) const {
    const Part &a = parts_[from], &b = parts_[to];
    const auto n = static_cast<double>(to - from);
    const double x = b.x - a.x, y = b.y - a.y;
    const double xx = b.xx - a.xx - x * x / n, xy = b.xy - a.xy - x * y / n, yy = b.yy - a.yy - y * y / n;
    return std::max(yy - (xx > 0.0 ? xy * xy / xx : 0.0), 0.0);
  }

 private:
  struct Part {
    double x = 0, y = 0, xx = 0, xy = 0, yy = 0;
  };
  std::vector<Part> parts_;
};

/// Standard deviation from one point to the next, free of slow change.
double short_scatter(const Trend& series) {
  std::vector<double> differences;
  for (std::size_t i = 1; i < series.size(); ++i)
    differences.push_back(std::abs(series[i].value - series[i - 1].value));
  return 1.4826 / std::sqrt(2.0) * median_of(differences);
}

/// A line carried on to a time: value and variance for a scatter of one; empty with too few points.
struct Carried {
  double value = 0, variance = 0, loss = 0;
  std::size_t points = 0;
};

std::optional<Carried> carried_to(double time, const Trend& points) {
  if (points.size() < least_near) return {};
  const auto n = static_cast<double>(points.size());
  double x = 0, y = 0, xx = 0, xy = 0;
  for (const TrendPoint& p : points) x += p.time / n, y += p.value / n;
  for (const TrendPoint& p : points) xx += (p.time - x) * (p.time - x), xy += (p.time - x) * (p.value - y);
  const double slope = xx > 0.0 ? xy / xx : 0.0;
  Carried carried{.value = y + slope * (time - x), .variance = 1.0 / n, .points = points.size()};
  if (xx > 0.0) carried.variance += (time - x) * (time - x) / xx;
  for (const TrendPoint& p : points) carried.loss += std::pow(p.value - y - slope * (p.time - x), 2);
  return carried;
}

/// The step at a split, between its neighbours in the list of splits.
std::optional<Step> step_at(const Trend& series, std::size_t from, std::size_t split, std::size_t to,
                            double scatter) {
  const double before = series[split - 1].time, after = series[split].time, at = 0.5 * (before + after);
  Trend left, right;
  for (std::size_t i = from; i < split; ++i)
    if (series[i].time > before - near) left.push_back(series[i]);
  for (std::size_t i = split; i < to; ++i)
    if (series[i].time < after + near) right.push_back(series[i]);
  const auto a = carried_to(at, left), b = carried_to(at, right);
  if (!a || !b) return {};
  const double local = std::sqrt((a->loss + b->loss) / static_cast<double>(a->points + b->points - 4));
  return Step{.at = at,
              .jump = b->value - a->value,
              .standard_error = std::max(local, scatter) * std::sqrt(a->variance + b->variance)};
}

void find_splits(const Trend& series, std::size_t from, std::size_t to, std::vector<std::size_t>& splits) {
  const Trend piece(series.begin() + static_cast<std::ptrdiff_t>(from),
                    series.begin() + static_cast<std::ptrdiff_t>(to));
  const auto split = best_split(piece, least_piece);
  if (!split || split->bic_unsplit - split->bic <= bic_gain) return;
  const std::size_t at = from + split->index;
  find_splits(series, from, at, splits);
  splits.push_back(at);
  find_splits(series, at, to, splits);
}

}  // namespace

std::optional<Split> best_split(const Trend& series, std::size_t least) {
  if (series.size() < 2 * least || least < 2) return {};
  const Sums sums(series);
  const std::size_t n = series.size();
  Split best{.loss = -1.0, .loss_unsplit = sums.loss(0, n)};
  for (std::size_t i = least; i + least <= n; ++i) {
    const double loss = sums.loss(0, i) + sums.loss(i, n);
    if (best.loss >= 0.0 && loss >= best.loss) continue;
    best.index = i;
    best.loss = loss;
  }
  // A series without scatter has a loss of rounding errors only: no split is better than another.
  double size = 0.0;
  for (const TrendPoint& point : series) size = std::max(size, std::abs(point.value));
  const auto count = static_cast<double>(n);
  const double floor = count * std::pow(1e-7 * std::max(size, 1e-300), 2);
  best.bic = count * std::log(std::max(best.loss, floor) / count) + 5.0 * std::log(count);
  best.bic_unsplit = count * std::log(std::max(best.loss_unsplit, floor) / count) + 2.0 * std::log(count);
  return best;
}

std::vector<Step> steps(const Trend& series, double floor) {
  std::vector<Step> found;
  if (series.size() < 2 * least_piece) return found;
  std::vector<std::size_t> splits;
  find_splits(series, 0, series.size(), splits);
  const double scatter = short_scatter(series);
  // Splits of a curve stand between real ones: the lines on either side may run across them.
  std::vector<std::size_t> real = splits;
  for (bool changed = true; changed;) {
    changed = false;
    for (std::size_t i = 0; i < real.size(); ++i) {
      const std::size_t from = i == 0 ? 0 : real[i - 1],
                        to = i + 1 == real.size() ? series.size() : real[i + 1];
      const auto step = step_at(series, from, real[i], to, scatter);
      if (step && std::abs(step->jump) > std::max(floor, clear * step->standard_error)) continue;
      real.erase(real.begin() + static_cast<std::ptrdiff_t>(i));
      changed = true;
      break;
    }
  }
  for (std::size_t i = 0; i < real.size(); ++i)
    found.push_back(*step_at(series, i == 0 ? 0 : real[i - 1], real[i],
                             i + 1 == real.size() ? series.size() : real[i + 1], scatter));
  return found;
}

}  // namespace dutygauge::field
