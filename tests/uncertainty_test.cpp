#include <doctest/doctest.h>

#include <boost/math/distributions/normal.hpp>
#include <cmath>
#include <numeric>

#include "dutygauge/uncertainty.hpp"
#include "support.hpp"

using namespace dutygauge;
using namespace dutygauge::uncertainty;

namespace {

const boost::math::normal standard;

double phi(double x) {
  return boost::math::cdf(standard, x);
}

/// One output of a model over all points.
std::vector<double> sampled(const Model& model, std::size_t inputs, const Sampling& sampling = {}) {
  std::vector<double> values;
  for (const auto& point : normal_points(inputs, sampling)) values.push_back((*model(point))[0]);
  return values;
}

double part_above(const std::vector<double>& values, double limit) {
  const auto count = std::ranges::count_if(values, [limit](double value) { return value > limit; });
  return static_cast<double>(count) / static_cast<double>(values.size());
}

}  // namespace

TEST_CASE("uncertainty: a linear model has the exact sigma to first order and by sampling") {
  const double weights[] = {3.0, -4.0, 12.0};
  const Model model = [&](std::span<const double> z) {
    return std::optional(std::vector{7.0 + weights[0] * z[0] + weights[1] * z[1] + weights[2] * z[2]});
  };
  const auto linear = first_order(model, 3);
  REQUIRE(linear.has_value());
  CHECK(linear->sigma[0] == doctest::Approx(13.0).epsilon(1e-12));
  CHECK(linear->share(0, 0) == doctest::Approx(9.0 / 169.0).epsilon(1e-12));
  CHECK(linear->share(2, 0) == doctest::Approx(144.0 / 169.0).epsilon(1e-12));
  const Spread spread = spread_of(sampled(model, 3));
  // 1024 points: errors of a smooth mean go as 1/N, those of a tail quantile are some 1/sqrt(N) smaller
  // steps.
  CHECK(std::abs(spread.mean - 7.0) < 0.002 * 13.0);
  CHECK(std::abs(spread.sigma - 13.0) < 0.01 * 13.0);
  CHECK(std::abs(spread.low - (7.0 - 1.644854 * 13.0)) < 0.03 * 13.0);
  CHECK(std::abs(spread.high - (7.0 + 1.644854 * 13.0)) < 0.03 * 13.0);
}

TEST_CASE("uncertainty: the probability that a sum of normals exceeds a limit is exact to sampling") {
  const Model sum = [](std::span<const double> z) {
    return std::optional(std::vector{std::accumulate(z.begin(), z.end(), 0.0)});
  };
  for (std::size_t inputs : {1u, 2u, 5u, 12u}) {
    const auto values = sampled(sum, inputs);
    for (double limit : {-2.0, -1.0, 0.0, 0.5, 1.5}) {
      CAPTURE(inputs);
      CAPTURE(limit);
      const double exact = 1.0 - phi(limit);
      const double found = part_above(values, limit * std::sqrt(static_cast<double>(inputs)));
      // A plain Monte Carlo of 1024 has a sigma of 0.0156 at one half; these points are better than that.
      CHECK(std::abs(found - exact) < 0.016);
    }
  }
}

TEST_CASE("uncertainty: a product of lognormals has the moments and quantiles of its closed form") {
  const double cvs[] = {0.1, 0.3, 0.4};
  const Model product = [&](std::span<const double> z) {
    double value = 1.0;
    for (std::size_t i = 0; i < 3; ++i)
      value *= drawn({.name = {}, .key = {}, .sigma = cvs[i], .source = {}}, z[i]);
    return std::optional(std::vector{value});
  };
  double variance_of_log = 0.0;
  for (double cv : cvs) variance_of_log += std::log1p(cv * cv);
  const double s = std::sqrt(variance_of_log);
  const Spread spread = spread_of(sampled(product, 3, {.samples = 4096}));
  CHECK(support::relative(spread.mean, std::exp(0.5 * s * s)) < 0.005);
  CHECK(support::relative(spread.sigma, std::exp(0.5 * s * s) * std::sqrt(std::expm1(s * s))) < 0.02);
  CHECK(support::relative(spread.low, std::exp(-1.6448536 * s)) < 0.01);
  CHECK(support::relative(spread.high, std::exp(1.6448536 * s)) < 0.01);
  // To first order the sigma is that of the logarithm: what sampling adds is the skew.
  CHECK(support::relative(first_order(product, 3)->sigma[0], s) < 1e-3);
}

TEST_CASE("uncertainty: a strongly bent model keeps its quantiles by sampling, not to first order") {
  // An effectiveness near its ceiling with one source: quantiles go through the model as they are.
  const Source surface{.name = {}, .key = {}, .sigma = 0.8, .source = {}};
  const auto bent = [&](double z) { return 1.0 - std::exp(-3.0 * drawn(surface, z)); };
  const Model model = [&](std::span<const double> z) { return std::optional(std::vector{bent(z[0])}); };
  const auto values = sampled(model, 1);
  const Spread spread = spread_of(values);
  CHECK(std::abs(spread.low - bent(-1.6448536)) < 0.003);
  CHECK(std::abs(spread.high - bent(1.6448536)) < 0.003);
  CHECK(std::abs(part_above(values, bent(0.7)) - (1.0 - phi(0.7))) < 0.002);
  const auto linear = first_order(model, 1);
  // Above 1, which cannot be: why probabilities come from samples.
  CHECK(linear->nominal[0] + 1.6448536 * linear->sigma[0] > 1.0);
  CHECK(spread.high < 1.0);
}

TEST_CASE("uncertainty: every distribution has mean and sigma as stated") {
  for (const auto distribution :
       {Distribution::normal, Distribution::lognormal, Distribution::uniform, Distribution::triangular}) {
    CAPTURE(static_cast<int>(distribution));
    const Source source{.name = {}, .key = {}, .sigma = 0.2, .distribution = distribution, .source = {}};
    const Model model = [&](std::span<const double> z) {
      return std::optional(std::vector{drawn(source, z[0])});
    };
    const Spread spread = spread_of(sampled(model, 1, {.samples = 4096}));
    // The lognormal has median 1 and so a mean of sqrt(1 + cv^2); its sigma is cv times that.
    const double mean = distribution == Distribution::lognormal ? std::sqrt(1.04) : 1.0;
    CHECK(std::abs(spread.mean - mean) < 0.001);
    CHECK(std::abs(spread.sigma - 0.2 * mean) < 0.001);
    CHECK(drawn(source, 0.0) == doctest::Approx(1.0).epsilon(1e-15));
    if (distribution == Distribution::uniform) {
      CHECK(drawn(source, 9.0) == doctest::Approx(1.0 + 0.2 * std::sqrt(3.0)));
      CHECK(drawn(source, -9.0) == doctest::Approx(1.0 - 0.2 * std::sqrt(3.0)));
    }
    if (distribution == Distribution::triangular)
      CHECK(drawn(source, 9.0) == doctest::Approx(1.0 + 0.2 * std::sqrt(6.0)));
  }
}

TEST_CASE("uncertainty: points are balanced in every input") {
  // The first 2^m points with a digital shift put exactly one into each interval of 2^-m.
  const auto points = normal_points(14, {.samples = 256});
  for (std::size_t input = 0; input < 14; ++input) {
    std::vector<int> in_interval(256, 0);
    for (const auto& point : points) ++in_interval[static_cast<std::size_t>(256.0 * phi(point[input]))];
    CHECK(std::ranges::count(in_interval, 1) == 256);
  }
}

TEST_CASE("uncertainty: a source without result on one side still has an effect, on neither side none") {
  const Model ends_above = [](std::span<const double> z) -> std::optional<std::vector<double>> {
    if (z[0] > 0.0) return {};
    return std::vector{5.0 + 2.0 * z[0]};
  };
  CHECK(first_order(ends_above, 1)->sigma[0] == doctest::Approx(2.0));
  const Model only_nominal = [](std::span<const double> z) -> std::optional<std::vector<double>> {
    if (z[0] != 0.0) return {};
    return std::vector{5.0};
  };
  CHECK_FALSE(first_order(only_nominal, 1).has_value());
}

TEST_CASE("uncertainty: grades begin at the probabilities they name") {
  CHECK(grade_of(1.0) == Grade::meets);
  CHECK(grade_of(0.95) == Grade::meets);
  CHECK(grade_of(0.9499) == Grade::likely);
  CHECK(grade_of(0.80) == Grade::likely);
  CHECK(grade_of(0.7999) == Grade::too_close);
  CHECK(grade_of(0.20) == Grade::too_close);
  CHECK(grade_of(0.1999) == Grade::unlikely);
  CHECK(grade_of(0.05) == Grade::unlikely);
  CHECK(grade_of(0.0499) == Grade::fails);
  CHECK(grade_of(0.0) == Grade::fails);
  CHECK_THROWS_AS(grade_of(1.01), std::invalid_argument);
  CHECK_THROWS_AS(grade_of(std::nan("")), std::invalid_argument);
  CHECK(word(Grade::too_close) == "too_close");
  CHECK(in_words(1.0) == "> 99 %");
  CHECK(in_words(0.991) == "> 99 %");
  CHECK(in_words(0.914) == "91 %");
  CHECK(in_words(0.001) == "< 1 %");
}
