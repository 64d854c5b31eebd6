#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <nlohmann/json.hpp>

#include "dutygauge/explore.hpp"

using namespace dutygauge;

namespace {

case_io::Document case_named(const std::string& name) {
  return case_io::read_file(SOURCE_DIR "/cases/" + name + ".yaml");
}

report::Result weighed(const case_io::Document& document) {
  auto result = explore::rate(case_io::build(document));
  explore::weigh(document, result);
  return result;
}

}  // namespace

TEST_CASE("explore: a lever is the difference between two ratings") {
  const auto document = case_named("lean-solvent-cooler");
  const auto levers = explore::levers(document);
  const auto more_water = std::ranges::find(levers, "streams.tube_side.flow", &report::Lever::key);
  REQUIRE(more_water != levers.end());
  CHECK(more_water->in_kelvin);
  const auto before = explore::rate(case_io::build(document));
  const auto after =
      explore::rate(case_io::build(case_io::with_factor(document, "streams.tube_side.flow", 1.1)));
  const double gain =
      before.assessment.rating.outcome->shell_outlet - after.assessment.rating.outcome->shell_outlet;
  CHECK(more_water->gain == doctest::Approx(gain).epsilon(1e-6));
  CHECK(more_water->tube_drop == doctest::Approx(after.assessment.rating.outcome->tube_drop.total()));
  CHECK(more_water->costs_tube);
  CHECK_FALSE(more_water->costs_shell);
}

TEST_CASE("explore: cleaning both sides gains more than either, and an inlet moves the way that helps") {
  const auto levers = explore::levers(case_named("lean-solvent-cooler"));
  const auto gain = [&levers](std::string_view what) {
    const auto found = std::ranges::find(levers, what, &report::Lever::what);
    return found == levers.end() ? -1.0 : found->gain;
  };
  CHECK(gain("cleaned on both sides") > gain("tubes cleaned inside"));
  CHECK(gain("cleaned on both sides") > gain("tubes cleaned outside"));
  CHECK(gain("tubes cleaned outside") > 0.0);
  CHECK(gain("plugged tubes renewed") > 0.0);
  CHECK(gain("cooling water 1 K colder") > 0.0);
  CHECK(gain("cooling water 1 K warmer") == -1.0);
}

TEST_CASE("explore: an effect is the margin at the ends of an assumption's span less the margin now") {
  for (const char* name : {"lean-solvent-cooler", "gear-oil-in-tubes", "kerosene-rundown-cooler"}) {
    CAPTURE(name);
    const auto document = case_named(name);
    const auto result = weighed(document);
    REQUIRE(result.effects.size() == result.assumed.size());
    for (std::size_t i = 0; i < result.assumed.size(); ++i) {
      const Assumption& one = result.assumed[i];
      CAPTURE(one.key);
      if (!one.low || !one.high) continue;
      REQUIRE(result.effects[i].has_value());
      const auto& effect = *result.effects[i];
      if (effect.margin != report::Effect::Margin::temperature) continue;
      const auto at_low = explore::rate(case_io::build(
          case_io::with_value(document, one.key, units::typed(*one.low, one.kind, units::System::si, 16))));
      const auto room = [&result](const report::Result& of) {
        const auto& demands = result.assessment.service.demands;
        const auto line = std::ranges::find_if(demands, [&result](const service::Demand& demand) {
          return service::key_of(demand.quantity) == result.assessment.verdict.limited_by;
        });
        return service::distance(*line, *of.assessment.rating.outcome);
      };
      CHECK(*effect.at_low == doctest::Approx(room(at_low) - room(result)).epsilon(1e-6));
    }
  }
}

TEST_CASE("explore: an assumption that decides the answer is said outright, with where to look") {
  auto document = case_named("kerosene-rundown-cooler");
  const auto plain = weighed(document);
  // Between the outlets at both ends of the widest span lies a limit that the span decides.
  std::size_t widest = 0;
  for (std::size_t i = 0; i < plain.effects.size(); ++i)
    if (plain.effects[i] && plain.effects[i]->margin == report::Effect::Margin::temperature &&
        (!plain.effects[widest] || plain.effects[i]->size > plain.effects[widest]->size))
      widest = i;
  REQUIRE(plain.effects[widest].has_value());
  const auto& effect = *plain.effects[widest];
  const double worst = std::min(*effect.at_low, *effect.at_high);
  REQUIRE(worst < 0.0);
  const double outlet = plain.assessment.rating.outcome->shell_outlet;
  document = case_io::with_value(
      document, "service.shell_side_outlet.at_most",
      units::typed(outlet - 0.5 * worst, units::Kind::temperature, units::System::si, 12));
  const auto result = weighed(document);
  CHECK(result.effects[widest]->changes_answer);
  const std::string page = report::text(result, {});
  CHECK(page.find("would change an answer") != std::string::npos);
  CHECK(page.find("None of them") == std::string::npos);
}

TEST_CASE("report: levers and effects stand in the JSON and on the page") {
  const auto result = weighed(case_named("kerosene-rundown-cooler"));
  const auto json = nlohmann::json::parse(report::json(result));
  CHECK(json["levers"].size() == result.levers.size());
  bool any = false;
  for (const auto& one : json["assumed"])
    if (!one["effect"].is_null()) {
      any = true;
      CHECK(one["effect"]["at_low"].is_number());
      CHECK(one["effect"]["margin"].is_string());
    }
  CHECK(any);
  CHECK(report::text(result, {}).find("LEVERS") != std::string::npos);
}

TEST_CASE("explore: compare shows what was changed and what came of it") {
  const auto a = case_named("lean-solvent-cooler");
  const auto b = case_io::with_value(a, "streams.shell_side.flow", "120 t/h");
  const auto comparison = explore::compare(a, b);
  REQUIRE(comparison.inputs.size() == 1);
  CHECK(comparison.inputs[0].key == "streams.shell_side.flow");
  CHECK(comparison.inputs[0].before == "108 t/h");
  CHECK(comparison.inputs[0].after == "120 t/h");
  CHECK(comparison.after.running->duty > comparison.before.running->duty);
  CHECK(explore::compare(a, a).inputs.empty());
  const auto json = nlohmann::json::parse(report::json(comparison));
  CHECK(json["outputs"][0]["name"] == "duty_W");
  CHECK(json["outputs"][0]["difference"].get<double>() ==
        doctest::Approx(comparison.after.running->duty - comparison.before.running->duty));
  // Both have the same scatter: the difference is surer than either, and this one stands out.
  const double of_difference = json["outputs"][0]["difference_90"].get<double>();
  const auto spread = explore::rate(a).spread;
  CHECK(of_difference < 0.3 * (spread->spreads[0].high - spread->spreads[0].low));
  CHECK(json["outputs"][0]["significant"] == true);
}

TEST_CASE("explore: a difference smaller than what it may be wrong by is not called significant") {
  const auto a = case_named("lean-solvent-cooler");
  // By the other method for the shell, whose scatter is another one, the duty is hardly another.
  const auto b = case_io::with_value(a, "methods.shell_side", "kern");
  const auto json = nlohmann::json::parse(report::json(explore::compare(a, b)));
  CHECK(json["outputs"][0]["significant"] == false);
  CHECK(report::text(explore::compare(a, b)).find("within the spread") != std::string::npos);
}

TEST_CASE("explore: recorded results compare as the cases do, without how sure it is") {
  const auto a = case_named("lean-solvent-cooler");
  const auto b = case_io::with_value(a, "streams.shell_side.flow", "120 t/h");
  const auto recorded = report::recorded(report::json(explore::rate(a)));
  REQUIRE(recorded.has_value());
  const auto comparison = explore::compare(*recorded, explore::compared(b));
  REQUIRE(comparison.inputs.size() == 1);
  CHECK(comparison.inputs[0].before == "108 t/h");
  CHECK(comparison.before.running->duty == doctest::Approx(explore::compared(a).running->duty));
  CHECK_FALSE(comparison.spread.has_value());
  CHECK_FALSE(report::recorded("dutygauge: 1").has_value());
  CHECK_FALSE(report::recorded("{\"a\": 1}").has_value());
  CHECK_THROWS_AS(report::recorded(R"({"schema_version": 1})"), std::invalid_argument);
  CHECK_THROWS_AS(report::recorded(R"({"schema_version": 1, "error": ["x"]})"), std::invalid_argument);
}
