#include "dutygauge/arrangement.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <limits>
#include <random>
#include <string>

#include "support.hpp"

using namespace dutygauge::arrangement;

namespace {

struct Point {
  Arrangement arrangement;
  double r, ntu, p;
  std::string f;
};

/// A row of the tables, from either reference, as seen from the tube side.
bool read_point(const support::CsvRow& row, Point& point) {
  const std::string& name = row.at("arrangement");
  point.arrangement = {.tube_passes = std::stoi(row.at("tube_passes")),
                       .shells_in_series = std::stoi(row.at("shells_in_series"))};
  if (name == "parallel")
    point.arrangement.flow = Flow::parallel;
  else if (name != "counterflow" && name != "E")
    return false;
  point.r = std::stod(row.at("R")), point.ntu = std::stod(row.at("NTU")), point.p = std::stod(row.at("P"));
  if (row.at("reference_side") == "shell") {
    if (point.r == 0.0) return false;  // the tube stream isothermal: no tube-side reference
    point.p *= point.r, point.ntu *= point.r, point.r = 1.0 / point.r;
  }
  point.f = row.at("F");
  return true;
}

const double ratios[] = {0.0, 1e-9,        0.1,        0.5, 1.0 - 1e-6, 1.0 - 1e-12,
                         1.0, 1.0 + 1e-12, 1.0 + 1e-6, 2.0, 30.0,       1e6};
const Arrangement several[] = {
    {},
    {.flow = Flow::parallel},
    {.tube_passes = 2},
    {.tube_passes = 4},
    {.tube_passes = 16},
    {.tube_passes = 2, .shells_in_series = 3},
    {.tube_passes = 6, .shells_in_series = 2},
};

}  // namespace

TEST_CASE("arrangement: P and F agree with a numerical solution of the governing equations") {
  int count = 0;
  for (const auto& row : support::read_csv(TEST_DATA "/pntu.csv")) {
    Point point;
    if (!read_point(row, point)) continue;
    ++count;
    CAPTURE(row.at("arrangement"));
    CAPTURE(point.arrangement.tube_passes);
    CAPTURE(point.r);
    CAPTURE(point.ntu);
    CHECK(std::abs(effectiveness(point.arrangement, point.r, point.ntu) - point.p) < 1e-9);
    if (point.f.empty()) continue;
    const auto f = lmtd_correction(point.arrangement, point.r, point.ntu);
    REQUIRE(f.has_value());
    CHECK(std::abs(*f - std::stod(point.f)) < 1e-7);
  }
  CHECK(count > 150);
}

TEST_CASE("arrangement: NTU belongs to P and back on the rising branch") {
  for (const auto& a : several) {
    for (double r : ratios) {
      const double scale = std::max(1.0, r);
      for (double ntu : {1e-6, 0.01, 0.3, 1.0, 2.0}) {
        const double p = effectiveness(a, r, ntu / scale);
        if (p > 0.999 * largest_effectiveness(a, r)) continue;  // flat: P no longer fixes NTU
        CAPTURE(a.tube_passes);
        CAPTURE(a.shells_in_series);
        CAPTURE(r);
        CAPTURE(ntu);
        const auto back = ntu_for(a, r, p);
        REQUIRE(back.has_value());
        CHECK(support::relative(*back, ntu / scale) < 1e-9);
      }
    }
  }
}

TEST_CASE("arrangement: small NTU gives NTU - NTU^2 (1+R)/2, F of 1, and no NTU gives nothing") {
  for (const auto& a : several)
    for (double r : {0.0, 0.5, 1.0, 3.0}) {
      CHECK(effectiveness(a, r, 0.0) == 0.0);
      CHECK(ntu_for(a, r, 0.0) == 0.0);
      CHECK(std::abs(effectiveness(a, r, 1e-4) / (1e-4 - 0.5e-8 * (1.0 + r)) - 1.0) < 1e-7);
      CHECK(std::abs(*lmtd_correction(a, r, 1e-6) - 1.0) < 1e-9);
    }
}

TEST_CASE("arrangement: an isothermal shell stream gives 1 - exp(-NTU) and F of 1 everywhere") {
  for (const auto& a : several)
    for (double ntu : {0.1, 1.0, 4.0, 20.0}) {
      CHECK(std::abs(effectiveness(a, 0.0, ntu) + std::expm1(-ntu)) < 1e-14);
      CHECK(lmtd_correction(a, 0.0, ntu) == 1.0);
    }
}

TEST_CASE("arrangement: an isothermal tube stream gives 1 - exp(-NTU) seen from the shell side") {
  for (const auto& a : several)
    for (double ntu : {0.1, 1.0, 4.0})
      CHECK(std::abs(1e9 * effectiveness(a, 1e9, ntu / 1e9) + std::expm1(-ntu)) < 1e-8);
}

TEST_CASE("arrangement: P stays finite, within the heat balance and below counterflow") {
  std::mt19937 random(7);
  std::uniform_real_distribution<double> unit(0.0, 1.0);
  for (int i = 0; i < 10000; ++i) {
    Arrangement a{.tube_passes = unit(random) < 0.3 ? 1 : 2 * (1 + int(8.0 * unit(random))),
                  .shells_in_series = 1 + int(5.0 * unit(random))};
    const double r = std::pow(10.0, -6.0 + 12.0 * unit(random)),
                 ntu = std::pow(10.0, -6.0 + 10.0 * unit(random));
    const double p = effectiveness(a, r, ntu), largest = largest_effectiveness(a, r);
    CAPTURE(a.tube_passes);
    CAPTURE(a.shells_in_series);
    CAPTURE(r);
    CAPTURE(ntu);
    REQUIRE(std::isfinite(p));
    CHECK(p >= 0.0);
    CHECK(p <= std::min(1.0, 1.0 / r));
    CHECK(p <= effectiveness({}, r, ntu) * (1.0 + 1e-13));
    CHECK(p <= largest * (1.0 + 1e-12));
    const auto f = lmtd_correction(a, r, ntu);
    if (f) CHECK((*f > 0.0 && *f <= 1.0));
  }
}

TEST_CASE("arrangement: the largest P and P at NTU 100 agree with a numerical solution") {
  for (const auto& row : support::read_csv(TEST_DATA "/pntu-limits.csv")) {
    if (row.at("arrangement") != "E" || row.at("tube_passes") == "inf") continue;
    const Arrangement a{.tube_passes = std::stoi(row.at("tube_passes"))};
    const double r = std::stod(row.at("R"));
    CAPTURE(a.tube_passes);
    CAPTURE(r);
    CHECK(std::abs(effectiveness(a, r, 100.0) - std::stod(row.at("P_at_NTU_100"))) < 1e-8);
    const bool rises = row.at("monotone_in_NTU") == "yes";
    const double largest = std::stod(row.at(rises ? "P_at_NTU_100" : "P_max"));
    CHECK(std::abs(largest_effectiveness(a, r) - largest) < 1e-8);
    CHECK(!ntu_for(a, r, largest + 2e-8).has_value());
    CHECK(ntu_for(a, r, largest - 2e-8).has_value());
  }
}

TEST_CASE("arrangement: a P out of reach has no NTU and impossible temperatures have no F") {
  CHECK(!ntu_for({.tube_passes = 2}, 1.0, 0.586).has_value());
  CHECK(!ntu_for({.tube_passes = 4}, 1.0, 0.5692).has_value());
  CHECK(!ntu_for({.flow = Flow::parallel}, 1.0, 0.5).has_value());
  CHECK(!counterflow_ntu(1.0, 1.0).has_value());
  CHECK(!counterflow_ntu(2.0, 0.5).has_value());
  CHECK(!counterflow_ntu(1.0, -0.1).has_value());
}

TEST_CASE("arrangement: NaN never becomes an answer and a caller's bug is thrown") {
  const double nan = std::numeric_limits<double>::quiet_NaN(),
               infinity = std::numeric_limits<double>::infinity();
  for (const auto& a : several) {
    CHECK(std::isnan(effectiveness(a, nan, 1.0)));
    CHECK(std::isnan(effectiveness(a, 1.0, nan)));
    CHECK(!ntu_for(a, nan, 0.3).has_value());
    CHECK(!ntu_for(a, 1.0, nan).has_value());
    CHECK(!lmtd_correction(a, nan, 1.0).has_value());
    CHECK(!lmtd_correction(a, 1.0, nan).has_value());
    CHECK(std::isfinite(effectiveness(a, 1.0, infinity)));
    CHECK(std::isfinite(effectiveness(a, infinity, 1.0)));
    CHECK_THROWS_AS(effectiveness(a, -1.0, 1.0), std::invalid_argument);
    CHECK_THROWS_AS(effectiveness(a, 1.0, -1.0), std::invalid_argument);
  }
  CHECK_THROWS_AS(effectiveness({.tube_passes = 0}, 1.0, 1.0), std::invalid_argument);
}

TEST_CASE("arrangement: the log mean is symmetric, exact at equal ends and 0 where there is none") {
  CHECK(log_mean(10.0, 10.0) == 10.0);
  CHECK(log_mean(20.0, 5.0) == log_mean(5.0, 20.0));
  CHECK(log_mean(20.0, 5.0) == doctest::Approx(15.0 / std::log(4.0)).epsilon(1e-15));
  CHECK(std::abs(log_mean(10.0 + 1e-7, 10.0) - (10.0 + 0.5e-7)) < 1e-14);
  CHECK(log_mean(10.0, 0.0) == 0.0);
  CHECK(log_mean(-1.0, 10.0) == 0.0);
  CHECK(log_mean(std::numeric_limits<double>::quiet_NaN(), 10.0) == 0.0);
}

TEST_CASE("arrangement: what is not built is objected to by key") {
  CHECK(objections({.tube_passes = 2}).empty());
  CHECK(objections({.tube_passes = 2, .flow = Flow::parallel}).at(0).key == "exchanger.flow_direction");
  CHECK(objections({.tube_passes = 0}).at(0).key == "exchanger.tubes.passes");
  CHECK(objections({.shell_type = 'Q'}).at(0).key == "exchanger.tema");
}
