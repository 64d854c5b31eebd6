#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>

#include "case_io_good.hpp"
#include "case_io_refused.hpp"
#include "dutygauge/case_io.hpp"
#include "dutygauge/field/times.hpp"

using namespace dutygauge;
using field::Channel;
using field::index_of;

namespace {

/// The cooler with all that may be said of a record and of a plan.
const std::string full = std::string(good::oil_cooler) + R"(readings:
  separator: ";"
  decimal: ","
  header_rows: 3
  time: {column: Zeit, format: "%d.%m.%Y %H:%M", offset: "+01:00", summer_time: eu}
  bad_words: [bad, no data, "-999"]
  columns:
    hot_flow: {tag: 21FI1043.PV, unit: t/h, uncertainty: {systematic: 3 %, random: 1 %}, trust: doubtful,
               meter: {kind: orifice, density: 741 kg/m3, compensated: no}}
    hot_in: {tag: 21TI1044.PV, unit: degC, uncertainty: {systematic: 0.5 K, random: 0.9 degF}}
    cold_flow: {tag: 21FI2007.PV, unit: m3/h, at: inlet, meter: {kind: magnetic}}
    tube_dp: {uncertainty: {systematic: 1 kPa, random: 0.01 bar}}
  clean_period: {from: 2026-03-10, to: 2026-03-17}
  events: [{from: 2026-08-11, to: 2026-08-16, what: outage}, {at: 2026-03-08T06:00Z, what: cleaning}]
plan: {next_stop: 2027-03-15, cleaning: {cost: 48000 EUR, days: 3, recovery: 85..100 %}, lost_duty_value: 28 EUR/MWh}
)";

case_io::Case built(const std::string& text) {
  return case_io::build(case_io::read_document(text, "x"));
}

std::int64_t utc(std::string_view text) {
  return field::read_moment(text, {}).value();
}

std::string with(std::string_view from, std::string_view to) {
  std::string text = full;
  const auto at = text.find(from);
  REQUIRE(at != std::string::npos);
  return text.replace(at, from.size(), to);
}

}  // namespace

TEST_CASE("case_io: how a record is written is read") {
  const auto readings = built(full).readings;
  CHECK(readings.separator == ';');
  CHECK(readings.decimal == ',');
  CHECK(readings.header_rows == 3);
  CHECK(readings.clock.column == "Zeit");
  CHECK(readings.clock.format == "%d.%m.%Y %H:%M");
  CHECK(readings.clock.offset == 3600);
  CHECK(readings.clock.summer_time == field::SummerTime::eu);
  CHECK(readings.bad_words == std::vector<std::string>{"bad", "no data", "-999"});
  const auto& hot_flow = readings.columns[index_of(Channel::hot_flow)];
  CHECK(hot_flow.tag == "21FI1043.PV");
  CHECK(hot_flow.unit == "t/h");
  CHECK(hot_flow.meter.principle == field::Principle::differential_pressure);
  CHECK(hot_flow.meter.density == 741.0);
  CHECK_FALSE(hot_flow.meter.compensated);
  CHECK(readings.columns[index_of(Channel::cold_flow)].at == "inlet");
  CHECK(readings.columns[index_of(Channel::cold_flow)].meter.compensated);
  CHECK(readings.columns[index_of(Channel::hot_out)].tag.empty());
}

TEST_CASE(
    "case_io: instruments are as stated, else as usual, and that is an assumption of the record alone") {
  const auto a_case = built(full);
  const auto& instruments = a_case.readings.instruments;
  const auto& flow = instruments[index_of(Channel::hot_flow)];
  CHECK(flow.relative);
  CHECK(flow.systematic == doctest::Approx(0.03));
  CHECK(flow.random == doctest::Approx(0.01));
  CHECK(flow.doubtful);
  const auto& inlet = instruments[index_of(Channel::hot_in)];
  CHECK_FALSE(inlet.relative);
  CHECK(inlet.systematic == doctest::Approx(0.5));
  CHECK(inlet.random == doctest::Approx(0.5));
  CHECK_FALSE(inlet.doubtful);
  const auto& drop = instruments[index_of(Channel::tube_dp)];
  CHECK_FALSE(drop.relative);
  CHECK(drop.random == doctest::Approx(1000.0));
  // A magnetic meter, in line; a Pt100 of class B at the cold inlet's 29 degC.
  CHECK(instruments[index_of(Channel::cold_flow)].systematic == doctest::Approx(0.0075));
  CHECK(instruments[index_of(Channel::cold_in)].systematic == doctest::Approx(0.25 + 0.003 * 29));
  const auto is_assumed = [&](std::string_view key) {
    return std::ranges::any_of(a_case.readings.assumed, [&](const auto& one) { return one.key == key; });
  };
  CHECK(is_assumed("readings.columns.cold_in.uncertainty.systematic"));
  CHECK(is_assumed("readings.columns.cold_flow.uncertainty.random"));
  CHECK_FALSE(is_assumed("readings.columns.hot_in.uncertainty.systematic"));
  for (const auto& one : a_case.assumed) CHECK_FALSE(one.key.starts_with("readings"));
  for (const auto& one : a_case.assumed) CHECK_FALSE(one.key.starts_with("plan"));
}

TEST_CASE("case_io: events and periods are instants, dates those of the plant") {
  const auto readings = built(full).readings;
  REQUIRE(readings.events.size() == 2);
  CHECK(readings.events[0].kind == field::Doing::cleaning);
  CHECK(readings.events[0].when.from == utc("2026-03-08T06:00Z"));
  CHECK(readings.events[0].when.to == readings.events[0].when.from);
  CHECK(readings.events[1].kind == field::Doing::outage);
  CHECK(readings.events[1].when.from == utc("2026-08-10T23:00Z"));
  CHECK(readings.events[1].when.to == utc("2026-08-16T23:00Z") - 1);  // to the end of that day
  REQUIRE(readings.clean_period);
  CHECK(readings.clean_period->from == utc("2026-03-09T23:00Z"));
  CHECK(readings.clean_period->to == utc("2026-03-17T23:00Z") - 1);
}

TEST_CASE("case_io: what is planned is read with its money") {
  const auto plan = built(full).plan;
  CHECK(plan.next_stop == utc("2027-03-14T23:00Z"));
  CHECK(plan.cleaning_cost == 48000.0);
  CHECK(plan.cleaning_time == 3.0 * 86400.0);
  CHECK(plan.recovery_low == doctest::Approx(0.85));
  CHECK(plan.recovery_high == doctest::Approx(1.0));
  CHECK(*plan.lost_duty_value * 3.6e9 == doctest::Approx(28.0));
  CHECK(plan.currency == "EUR");
}

TEST_CASE("case_io: a case without a record has usual instruments and no plan") {
  const auto a_case = built(std::string(good::oil_cooler));
  CHECK(a_case.readings.separator == 0);
  CHECK(a_case.readings.instruments[index_of(Channel::hot_flow)].systematic == doctest::Approx(0.015));
  CHECK(a_case.readings.events.empty());
  CHECK_FALSE(a_case.plan.next_stop);
  CHECK(a_case.plan.currency.empty());
}

TEST_CASE("case_io: the simulated plants are read as they stand") {
  for (const char* id : {"A", "B", "G"}) {
    CAPTURE(id);
    const auto a_case = case_io::build(case_io::read_file(std::string(TEST_DATA "/field/") + id + ".yaml"));
    CHECK(a_case.readings.assumed.empty());
    CHECK_FALSE(a_case.readings.events.empty());
    CHECK(a_case.readings.instruments[index_of(Channel::cold_out)].systematic == doctest::Approx(0.15));
  }
}

TEST_CASE("case_io: a fluid that is a heat capacity may be given at two points where films are laws") {
  const auto b = case_io::build(case_io::read_file(TEST_DATA "/field/B.yaml"));
  CHECK_FALSE(b.readings.shell_density_known);
  const auto at = [&](double celsius) {
    return fluids::state(b.problem.shell_side.fluid, celsius + 273.15, 5e5).heat_capacity;
  };
  CHECK(at(187) == doctest::Approx(2290));
  CHECK(at(237) == doctest::Approx(2450));
  CHECK(at(287) == doctest::Approx(2610));
}

TEST_CASE("case_io: mistakes in what is said of a record are named where they stand") {
  refused::check({
      {"separator", with("\";\"", "\"|\""), {"x:50:14: error: readings.separator:", "';', ',' or tab"}},
      {"both commas", with("separator: \";\"", "separator: \",\""), {"x:51:12:", "both separate values"}},
      {"decimal", with("decimal: \",\"", "decimal: \"'\""), {"x:51:12:", "no decimal mark"}},
      {"no header", with("header_rows: 3", "header_rows: 0"), {"x:52:16:", "below 1"}},
      {"format", with("%d.%m.%Y %H:%M", "%d.%m.%Q %H:%M"), {"x:53:32:", "readings.time.format", "%Q"}},
      {"half a format", with("%d.%m.%Y %H:%M", "%d.%m. %H:%M"), {"x:53:", "no year"}},
      {"offset", with("\"+01:00\"", "CET"), {"readings.time.offset", "no offset from UTC"}},
      {"summer", with(", offset: \"+01:00\"", ""), {"summer_time", "without the offset"}},
      {"summer word", with("summer_time: eu", "summer_time: europe"), {"summer_time", "none, eu or us"}},
      {"a block of bad words",
       with("[bad, no data, \"-999\"]", "bad"),
       {"readings.bad_words", "a list of texts"}},
      {"channel", with("    hot_in:", "    hot_inn:"), {"readings.columns.hot_inn", "hot_in"}},
      {"two of one tag",
       with("21TI1044.PV", "21FI1043.PV"),
       {"readings.columns.hot_in.tag", "tag of hot_flow"}},
      {"unit of a share",
       with("systematic: 0.5 K", "systematic: 1 %"),
       {"readings.columns.hot_in", "write it in K"}},
      {"no unit", with("systematic: 0.5 K", "systematic: 0.5"), {"hot_in.uncertainty.systematic", "no unit"}},
      {"a negative one", with("systematic: 0.5 K", "systematic: -0.5 K"), {"hot_in", "negative"}},
      {"a share too large", with("systematic: 3 %", "systematic: 300 %"), {"hot_flow", "between 0 and 50 %"}},
      {"half of one", with(", random: 1 %", ""), {"hot_flow.uncertainty.random", "is missing"}},
      {"mixed", with("random: 1 %", "random: 0.1 kg/s"), {"hot_flow.uncertainty", "both in the same way"}},
      {"a meter of no density", with(", density: 741 kg/m3", ""), {"compensated", "density"}},
      {"a meter of a temperature", with("tube_dp: {", "tube_dp: {meter: {kind: orifice}, "), {"no such key"}},
      {"a date both ways",
       with("from: 2026-03-10", "from: 03/10/2026"),
       {"clean_period.from", "its day or its month"}},
      {"no date", with("from: 2026-03-10", "from: spring"), {"clean_period.from", "no date"}},
      {"a period backwards", with("to: 2026-03-17", "to: 2026-03-01"), {"clean_period.to", "before from"}},
      {"an event never", with("at: 2026-03-08T06:00Z, ", ""), {"readings.events.1", "at alone"}},
      {"an event twice",
       with("{at: 2026-03-08T06:00Z", "{at: 2026-03-08T06:00Z, from: 2026-03-01"),
       {"readings.events.1", "at alone"}},
      {"an event of nothing", with("what: outage", "what: holiday"), {"events.0.what", "recalibration"}},
      {"money without a currency", with("48000 EUR", "48000"), {"plan.cleaning.cost", "with a currency"}},
      {"money in words", with("48000 EUR", "48000 Euro"), {"plan.cleaning.cost", "three capital letters"}},
      {"money per energy",
       with("48000 EUR", "48000 EUR/MWh"),
       {"plan.cleaning.cost", "more than a currency"}},
      {"a price of nothing", with("28 EUR/MWh", "28 EUR"), {"plan.lost_duty_value", "not for an energy"}},
      {"a price of a flow", with("28 EUR/MWh", "28 EUR/m3"), {"plan.lost_duty_value", "not for an energy"}},
      {"two currencies", with("28 EUR/MWh", "28 USD/MWh"), {"plan.lost_duty_value", "one currency"}},
      {"too much recovered", with("85..100 %", "85..120 %"), {"plan.cleaning.recovery", "above 100 %"}},
  });
}
