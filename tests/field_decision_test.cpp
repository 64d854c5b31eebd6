#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>

#include "dutygauge/field/decision.hpp"
#include "support.hpp"

using namespace dutygauge::field;

TEST_CASE("field: the economic interval between cleanings matches an independent program") {
  // clean-1..3. How: "computed: root of p(t)(t+td) = C + pd td + integral of p, confirmed by direct
  // minimisation".
  const auto asymptotic = [](double limit, double tau) {
    return [=](double t) { return -limit * std::expm1(-t / tau); };
  };
  const auto first = best_interval({18000.0, 4.0, 2500.0}, [](double t) { return 9.0 * t; });
  REQUIRE(first);
  CHECK(support::relative(first->days, 74.98242) < 1e-5);
  CHECK(support::relative(first->cost_rate, 674.8418) < 1e-5);
  const auto second = best_interval({18000.0, 4.0, 2500.0}, asymptotic(900.0, 60.0));
  REQUIRE(second);
  CHECK(support::relative(second->days, 94.27009) < 1e-5);
  CHECK(support::relative(second->cost_rate, 712.9779) < 1e-5);
  CHECK_FALSE(best_interval({60000.0, 6.0, 2500.0}, asymptotic(400.0, 30.0)));
  // Without downtime and with a linear loss: sqrt(2 C/a).
  CHECK(best_interval({18000.0, 0.0, 0.0}, [](double t) { return 9.0 * t; })->days ==
        doctest::Approx(std::sqrt(2.0 * 18000.0 / 9.0)));
}

namespace {

/// Courses of a steady deposit from day 0, read until `now`.
Forecast steady(double rate, double spread, double now, double allowed = 2e-4) {
  Forecast forecast{.as_of = now, .record = now};
  for (int i = 0; i < 201; ++i) {
    Course course{.law = {.kind = LawKind::linear, .rise = rate * (1.0 + spread * (i - 100) / 100.0)},
                  .allowed = allowed};
    course.lost = course.law.reaches(allowed);
    forecast.courses.push_back(course);
  }
  forecast.lost = {forecast.courses[190].lost, forecast.courses[100].lost, forecast.courses[10].lost};
  forecast.lost_already = *forecast.lost.middle <= now;
  return forecast;
}

/// 1 kW lost for each 1e-6 m2.K/W.
Economics money(double cleaning, double price_per_kwh) {
  return {.cost = {cleaning, 2.0, 1000.0},
          .heat_price = price_per_kwh / 3.6e6,
          .currency = "EUR",
          .duty_lost = [](double fouling) { return 1e9 * fouling; }};
}

const Option& of(const Decision& decision, Way way) {
  const auto found = std::ranges::find(decision.options, way, &Option::way);
  REQUIRE(found != decision.options.end());
  return *found;
}

}  // namespace

TEST_CASE("field: a service that outlasts the horizon needs no cleaning") {
  const auto decision = decide(steady(2e-7, 0.3, 100.0), {.horizon = 365});
  CHECK(decision.advice == Advice::not_needed);
  CHECK(of(decision, Way::never).risk == 0.0);
  CHECK(of(decision, Way::never).recommended);
  CHECK(decision.options.size() == 2);
}

TEST_CASE("field: a service lost after the next stop waits for it") {
  const auto decision = decide(steady(1e-6, 0.2, 100.0), {.horizon = 100, .next_stop = 130});
  CHECK(decision.advice == Advice::next_stop);
  CHECK(of(decision, Way::next_stop).risk == 0.0);
  CHECK(of(decision, Way::never).risk > 0.4);
  CHECK_FALSE(of(decision, Way::never).recommended);
}

TEST_CASE("field: a service lost before the next stop does not wait") {
  const auto decision = decide(steady(1e-6, 0.2, 180.0), {.horizon = 150, .next_stop = 260});
  CHECK(decision.advice == Advice::stop_now);
  CHECK(of(decision, Way::next_stop).risk > 0.9);
  CHECK(of(decision, Way::now).risk == 0.0);
}

TEST_CASE("field: a service that is lost comes back with a cleaning now") {
  const auto decision = decide(steady(1e-6, 0.1, 250.0), {.horizon = 100, .next_stop = 280});
  CHECK(decision.advice == Advice::stop_now);
  CHECK(of(decision, Way::now).risk == 0.0);
  CHECK(of(decision, Way::next_stop).risk == 1.0);
  // Not with one that leaves too much behind.
  const auto useless = decide(steady(1e-6, 0.1, 250.0), {.horizon = 100, .next_stop = 280, .residue = 0.95});
  CHECK(of(useless, Way::now).risk == 1.0);
  CHECK(useless.advice == Advice::not_needed);
  CHECK(useless.why == "a cleaning would not bring the service back");
}

TEST_CASE("field: without a stop to wait for, one can be arranged while there is time") {
  CHECK(decide(steady(1e-6, 0.1, 100.0), {.horizon = 150}).advice == Advice::next_stop);
  CHECK(decide(steady(1e-6, 0.1, 175.0), {.horizon = 150}).advice == Advice::stop_now);
}

TEST_CASE("field: cost decides between ways that keep the service") {
  const auto forecast = steady(2e-7, 0.2, 100.0);
  // By hand: on average the fouling rises 0.2 kW a day from 20 kW, 365 days: 20622.5 kWd = 494940 kWh never;
  // cleaned now 0.2 * 365^2/2 = 13322.5 kWd = 319740 kWh.
  const auto cheap = decide(forecast, {.horizon = 365, .economics = money(5000.0, 0.10)});
  CHECK(of(cheap, Way::never).bill->sum() == doctest::Approx(49494.0).epsilon(1e-6));
  CHECK(of(cheap, Way::now).bill->lost_duty == doctest::Approx(31974.0).epsilon(1e-6));
  CHECK(of(cheap, Way::now).bill->sum() == doctest::Approx(31974.0 + 5000.0 + 2000.0).epsilon(1e-6));
  CHECK(of(cheap, Way::now).recommended);
  const auto dear = decide(forecast, {.horizon = 365, .economics = money(50000.0, 0.10)});
  CHECK(dear.advice == Advice::not_needed);
  CHECK(of(dear, Way::never).recommended);
  // Near the point where both cost the same nothing is recommended.
  const auto even = decide(forecast, {.horizon = 365, .economics = money(49494.0 - 31974.0 - 2000.0, 0.10)});
  for (const Option& option : even.options) CHECK_FALSE(option.recommended);
  CHECK(of(even, Way::never).cheapest_in == doctest::Approx(0.5).epsilon(0.1));
}

TEST_CASE("field: the service goes before the money") {
  const auto decision =
      decide(steady(1e-6, 0.2, 100.0), {.horizon = 150, .next_stop = 140, .economics = money(1e7, 0.01)});
  CHECK(of(decision, Way::never).bill->sum() < of(decision, Way::next_stop).bill->sum());
  CHECK_FALSE(of(decision, Way::never).recommended);
  CHECK(decision.advice == Advice::next_stop);
}

TEST_CASE("field: a unit that fouls twice within the horizon is still worth cleaning") {
  const auto decision = decide(steady(2e-6, 0.1, 120.0), {.horizon = 365, .next_stop = 150});
  CHECK(decision.advice == Advice::stop_now);
  CHECK(of(decision, Way::now).risk == 0.0);
}

TEST_CASE("field: no courses, no decision") {
  CHECK_THROWS_AS(decide(Forecast{}, {}), std::invalid_argument);
}
