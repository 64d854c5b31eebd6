#include <doctest/doctest.h>

#include <boost/math/distributions/binomial.hpp>
#include <cmath>
#include <cstring>
#include <random>

#include "dutygauge/uncertainty.hpp"
#include "random_cases.hpp"
#include "support.hpp"
#include "water_cooler.hpp"

// The spread of ratings; the mathematics alone is in uncertainty_test.cpp.

using namespace dutygauge;
using namespace dutygauge::uncertainty;

namespace {

rating::Problem cooler() {
  return water_cooler(340.0);
}

Predicate duty_above(double limit) {
  return [limit](const rating::Outcome& outcome) { return outcome.duty >= limit; };
}

Question question_of(const rating::Problem& problem, double share_of_duty) {
  Question question{.problem = problem, .nominal = *rating::rate_mean(problem).outcome, .sources = {}};
  question.sources = sources_of(problem, question.nominal);
  question.meets = duty_above(share_of_duty * question.nominal.duty);
  return question;
}

bool same_bytes(const Result& a, const Result& b) {
  return std::memcmp(a.spreads.data(), b.spreads.data(), sizeof a.spreads) == 0 &&
         a.probability == b.probability && a.first_order_sigma == b.first_order_sigma;
}

}  // namespace

TEST_CASE("uncertainty: a rating has the same spread in every run, and costs at most 1100 ratings") {
  const Question question = question_of(cooler(), 0.97);
  const auto once = propagate(question), again = propagate(question);
  REQUIRE(once.has_value());
  CHECK(same_bytes(*once, *again));
  CHECK(once->samples == 1024);
  CHECK(once->evaluations <= 1100);
  CHECK(once->failed == 0);
}

TEST_CASE("uncertainty: shares add up to the variance, and the films and foulings carry most of the duty's") {
  const auto result = propagate(question_of(cooler(), 1.0));
  for (std::size_t k = 0; k < output_count; ++k) {
    double sum = 0;
    for (const Share& share : result->shares) sum += share.of[k];
    CHECK(sum == doctest::Approx(1.0).epsilon(1e-9));
  }
  CHECK(result->shares[0][Output::duty] >= result->shares[1][Output::duty]);
  double expected = 0;
  for (const Share& share : result->shares) {
    if (share.key.ends_with(".film") || share.key.ends_with(".fouling")) expected += share[Output::duty];
    if (share.key == "tube_side.pressure_drop") CHECK(share[Output::tube_drop] > 0.5);
    if (share.key.ends_with("pressure_drop")) CHECK(share[Output::duty] == 0.0);
  }
  CHECK(expected > 0.8);
}

TEST_CASE("uncertainty: a wider spread moves the probability towards one half") {
  for (double share_of_duty : {0.9, 1.1}) {
    double last = share_of_duty < 1.0 ? 1.0 : 0.0;
    for (double wider : {0.5, 1.0, 1.5, 2.0}) {
      Question question = question_of(cooler(), share_of_duty);
      for (Source& source : question.sources) source.sigma *= wider;
      const double probability = *propagate(question)->probability;
      if (share_of_duty < 1.0) {
        CHECK(probability <= last);
        CHECK(probability > 0.5);
      } else {
        CHECK(probability >= last);
        CHECK(probability < 0.5);
      }
      last = probability;
    }
  }
}

TEST_CASE("uncertainty: spreads stand around the nominal as it is shown") {
  Question question = question_of(cooler(), 1.0);
  const auto by_means = propagate(question);
  question.nominal = *rating::rate_march(question.problem).outcome;
  const auto by_march = propagate(question);
  const double ratio = question.nominal.duty / rating::rate_mean(question.problem).outcome->duty;
  CHECK(support::relative((*by_march)[Output::duty].mean, ratio * (*by_means)[Output::duty].mean) < 1e-12);
  const double inlet = question.problem.tube_side.inlet_temperature;
  CHECK((*by_march)[Output::tube_outlet].low > inlet);
  CHECK((*by_march)[Output::tube_outlet].low < question.nominal.tube_outlet);
  CHECK((*by_march)[Output::tube_outlet].high > question.nominal.tube_outlet);
}

TEST_CASE("uncertainty: deviations of the mean solution are those of the march") {
  // The claim under which samples are rated by mean properties.
  const rating::Problem problem = cooler();
  const auto march = rating::rate_march(problem).outcome, mean = rating::rate_mean(problem).outcome;
  for (const Source& source : sources_of(problem, *march))
    for (double deviate : {-1.0, 1.0}) {
      CAPTURE(source.key);
      rating::Problem swung = problem;
      apply(source, deviate, swung);
      const double by_march = rating::rate_march(swung).outcome->duty / march->duty;
      const double by_mean = rating::rate_mean(swung).outcome->duty / mean->duty;
      CHECK(std::abs(by_march - by_mean) < 0.002);
    }
}

TEST_CASE("uncertainty: the difference of two cases of one unit is surer than either") {
  rating::Problem more_flow = cooler();
  more_flow.tube_side.mass_flow *= 1.1;
  const std::vector<Question> questions{question_of(cooler(), 0.97), question_of(more_flow, 0.97)};
  const Together together = propagate_together(questions);
  REQUIRE(together.each[1].has_value());
  const double each = (*together.each[1])[Output::duty].sigma;
  const double difference = (*together.less_first[1])[0].sigma;
  CHECK(difference < 0.2 * each);
  CHECK((*together.less_first[0])[0].sigma == 0.0);
  // The first question is the same as alone.
  CHECK(same_bytes(*together.each[0], *propagate(questions[0])));
  CHECK(*together.probability_all <=
        std::min(*together.each[0]->probability, *together.each[1]->probability));

  // With nothing in common the variances add.
  std::vector<Question> apart = questions;
  for (Question& question : apart)
    for (Source& source : question.sources) source.common = false;
  const Together strangers = propagate_together(apart);
  const double expected =
      std::hypot((*strangers.each[0])[Output::duty].sigma, (*strangers.each[1])[Output::duty].sigma);
  CHECK(support::relative((*strangers.less_first[1])[0].sigma, expected) < 0.05);
}

TEST_CASE("uncertainty: inputs given with a spread reach the outlets") {
  Question question = question_of(cooler(), 1.0);
  question.sources = {{.name = "the inlet",
                       .key = "inlet",
                       .varied = Varied::inlet_temperature,
                       .side = Side::tube,
                       .sigma = 2.0,
                       .distribution = Distribution::normal,
                       .source = {}}};
  const auto result = propagate(question);
  // An outlet follows its own inlet by 1 - P and the other stream's by P (constant films): between 0 and 1.
  const double moved = (*result)[Output::tube_outlet].sigma / 2.0;
  const double p = question.nominal.p_tube;
  CHECK(std::abs(moved - (1.0 - p)) < 0.02);
  question.sources = {{.name = "the flow",
                       .key = "flow",
                       .varied = Varied::flow,
                       .side = Side::shell,
                       .sigma = 0.05,
                       .distribution = Distribution::normal,
                       .source = {}}};
  CHECK((*propagate(question))[Output::shell_drop].sigma / question.nominal.shell_drop.total() ==
        doctest::Approx(0.05 * 1.85).epsilon(0.06));  // drops go as flow^1.75 to ^2
}

TEST_CASE("uncertainty: samples without a result count as not meeting") {
  // Water close to boiling at the outlet: with more heat it leaves its range.
  rating::Problem problem = cooler();
  problem.shell_side.inlet_pressure = 40e5;
  problem.shell_side.inlet_temperature = 430.0;
  problem.shell_side.fluid = fluids::make_water(430.0, 40e5).fluid;
  problem.tube_side.inlet_pressure = 1.2e5;
  problem.tube_side.mass_flow = 25.0;
  for (; problem.tube_side.mass_flow > 5.0; problem.tube_side.mass_flow *= 0.98) {
    rating::Problem less = problem;
    less.tube_side.mass_flow *= 0.98;
    if (!rating::rate_mean(less).outcome) break;
  }
  REQUIRE(problem.tube_side.mass_flow > 5.0);
  const auto result = propagate(question_of(problem, 0.01));
  REQUIRE(result.has_value());
  CHECK(result->failed > 0);
  CHECK(*result->probability == doctest::Approx(1.0 - result->failed / 1024.0));
  CHECK(std::isfinite((*result)[Output::duty].sigma));
}

TEST_CASE("uncertainty: a nominal without result has no spread") {
  Question question = question_of(cooler(), 1.0);
  question.problem.tube_side.inlet_temperature = 460.0;  // steam at this pressure
  CHECK_FALSE(propagate(question).has_value());
}

TEST_CASE("uncertainty: regimes and what is known of the drawing set the scatter of the methods") {
  const auto sigma_of = [](const rating::Problem& problem, std::string_view key) {
    for (const Source& source : sources_of(problem, *rating::rate_mean(problem).outcome))
      if (source.key == key) return source.sigma;
    return 0.0;
  };
  rating::Problem problem = cooler();
  CHECK(sigma_of(problem, "tube_side.film") == 0.10);
  CHECK(sigma_of(problem, "shell_side.film") == 0.25);
  problem.exchanger.as_described.tube_to_baffle = problem.exchanger.as_described.shell_to_baffle =
      problem.exchanger.as_described.bundle_to_shell = 0.001;
  CHECK(sigma_of(problem, "shell_side.film") == 0.20);
  problem.methods.shell_side = shellside::Method::kern;
  CHECK(sigma_of(problem, "shell_side.film") == 0.35);
  problem.tube_side.mass_flow = 2.0;
  problem.tube_side.mass_flow *= 3000.0 / rating::rate_mean(problem).outcome->local.tube_film.reynolds;
  CHECK(sigma_of(problem, "tube_side.film") == 0.30);
  CHECK(sigma_of(problem, "shell_side.fouling") == 0.40);
  problem.shell_side.fouling_resistance = 0.0;
  CHECK(sigma_of(problem, "shell_side.fouling") == 0.0);  // nothing to be wrong
}

TEST_CASE("uncertainty: events given a probability happen that often") {
  // Units whose truth is drawn from the very spreads: of all those said to meet with probability
  // p, the part p does, within what chance allows.
  random_cases::Generator generator(512);
  std::mt19937_64 engine(99);
  std::uniform_real_distribution<double> asked(0.85, 1.1);
  std::normal_distribution<double> normal;
  constexpr int bins = 5;
  std::array<int, bins> units{}, met{};
  std::array<double, bins> expected{};
  for (int rated = 0; rated < 500;) {
    const rating::Problem problem = generator.next();
    if (!rating::rate_mean(problem).outcome) continue;
    const Question question = question_of(problem, asked(engine));
    const auto result = propagate(question, {.samples = 128});
    if (!result) continue;
    ++rated;
    rating::Problem truth = problem;
    for (const Source& source : question.sources) apply(source, normal(engine), truth);
    const auto outcome = rating::rate_mean(truth).outcome;
    const auto bin =
        static_cast<std::size_t>(std::min(bins - 1, static_cast<int>(bins * *result->probability)));
    ++units[bin];
    met[bin] += outcome && question.meets(*outcome);
    expected[bin] += *result->probability;
  }
  for (std::size_t bin = 0; bin < bins; ++bin) {
    CAPTURE(bin);
    CAPTURE(units[bin]);
    CAPTURE(met[bin]);
    REQUIRE(units[bin] >= 20);
    const boost::math::binomial count(units[bin], std::clamp(expected[bin] / units[bin], 1e-3, 1.0 - 1e-3));
    // Both tails 0.5 % in each of five bins: one false alarm in twenty sets of seeds.
    CHECK(boost::math::cdf(count, met[bin]) > 0.005);
    CHECK(boost::math::cdf(boost::math::complement(count, met[bin] - 1.0)) > 0.005);
  }
}
