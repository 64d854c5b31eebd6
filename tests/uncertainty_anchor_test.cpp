#include <doctest/doctest.h>

#include <boost/math/distributions/binomial.hpp>
#include <cmath>
#include <random>

#include "dutygauge/uncertainty.hpp"
#include "support.hpp"
#include "water_cooler.hpp"

// A rating tied to a reading, held against units whose truth is known: the same equations
// with hidden factors on films and properties.

using namespace dutygauge;
using namespace dutygauge::uncertainty;

namespace {

rating::Problem cooler() {
  auto problem = water_cooler(350.0);
  problem.methods.solution = rating::Solution::mean;
  return problem;
}

/// What an honest reading of a true unit shows.
SteadyReading read_of(const rating::Problem& truth) {
  const auto outcome = *rating::rate(truth).outcome;
  SteadyReading reading;
  reading.shell_side = {truth.shell_side.mass_flow, truth.shell_side.inlet_temperature, outcome.shell_outlet};
  reading.tube_side = {truth.tube_side.mass_flow, truth.tube_side.inlet_temperature, outcome.tube_outlet};
  return reading;
}

rating::Problem with_more_flow(rating::Problem problem, double factor) {
  problem.shell_side.mass_flow *= factor;
  return problem;
}

rating::Problem unfouled(rating::Problem problem) {
  problem.shell_side.fouling_resistance = problem.tube_side.fouling_resistance = 0.0;
  return problem;
}

Question question_of(const Anchor& anchor, const rating::Problem& of_case) {
  const auto problem = today(anchor, of_case);
  Question question{.problem = problem, .nominal = *rating::rate(problem).outcome, .sources = {}};
  question.sources = sources_of_today(anchor, problem, question.nominal);
  question.anchor = anchor;
  return question;
}

}  // namespace

TEST_CASE("anchor: an honest reading gives the deposit back, and the same outlets") {
  auto unit = cooler();
  for (double fouling : {0.0, 1e-4, 5e-4}) {
    CAPTURE(fouling);
    auto truth = unfouled(unit);
    truth.shell_side.fouling_resistance = fouling;
    const auto anchored = anchor_to(unit, read_of(truth));
    REQUIRE(anchored.value.has_value());
    CHECK(anchored.value->closing == Closing::closes);
    CHECK(anchored.value->resistance == doctest::Approx(fouling).epsilon(0.005).scale(1e-5));
    const auto again = rating::rate(today(*anchored.value, unit)).outcome;
    CHECK(std::abs(again->shell_outlet - rating::rate(truth).outcome->shell_outlet) < 0.01);
  }
}

TEST_CASE("anchor: a shell film 20 % off costs the absolute rating kelvins and the anchored one tenths") {
  const auto unit = cooler();
  for (double hidden : {0.8, 1.2}) {
    CAPTURE(hidden);
    auto truth = unit;
    truth.factors.shell_film = hidden;
    truth.shell_side.fouling_resistance = 5e-5;
    truth.tube_side.fouling_resistance = 5e-5;
    const auto anchored = anchor_to(unit, read_of(truth));
    REQUIRE(anchored.value.has_value());
    const double true_outlet = rating::rate(with_more_flow(truth, 1.15)).outcome->shell_outlet;
    const double absolute = rating::rate(with_more_flow(unit, 1.15)).outcome->shell_outlet;
    const double tied =
        rating::rate(today(*anchored.value, with_more_flow(unit, 1.15))).outcome->shell_outlet;
    CHECK(std::abs(absolute - true_outlet) > 1.0);
    CHECK(std::abs(tied - true_outlet) < 0.3);
    const auto spread = propagate(question_of(*anchored.value, with_more_flow(unit, 1.15)));
    REQUIRE(spread.has_value());
    // The reading's own 0.5 K and 3 % are what is left.
    CHECK((*spread)[Output::shell_outlet].sigma < 1.0);
  }
}

TEST_CASE("anchor: a unit better than its methods has a film multiplied, with a word") {
  const auto unit = cooler();
  auto truth = unfouled(unit);
  truth.factors.shell_film = 1.3;
  const auto anchored = anchor_to(unit, read_of(truth));
  REQUIRE(anchored.value.has_value());
  CHECK(anchored.value->resistance == 0.0);
  CHECK(anchored.value->film_side == Side::shell);
  CHECK(anchored.value->film_factor == doctest::Approx(1.3).epsilon(0.01));
  REQUIRE(anchored.findings.size() == 1);
  CHECK(anchored.findings[0].id == "anchor.better_than_clean");
}

TEST_CASE("anchor: two duties that do not agree are a heat balance fault, and nothing is said of today") {
  const auto unit = cooler();
  auto reading = read_of(unit);
  reading.tube_side.outlet += 8.0;
  const auto anchored = anchor_to(unit, reading);
  CHECK_FALSE(anchored.value.has_value());
  REQUIRE(anchored.findings.size() == 1);
  CHECK(anchored.findings[0].id == "anchor.heat_balance");
  CHECK(anchored.findings[0].severity == Severity::must);
  CHECK(anchored.findings[0].text.find("heat balance") != std::string::npos);
}

TEST_CASE("anchor: a missing flow is the one that balances, and the closure is untested") {
  const auto unit = cooler();
  auto reading = read_of(unit);
  const double flow = *reading.tube_side.mass_flow;
  reading.tube_side.mass_flow.reset();
  const auto anchored = anchor_to(unit, reading);
  REQUIRE(anchored.value.has_value());
  CHECK(anchored.value->closing == Closing::untested);
  CHECK(anchored.value->at_reading.tube_side.mass_flow == doctest::Approx(flow).epsilon(1e-6));
}

TEST_CASE("anchor: a duty no film explains has a reason") {
  const auto unit = cooler();
  auto reading = read_of(unit);
  reading.shell_side.outlet = 301.0;
  reading.tube_side.outlet = 349.0;
  reading.tube_side.mass_flow = 20.0;
  const auto anchored = anchor_to(unit, reading);
  CHECK_FALSE(anchored.value.has_value());
  REQUIRE_FALSE(anchored.findings.empty());
  CHECK(anchored.findings[0].id == "anchor.unexplained");
}

TEST_CASE("anchor: anchored probabilities come true as often as they say") {
  // Truth: the program's equations with films, heat capacities and reading drawn from the
  // spreads that are stated. Of events given probability p, p come true.
  const auto unit = cooler();
  std::mt19937_64 random(20261201);
  std::normal_distribution<double> normal;
  const auto lognormal = [&](double cv) { return std::exp(normal(random) * std::sqrt(std::log1p(cv * cv))); };
  constexpr int units = 500;
  int came_true = 0;
  double expected = 0, variance = 0;
  for (int i = 0; i < units; ++i) {
    auto truth = unfouled(unit);
    truth.shell_side.fouling_resistance = 4e-4 * lognormal(0.5);
    truth.factors.shell_film = lognormal(0.25);
    truth.factors.tube_film = lognormal(0.10);
    auto reading = read_of(truth);
    for (ReadStream* stream : {&reading.shell_side, &reading.tube_side}) {
      *stream->mass_flow *= 1.0 + reading.flow_sigma * normal(random);
      stream->inlet += reading.temperature_sigma * normal(random);
      stream->outlet += reading.temperature_sigma * normal(random);
    }
    const auto anchored = anchor_to(unit, reading);
    if (!anchored.value) continue;
    auto of_case = with_more_flow(unit, 1.15);
    auto question = question_of(*anchored.value, of_case);
    const double shift = 0.01 * normal(random);
    const double limit = question.nominal.duty * (1.0 + shift);
    question.meets = [limit](const rating::Outcome& outcome) { return outcome.duty >= limit; };
    const auto result = propagate(question, {.samples = 64});
    REQUIRE(result.has_value());
    const double p = *result->probability;
    expected += p;
    variance += p * (1.0 - p);
    came_true += rating::rate(with_more_flow(truth, 1.15)).outcome->duty >= limit;
  }
  CAPTURE(expected);
  CAPTURE(came_true);
  CHECK(std::abs(came_true - expected) < 3.0 * std::sqrt(variance + 0.25));
}
