#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <limits>
#include <random>
#include <string>

#include "arrangement_rows.hpp"

using namespace arrangement_rows;

namespace {

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
    {.tube_passes = 4, .shells_in_series = 2, .shells_order = Flow::parallel},
    {.tube_passes = 4, .shells_in_series = 3, .shells_order = Flow::parallel},
    {.tube_passes = 3},
    {.tube_passes = 5, .first_tube_pass = FirstTubePass::with_shell_flow},
    {.tube_passes = 3, .pass_areas = {2, 1, 1}},
    {.shell_type = 'F', .tube_passes = 2},
    {.shell_type = 'F', .tube_passes = 4, .shells_in_series = 2},
    {.shell_type = 'F', .tube_passes = 6, .first_tube_pass = FirstTubePass::with_shell_flow},
    {.shell_type = 'F', .tube_passes = 4, .baffle_conductance = 0.1},
    {.shell_type = 'G'},
    {.shell_type = 'G', .tube_passes = 2},
    {.shell_type = 'G', .tube_passes = 2, .first_tube_pass = FirstTubePass::with_shell_flow},
    {.shell_type = 'G', .tube_passes = 6},
    {.shell_type = 'H'},
    {.shell_type = 'H', .tube_passes = 2, .mixing = Mixing::shell_stream},
    {.shell_type = 'H', .tube_passes = 4},
    {.shell_type = 'J'},
    {.shell_type = 'J', .tube_passes = 2, .shells_in_series = 2},
    {.shell_type = 'J', .tube_passes = 3},
    {.shell_type = 'J', .tube_passes = 4, .tube_inlet_share = 0.3},
    {.shell_type = 'X'},
    {.shell_type = 'X', .tube_passes = 3},
    {.shell_type = 'X', .tube_passes = 2, .flow = Flow::parallel},
    {.shell_type = 'X', .mixing = Mixing::shell_stream},
    {.shell_type = 'X', .tube_passes = 4, .mixing = Mixing::nowhere},
    {.shell_type = 'X', .tube_passes = 2, .flow = Flow::parallel, .mixing = Mixing::nowhere},
};

double between(std::mt19937& random, double low, double high) {
  return std::uniform_real_distribution<double>(low, high)(random);
}

int any_of(std::mt19937& random, int count) {
  return std::uniform_int_distribution<int>(0, count - 1)(random);
}

Arrangement any_arrangement(std::mt19937& random) {
  Arrangement a{.shell_type = "EFGHJKX"[any_of(random, 7)],
                .tube_passes = 1 + any_of(random, 8),
                .shells_in_series = 1 + any_of(random, 4),
                .flow = any_of(random, 4) == 0 ? Flow::parallel : Flow::counter,
                .first_tube_pass = any_of(random, 2) == 0 ? FirstTubePass::with_shell_flow
                                                          : FirstTubePass::against_shell_flow,
                .shells_order = any_of(random, 3) == 0 ? Flow::parallel : Flow::counter};
  if (a.shell_type == 'X' && any_of(random, 2) == 0) a.mixing = Mixing::shell_stream;
  if (a.shell_type == 'X' && any_of(random, 10) == 0) a.mixing = Mixing::nowhere;
  if (any_of(random, 3) == 0)
    for (int pass = 0; pass < a.tube_passes; ++pass)
      a.pass_areas.at(std::size_t(pass)) = between(random, 0.5, 1.5);
  if (a.shell_type == 'F' && any_of(random, 2) == 0) a.baffle_conductance = between(random, 0.0, 0.3);
  if (a.shell_type == 'J' && any_of(random, 2) == 0) a.tube_inlet_share = between(random, 0.1, 0.9);
  return is_built(a) ? a : any_arrangement(random);
}

}  // namespace

TEST_CASE("arrangement: P and F agree with a numerical solution of the governing equations") {
  const auto rows = support::read_csv(TEST_DATA "/pntu.csv");
  REQUIRE(rows.size() == 465);
  for (const auto& row : rows) {
    const Point point = point_of(row);
    CAPTURE(row.at("arrangement"));
    CAPTURE(point.arrangement.tube_passes);
    CAPTURE(point.r);
    CAPTURE(point.ntu);
    const double p = effectiveness(point.arrangement, point.r, point.ntu);
    CHECK(std::abs(p - point.p) * point.p_scale < 1e-9);
    if (!point.f) continue;
    const auto f = lmtd_correction(point.arrangement, point.r, point.ntu);
    REQUIRE(f.has_value());
    CHECK(std::abs(*f - *point.f) < 1e-7);
  }
}

TEST_CASE("arrangement: NTU belongs to P and back on the rising branch") {
  for (const auto& a : several) {
    for (double r : ratios) {
      const double scale = std::max(1.0, r);
      for (double ntu : {1e-6, 0.01, 0.3, 1.0, 2.0}) {
        const double p = effectiveness(a, r, ntu / scale);
        if (p > 0.999 * largest_effectiveness(a, r)) continue;  // flat: P no longer fixes NTU
        CAPTURE(a.shell_type);
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
  for (const auto& a : several) {
    // An unequal split changes the term of second order: part of the surface has less shell flow.
    if (a.tube_inlet_share != 0.5) continue;
    for (double r : {0.0, 0.5, 1.0, 3.0}) {
      CHECK(effectiveness(a, r, 0.0) == 0.0);
      CHECK(ntu_for(a, r, 0.0) == 0.0);
      CHECK(std::abs(effectiveness(a, r, 1e-4) / (1e-4 - 0.5e-8 * (1.0 + r)) - 1.0) < 1e-7);
      CHECK(std::abs(*lmtd_correction(a, r, 1e-6) - 1.0) < 1e-9);
    }
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
    // Two unequal shell streams cool unequally, and through a baffle the stream gives to itself.
    if (a.tube_inlet_share == 0.5 && a.baffle_conductance == 0.0)
      for (double ntu : {0.1, 1.0, 4.0})
        CHECK(std::abs(1e9 * effectiveness(a, 1e9, ntu / 1e9) + std::expm1(-ntu)) < 1e-8);
}

TEST_CASE("arrangement: P stays finite, within the heat balance and below counterflow") {
  std::mt19937 random(7);
  for (int i = 0; i < 10000; ++i) {
    const Arrangement a = any_arrangement(random);
    const double r = std::pow(10.0, between(random, -6.0, 6.0)),
                 ntu = std::pow(10.0, between(random, -6.0, 4.0));
    const double p = effectiveness(a, r, ntu);
    CAPTURE(a.shell_type);
    CAPTURE(a.tube_passes);
    CAPTURE(a.shells_in_series);
    CAPTURE(r);
    CAPTURE(ntu);
    REQUIRE(std::isfinite(p));
    CHECK(p >= 0.0);
    CHECK(p <= std::min(1.0, 1.0 / r));
    CHECK(p <= effectiveness({}, r, ntu) * (1.0 + 1e-12));
    const auto f = lmtd_correction(a, r, ntu);
    if (f) CHECK((*f >= 0.0 && *f <= 1.0));
  }
}

TEST_CASE("arrangement: no NTU gives more than the largest P, and what is reached can be asked for") {
  std::mt19937 random(11);
  for (int i = 0; i < 400; ++i) {
    const Arrangement a = any_arrangement(random);
    const double r = std::pow(10.0, between(random, -3.0, 3.0)),
                 ntu = std::pow(10.0, between(random, -3.0, 2.0));
    const double p = effectiveness(a, r, ntu), largest = largest_effectiveness(a, r);
    CAPTURE(a.shell_type);
    CAPTURE(a.tube_passes);
    CAPTURE(a.shells_in_series);
    CAPTURE(r);
    CAPTURE(ntu);
    CHECK(p <= largest * (1.0 + 1e-12));
    CHECK(!ntu_for(a, r, largest * 1.0001).has_value());
    if (p > 0.999 * std::min({1.0, 1.0 / r, largest})) continue;
    const auto smallest = ntu_for(a, r, p);
    REQUIRE(smallest.has_value());
    CHECK(*smallest <= ntu * (1.0 + 1e-9));
    CHECK(support::relative(effectiveness(a, r, *smallest), p) < 1e-10);
  }
}

TEST_CASE("arrangement: maxima, and P at NTU 100, agree with a numerical solution") {
  for (const auto& row : support::read_csv(TEST_DATA "/pntu-limits.csv")) {
    if (row.at("tube_passes") == "inf") continue;
    const Arrangement a = named(row.at("arrangement"), std::stoi(row.at("tube_passes")), 1);
    const double r = std::stod(row.at("R"));
    CAPTURE(row.at("arrangement"));
    CAPTURE(a.tube_passes);
    CAPTURE(r);
    CHECK(std::abs(effectiveness(a, r, 100.0) - std::stod(row.at("P_at_NTU_100"))) < 1e-9);
    if (row.at("monotone_in_NTU") == "yes") {
      CHECK(std::isinf(ntu_at_largest(a, r)));
      CHECK(largest_effectiveness(a, r) >= std::stod(row.at("P_at_NTU_100")) - 1e-9);
      continue;
    }
    const double largest = std::stod(row.at("P_max")), at = std::stod(row.at("NTU_at_P_max"));
    CHECK(std::abs(largest_effectiveness(a, r) - largest) < 1e-9);
    CHECK(support::relative(ntu_at_largest(a, r), at) < 1e-5);  // printed to six digits
    CHECK(std::abs(*lmtd_correction(a, r, at) - std::stod(row.at("F_at_P_max"))) < 1e-5);
    CHECK(!ntu_for(a, r, largest + 2e-9).has_value());
    CHECK(ntu_for(a, r, largest - 2e-9).value() <= at);
  }
}

TEST_CASE("arrangement: known limits at infinite NTU") {
  for (double r : {0.0, 0.2, 0.7, 1.0, 1.6, 8.0}) {
    const double limit = std::min(1.0, 1.0 / r);
    CHECK(largest_effectiveness({}, r) == doctest::Approx(limit).epsilon(1e-14));
    CHECK(largest_effectiveness({.flow = Flow::parallel}, r) ==
          doctest::Approx(1.0 / (1.0 + r)).epsilon(1e-14));
    CHECK(largest_effectiveness({.shell_type = 'G'}, r) == doctest::Approx(limit).epsilon(1e-14));
    CHECK(largest_effectiveness({.tube_passes = 3}, r) == doctest::Approx(limit).epsilon(1e-10));
    CHECK(largest_effectiveness({.tube_passes = 2}, r) ==
          doctest::Approx(2.0 / (1.0 + r + std::sqrt(1.0 + r * r))).epsilon(1e-14));
    CHECK(largest_effectiveness({.shell_type = 'X', .mixing = Mixing::shell_stream}, r) ==
          doctest::Approx(r == 0.0 ? 1.0 : -std::expm1(-r) / r).epsilon(1e-14));
    CHECK(largest_effectiveness({.shell_type = 'K', .tube_passes = 2}, r) ==
          doctest::Approx(1.0 / (1.0 + r)).epsilon(1e-14));
    if (r <= 0.5) continue;
    CHECK(largest_effectiveness({.shell_type = 'J'}, r) ==
          doctest::Approx(0.5 / r + (1.0 - 0.5 / r) / (1.0 + 2.0 * r)).epsilon(1e-14));
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
    CHECK(std::isnan(largest_effectiveness(a, nan)));
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
  CHECK(objections({.tube_passes = 0}).at(0).what == "0 tube passes in an E shell");
  CHECK(objections({.shell_type = 'G', .tube_passes = 3}).at(0).what == "3 tube passes in a G shell");
  CHECK(objections({.shell_type = 'Q'}).at(0).key == "exchanger.tema");
}
