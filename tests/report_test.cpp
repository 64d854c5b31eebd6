#include <doctest/doctest.h>

#include <algorithm>
#include <limits>
#include <nlohmann/json.hpp>
#include <stdexcept>
#include <string>
#include <vector>

#include "dutygauge/report.hpp"

// All numbers here are invented: the reports are checked, not the physics.

namespace {

using namespace dutygauge;
using Json = nlohmann::ordered_json;
using units::Kind;

rating::Outcome invented_outcome() {
  rating::Outcome outcome;
  outcome.duty = outcome.duty_ntu = outcome.duty_lmtd = 1.3e6;
  outcome.shell_outlet = 327.4;
  outcome.tube_outlet = 299.5;
  outcome.local.resistances = {.tube_film = 1.5e-4,
                               .tube_fouling = 4.4e-4,
                               .wall = 2.1e-4,
                               .shell_fouling = 1.8e-4,
                               .shell_film = 6.7e-3};
  outcome.local.walls = {297.5, 301.7, 299.0};
  outcome.local.u_dirty = 130.0;
  outcome.local.u_clean = 142.0;
  outcome.tube_drop = {.friction = 52e3, .turns = 13.7e3, .nozzles = 1.7e3};
  outcome.shell_drop = {.crossflow = 2.1e3, .window = 1.3e3, .ends = 0.6e3};
  outcome.local.tube_film = {.coefficient = 8757.0,
                             .nusselt = 278.7,
                             .reynolds = 53920.0,
                             .prandtl = 3.98,
                             .velocity = 1.62,
                             .mass_flux = 1600.0,
                             .regime = tubeside::Regime::turbulent};
  outcome.local.shell_film = {.coefficient = 149.0,
                              .ideal = 312.0,
                              .reynolds = 195.0,
                              .prandtl = 722.0,
                              .velocity = 0.38,
                              .mass_flux = 350.0,
                              .j_cut = 0.97};
  return outcome;
}

report::Result invented_result() {
  report::Result result{
      .file = "oil.yaml",
      .title = "Oil cooler",
      .tag = "E-1",
      .input_sha256 = "7f3a91c2aaaa",
      .assessment = {},
      .inputs = {{.key = "exchanger.tubes.count",
                  .as_typed = "208",
                  .si = 208,
                  .kind = Kind::count,
                  .line = 9,
                  .origin = "typed"},
                 {.key = "exchanger.tema", .as_typed = "AES", .is_word = true, .line = 3, .origin = "typed"},
                 {.key = "streams.tube_side.inlet.temperature",
                  .as_typed = "20 degC",
                  .si = 293.15,
                  .kind = Kind::temperature,
                  .line = 12,
                  .origin = "typed"}},
      .assumed = {{.key = "exchanger.clearances.tube_to_baffle",
                   .value = 0.0008,
                   .kind = Kind::length,
                   .why = "practice",
                   .low = 0.0004,
                   .high = 0.001,
                   .look_in = "bundle drawing"},
                  {.key = "streams.tube_side.fluid.phase", .word = "liquid", .why = "not said"}},
      .findings = {}};
  auto& assessment = result.assessment;
  assessment.problem.shell_side = {
      .name = "lube oil", .fluid = {}, .mass_flow = 35.0, .inlet_temperature = 345.0};
  assessment.problem.tube_side = {
      .name = "water", .fluid = {}, .mass_flow = 57.0, .inlet_temperature = 293.95};
  assessment.problem.exchanger.area = 260.0;
  assessment.rating.outcome = invented_outcome();
  assessment.rating.largest_duty = 3.8e6;
  assessment.service = {.demands = {{service::Quantity::duty, true, 1.1e6}},
                        .shell_side_allowable_drop = 3.9e3,
                        .tube_side_allowable_drop = 136e3};
  assessment.margins = {.required_duty = 1.1e6,
                        .u_required = 105.0,
                        .duty = 0.18,
                        .surface = 0.24,
                        .surface_clean = 0.35,
                        .fouling_spare = 0.0018,
                        .temperature = {}};
  assessment.verdict = {
      .met = true, .limited_by = "service.duty", .text = "Yes: 1300 kW against at least 1100 kW."};
  assessment.second_opinion = invented_outcome();
  assessment.second_opinion->duty = 1.0e6;
  assessment.second_opinion->local.shell_film.coefficient = 119.2;
  return result;
}

Finding invented_finding(std::string id, Severity severity) {
  return {.id = std::move(id),
          .severity = severity,
          .text = "the wall is {value}, above {limit}; lower the flow",
          .value = 373.15,
          .limit = 353.15,
          .kind = Kind::temperature};
}

std::vector<std::string> lines_of(const std::string& text) {
  std::vector<std::string> lines(1);
  for (char c : text) {
    if (c == '\n')
      lines.emplace_back();
    else
      lines.back() += c;
  }
  return lines;
}

void check_page(const std::string& text) {
  for (const auto& line : lines_of(text)) {
    CAPTURE(line);
    CHECK(line.size() <= 100);
    CHECK(std::ranges::all_of(line, [](char c) { return c >= ' ' && c <= '~'; }));
    CHECK((line.empty() || line.back() != ' '));
  }
}

std::string line_with(const std::string& text, const std::string& start) {
  for (const auto& line : lines_of(text))
    if (line.starts_with(start)) return line;
  return "";
}

// The page with its line breaks and blanks made single blanks.
std::string unwrapped(const std::string& text) {
  std::string words;
  for (char c : text)
    if (c != ' ' && c != '\n')
      words += c;
    else if (!words.ends_with(' '))
      words += ' ';
  return words;
}

std::vector<std::string> keys_of(const Json& object) {
  std::vector<std::string> keys;
  for (const auto& [key, value] : object.items()) keys.push_back(key);
  return keys;
}

}  // namespace

TEST_CASE("report: the JSON object is one line with its keys in a fixed order") {
  const std::string line = report::json(invented_result());
  CHECK(line.find('\n') == std::string::npos);
  const auto object = Json::parse(line);
  CHECK(keys_of(object) == std::vector<std::string>{"dutygauge", "schema_version",  "input_sha256",
                                                    "case",      "operating_case",  "present_since",
                                                    "verdict",   "thermal",         "resistances_m2K_W",
                                                    "tube_side", "shell_side",      "margins",
                                                    "spread",    "control",         "solutions",
                                                    "states",    "operating_cases", "anchor",
                                                    "assumed",   "levers",          "findings",
                                                    "claims",    "inputs",          "between_shells",
                                                    "profile"});
  CHECK(keys_of(object["thermal"]) ==
        std::vector<std::string>{"duty_W", "duty_ntu_W", "duty_lmtd_W", "shell_side_outlet_degC",
                                 "tube_side_outlet_degC", "effectiveness", "ntu", "capacity_ratio", "lmtd_K",
                                 "f_correction", "mtd_K", "area_m2", "u_clean_W_m2K", "u_dirty_W_m2K",
                                 "u_required_W_m2K", "ua_W_K", "balance_error"});
  CHECK(object["states"]["design_fouling"]["thermal"] == object["thermal"]);
  CHECK(object["operating_cases"]["base"]["margins"] == object["margins"]);
}

TEST_CASE("report: JSON numbers are SI with temperatures in degC") {
  const auto object = Json::parse(report::json(invented_result()));
  CHECK(object["thermal"]["shell_side_outlet_degC"].get<double>() == doctest::Approx(54.25));
  CHECK(object["tube_side"]["wall_degC"].get<double>() == doctest::Approx(24.35));
  CHECK(object["thermal"]["ua_W_K"].get<double>() == doctest::Approx(130.0 * 260.0));
  CHECK(object["inputs"][2]["si"].get<double>() == doctest::Approx(20.0));
  CHECK(object["inputs"][2]["unit"] == "degC");
  CHECK(object["inputs"][1]["si"].is_null());
  CHECK(object["assumed"][0]["low"] == "0.4 mm");
  CHECK(object["assumed"][1]["value"] == "liquid");
  CHECK(object["assumed"][1]["low"].is_null());
  CHECK(object["verdict"]["grade"].is_null());
  CHECK(object["verdict"]["probability"].is_null());
}

TEST_CASE("report: a finding's text carries its two numbers") {
  auto result = invented_result();
  result.findings = {invented_finding("tubeside.wall", Severity::must)};
  const auto finding = Json::parse(report::json(result))["findings"][0];
  CHECK(finding["text"] == "the wall is 100.0 degC, above 80.0 degC; lower the flow");
  CHECK(finding["value"].get<double>() == doctest::Approx(100.0));
  CHECK(finding["unit"] == "degC");
  CHECK(finding["severity"] == "must");
  CHECK(finding["ground"] == "method");
  result.display = units::System::us;
  CHECK(report::text(result, {}).find("the wall is 212.0 degF, above 176.0 degF") != std::string::npos);
}

TEST_CASE("report: a number that is not finite is refused, never printed as null") {
  auto result = invented_result();
  result.assessment.rating.outcome->ntu = std::numeric_limits<double>::quiet_NaN();
  CHECK_THROWS_AS(report::json(result), std::logic_error);
}

TEST_CASE("report: without a result the blocks are null and the verdict says why") {
  auto result = invented_result();
  result.assessment.rating = {};
  result.assessment.rating.no_result = "the water boils";
  result.assessment.margins = {};
  result.assessment.second_opinion.reset();
  result.assessment.verdict = {.met = {}, .limited_by = "no result", .text = ""};
  const auto object = Json::parse(report::json(result));
  for (const char* block : {"thermal", "resistances_m2K_W", "tube_side", "shell_side"})
    CHECK(object[block].is_null());
  CHECK(object["margins"]["duty"].is_null());
  CHECK(object["verdict"]["text"] == "the water boils");
  CHECK(object["solutions"]["mean"].is_null());
  const auto page = report::text(result, {.all = true});
  CHECK(line_with(page, "ANSWER") == "ANSWER       No result: the water boils.");
  CHECK(page.find("HOW MUCH") == std::string::npos);
}

TEST_CASE("report: Kern's method has no factors and no ideal film") {
  auto result = invented_result();
  result.assessment.problem.methods.shell_side = shellside::Method::kern;
  result.assessment.second_opinion.reset();
  const auto shell = Json::parse(report::json(result))["shell_side"];
  for (const char* key :
       {"ideal_film_W_m2K", "j_cut", "j_leakage", "j_bypass", "j_spacing", "j_laminar", "second_opinion"})
    CHECK(shell[key].is_null());
}

TEST_CASE("report: the crossflow area is that of one stream of the shell") {
  auto result = invented_result();
  const auto area = [&result] {
    return Json::parse(report::json(result))["shell_side"]["crossflow_area_m2"].get<double>();
  };
  CHECK(area() == doctest::Approx(35.0 / 350.0));
  result.assessment.problem.exchanger.shells_in_parallel = 2;
  CHECK(area() == doctest::Approx(35.0 / 350.0 / 2.0));
  result.assessment.problem.exchanger.shell_side.shell_type = 'H';
  CHECK(area() == doctest::Approx(35.0 / 350.0 / 8.0));
}

TEST_CASE("report: a file at fault becomes an object of its own") {
  const auto object = Json::parse(report::error_json("a.yaml", {"a.yaml:1:1: error: no", "again"}));
  CHECK(object["case"]["file"] == "a.yaml");
  CHECK(object["schema_version"] == 1);
  CHECK(object["error"].size() == 2);
}

TEST_CASE("report: the page fits 100 columns of ASCII whatever the names are") {
  auto result = invented_result();
  result.title = "K\u00fchler f\u00fcr \u00d6l \u2014 " + std::string(150, 'x') + "\n\t\xff";
  result.assessment.problem.shell_side.name = "\u00d6l " + std::string(120, 'y');
  result.assumed[0].why = std::string(300, 'z');
  result.inputs[0].as_typed = std::string(200, 'w');
  for (int i = 0; i < 8; ++i) result.findings.push_back(invented_finding("a.b", Severity::should));
  for (const auto system : {units::System::si, units::System::metric, units::System::us})
    for (const bool all : {false, true}) {
      result.display = system;
      check_page(report::text(result, {.all = all}));
    }
  CHECK(report::text(result, {}).find("Kuehler fuer Oel - xxx") != std::string::npos);
  CHECK_NOTHROW(report::json(result));
}

TEST_CASE("report: the page answers first and keeps its order") {
  auto result = invented_result();
  result.findings = {invented_finding("a.b", Severity::should)};
  const auto page = report::text(result, {});
  CHECK(lines_of(page)[2] == "ANSWER       Yes: 1300 kW against at least 1100 kW.");
  std::size_t last = 0;
  for (const char* name : {"E-1  Oil cooler", "\nANSWER", "\nHOW MUCH", "\nHOW SURE", "\nWHAT LIMITS",
                           "\nASSUMED", "\nRULES", "\nNEXT", "\nEngineering aid"}) {
    CAPTURE(name);
    const auto at = page.find(name);
    REQUIRE(at != std::string::npos);
    CHECK(at >= last);
    last = at;
  }
}

TEST_CASE("report: ok, close and over stand beside the limits") {
  auto result = invented_result();
  const auto ending = [&result](const std::string& start) {
    const auto line = line_with(report::text(result, {}), start);
    return line.substr(line.find_last_of(' ') + 1);
  };
  CHECK(ending("  duty") == "ok");
  CHECK(ending("  lube oil pressure drop") == "over");  // 4.0 of 3.9 kPa
  CHECK(ending("  water pressure drop") == "ok");
  result.assessment.service.shell_side_allowable_drop = 4.1e3;
  CHECK(ending("  lube oil pressure drop") == "close");
  result.assessment.margins.duty = -0.01;
  CHECK(ending("  duty") == "short");
  result.assessment.service.demands = {{service::Quantity::shell_side_outlet, false, 327.0}};
  CHECK(ending("  lube oil outlet") == "over");
  result.assessment.service.demands.front().limit = 328.0;
  CHECK(ending("  lube oil outlet") == "close");
  result.assessment.service.demands.front().limit = 333.0;
  CHECK(ending("  lube oil outlet") == "ok");
}

TEST_CASE("report: what has no limit is not called ok") {
  auto result = invented_result();
  result.assessment.service = {};
  result.assessment.margins = {};
  result.assessment.verdict = {.met = {}, .limited_by = "", .text = "No service is stated."};
  const auto page = report::text(result, {});
  CHECK(page.find(" ok\n") == std::string::npos);
  CHECK(page.find("margin left") == std::string::npos);
  const auto object = Json::parse(report::json(result));
  CHECK(object["verdict"]["service_met"].is_null());
  for (const auto& [key, value] : object["margins"].items()) CHECK(value.is_null());
}

TEST_CASE("report: how sure compares the second method and says when it changes the answer") {
  const auto page = unwrapped(report::text(invented_result(), {}));
  CHECK(page.find("film 20 % lower, the duty 23 % lower") != std::string::npos);
  CHECK(page.find("the service would not be met") != std::string::npos);
}

TEST_CASE("report: page one holds five findings and five assumptions, -v all of them") {
  auto result = invented_result();
  for (int i = 0; i < 8; ++i)
    result.findings.push_back(invented_finding("rule.number_" + std::to_string(i), Severity::should));
  for (int i = 0; i < 7; ++i)
    result.assumed.push_back({.key = "exchanger.key_" + std::to_string(i), .word = "w", .why = "because"});
  const auto page = report::text(result, {});
  CHECK(page.find("rule.number_4") != std::string::npos);
  CHECK(page.find("rule.number_5") == std::string::npos);
  CHECK(page.find("  3 more: -v") != std::string::npos);
  CHECK(page.find("  4 more: -v") != std::string::npos);
  const auto all = report::text(result, {.all = true});
  CHECK(all.find("rule.number_7") != std::string::npos);
  CHECK(all.find("exchanger.key_6") != std::string::npos);
  CHECK(all.find("more: -v") == std::string::npos);
}

TEST_CASE("report: the next steps say where to look") {
  const auto page = report::text(invented_result(), {});
  CHECK(page.find("Look in the bundle drawing for clearance tube to baffle.") != std::string::npos);
}
