#include "dutygauge/field/forecast.hpp"

#include <algorithm>
#include <boost/math/distributions/normal.hpp>
#include <boost/random/gamma_distribution.hpp>
#include <boost/random/mersenne_twister.hpp>
#include <boost/random/normal_distribution.hpp>
#include <boost/random/uniform_01.hpp>
#include <cmath>
#include <limits>

#include "shape_fit.hpp"

namespace dutygauge::field {
namespace {

constexpr int shapes = 41;
// In lengths of the record; beyond, a curved law is a line.
constexpr double shortest_shape = 0.05, longest_shape = 5.0;
constexpr double huber = 1.345;
// Days after the record that still count as a date: nobody plans further.
constexpr double horizon = 20.0 * 365.25;

/// A law with its shape, level and rise still to be drawn.
struct Candidate {
  Law law;
  LinearFit fitted = {};
  double weight = 0;
};

struct Posterior {
  std::vector<Candidate> candidates;
  double variance = 0;  ///< of a point about the best candidate, widened for neighbours
  double n_effective = 0;
};

std::vector<Candidate> candidates_of(const Trend& cycle, const std::vector<double>& weights, double scale) {
  const double length = cycle.back().time - cycle.front().time;
  std::vector<Candidate> candidates;
  const auto add = [&](LawKind kind, double shape, double prior) {
    Candidate candidate{.law = {.kind = kind, .origin = cycle.front().time, .shape = shape}, .weight = prior};
    if (const auto fitted = fit_at_shape(cycle, weights, candidate.law, scale, huber)) {
      candidate.fitted = *fitted;
      candidates.push_back(candidate);
    }
  };
  add(LawKind::constant, 0.0, 1.0);
  add(LawKind::linear, 0.0, 1.0);
  for (const LawKind kind : {LawKind::falling, LawKind::asymptotic})
    for (int i = 0; i < shapes; ++i)
      add(kind, length * shortest_shape * std::pow(longest_shape / shortest_shape, double(i) / (shapes - 1)),
          1.0 / shapes);
  return candidates;
}

double correlation_of(const Trend& cycle, const std::vector<double>& weights, const Candidate& best,
                      double scale) {
  std::vector<double> times, residuals;
  Law law = best.law;
  law.r0 = best.fitted.r0, law.rise = best.fitted.rise;
  for (std::size_t i = 0; i < cycle.size(); ++i) {
    const double residual = (cycle[i].value - law.at(cycle[i].time)) * std::sqrt(weights[i]);
    times.push_back(cycle[i].time);
    residuals.push_back(std::clamp(residual, -3.0 * scale, 3.0 * scale));
  }
  return lag_correlation(times, residuals);
}

Posterior posterior_of(const Trend& cycle) {
  const auto weights = weights_of(cycle);
  const double scale = robust_scale(cycle);
  Posterior posterior{.candidates = candidates_of(cycle, weights, scale)};
  const auto loss_of = [](const Candidate& candidate) { return candidate.fitted.loss; };
  const Candidate& best = *std::ranges::min_element(posterior.candidates, {}, loss_of);
  const double rho = correlation_of(cycle, weights, best, scale);
  const auto n = static_cast<double>(cycle.size());
  posterior.n_effective = std::max(n * (1.0 - rho) / (1.0 + rho), 5.0);
  const double floor = n * std::pow(1e-9 * scale, 2);
  const double least = std::max(best.fitted.loss, floor);
  posterior.variance = least / (n - 3.0) * (1.0 + rho) / (1.0 - rho);
  for (Candidate& candidate : posterior.candidates) {
    const double ratio = std::max(candidate.fitted.loss, floor) / least;
    candidate.weight *= std::pow(ratio, -0.5 * posterior.n_effective);
    // One parameter less, by BIC.
    if (candidate.law.kind == LawKind::constant) candidate.weight *= std::sqrt(posterior.n_effective);
  }
  return posterior;
}

class Draws {
 public:
  Draws(const Posterior& posterior, std::uint64_t seed) : posterior_(posterior), engine_(seed) {
    for (const Candidate& candidate : posterior.candidates)
      cumulative_.push_back(candidate.weight + (cumulative_.empty() ? 0.0 : cumulative_.back()));
  }

  double normal() { return normal_(engine_); }

  Law law() {
    const double at = boost::random::uniform_01<>()(engine_) * cumulative_.back();
    const auto index =
        static_cast<std::size_t>(std::ranges::upper_bound(cumulative_, at) - cumulative_.begin());
    const Candidate& candidate = posterior_.candidates[std::min(index, cumulative_.size() - 1)];
    const double freedom = std::max(posterior_.n_effective - 2.0, 3.0);
    const double chi2 = 2.0 * boost::random::gamma_distribution<>(0.5 * freedom)(engine_);
    const double sigma = std::sqrt(posterior_.variance * freedom / chi2);
    // Cholesky factor of the 2 x 2 covariance.
    const LinearFit& f = candidate.fitted;
    const double a = std::sqrt(f.inverse_00), b = f.inverse_01 / a;
    const double c = std::sqrt(std::max(f.inverse_11 - b * b, 0.0));
    const double first = normal(), second = normal();
    Law law = candidate.law;
    law.r0 = f.r0 + sigma * a * first;
    law.rise = f.rise + sigma * (b * first + c * second);
    return law;
  }

 private:
  const Posterior& posterior_;
  boost::random::mt19937_64 engine_;
  boost::random::normal_distribution<> normal_;
  std::vector<double> cumulative_;
};

std::optional<double> quantile(const std::vector<double>& sorted, double p) {
  const auto rank = static_cast<std::size_t>(p * static_cast<double>(sorted.size() - 1) + 0.5);
  return std::isfinite(sorted[rank]) ? std::optional(sorted[rank]) : std::nullopt;
}

/// The first day on which the law, less what came at once only later, reaches the level.
std::optional<double> lost_with(const std::vector<Lift>& lifts, const Law& law, double allowed) {
  double to_come = 0.0, since = -std::numeric_limits<double>::infinity();
  for (const Lift& lift : lifts) to_come += lift.jump;
  for (const Lift& lift : lifts) {
    const auto day = law.reaches(allowed + to_come);
    if (day && *day < lift.at) return std::max(*day, since);
    since = lift.at;
    to_come -= lift.jump;
  }
  const auto day = law.reaches(allowed);
  return day ? std::optional(std::max(*day, since)) : std::nullopt;
}

LossDays days_of(const std::vector<Course>& courses) {
  std::vector<double> days;
  for (const Course& course : courses)
    days.push_back(course.lost.value_or(std::numeric_limits<double>::infinity()));
  std::ranges::sort(days);
  return {quantile(days, 0.05), quantile(days, 0.50), quantile(days, 0.95)};
}

}  // namespace

double Forecast::lost_by(double day) const {
  const auto count =
      std::ranges::count_if(courses, [day](const Course& c) { return c.lost && *c.lost <= day; });
  return courses.empty() ? 0.0 : static_cast<double>(count) / static_cast<double>(courses.size());
}

std::optional<Forecast> forecast(const Trend& cycle, const Allowed& allowed, const ForecastOptions& options) {
  if (cycle.size() < 6 || !(cycle.back().time > cycle.front().time)) return {};
  const Posterior posterior = posterior_of(cycle);
  Draws draws(posterior, options.seed);
  Forecast result{.as_of = cycle.back().time, .record = cycle.back().time - cycle.front().time};
  for (int i = 0; i < options.courses; ++i) {
    Course course{.law = draws.law(),
                  .allowed = allowed.fouling + allowed.standard_uncertainty * draws.normal()};
    course.lost = lost_with(options.lifts, course.law, course.allowed);
    if (course.lost && *course.lost > result.as_of + horizon) course.lost.reset();
    result.courses.push_back(course);
  }
  result.lost = days_of(result.courses);
  result.lost_already = result.lost.middle && *result.lost.middle <= result.as_of;
  result.beyond_record = result.lost.middle && *result.lost.middle > result.as_of + result.record;
  return result;
}

double SteadyRisk::lost_by(double day) const {
  if (!(day > 0.0)) return 0.0;
  const double deviate = (1.0 - allowed / mean_rate / day) / variation;
  return boost::math::cdf(boost::math::normal(), deviate);
}

std::optional<double> SteadyRisk::day_at(double risk) const {
  const double share = 1.0 - variation * boost::math::quantile(boost::math::normal(), risk);
  if (!(share > 0.0)) return {};
  return allowed / mean_rate / share;
}

}  // namespace dutygauge::field
