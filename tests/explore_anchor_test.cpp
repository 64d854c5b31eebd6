#include <doctest/doctest.h>

#include <nlohmann/json.hpp>

#include "dutygauge/explore.hpp"
#include "support.hpp"

// A case file with an anchor, through to its page and its JSON.

using namespace dutygauge;

namespace {

const std::string good_anchor =
    "anchor:\n"
    "  taken: 2026-11-29T14:00+01:00\n"
    "  shell_side: {flow: 93 klb/h, inlet: 164 degF, outlet: 104.5 degF}\n"
    "  tube_side: {flow: 560 gpm, inlet: 85 degF, outlet: 95.2 degF}\n"
    "  instruments: {temperature: 0.9 degF, flow: 3 %}\n";

case_io::Document with_anchor(std::string anchor, const std::string& what = "", const std::string& by = "") {
  if (!what.empty()) {
    const auto at = anchor.find(what);
    REQUIRE(at != std::string::npos);
    anchor.replace(at, what.size(), by);
  }
  auto text = support::read_text(SOURCE_DIR "/cases/naphtha-cooler.yaml");
  if (const auto own = text.find("\nanchor:"); own != std::string::npos) {
    auto end = own + 1;
    do end = text.find('\n', end) + 1;
    while (end < text.size() && text[end] == ' ');
    text.erase(own + 1, end - own - 1);
  }
  return case_io::read_document(text + anchor, "anchored.yaml");
}

std::string mistakes_of(const case_io::Document& document) {
  try {
    case_io::build_all(document);
  } catch (const case_io::InputError& error) {
    std::string all;
    for (const auto& line : error.lines()) all += line + "\n";
    return all;
  }
  return "";
}

}  // namespace

TEST_CASE("anchor: every operating case is rated as the unit is today") {
  const auto result = explore::rate(with_anchor(good_anchor));
  REQUIRE(result.anchored.has_value());
  const auto json = nlohmann::json::parse(report::json(result));
  CHECK(json["anchor"]["verdict"] == "closes");
  CHECK(json["anchor"]["resistance_m2K_W"].get<double>() > 0.0);
  REQUIRE(json["operating_cases"].size() == result.cases.size());
  for (const auto& [name, one] : json["operating_cases"].items()) {
    CAPTURE(name);
    const auto& today = one["states"]["today"];
    CHECK(today["thermal"]["duty_W"].get<double>() <
          one["states"]["clean"]["thermal"]["duty_W"].get<double>());
    CHECK(today["verdict"]["probability"].is_number());
    CHECK(today["change_since_reading"]["duty_W"]["sigma"].get<double>() > 0.0);
    // Tied to a reading, it is much surer than by the methods alone.
    CHECK(today["spread"]["duty_W"]["sigma"].get<double>() <
          0.6 * one["states"]["design_fouling"]["spread"]["duty_W"]["sigma"].get<double>());
  }
  CHECK(json["states"]["today"]["thermal"]["duty_W"].is_number());
  const auto page = report::text(result, {});
  CHECK(page.find("  design      today ") != std::string::npos);
  CHECK(page.find("its heat balance closes") != std::string::npos);
  CHECK(page.find("From there to then") != std::string::npos);
}

TEST_CASE("anchor: without one there is no state today") {
  const auto json = nlohmann::json::parse(report::json(explore::rate(with_anchor(""))));
  CHECK(json["anchor"].is_null());
  CHECK_FALSE(json["states"].contains("today"));
}

TEST_CASE("anchor: duties that do not agree leave no state today, and a must") {
  const auto result = explore::rate(with_anchor(good_anchor, "outlet: 95.2 degF", "outlet: 108 degF"));
  CHECK_FALSE(result.anchored.has_value());
  const auto found = std::ranges::find(result.findings, "anchor.heat_balance", &Finding::id);
  REQUIRE(found != result.findings.end());
  CHECK(found->severity == Severity::must);
  CHECK(found->text.starts_with("heat balance fault"));
}

TEST_CASE("anchor: instruments left out are assumed and listed") {
  const auto document = with_anchor(good_anchor, "  instruments: {temperature: 0.9 degF, flow: 3 %}\n", "");
  const auto result = explore::rate(document);
  for (const char* key : {"anchor.instruments.temperature", "anchor.instruments.flow"})
    CHECK(std::ranges::find(result.assumed, key, &Assumption::key) != result.assumed.end());
}

TEST_CASE("anchor: one missing flow is found from the balance") {
  const auto result = explore::rate(with_anchor(good_anchor, "flow: 560 gpm, ", ""));
  REQUIRE(result.anchored.has_value());
  CHECK(result.anchored->anchor.closing == uncertainty::Closing::untested);
}

TEST_CASE("anchor: a fouling found from a record is the unit of today") {
  const auto result = explore::rate(with_anchor("anchor: {fouling: 0.0004 +- 0.00008 m2.K/W}\n"));
  REQUIRE(result.anchored.has_value());
  const auto& one = result.cases.front();
  CHECK(one.today->assessment.problem.shell_side.fouling_resistance > 0.0);
  const auto& resistances = one.today->assessment.rating.outcome->local.resistances;
  CHECK(resistances.tube_fouling + resistances.shell_fouling == doctest::Approx(4e-4).epsilon(0.01));
  // What is left open is the fouling's own spread: d ln Q = -U sigma E, with E below one.
  const auto& outcome = *one.today->assessment.rating.outcome;
  const double most = outcome.local.u_dirty * 8e-5;
  const auto& spread = (*one.today->spread)[uncertainty::Output::duty];
  CHECK(spread.sigma / outcome.duty < most);
  CHECK(spread.sigma / outcome.duty > 0.2 * most);
  CHECK(report::text(result, {}).find("the fouling that its record has shown") != std::string::npos);
  CHECK(mistakes_of(with_anchor("anchor: {fouling: 0.0004 m2.K/W, shell_side: {inlet: 164 degF, outlet: 104 "
                                "degF}}\n"))
            .find("stands beside anchor.fouling") != std::string::npos);
  CHECK(mistakes_of(with_anchor("anchor: {taken: 2026-11-29}\n")).find("anchor.shell_side is missing") !=
        std::string::npos);
}

TEST_CASE("anchor: a reading that cannot be is refused with its key") {
  struct Row {
    std::string what, by, expected;
  };
  const Row rows[] = {
      {"outlet: 104.5 degF", "outlet: 170 degF",
       "anchor.shell_side.outlet: the hot stream was read to go from"},
      {"outlet: 95.2 degF", "outlet: 80 degF",
       "anchor.tube_side.outlet: the cold stream was read to go from"},
      {"inlet: 164 degF", "inlet: 60 degF", "anchor.tube_side.inlet: the shell side was read to enter at"},
      {"outlet: 104.5 degF", "outlet: 82 degF", "anchor.shell_side.outlet: "},
      {"flow: 560 gpm", "flow: from_duty", "anchor.tube_side.flow: from_duty is no reading"},
      {", outlet: 95.2 degF", "", "anchor.tube_side.outlet"},
      {"temperature: 0.9 degF", "temperature: 0 K", "anchor.instruments.temperature"},
      {"flow: 3 %", "flow: 80 %", "anchor.instruments.flow"},
      {"inlet: 164 degF", "inlet: 1500 degF", "anchor.shell_side.inlet"},
      {"outlet: 95.2 degF", "outlet: 300 degF", "anchor.tube_side.outlet"},
      {"taken:", "takn:", "anchor.takn"},
  };
  for (const Row& row : rows) {
    CAPTURE(row.by);
    const auto said = mistakes_of(with_anchor(good_anchor, row.what, row.by));
    CAPTURE(said);
    CHECK(said.find(row.expected) != std::string::npos);
  }
  auto neither = good_anchor;
  neither.replace(neither.find("flow: 93 klb/h, "), 16, "");
  CHECK(mistakes_of(with_anchor(neither, "flow: 560 gpm, ", "")).find("neither flow was read") !=
        std::string::npos);
}

TEST_CASE("anchor: a reading of next to no duty ends in a result, not in a fault of ours") {
  const auto lean = support::read_text(SOURCE_DIR "/cases/lean-solvent-cooler.yaml");
  const char* readings[] = {
      "anchor: {shell_side: {flow: 108 t/h, inlet: 61 degC, outlet: 60 degC}, tube_side: {flow: 215 m3/h at "
      "inlet, "
      "inlet: 28 degC, outlet: 28.5 degC}}\n",
      "anchor: {shell_side: {flow: 1 t/h, inlet: 61 degC, outlet: 28.1 degC}, tube_side: {flow: 215 m3/h at "
      "inlet, "
      "inlet: 28 degC, outlet: 28.1 degC}}\n"};
  for (const char* reading : readings) {
    CAPTURE(reading);
    const auto result = explore::rate(case_io::read_document(lean + reading, "x"));
    CHECK(nlohmann::json::parse(report::json(result))["verdict"].is_object());
  }
}

TEST_CASE("anchor: a unit may do its service at design fouling and miss it today") {
  const auto lean = support::read_text(SOURCE_DIR "/cases/lean-solvent-cooler.yaml");
  const auto result =
      explore::rate(case_io::read_document(lean + "anchor: {fouling: 0.00329 +- 0.00003 m2.K/W}\n", "x"));
  CHECK(*result.assessment.verdict.met);
  REQUIRE(result.cases[0].today.has_value());
  CHECK_FALSE(*result.cases[0].today->assessment.verdict.met);
}
