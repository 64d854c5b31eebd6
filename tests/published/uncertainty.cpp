#include <algorithm>
#include <cmath>
#include <numeric>

#include "dutygauge/uncertainty.hpp"
#include "published/published.hpp"

// Uncertainties recomputed by an independent program from invented readings and an invented unit: not
// published, but the same equations solved elsewhere (central differences; scrambled Sobol points).

namespace published {
namespace {

using namespace dutygauge;

constexpr double outside_films[] = {4300.0, 3600.0};  ///< tube and shell side [W/m2.K]
constexpr double wall = 4e-5;                         ///< [m2.K/W]

arrangement::Arrangement shell(int tube_passes) {
  return {.shell_type = 'E', .tube_passes = tube_passes};
}

/// One set of readings of both streams, the hot one in the shell.
struct Readings {
  const char* name;
  int tube_passes;
  double area, hot_heat_capacity, cold_heat_capacity;
  std::vector<double>
      values;  ///< hot flow, cold flow, hot in, hot out, cold in, cold out, tube film, shell film
};

constexpr const char* inputs[] = {"hot flow",   "cold flow",   "hot inlet", "hot outlet",
                                  "cold inlet", "cold outlet", "tube film", "shell film"};

/// One standard deviation each: flows 1 %, temperatures 0.15 K systematic with 0.2 K random on
/// each of 24 readings, films 8 and 12 %.
std::vector<double> uncertainties(const std::vector<double>& x) {
  const double temperature = std::hypot(0.15, 0.2 / std::sqrt(24.0));
  return {0.01 * x[0], 0.01 * x[1], temperature, temperature,
          temperature, temperature, 0.08 * x[6], 0.12 * x[7]};
}

double hot_duty(const Readings& at, const std::vector<double>& x) {
  return x[0] * at.hot_heat_capacity * (x[2] - x[3]);
}
double cold_duty(const Readings& at, const std::vector<double>& x) {
  return x[1] * at.cold_heat_capacity * (x[5] - x[4]);
}

/// Both duties, their mean of least variance, UA and the fouling resistance that is left.
std::optional<std::vector<double>> reduced(const Readings& at, const std::vector<double>& x,
                                           double hot_weight) {
  const double hot = hot_duty(at, x), cold = cold_duty(at, x);
  const double duty = hot_weight * hot + (1.0 - hot_weight) * cold;
  const double hot_rate = x[0] * at.hot_heat_capacity, cold_rate = x[1] * at.cold_heat_capacity;
  const auto ntu =
      arrangement::ntu_for(shell(at.tube_passes), cold_rate / hot_rate, duty / (cold_rate * (x[2] - x[4])));
  if (!ntu) return {};
  const double ua = *ntu * cold_rate;
  return std::vector{hot, cold, duty, ua, at.area / ua - 1.0 / x[6] - wall - 1.0 / x[7]};
}

uncertainty::FirstOrder budget(const Readings& at, double hot_weight) {
  const std::vector<double> u = uncertainties(at.values);
  const uncertainty::Model model = [&](std::span<const double> deviates) {
    std::vector<double> x = at.values;
    for (std::size_t i = 0; i < x.size(); ++i) x[i] += u[i] * deviates[i];
    return reduced(at, x, hot_weight);
  };
  return *uncertainty::first_order(model, at.values.size());
}

/// What the other program made of them.
struct Expected {
  std::vector<double> nominal, sigma;  ///< as `reduced` gives
  double hot_weight;
  std::vector<double> sensitivity, share;  ///< of the fouling resistance, by input
};

void compare(const Readings& at, const Expected& expected, Rows& rows) {
  const std::string source = std::string("independent computation: ") + at.name;
  const auto first = budget(at, 0.5);
  const double hot_weight = 1.0 / (1.0 + std::pow(first.sigma[0] / first.sigma[1], 2));
  const auto ours = budget(at, hot_weight);
  const auto add = [&](std::string what, const char* unit, double published, double value) {
    rows.push_back({source, Known::computed, std::move(what), unit, published, value, 0.002, true, {}});
  };
  constexpr const char* outputs[] = {"duty of the hot side", "duty of the cold side", "weighted duty", "UA",
                                     "fouling resistance"};
  constexpr const char* units[] = {"W", "W", "W", "W/K", "m2.K/W"};
  for (std::size_t k = 0; k < 5; ++k) {
    add(outputs[k], units[k], expected.nominal[k], ours.nominal[k]);
    add(std::string("u of the ") + outputs[k], units[k], expected.sigma[k], ours.sigma[k]);
  }
  add("weight of the hot duty", "-", expected.hot_weight, hot_weight);
  const std::vector<double> u = uncertainties(at.values);
  for (std::size_t i = 0; i < u.size(); ++i) {
    add(std::string("sensitivity of the fouling to the ") + inputs[i], "SI", expected.sensitivity[i],
        ours.effects[i][4] / u[i]);
    // Shares are printed to three digits.
    add(std::string("share in its variance of the ") + inputs[i], "-", expected.share[i], ours.share(i, 4));
    rows.back().tolerance = 0.005;
  }
}

Rows readings() {
  Rows rows;
  compare({"readings of a 1-2 shell", 2, 210.0, 4180.0, 4180.0, {80, 110, 55, 43, 24, 32.7, 4300, 3600}},
          {{4012800, 4000260, 4008129, 203157, 0.000483349},
           {83756, 108710, 66350, 3999, 4.326e-05},
           0.62753,
           {-8.4358e-06, -3.262e-06, -3.4205e-05, 8.9109e-05, 1.7822e-05, -7.2726e-05, 5.4083e-08, 7.716e-08},
           {0.0243, 0.00688, 0.0151, 0.103, 0.0041, 0.0683, 0.185, 0.594}},
          rows);
  compare({"readings of a counterflow shell at high NTU",
           1,
           560.0,
           4190.0,
           4185.0,
           {20.0, 20.6, 90, 35, 30, 83.45, 4300, 3600}},
          {{4609000, 4607978, 4608491, 802766, 0.000147252},
           {49636, 49825, 35160, 23330, 4.322e-05},
           0.50191,
           {-1.0461e-06, -3.2848e-05, 5.5303e-05, 6.694e-05, -5.3901e-05, -6.8342e-05, 5.4083e-08, 7.716e-08},
           {2.34e-05, 0.0245, 0.0396, 0.058, 0.0376, 0.0604, 0.185, 0.595}},
          rows);
  return rows;
}

/// A 1-2 shell with both films, a fouling and both heat capacities uncertain.
std::optional<std::vector<double>> duty(std::span<const double> deviates) {
  const auto lognormal = [&](std::size_t i, double cv) {
    return uncertainty::drawn({.name = {}, .key = {}, .sigma = cv, .source = {}}, deviates[i]);
  };
  const double fouling = 3e-4 * lognormal(2, 0.35);
  const double u = 1.0 / (1.0 / (outside_films[0] * lognormal(0, 0.1)) + fouling + wall +
                          1.0 / (outside_films[1] * lognormal(1, 0.2)));
  const double hot_rate = 80.0 * 4180.0 * (1.0 + 0.01 * deviates[3]);
  const double cold_rate = 110.0 * 4180.0 * (1.0 + 0.01 * deviates[4]);
  const double p = arrangement::effectiveness(shell(2), cold_rate / hot_rate, u * 210.0 / cold_rate);
  return std::vector{p * cold_rate * (55.0 - 26.0)};
}

Rows probability() {
  const char* source = "independent computation: a 1-2 shell, scrambled Sobol, 32768 points";
  const auto linear = *uncertainty::first_order(duty, 5);
  const double z = (linear.nominal[0] - 3.9e6) / linear.sigma[0];
  std::vector<double> duties;
  for (const auto& point : uncertainty::normal_points(5, {.samples = 32768}))
    duties.push_back((*duty(point))[0]);
  const uncertainty::Spread spread = uncertainty::spread_of(duties);
  const auto met = static_cast<double>(std::ranges::count_if(duties, [](double q) { return q >= 3.9e6; }));
  const auto row = [source](const char* what, const char* unit, double published, double ours,
                            double tolerance, bool relative = true) {
    return Row{source, Known::computed, what, unit, published, ours, tolerance, relative, {}};
  };
  return {
      row("duty, nominal", "W", 4197172, linear.nominal[0], 1e-6),
      row("sigma of the duty, first order", "W", 319330, linear.sigma[0], 0.001),
      row("probability of 3.9 MW, first order", "-", 0.824, 0.5 * std::erfc(-z / std::sqrt(2.0)), 0.001,
          false),
      row("mean duty", "W", 4154600, spread.mean, 0.001),
      row("sigma of the duty", "W", 321900, spread.sigma, 0.005),
      row("probability of 3.9 MW", "-", 0.7921, met / 32768.0, 0.004, false),
      row("duty, 5 % quantile", "W", 3598700, spread.low, 0.001),
      row("duty, 95 % quantile", "W", 4655200, spread.high, 0.001),
  };
}

const Registration rows_of_readings{&readings};
const Registration rows_of_probability{&probability};

}  // namespace
}  // namespace published
