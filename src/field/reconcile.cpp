#include "dutygauge/field/reconcile.hpp"

#include <Eigen/Dense>
#include <algorithm>
#include <boost/math/distributions/chi_squared.hpp>
#include <boost/math/distributions/normal.hpp>
#include <cmath>
#include <utility>

#include "balance.hpp"

namespace dutygauge::field {
namespace {

constexpr int most_data = static_cast<int>(datum_count);
using Vector = Eigen::Matrix<double, Eigen::Dynamic, 1, 0, most_data, 1>;
using Matrix = Eigen::Matrix<double, Eigen::Dynamic, Eigen::Dynamic, 0, most_data, most_data>;

/// How much less a datum counts that is missing or removed.
constexpr double free_factor = 1e4;

/// Data with their uncertainties; the free ones have theirs widened.
struct Problem {
  const Plant* plant;
  Vector y, u;
  int constraints;
  int free = 0;
};

double heat(const rating::Stream& stream, double warm, double cool) {
  return fluids::enthalpy(stream.fluid, warm, stream.inlet_pressure) -
         fluids::enthalpy(stream.fluid, cool, stream.inlet_pressure);
}

double hot_duty(const Plant& plant, const Vector& x) {
  return x[0] * heat(hot_stream(plant), x[2], x[3]);
}

/// The exchanger's duty at the flows, ends and UA of `x`.
double exchanger_duty(const Plant& plant, const Vector& x, double hot, double cold) {
  const double hot_rate = hot / (x[2] - x[3]), cold_rate = cold / (x[5] - x[4]);
  const auto [tube, shell] =
      plant.prepared.shell_side_is_hot() ? std::pair{cold_rate, hot_rate} : std::pair{hot_rate, cold_rate};
  if (!(tube > 0.0 && shell > 0.0 && x[6] > 0.0)) return std::nan("");
  return arrangement::effectiveness(plant.prepared.arrangement(), tube / shell, x[6] / tube) * tube *
         (x[2] - x[4]);
}

/// Balance and, with UA among the data, the exchanger's relation [W]; zero where consistent.
Vector constraints(const Problem& problem, const Vector& x) {
  const Plant& plant = *problem.plant;
  const double hot = hot_duty(plant, x), cold = x[1] * heat(cold_stream(plant), x[5], x[4]);
  Vector g(problem.constraints);
  g[0] = hot - cold;
  if (problem.constraints == 2) g[1] = hot - exchanger_duty(plant, x, hot, cold);
  return g;
}

Matrix jacobian(const Problem& problem, const Vector& x) {
  Matrix a(problem.constraints, x.size());
  for (Eigen::Index i = 0; i < x.size(); ++i) {
    // Temperature differences are some 10 K where temperatures are some 300 K.
    const double step = i >= 2 && i < 6 ? 1e-3 : 1e-5 * std::abs(x[i]);
    Vector more = x, less = x;
    more[i] += step, less[i] -= step;
    a.col(i) = (constraints(problem, more) - constraints(problem, less)) / (2.0 * step);
  }
  return a;
}

double upper_tail(double objective, int degrees_of_freedom) {
  if (degrees_of_freedom < 1) return 1.0;
  const boost::math::chi_squared_distribution<double> chi_squared(degrees_of_freedom);
  return boost::math::cdf(boost::math::complement(chi_squared, objective));
}

Reconciled outcome_of(const Problem& problem, const Vector& x, const Matrix& a) {
  const Vector variance = problem.u.cwiseAbs2();
  const Matrix v = variance.asDiagonal();
  const Matrix moved = v * a.transpose() * (a * v * a.transpose()).inverse() * a * v;
  Reconciled r;
  for (Eigen::Index i = 0; i < x.size(); ++i) {
    const auto at = static_cast<std::size_t>(i);
    const double move = x[i] - problem.y[i];
    r.value[at] = x[i];
    r.standard_uncertainty[at] = std::sqrt(std::max(0.0, variance[i] - moved(i, i)));
    r.measurement_test[at] = moved(i, i) > 1e-20 * variance[i] ? move / std::sqrt(moved(i, i)) : 0.0;
    r.objective += move * move / variance[i];
  }
  r.duty = hot_duty(*problem.plant, x);
  r.degrees_of_freedom = problem.constraints - problem.free;
  r.p_value = upper_tail(r.objective, r.degrees_of_freedom);
  return r;
}

std::optional<Reconciled> solve(const Problem& problem) {
  if (problem.free > problem.constraints) return {};
  const Matrix v = problem.u.cwiseAbs2().asDiagonal();
  Vector x = problem.y;
  for (int pass = 0; pass < 200; ++pass) {
    const Matrix a = jacobian(problem, x);
    const Vector wrong = a * (problem.y - x) + constraints(problem, x);
    const Vector next = problem.y - v * a.transpose() * (a * v * a.transpose()).fullPivLu().solve(wrong);
    if (!next.allFinite()) return {};
    const bool stands = ((next - x).array().abs() < 1e-9 * problem.u.array()).all();
    x = next;
    if (stands) return outcome_of(problem, x, jacobian(problem, x));
  }
  return {};
}

void set_free(Problem& problem, std::size_t datum) {
  problem.u[static_cast<Eigen::Index>(datum)] *= free_factor;
  ++problem.free;
}

/// Missing data begin at what the balance gives for them.
std::optional<Problem> problem_of(const Plant& plant, const ToReconcile& data) {
  const auto balance = balance_of(plant, data.reading);
  if (!balance) return {};
  const int count = data.ua ? 7 : 6;
  Problem problem{&plant, Vector(count), Vector(count), data.ua ? 2 : 1};
  const std::array<double, ua_datum> filled = {balance->hot_flow, balance->cold_flow, balance->hot_in,
                                               balance->hot_out,  balance->cold_in,   balance->cold_out};
  for (std::size_t i = 0; i < ua_datum; ++i) {
    problem.y[static_cast<Eigen::Index>(i)] = filled[i];
    problem.u[static_cast<Eigen::Index>(i)] = data.standard_uncertainty[i];
  }
  if (data.ua) problem.y[6] = data.ua->value, problem.u[6] = data.ua->standard_uncertainty;
  if (!(problem.u.array() > 0.0).all()) return {};
  if (balance->missing) set_free(problem, index_of(*balance->missing));
  return problem;
}

/// Data whose measurement test fails at the level of all together, the worst first.
std::vector<std::size_t> failing_tests(const Reconciled& r, std::size_t count, double level) {
  const double each = -std::expm1(std::log1p(-level) / static_cast<double>(count));
  const double limit =
      boost::math::quantile(boost::math::complement(boost::math::normal_distribution<double>(), 0.5 * each));
  std::vector<std::size_t> failing;
  for (std::size_t i = 0; i < count; ++i)
    if (std::abs(r.measurement_test[i]) > limit) failing.push_back(i);
  std::ranges::stable_sort(failing, [&](std::size_t a, std::size_t b) {
    return std::abs(r.measurement_test[a]) > std::abs(r.measurement_test[b]);
  });
  return failing;
}

std::optional<Reconciled> solve_without(Problem problem, std::size_t datum) {
  set_free(problem, datum);
  return solve(problem);
}

bool is_in(const std::vector<std::size_t>& list, std::size_t datum) {
  return std::ranges::find(list, datum) != list.end();
}

/// Removes the datum that helps most, one after another, while the rest disagrees.
void eliminate(Problem problem, double level, GrossErrors& errors) {
  errors.rest = errors.all;
  const auto count = static_cast<std::size_t>(problem.y.size());
  while (errors.rest->p_value < level && problem.free < problem.constraints) {
    std::optional<Reconciled> best;
    std::size_t removed = 0;
    for (std::size_t i = 0; i < count; ++i) {
      if (is_in(errors.eliminated, i)) continue;
      const auto without = solve_without(problem, i);
      if (without && (!best || without->objective < best->objective)) best = without, removed = i;
    }
    if (!best) return;
    errors.eliminated.push_back(removed);
    errors.rest = best;
    set_free(problem, removed);
  }
}

}  // namespace

std::optional<UaDatum> ua_from(const Plant& plant, const Channels& reading, const TrendedFouling& fouling) {
  const auto a = apparent(plant, {}, reading);
  if (!a) return {};
  const double resistance = 1.0 / a->u_clean + fouling.value;
  if (!(resistance > 0.0)) return {};
  const double ua = plant.prepared.problem().exchanger.area / resistance;
  return UaDatum{ua, ua * fouling.standard_uncertainty / resistance};
}

std::optional<Reconciled> reconcile(const Plant& plant, const ToReconcile& data) {
  const auto problem = problem_of(plant, data);
  if (!problem) return {};
  return solve(*problem);
}

std::optional<GrossErrors> find_gross_errors(const Plant& plant, const ToReconcile& data, double level) {
  const auto problem = problem_of(plant, data);
  if (!problem) return {};
  const auto all = solve(*problem);
  if (!all) return {};
  GrossErrors errors;
  errors.all = *all;
  errors.detected = all->p_value < level;
  const auto count = static_cast<std::size_t>(problem->y.size());
  if (!errors.detected) {
    errors.rest = all;
    return errors;
  }
  errors.failing = failing_tests(*all, count, level);
  double lowest = all->objective;
  for (std::size_t i = 0; i < count; ++i) {
    const auto without = solve_without(*problem, i);
    if (!without) continue;
    errors.objective_without[i] = without->objective;
    lowest = std::min(lowest, without->objective);
  }
  constexpr double no_different = 3.84;  // chi-square of one degree of freedom, 5 %
  for (std::size_t i = 0; i < count; ++i)
    if (errors.objective_without[i] && *errors.objective_without[i] <= lowest + no_different)
      errors.inseparable.push_back(i);
  std::ranges::stable_sort(errors.inseparable, [&](std::size_t a, std::size_t b) {
    return *errors.objective_without[a] < *errors.objective_without[b];
  });
  eliminate(*problem, level, errors);
  return errors;
}

}  // namespace dutygauge::field
