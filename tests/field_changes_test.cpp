#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <string>
#include <vector>

#include "dutygauge/field/changes.hpp"
#include "field_days.hpp"
#include "support.hpp"

using namespace dutygauge::field;

namespace {

Trend by_index(const std::vector<double>& values) {
  Trend trend;
  for (std::size_t i = 0; i < values.size(); ++i) trend.push_back({.time = double(i), .value = values[i]});
  return trend;
}

}  // namespace

TEST_CASE("field: the best split of a series is the one an independent program finds") {
  // change-1 and change-2, values in 1e-6 m2.K/W. How: "computed by trying every index; true change at 37"
  // (20).
  struct Row {
    std::vector<double> values;
    std::size_t index;
    double loss, loss_unsplit, bic_unsplit, bic;
  };
  const std::vector<Row> rows = {
      {{123.2, 134.6, 105.9, 138.2, 123.6, 117.8, 118.8, 117.3, 126.0, 136.5, 135.3, 136.7,
        116.7, 118.9, 148.0, 143.7, 155.6, 147.9, 128.8, 150.6, 145.7, 142.9, 134.6, 143.0,
        142.7, 153.0, 147.1, 161.3, 141.0, 153.2, 154.5, 143.2, 141.4, 162.1, 158.7, 153.5,
        159.5, 220.9, 230.1, 223.6, 231.7, 239.9, 228.9, 240.6, 224.7, 232.4, 223.7, 236.1,
        238.7, 237.2, 237.6, 253.1, 254.8, 232.1, 254.6, 229.5, 239.4, 245.4, 249.0, 239.6},
       37,
       4424.557,
       22921.92,
       364.919,
       278.507},
      {{280.4, 283.9, 283.4, 293.7, 323.5, 281.6, 318.0, 323.3, 301.4, 297.4, 314.6, 325.8, 339.8,
        322.9, 333.5, 305.7, 300.6, 289.5, 298.2, 310.1, 78.7,  58.4,  89.0,  77.0,  70.2,  69.3,
        109.1, 84.0,  69.8,  69.8,  109.7, 76.7,  102.2, 106.3, 54.7,  106.9, 85.9,  74.4,  82.8,
        99.1,  97.2,  98.8,  83.5,  112.3, 116.2, 121.7, 110.8, 124.1, 127.7, 109.1},
       20,
       11952.1,
       221467.5,
       427.624,
       293.392}};
  for (const Row& row : rows) {
    const auto split = best_split(by_index(row.values), 4);
    REQUIRE(split);
    CHECK(split->index == row.index);
    CHECK(support::relative(split->loss, row.loss) < 1e-5);
    CHECK(support::relative(split->loss_unsplit, row.loss_unsplit) < 1e-5);
    // Printed to three decimals there.
    CHECK(std::abs(split->bic - row.bic) < 1e-3);
    CHECK(std::abs(split->bic_unsplit - row.bic_unsplit) < 1e-3);
  }
}

TEST_CASE("field: a curved trend has no steps, a step on it has one") {
  for (std::uint64_t seed = 1; seed <= 20; ++seed) {
    CAPTURE(seed);
    const Law law{LawKind::asymptotic, 0.0, 2e-5, 3e-4, 55.0};
    series::Noise noise(seed, 3.4e-6, 0.2);
    Trend curve;
    for (int day = 0; day < 300; ++day) curve.push_back({.time = day + 0.5, .value = law.at(day) + noise()});
    CHECK(steps(curve, 15e-6).empty());
    for (TrendPoint& point : curve)
      if (point.time > 150.0) point.value -= 1e-4;
    const auto found = steps(curve, 15e-6);
    REQUIRE(found.size() == 1);
    CHECK(std::abs(found[0].at - 150.0) <= 1.0);
    CHECK(found[0].jump == doctest::Approx(-1e-4).epsilon(0.08));
  }
}

TEST_CASE("field: steps below the floor, or on too few points, are none") {
  Trend series;
  for (int day = 0; day < 60; ++day) series.push_back({.time = double(day), .value = day < 30 ? 0.0 : 1.0});
  CHECK(steps(series, 0.5).size() == 1);
  CHECK(steps(series, 1.5).empty());
  CHECK(steps({}, 0.5).empty());
  CHECK(steps(Trend(series.begin(), series.begin() + 11), 0.5).empty());
  CHECK_FALSE(best_split(Trend(series.begin(), series.begin() + 11), 6));
}

namespace {

const DropLaws laws{};

std::vector<What> kinds_of(const Events& events) {
  std::vector<What> kinds;
  for (const Event& event : events) kinds.push_back(event.what);
  return kinds;
}

/// The only event of a kind.
Event only(const Events& events, What what) {
  REQUIRE(std::ranges::count(events, what, &Event::what) == 1);
  return *std::ranges::find(events, what, &Event::what);
}

}  // namespace

TEST_CASE("field: a quiet unit has no events") {
  for (std::uint64_t seed = 1; seed <= 40; seed += 5) {
    CAPTURE(seed);
    const auto days = series::days(
        300, [](int i, series::Settings& s) { s.fouling += 1e-6 * i; }, seed);
    CHECK(events_of(days, laws, {}, {}).empty());
  }
  CHECK(events_of({}, laws, {}, {}).empty());
}

TEST_CASE("field: each thing that happens is called by its name") {
  struct Row {
    What what;
    std::optional<Channel> channel;
    bool at_outage;
    void (*then)(series::Settings&);
  };
  const Row rows[] = {
      {What::cleaning, {}, false, [](series::Settings& s) { s.fouling = 1e-5, s.tube_factor = 0.9; }},
      {What::cleaning, {}, true, [](series::Settings& s) { s.fouling = 1e-5; }},
      {What::plugging, {}, true, [](series::Settings& s) { s.fouling = 1e-4, s.tube_factor = 1.21; }},
      {What::blockage, {}, false, [](series::Settings& s) { s.fouling = 1e-4, s.tube_factor = 1.21; }},
      {What::blockage, {}, false, [](series::Settings& s) { s.fouling = 1e-4, s.shell_factor = 1.3; }},
      {What::leak, {}, true, [](series::Settings& s) { s.fouling = 1.5e-4, s.tube_factor = 0.67; }},
      {What::bypass, {}, true, [](series::Settings& s) { s.fouling = 1.5e-4, s.shell_factor = 0.67; }},
      {What::sensor_shift, Channel::cold_out, false,
       [](series::Settings& s) { s.fouling = 2e-5, s.closure = -0.17, s.cold_out = 313.5; }},
      // A meter that reads 8 % low: its drop over flow^1.8 rises with it.
      {What::sensor_shift, Channel::tube_dp, false, [](series::Settings& s) { s.tube_factor = 1.2; }},
      {What::load_change, Channel::hot_flow, false, [](series::Settings& s) { s.hot_flow = 64; }},
      {What::load_change, Channel::hot_in, false, [](series::Settings& s) { s.hot_in += 8, s.hot_out += 4; }},
      {What::unexplained, {}, false, [](series::Settings& s) { s.fouling = 1.5e-4; }},
  };
  for (const Row& row : rows) {
    CAPTURE(name_of(row.what));
    CAPTURE(row.at_outage);
    const auto days = series::days(200, [&row](int i, series::Settings& s) {
      if (i >= 100) row.then(s);
      s.running = !row.at_outage || i < 96 || i >= 100;
    });
    const auto events = events_of(days, laws, {}, {});
    const Event event = only(events, row.what);
    CHECK(std::abs(event.at - 100.0) <= 1.0);
    CHECK(event.channel == row.channel);
    CHECK_FALSE(event.logged);
    CHECK(events.size() == (row.at_outage ? 2u : 1u));
    if (row.at_outage) CHECK(only(events, What::outage).at == doctest::Approx(96.0));
  }
}

TEST_CASE("field: a sensor touched at an outage is no cleaning") {
  const auto days = series::days(200, [](int i, series::Settings& s) {
    s.running = i < 96 || i >= 100;
    if (i >= 100) s.fouling = -2e-5, s.closure = -0.1, s.cold_out += 2.5;
  });
  const auto events = events_of(days, laws, {}, {});
  CHECK(kinds_of(events) == std::vector{What::outage, What::sensor_shift});
  CHECK(events[1].channel == Channel::cold_out);
  // Unless somebody cleaned, too.
  const auto logged = events_of(days, laws, {{96, 100, What::outage}, {100, 100, What::cleaning}}, {});
  CHECK(kinds_of(logged) == std::vector{What::outage, What::cleaning, What::sensor_shift});
  CHECK(logged[0].logged);
  CHECK(logged[1].logged);
  CHECK_FALSE(logged[2].logged);
}

TEST_CASE("field: what was written down is used, and said to be unseen where it is") {
  const auto quiet = series::days(200, [](int, series::Settings&) {});
  const auto events = events_of(quiet, laws, {{120, 120, What::cleaning}, {40, 40, What::plugging}}, {});
  REQUIRE(events.size() == 2);
  CHECK(events[0].what == What::plugging);
  CHECK(events[1].at == 120.0);
  CHECK(events[1].logged);
  CHECK_FALSE(events[1].seen);
  const auto cleaned =
      series::days(200, [](int i, series::Settings& s) { s.fouling = i < 121 ? 2e-4 : 1e-5; });
  const auto matched = events_of(cleaned, laws, {{120, 120, What::cleaning}}, {});
  REQUIRE(matched.size() == 1);
  CHECK(matched[0].logged);
  CHECK(matched[0].seen);
  CHECK(*matched[0].fouling == doctest::Approx(-1.9e-4).epsilon(0.05));
}

TEST_CASE("field: a meter that drifts is a slope of the closure, not a step") {
  const auto days = series::days(300, [](int i, series::Settings& s) { s.closure = -0.06 * i / 300.0; });
  const auto events = events_of(days, laws, {}, {{{Channel::hot_flow}, 2.0}});
  REQUIRE(events.size() == 1);
  CHECK(events[0].what == What::sensor_drift);
  CHECK(events[0].channel == Channel::hot_flow);
  CHECK(*events[0].closure == doctest::Approx(-0.06).epsilon(0.05));
  // Nobody suspected: one balance does not say which.
  CHECK_FALSE(events_of(days, laws, {}, {})[0].channel);
  // A step and a drift are told apart.
  const auto both = series::days(300, [](int i, series::Settings& s) {
    s.closure = -0.06 * i / 300.0 - (i < 150 ? 0.0 : 0.1);
    s.cold_out += i < 150 ? 0.0 : 2.5;
  });
  CHECK(kinds_of(events_of(both, laws, {}, {})) == std::vector{What::sensor_drift, What::sensor_shift});
}

TEST_CASE("field: a step where a channel goes missing is the balance's, not the deposit's") {
  auto days =
      series::days(200, [](int i, series::Settings& s) { s.fouling = i < 80 || i >= 120 ? 1e-4 : 2e-4; });
  for (Day& day : days)
    if (day.day > 80.0 && day.day < 120.0) {
      day.value[index_of(Channel::cold_flow)] = std::nan("");
      day.apparent.closure = std::nan("");
    }
  const auto events = events_of(days, laws, {}, {});
  REQUIRE(events.size() == 2);
  for (const Event& event : events) {
    CHECK(event.what == What::sensor_shift);
    CHECK(event.channel == Channel::cold_flow);
  }
}

TEST_CASE("field: a day without readings is no outage unless somebody says so") {
  const auto days = series::days(100, [](int i, series::Settings& s) { s.running = i != 50; });
  CHECK(events_of(days, laws, {}, {}).empty());
  const auto longer = series::days(100, [](int i, series::Settings& s) { s.running = i < 50 || i > 52; });
  CHECK(only(events_of(longer, laws, {}, {}), What::outage).at == 50.0);
  const auto said = events_of(days, laws, {{50.2, 50.9, What::outage}}, {});
  CHECK(only(said, What::outage).logged);
}
