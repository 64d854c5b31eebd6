#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <nlohmann/json.hpp>
#include <optional>

#include "dutygauge/explore.hpp"

using namespace dutygauge;

namespace {

constexpr const char* flow = "streams.shell_side.flow";

case_io::Document case_named(const std::string& name) {
  return case_io::read_file(SOURCE_DIR "/cases/" + name + ".yaml");
}

const report::Limit* limit_named(const report::Reach& reach, std::string_view name) {
  const auto found = std::ranges::find(reach.limits, name, &report::Limit::name);
  return found == reach.limits.end() ? nullptr : &*found;
}

explore::Variation variation(const case_io::Document& document, const char* key, const char* range) {
  const auto read = explore::read_variation(*explore::dial(document, key), range);
  REQUIRE(std::holds_alternative<explore::Variation>(read));
  return std::get<explore::Variation>(read);
}

// The first step of a fine sweep, rising, after which `fails` is true; the two values it lies between.
template <class Fails>
std::optional<std::pair<double, double>> first_failure(const report::Sweep& sweep, Fails&& fails) {
  for (std::size_t i = 0; i + 1 < sweep.rows.size(); ++i) {
    const auto &low = sweep.rows[i], &high = sweep.rows[i + 1];
    if (low.running && high.running && !fails(*low.running) && fails(*high.running))
      return std::pair(low.at.front(), high.at.front());
  }
  return {};
}

}  // namespace

TEST_CASE("explore: reach finds the service line where a brute-force sweep sees it pass") {
  const auto document = case_named("lean-solvent-cooler");
  const auto dial = *explore::dial(document, flow);
  const auto reach = explore::reach(document, dial, {}, {});
  const auto sweep = explore::sweep(document, {variation(document, flow, "x1..x1.6:241")});
  const double most = 42.0 + 273.15;
  const auto between =
      first_failure(sweep, [most](const report::Running& one) { return one.shell_outlet > most; });
  REQUIRE(between.has_value());
  const auto* limit = limit_named(reach, "service.shell_side_outlet");
  REQUIRE(limit != nullptr);
  CHECK(limit->value >= between->first);
  CHECK(limit->value <= between->second);
  CHECK(limit->fails_above);
  REQUIRE(reach.room.has_value());
  REQUIRE(reach.room->above.has_value());
  CHECK(reach.room->above->name == "service.shell_side_outlet");
}

TEST_CASE("explore: at a limit of the service the outlet is the limit, to 1e-6 K") {
  const auto document = case_named("lean-solvent-cooler");
  const auto dial = *explore::dial(document, flow);
  const auto reach = explore::reach(document, dial, {}, {});
  const auto* limit = limit_named(reach, "service.shell_side_outlet");
  REQUIRE(limit != nullptr);
  const auto there = explore::rate(case_io::build(explore::turned(document, dial, limit->value)));
  CHECK(there.assessment.rating.outcome->shell_outlet == doctest::Approx(42.0 + 273.15).epsilon(1e-8));
}

TEST_CASE("explore: an allowable pressure drop stops the flow on its own side where the drop reaches it") {
  const auto document = case_named("lean-solvent-cooler");
  const auto dial = *explore::dial(document, "streams.tube_side.flow");
  const auto reach = explore::reach(document, dial, {}, {});
  const auto* limit = limit_named(reach, "tube_side.allowable_pressure_drop");
  REQUIRE(limit != nullptr);
  const auto there = explore::rate(case_io::build(explore::turned(document, dial, limit->value)));
  CHECK(there.assessment.rating.outcome->tube_drop.total() == doctest::Approx(60e3).epsilon(1e-6));
  const auto* velocity = limit_named(reach, "tube_side.velocity");
  REQUIRE(velocity != nullptr);
  const auto fast = explore::rate(case_io::build(explore::turned(document, dial, velocity->value)));
  CHECK(fast.assessment.rating.outcome->local.tube_film.velocity == doctest::Approx(3.0).epsilon(1e-6));
}

TEST_CASE("explore: limits come from the own value upwards, then downwards, in the order met") {
  const auto document = case_named("lean-solvent-cooler");
  const auto dial = *explore::dial(document, "streams.tube_side.flow");
  const auto reach = explore::reach(document, dial, {}, {});
  REQUIRE(reach.limits.size() >= 2);
  const double own = *dial.own;
  for (std::size_t i = 0; i + 1 < reach.limits.size(); ++i) {
    const double one = reach.limits[i].value, next = reach.limits[i + 1].value;
    const bool up = one >= own && next >= own, down = one < own && next < own;
    CHECK((up ? one <= next : down ? one >= next : one >= own));
  }
}

TEST_CASE("explore: a limit met nowhere is not reported, and one broken everywhere is said") {
  auto document = case_named("lean-solvent-cooler");
  const auto narrow = variation(document, flow, "x0.98..x1.02:5");
  const auto reach = explore::reach(document, narrow.dial, narrow, {});
  CHECK(reach.limits.empty());
  CHECK(reach.broken.empty());
  REQUIRE(reach.room.has_value());
  CHECK_FALSE(reach.room->above.has_value());
  CHECK_FALSE(reach.room->below.has_value());
  document = case_io::with_value(document, "service.shell_side_outlet.at_most", "29 degC");
  const auto hopeless = explore::reach(document, narrow.dial, narrow, {});
  CHECK(hopeless.limits.empty());
  CHECK(hopeless.broken.size() == 1);
  CHECK_FALSE(hopeless.room.has_value());
}

TEST_CASE("explore: two lines on one outlet are both seen, one either way") {
  auto document = case_named("lean-solvent-cooler");
  document = case_io::with_value(document, "service.shell_side_outlet.at_least", "38 degC");
  const auto reach = explore::reach(document, *explore::dial(document, flow), {}, {});
  REQUIRE(reach.room.has_value());
  REQUIRE(reach.room->below.has_value());
  REQUIRE(reach.room->above.has_value());
  CHECK(reach.room->below->what.find("at least") != std::string::npos);
  CHECK(reach.room->above->what.find("at most") != std::string::npos);
}

TEST_CASE("explore: a stream that leaves the range of its fluid is a limit, named as such") {
  const auto document = case_named("lean-solvent-cooler");
  const auto dial = *explore::dial(document, "streams.shell_side.inlet.temperature");
  const auto reach = explore::reach(document, dial, {}, {});
  const bool named = std::ranges::any_of(reach.limits, [](const report::Limit& limit) {
    return limit.stops &&
           (limit.name.ends_with("fluid_range") || limit.name == "streams.shell_side.inlet.temperature") &&
           !limit.what.empty();
  });
  CHECK(named);
}

TEST_CASE("explore: the map's column at the case's own second input is the reach itself") {
  const auto document = case_named("lean-solvent-cooler");
  const auto dial = *explore::dial(document, flow);
  const auto over = variation(document, "streams.tube_side.inlet.temperature", "26..30 degC:3");
  const auto reach = explore::reach(document, dial, {}, over);
  REQUIRE(reach.map.size() == 3);
  REQUIRE(reach.map[1].room.has_value());
  REQUIRE(reach.map[1].room->above.has_value());
  CHECK(reach.map[1].room->above->value == doctest::Approx(reach.room->above->value).epsilon(1e-8));
  // Colder water allows more.
  CHECK(reach.map[0].room->above->value > reach.map[2].room->above->value);
}

TEST_CASE("explore: whole numbers stop at the last one that holds") {
  const auto document = case_named("lean-solvent-cooler");
  const auto plugged = variation(document, "exchanger.tubes.plugged", "0..160:41");
  const auto reach = explore::reach(document, plugged.dial, plugged, {});
  REQUIRE(reach.room.has_value());
  REQUIRE(reach.room->above.has_value());
  const double last = reach.room->above->value;
  CHECK(last == std::floor(last));
  const auto met = [&](double number) {
    const auto result = explore::rate(case_io::build(explore::turned(document, plugged.dial, number)));
    return *result.assessment.verdict.met && result.assessment.rating.outcome->tube_drop.total() <= 60e3;
  };
  CHECK(met(last));
  CHECK_FALSE(met(last + 1.0));
}

TEST_CASE("explore: the reach as JSON holds limits with name, value, factor and relief, and what is held") {
  const auto document = case_named("lean-solvent-cooler");
  const auto dial = *explore::dial(document, flow);
  const auto reach = explore::reach(document, dial, {}, {});
  const auto json = nlohmann::json::parse(report::json(reach));
  REQUIRE(json["limits"].size() == reach.limits.size());
  for (const auto& limit : json["limits"]) {
    CHECK(limit["factor"].get<double>() == doctest::Approx(limit["value"].get<double>() / *dial.own));
    CHECK(limit.contains("relieved_by"));
  }
  CHECK(json["held"].size() == 5);
  const std::string page = report::text(reach);
  CHECK(page.find("Held constant") != std::string::npos);
}
