#include <doctest/doctest.h>

#include <cmath>
#include <limits>
#include <numeric>

#include "dutygauge/field/reconcile.hpp"
#include "field_plants.hpp"
#include "support.hpp"

// One reading made consistent, and what of it may be wrong.

using namespace dutygauge;
using support::relative;

namespace {

constexpr double missing = std::numeric_limits<double>::quiet_NaN();
constexpr double zero_celsius = 273.15;

using Six = std::array<double, 6>;

/// A 1-2 shell between two streams of fixed heat capacities; its films play no part.
field::Plant plant_of(double hot_heat_capacity, double cold_heat_capacity) {
  return field::Plant(plants::fixed({.passes = 2,
                                     .area = 210.0,
                                     .wall = 4e-5,
                                     .tube_film = 4300.0,
                                     .shell_film = 3600.0,
                                     .hot_heat_capacity = hot_heat_capacity,
                                     .cold_heat_capacity = cold_heat_capacity}));
}

/// Data with temperatures in [degC].
field::ToReconcile data(const Six& reading, const Six& uncertainty) {
  field::ToReconcile d;
  d.reading.fill(missing);
  for (std::size_t i = 0; i < 6; ++i) d.reading[i] = reading[i] + (i >= 2 ? zero_celsius : 0.0);
  d.standard_uncertainty = uncertainty;
  return d;
}

void check_values(const field::Reconciled& r, const Six& expected, double tolerance) {
  for (std::size_t i = 0; i < 6; ++i) {
    CAPTURE(i);
    CHECK(relative(r.value[i] - (i >= 2 ? zero_celsius : 0.0), expected[i]) < tolerance);
  }
}

}  // namespace

TEST_CASE("field: one balance reconciles a reading as an independent solution does") {
  // Computed: Lagrange-Newton on the bilinear problem, objective confirmed with BFGS; 1e-5.
  struct Row {
    const char* what;
    Six reading, uncertainty;
    double hot_heat_capacity, cold_heat_capacity;
    Six reconciled, reconciled_uncertainty;
    double objective, p_value, z, duty;
    bool detected;
  };
  const Row rows[] = {
      {"fair",
       {40.0, 43.0, 80.0, 52.0, 25.0, 38.4},
       {0.6, 0.65, 0.3, 0.3, 0.3, 0.3},
       2100.0,
       4180.0,
       {40.12486, 42.86282, 80.04459, 51.95541, 25.09482, 38.30518},
       {0.55947, 0.6048, 0.28984, 0.28984, 0.25081, 0.25081},
       0.3318126,
       0.56459,
       0.57603,
       2366857.0,
       false},
      {"gross error",
       {80.5, 108.0, 55.2, 42.6, 24.1, 36.0},
       {0.8, 1.1, 0.2, 0.2, 0.2, 0.2},
       4180.0,
       4180.0,
       {81.89443, 105.9625, 55.72303, 42.07697, 24.77674, 35.32326},
       {0.77125, 1.0553, 0.18343, 0.18343, 0.17135, 0.17135},
       43.04575,
       5.3475e-11,
       6.5609,
       4671299.0,
       true},
  };
  for (const Row& row : rows) {
    CAPTURE(row.what);
    const field::Plant plant = plant_of(row.hot_heat_capacity, row.cold_heat_capacity);
    const auto errors = field::find_gross_errors(plant, data(row.reading, row.uncertainty));
    REQUIRE(errors.has_value());
    const field::Reconciled& r = errors->all;
    check_values(r, row.reconciled, 1e-5);
    CHECK(r.degrees_of_freedom == 1);
    CHECK(relative(r.objective, row.objective) < 1e-5);
    CHECK(relative(r.p_value, row.p_value) < 5e-5);
    CHECK(relative(r.duty, row.duty) < 1e-5);
    for (std::size_t i = 0; i < 6; ++i) {
      CAPTURE(i);
      // All alike: one balance sees that something is wrong, never which.
      const double sign = i % 2 == 0 ? 1.0 : -1.0;
      CHECK(std::abs(r.measurement_test[i] - sign * row.z) < 1e-4 * row.z);
      CHECK(relative(r.standard_uncertainty[i], row.reconciled_uncertainty[i]) < 1e-4);
    }
    CHECK(errors->detected == row.detected);
    CHECK(errors->inseparable.size() == (row.detected ? 6 : 0));
    CHECK(errors->failing.size() == (row.detected ? 6 : 0));
  }
}

TEST_CASE("field: with UA from the days before, a gross error is located as far as it can be") {
  // Computed: as above with numerical derivatives; 1e-4.
  struct Row {
    const char* what;
    Six reading, reconciled;
    double ua, objective, p_value;
    field::Data z, without;
    std::vector<std::size_t> inseparable;
  };
  const Row rows[] = {
      {"cold outlet 2 K high",
       {81.02, 108.21, 55.04, 42.54, 23.95, 35.0},
       {81.4194, 105.405, 55.2489, 42.6041, 24.4548, 34.2222},
       233263.0,
       36.126,
       1.43e-08,
       {1.09, -5.623, 2.527, 0.528, 4.952, -5.985, 4.23},
       {34.94, 4.567, 29.61, 35.86, 11.48, 0.4092, 18.21},
       {5}},
      {"hot flow 10 % low",
       {71.71, 109.88, 55.17, 42.67, 23.84, 33.02},
       {72.9983, 109.039, 55.417, 42.3197, 24.0975, 32.8658},
       206776.0,
       10.745,
       0.004643,
       {3.274, -1.876, 3.219, -3.13, 2.401, -1.191, -1.807},
       {0.02449, 7.215, 0.4121, 1.016, 4.991, 9.304, 7.474},
       {0, 2, 3}},
  };
  const field::Plant plant = plant_of(4180.0, 4180.0);
  for (const Row& row : rows) {
    CAPTURE(row.what);
    field::ToReconcile d = data(row.reading, {1.0, 1.4, 0.2, 0.2, 0.2, 0.2});
    d.ua = {215000.0, 6000.0};
    const auto errors = field::find_gross_errors(plant, d);
    REQUIRE(errors.has_value());
    check_values(errors->all, row.reconciled, 1e-4);
    CHECK(relative(errors->all.value[field::ua_datum], row.ua) < 1e-4);
    CHECK(errors->all.degrees_of_freedom == 2);
    CHECK(relative(errors->all.objective, row.objective) < 1e-4);
    CHECK(relative(errors->all.p_value, row.p_value) < 2e-3);  // printed to three digits
    for (std::size_t i = 0; i < field::datum_count; ++i) {
      CAPTURE(i);
      // Printed to three decimals, and of what is removed to four digits.
      CHECK(std::abs(errors->all.measurement_test[i] - row.z[i]) < 0.0006 + 1e-4 * std::abs(row.z[i]));
      REQUIRE(errors->objective_without[i].has_value());
      CHECK(relative(*errors->objective_without[i], row.without[i]) < 1e-3);
    }
    CHECK(errors->inseparable == row.inseparable);
    CHECK(errors->eliminated == std::vector<std::size_t>{row.inseparable.front()});
    REQUIRE(errors->rest.has_value());
    CHECK(errors->rest->p_value > 0.05);
  }
}

TEST_CASE("field: reconciled values close the balance and are surer than what was read") {
  const field::Plant plant(plants::problem(plants::oil_preheater));
  field::ToReconcile d = data({61.0, 98.0, 290.0, 198.0, 150.0, 212.0}, {0.9, 1.2, 0.4, 0.4, 0.4, 0.4});
  const auto trended = field::ua_from(plant, d.reading, {.value = 1e-4, .standard_uncertainty = 2e-5});
  REQUIRE(trended.has_value());
  for (const bool with_ua : {false, true}) {
    if (with_ua) d.ua = trended;
    const auto r = field::reconcile(plant, d);
    REQUIRE(r.has_value());
    field::Channels consistent;
    consistent.fill(missing);
    for (std::size_t i = 0; i < 6; ++i) {
      consistent[i] = r->value[i];
      CHECK(r->standard_uncertainty[i] < d.standard_uncertainty[i]);
    }
    const auto a = field::apparent(plant, {}, consistent);
    REQUIRE(a.has_value());
    CHECK(std::abs(a->closure) < 1e-9);
    if (with_ua) CHECK(relative(a->u * 480.0, r->value[field::ua_datum]) < 1e-9);
  }
}

TEST_CASE("field: a missing datum is free, and takes a degree of freedom") {
  const field::Plant plant = plant_of(4180.0, 4180.0);
  field::ToReconcile d = data({81.0, missing, 55.0, 42.6, 24.0, 33.2}, {1.0, 1.4, 0.2, 0.2, 0.2, 0.2});
  const auto free = field::reconcile(plant, d);
  REQUIRE(free.has_value());
  CHECK(free->degrees_of_freedom == 0);
  CHECK(free->objective < 1e-6);
  CHECK(relative(free->value[1], 81.0 * 12.4 / 9.2) < 1e-6);
  d.ua = {215000.0, 6000.0};
  const auto with_ua = field::reconcile(plant, d);
  REQUIRE(with_ua.has_value());
  CHECK(with_ua->degrees_of_freedom == 1);
  CHECK(with_ua->standard_uncertainty[1] < free->standard_uncertainty[1]);
  d.reading[0] = missing;
  CHECK_FALSE(field::reconcile(plant, d));
}
