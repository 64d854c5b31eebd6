#include <doctest/doctest.h>

#include <cmath>
#include <limits>
#include <vector>

#include "dutygauge/field/laws.hpp"
#include "field_series.hpp"
#include "support.hpp"

using namespace dutygauge::field;

namespace {

constexpr double infinite = std::numeric_limits<double>::infinity();

/// Plain least squares, independent points: what the independent program computed.
const FitOptions plain{.huber = infinite, .correlation = 0.0};

/// Both series in 1e-6 m2.K/W, made by an independent program: see the values' `how`.
const std::vector<double> day_1 = {0,   6,   12,  18,  24,  30,  36,  42,  48,  54,  60,  66,
                                   72,  78,  84,  90,  96,  102, 108, 114, 120, 126, 132, 138,
                                   144, 150, 156, 162, 168, 174, 180, 186, 192, 198, 204, 210};
const std::vector<double> fouling_1 = {
    20.41,  67.32,  93.5,   97.61,  122.51, 139.8,  170.93, 179.54, 203.62, 185.44, 238.03, 228.48,
    247.14, 245.72, 250.31, 267.15, 277.52, 270.61, 276.06, 290.48, 275.71, 271.48, 297.52, 287.55,
    275.08, 290.61, 296.8,  289.91, 287.95, 307.76, 319.4,  307.01, 301.93, 316.42, 321.26, 309.81};
const std::vector<double> day_2 = {0,      6.21,   12.41,  18.62,  24.83,  31.03,  37.24,  43.45,
                                   49.66,  55.86,  62.07,  68.28,  74.48,  80.69,  86.9,   93.1,
                                   99.31,  105.52, 111.72, 117.93, 124.14, 130.34, 136.55, 142.76,
                                   148.97, 155.17, 161.38, 167.59, 173.79, 180.0};
const std::vector<double> fouling_2 = {39.93,  58.41,  63.23,  70.86,  87.55,  66.97,  80.36,  80.96,
                                       100.56, 119.02, 116.15, 128.6,  111.73, 139.46, 136.0,  169.84,
                                       167.91, 175.43, 172.19, 185.67, 192.84, 189.46, 194.53, 204.89,
                                       206.47, 213.0,  222.47, 224.34, 245.53, 228.11};

Trend trend_of(const std::vector<double>& days, const std::vector<double>& values) {
  Trend trend;
  for (std::size_t i = 0; i < days.size(); ++i) trend.push_back({.time = days[i], .value = values[i]});
  return trend;
}

struct Row {
  LawKind kind;
  double r0, rise, shape, loss, bic;
  double rise_error, shape_error;  ///< 0: not given
};

void check_rows(const Trend& trend, const std::vector<Row>& rows) {
  for (const Row& row : rows) {
    CAPTURE(name_of(row.kind));
    const auto fitted = fit(trend, row.kind, plain);
    REQUIRE(fitted);
    CHECK(support::relative(fitted->law.r0, row.r0) < 1e-4);
    CHECK(support::relative(fitted->law.rise, row.rise) < 1e-4);
    CHECK(support::relative(fitted->loss, row.loss) < 1e-4);
    CHECK(support::relative(fitted->bic, row.bic) < 1e-4);
    if (row.shape == 0.0) continue;
    CHECK(support::relative(fitted->law.shape, row.shape) < 1e-4);
    // Printed to three figures there.
    CHECK(support::relative(fitted->standard_error[1], row.rise_error) < 5e-3);
    CHECK(support::relative(fitted->standard_error[2], row.shape_error) < 5e-3);
  }
}

}  // namespace

TEST_CASE("field: laws fit an asymptotic record as an independent program does") {
  // kern-seaton-1. How: "linear least squares, and multistart Levenberg-type least squares for the
  // asymptotic law; data made with amplitude 300, tau 55, r0 20, noise sd 12".
  const Trend trend = trend_of(day_1, fouling_1);
  check_rows(trend, {{LawKind::linear, 121.8547, 1.122119, 0, 43676.31, 262.805, 0, 0},
                     {LawKind::asymptotic, 26.5145, 288.547, 54.4663, 3453.685, 175.043, 6.39, 3.17},
                     {LawKind::root_time, 40.64958, 20.77498, 0, 14366.66, 222.776, 0, 0}});
  const auto flat = fit(trend, LawKind::constant, plain);
  REQUIRE(flat);
  CHECK(support::relative(flat->law.r0, 239.6772) < 1e-4);
  CHECK(support::relative(flat->bic, 317.391) < 1e-4);
  const auto choice = choose_law(trend, plain);
  REQUIRE(choice);
  CHECK(choice->best().law.kind == LawKind::asymptotic);
  CHECK(choice->undecided == 1);
  CHECK(asymptote_identified(choice->best(), 210.0));
}

TEST_CASE("field: a record of a quarter of its time constant does not show where it ends") {
  // kern-seaton-2, same program; data made with amplitude 900, tau 700, r0 40, noise sd 10.
  const Trend trend = trend_of(day_2, fouling_2);
  check_rows(trend, {{LawKind::linear, 48.13825, 1.091971, 0, 2532.666, 139.877, 0, 0},
                     {LawKind::asymptotic, 42.5843, 682.961, 529.23, 2308.862, 140.503, 365.0, 337.0},
                     {LawKind::root_time, -2.510499, 16.82189, 0, 7113.27, 170.858, 0, 0}});
  const auto choice = choose_law(trend, plain);
  REQUIRE(choice);
  CHECK(choice->best().law.kind == LawKind::linear);
  CHECK(choice->undecided > 1);
  const auto asymptotic = fit(trend, LawKind::asymptotic, plain);
  CHECK_FALSE(asymptote_identified(*asymptotic, 180.0));
}

TEST_CASE("field: laws without scatter give their parameters back") {
  for (const Law law :
       {Law{LawKind::linear, 3.0, 2e-5, 1e-6, 0.0}, Law{LawKind::root_time, 3.0, 1e-5, 2e-5, 0.0},
        Law{LawKind::falling, 3.0, 1e-5, 8e-5, 25.0}, Law{LawKind::asymptotic, 3.0, 1e-5, 3e-4, 60.0}}) {
    CAPTURE(name_of(law.kind));
    Trend trend;
    for (int day = 0; day < 150; ++day) trend.push_back({.time = 3.0 + day, .value = law.at(3.0 + day)});
    const auto fitted = fit(trend, law.kind);
    REQUIRE(fitted);
    CHECK(fitted->law.rise == doctest::Approx(law.rise).epsilon(1e-3));
    CHECK(fitted->law.shape == doctest::Approx(law.shape).epsilon(1e-3));
    // The rate is the derivative, and the level is reached when the law says so.
    const double later = 400.0, step = 1e-4;
    CHECK(law.rate_at(later) ==
          doctest::Approx((law.at(later + step) - law.at(later - step)) / (2 * step)).epsilon(1e-5));
    const auto at = law.reaches(law.at(later));
    REQUIRE(at);
    CHECK(*at == doctest::Approx(later).epsilon(1e-9));
  }
}

TEST_CASE("field: a deposit that ends below a level never reaches it") {
  const Law law{LawKind::asymptotic, 0.0, 1e-5, 3e-4, 60.0};
  CHECK_FALSE(law.reaches(3.2e-4));
  CHECK(law.reaches(3.0e-4));
  CHECK(law.reaches(0.5e-5).value() == 0.0);
  CHECK_FALSE(Law{LawKind::linear, 0.0, 1e-5, -1e-7, 0.0}.reaches(1e-4));
}

TEST_CASE("field: bad days do not bend a law") {
  series::Noise noise(11, 3e-6, 0.0);
  Trend trend;
  for (int day = 0; day < 120; ++day) trend.push_back({.time = day + 0.5, .value = 1e-6 * day + noise()});
  for (const std::size_t bad : {20u, 21u, 60u, 100u, 101u, 102u}) trend[bad].value -= 2e-4;
  const auto robust = fit(trend, LawKind::linear), least_squares = fit(trend, LawKind::linear, plain);
  REQUIRE(robust);
  CHECK(robust->law.rise == doctest::Approx(1e-6).epsilon(0.05));
  CHECK(std::abs(least_squares->law.rise / 1e-6 - 1.0) > 0.05);  // without it they do
}

TEST_CASE("field: a day that is known less well counts less") {
  Trend trend;
  for (int day = 0; day < 30; ++day) trend.push_back({.time = double(day), .value = 0.0, .sigma = 1.0});
  for (int day = 30; day < 40; ++day) trend.push_back({.time = double(day), .value = 1.0, .sigma = 100.0});
  const auto weighted = fit(trend, LawKind::constant, plain);
  REQUIRE(weighted);
  CHECK(weighted->law.r0 < 1e-4);
  CHECK(weighted->law.r0 > 0.0);
}

TEST_CASE("field: a series without fouling says what would have been seen") {
  int found = 0, seen = 0;
  for (std::uint64_t seed = 1; seed <= 100; ++seed) {
    series::Noise noise(seed, 4e-6, 0.3);
    Trend flat, rising;
    for (int day = 0; day < 200; ++day) flat.push_back({.time = day + 0.5, .value = 5e-5 + noise()});
    const auto choice = choose_law(flat);
    REQUIRE(choice);
    found += choice->trend;
    rising = flat;
    for (TrendPoint& point : rising) point.value += choice->detectable_rate * point.time;
    seen += choose_law(rising)->trend;
  }
  CHECK(found <= 5);
  CHECK(seen >= 90);
}

TEST_CASE("field: neighbouring days that are alike are worth fewer") {
  for (const double rho : {0.0, 0.4, 0.7}) {
    CAPTURE(rho);
    double sum = 0.0;
    for (std::uint64_t seed = 1; seed <= 40; ++seed) {
      series::Noise noise(seed, 1.0, rho);
      Trend trend;
      for (int day = 0; day < 120; ++day)
        trend.push_back({.time = double(day), .value = 0.05 * day + noise()});
      const auto fitted = fit(trend, LawKind::linear);
      sum += fitted->correlation;
      CHECK(fitted->n_effective ==
            doctest::Approx(120.0 * (1 - fitted->correlation) / (1 + fitted->correlation)));
    }
    CHECK(sum / 40.0 == doctest::Approx(rho).epsilon(0.05).scale(1.0));
  }
}

TEST_CASE("field: the error of a slope is what repeated records show") {
  // Against brute force: the spread of fitted slopes.
  CHECK(slope_error(1.0, 100.0, 0.0) == doctest::Approx(std::sqrt(12.0 / (100.0 * 9999.0))));
  CHECK(slope_error(2.0, 100.0, 0.6) == doctest::Approx(4.0 * slope_error(1.0, 100.0, 0.0)));
  double square = 0.0, claimed = 0.0;
  for (std::uint64_t seed = 1; seed <= 300; ++seed) {
    series::Noise noise(seed, 1.0, 0.5);
    Trend trend;
    for (int day = 0; day < 150; ++day) trend.push_back({.time = double(day), .value = noise()});
    const auto fitted = fit(trend, LawKind::linear);
    square += fitted->law.rise * fitted->law.rise;
    claimed += fitted->standard_error[1];
  }
  CHECK(claimed / 300.0 == doctest::Approx(std::sqrt(square / 300.0)).epsilon(0.15));
}

TEST_CASE("field: too short a record has no law") {
  CHECK_FALSE(choose_law({}));
  CHECK_FALSE(choose_law({{0, 1, 0}, {1, 2, 0}, {2, 3, 0}}));
  CHECK_FALSE(fit({{0, 1, 0}, {1, 2, 0}, {2, 3, 0}, {3, 3, 0}}, LawKind::asymptotic));
  CHECK_FALSE(choose_law({{1, 1, 0}, {1, 2, 0}, {1, 3, 0}, {1, 3, 0}, {1, 3, 0}, {1, 3, 0}}));
}
