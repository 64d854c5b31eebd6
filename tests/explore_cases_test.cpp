#include <doctest/doctest.h>

#include <algorithm>
#include <fstream>
#include <iterator>
#include <nlohmann/json.hpp>
#include <sstream>
#include <string>
#include <vector>

#include "dutygauge/cli.hpp"
#include "dutygauge/explore.hpp"

// Several operating cases, on a case of the project. Its numbers are invented: what is
// checked is which case governs and how the result says so.

using namespace dutygauge;
using Json = nlohmann::json;

namespace {

const std::string naphtha = SOURCE_DIR "/cases/naphtha-cooler.yaml";

std::string text_with(const std::string& more) {
  std::ifstream file(naphtha);
  return std::string(std::istreambuf_iterator<char>(file), {}) + more;
}

report::Result rated_with(const std::string& more) {
  return explore::rate(case_io::read_document(text_with(more), "naphtha-cooler.yaml"));
}

report::Result rated(const std::string& key, const std::string& value) {
  return explore::rate(case_io::with_value(case_io::read_file(naphtha), key, value));
}

std::vector<std::string> lines_of(const std::string& text) {
  std::vector<std::string> lines;
  std::istringstream stream(text);
  for (std::string line; std::getline(stream, line);) lines.push_back(line);
  return lines;
}

bool contains(const std::string& text, const std::string& part) {
  return text.find(part) != std::string::npos;
}

}  // namespace

TEST_CASE("explore: the case with the smallest duty margin governs, and clean does more than fouled") {
  const auto result = explore::rate(case_io::read_file(naphtha));
  REQUIRE(result.cases.size() == 4);
  CHECK(result.cases[result.governing].name == "both");
  CHECK(result.assessment.margins.duty == result.cases[3].design_fouling.margins.duty);
  for (const auto& one : result.cases) {
    CAPTURE(one.name);
    CHECK(*one.design_fouling.margins.duty >= *result.assessment.margins.duty);
    CHECK(one.clean.rating.outcome->duty > one.design_fouling.rating.outcome->duty);
    // Installed over needed surface without fouling is the same number in both states.
    CHECK(*one.clean.margins.surface == doctest::Approx(*one.design_fouling.margins.surface_clean));
  }
}

TEST_CASE("explore: among equals the first case governs, and a case without a result before all") {
  const auto twins = explore::rate(case_io::with_value(
      case_io::read_file(SOURCE_DIR "/cases/naphtha-cooler.yaml"), "streams.shell_side.flow", "95 klb/h"));
  CHECK(twins.governing == 3);
  auto text = text_with("");
  text.erase(text.find("operating_cases:"));
  const auto result = explore::rate(
      case_io::read_document(text + "operating_cases: {one: {}, two: {}}\n", "naphtha-cooler.yaml"));
  CHECK(result.governing == 0);
  const auto none = explore::rate(case_io::read_document(
      text + "operating_cases: {one: {}, hopeless: {streams.tube_side.inlet.pressure: 0.7 psia}}\n",
      "naphtha-cooler.yaml"));
  CHECK(none.cases[none.governing].name == "hopeless");
}

TEST_CASE("explore: the unit as it is changes every case, the claims are those of the unit as built") {
  const auto new_unit = explore::rate(case_io::read_file(naphtha));
  const auto result = rated_with("present: {since: 2025-05-04, exchanger.tubes.plugged: 20}\n");
  CHECK(result.present_since == "2025-05-04");
  for (std::size_t i = 0; i < 4; ++i)
    CHECK(*result.cases[i].design_fouling.margins.duty < *new_unit.cases[i].design_fouling.margins.duty);
  CHECK(contains(report::text(result, {}), "as it is since 2025-05-04"));
}

TEST_CASE("explore: an accepted finding is counted by name and moves no exit status") {
  const std::string key = "streams.shell_side.allowable_pressure_drop";
  const auto over = rated(key, "0.1 psi");
  const auto must = std::ranges::find(over.findings, "rating.pressure_drop", &Finding::id);
  REQUIRE(must != over.findings.end());
  auto document = case_io::read_document(
      text_with("accepted: [{id: rating.pressure_drop, because: pump has room, by: A. Person}, "
                "{id: no.such, because: x, by: y}]\n"),
      "naphtha-cooler.yaml");
  const auto accepted = explore::rate(case_io::with_value(document, key, "0.1 psi"));
  CHECK(std::ranges::find(accepted.findings, "rating.pressure_drop", &Finding::id) ==
        accepted.findings.end());
  CHECK(contains(report::text(accepted, {}), "1 accepted (rating.pressure_drop)"));
  const auto json = Json::parse(report::json(accepted));
  const auto found = std::ranges::find_if(
      json["findings"], [](const Json& finding) { return finding["id"] == "rating.pressure_drop"; });
  REQUIRE(found != json["findings"].end());
  CHECK((*found)["accepted"]["by"] == "A. Person");
}

TEST_CASE("explore: the JSON has every case with its states, the governing one on top") {
  const auto json = Json::parse(report::json(explore::rate(case_io::read_file(naphtha))));
  CHECK(json["operating_case"] == "both");
  REQUIRE(json["operating_cases"].size() == 4);
  const auto& both = json["operating_cases"]["both"];
  for (const char* key : {"verdict", "thermal", "tube_side", "shell_side", "margins"}) {
    CAPTURE(key);
    CHECK(both[key] == json[key]);
    CHECK(both["states"]["design_fouling"][key] == json[key]);
    CHECK(json["states"]["design_fouling"][key] == json[key]);
    CHECK(json["states"]["clean"].contains(key));
  }
  CHECK(json["operating_cases"]["design"]["states"]["clean"]["verdict"]["service_met"] == true);
  CHECK(json["verdict"]["service_met"] == false);
}

TEST_CASE("explore: a finding of a later case alone is of this case, not of the base") {
  const auto json = Json::parse(report::json(rated_with("accepted: [{id: none, because: x, by: y}]\n")));
  for (const auto& finding : json["findings"])
    CHECK((finding["since"] == "base" || finding["since"] == "this_case"));
  auto text = text_with("");
  text.erase(text.find("operating_cases:"));
  const auto two = Json::parse(report::json(explore::rate(case_io::read_document(
      text + "operating_cases: {one: {}, over: {streams.shell_side.allowable_pressure_drop: 0.1 psi}}\n",
      "naphtha-cooler.yaml"))));
  const auto found = std::ranges::find_if(
      two["findings"], [](const Json& finding) { return finding["id"] == "rating.pressure_drop"; });
  REQUIRE(found != two["findings"].end());
  CHECK((*found)["since"] == "this_case");
}

TEST_CASE("explore: a page of four cases fits a screen and begins with a sentence for each") {
  const auto page = report::text(explore::rate(case_io::read_file(naphtha)), {});
  const auto lines = lines_of(page);
  CHECK(lines.size() <= 50);
  for (const auto& line : lines) CHECK(line.size() <= 100);
  CHECK(contains(page, "Design and more crude: yes, today and at design fouling. Hot water: yes as it is"));
  CHECK(contains(page, "<= 110.0"));
  CHECK(std::ranges::count_if(lines, [](const auto& line) { return contains(line, "design fouling  "); }) ==
        4);
}

TEST_CASE("explore: the rows of a page of cases keep to a line each, whatever the names and units are") {
  auto text = text_with("");
  text.replace(text.find("name: naphtha"), 13, "name: naphtha of the second unit");
  text.replace(text.find("  both: {"), 9, "  a_case_with_a_rather_long_name: {");
  const auto document = case_io::read_document(text, "naphtha-cooler.yaml");
  for (const auto system : {units::System::si, units::System::metric, units::System::us}) {
    const auto lines = lines_of(report::text(explore::rate(document, system), {}));
    CHECK(std::ranges::count_if(lines, [](const auto& line) { return line.ends_with("missed"); }) == 3);
    CHECK(std::ranges::all_of(lines, [](const auto& line) { return line.size() <= 100; }));
    CHECK(lines.size() <= 50);
  }
}

TEST_CASE("cli: the status is 1 if any operating case misses, whichever governs") {
  std::ostringstream out, err;
  CHECK(cli::run({"rate", naphtha}, out, err) == cli::not_met);
  CHECK(err.str().empty());
}

TEST_CASE("explore: what is to be said of both streams alike is said once") {
  const auto result = explore::rate(case_io::read_file(SOURCE_DIR "/cases/stacked-crude-preheater.yaml"));
  CHECK(std::ranges::count(result.findings, "fluids.phase_not_checked", &Finding::id) == 1);
}
