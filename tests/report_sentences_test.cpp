#include <doctest/doctest.h>

#include <algorithm>
#include <filesystem>
#include <regex>
#include <string>
#include <vector>

#include "case_io_good.hpp"
#include "dutygauge/case_io.hpp"
#include "dutygauge/explore.hpp"
#include "dutygauge/report.hpp"
#include "dutygauge/report/finding_help.hpp"
#include "dutygauge/sources.hpp"
#include "support.hpp"

// What findings, assumptions and the page say, in words. The cases are invented; no number is checked.

namespace {

using namespace dutygauge;
using units::System;

report::Result rated(const std::string& text) {
  return explore::rate(case_io::read_document(text, "case.yaml"));
}

std::string page(const report::Result& result, System system = System::metric) {
  report::Result shown = result;
  shown.display = system;
  return report::text(shown, {.all = true});
}

/// The page as one line, as sentences are wrapped anywhere.
std::string flat(const std::string& page) {
  return std::regex_replace(page, std::regex("\\s+"), " ");
}

const Finding* find(const report::Result& result, const std::string& id) {
  const auto found = std::ranges::find(result.findings, id, &Finding::id);
  return found == result.findings.end() ? nullptr : &*found;
}

bool contains(const std::string& text, const std::string& part) {
  return text.find(part) != std::string::npos;
}

std::vector<std::string> sentences(const report::Result& result, System system) {
  std::vector<std::string> all;
  for (const Finding& finding : result.findings) all.push_back(report::sentence(finding, system));
  for (const Assumption& one : result.assumed) all.push_back(report::reason(one, system));
  return all;
}

/// Cases that make the program say much: those of the project, and some that run out of ranges.
std::vector<std::string> talkative_cases() {
  std::vector<std::string> texts;
  for (const auto& entry : std::filesystem::directory_iterator(SOURCE_DIR "/cases"))
    if (entry.path().extension() == ".yaml") texts.push_back(support::read_text(entry.path().string()));
  const std::string viscous = good::with("viscosity: 22 mPa.s", "viscosity: 2200 mPa.s");
  texts.push_back(viscous);
  texts.push_back(good::with("temperature: 29 degC", "temperature: 0.2 degC"));
  texts.push_back(
      good::with("  clearances: {tube_to_baffle: 0.8 mm, shell_to_baffle: 4.8 mm, bundle_to_shell: 45 mm}\n",
                 "", good::with("    tubesheet_thickness: 45 mm\n", "")));
  texts.push_back(
      good::with("fluid: {constant: {density: 865 kg/m3, heat_capacity: 2050 J/kg.K, conductivity: 0.13 "
                 "W/m.K, viscosity: 22 mPa.s, phase: liquid}}",
                 "fluid: {petroleum: {api: 20, watson_k: 11.5}}"));
  texts.push_back(good::with("conductivity: 0.13 W/m.K, viscosity", "conductivity: 1.3 W/m.K, viscosity"));
  texts.push_back(good::with("pressure: 4 bara", "pressure: 0.05 bara", good::with("29 degC", "31 degC")));
  return texts;
}

}  // namespace

TEST_CASE("report: every number of a finding or an assumption is in the reader's units") {
  // Units that do not occur in the other system; "m2" and "K" only behind a number.
  const std::regex not_us(
      R"([0-9] (degC|K|mm|m|m2|kPa|bar|bara|Pa|kW|W|m/s|kg/s|mm2/s|Pa\.s|mPa\.s|kg/m3)\b)");
  const std::regex not_si(R"([0-9] (degC|degF|mm|kPa|bar|bara|kW|mm2/s|mPa\.s|cP|psi)\b)");
  const std::regex not_metric(R"([0-9] (degF|in|ft|psi|psia|Btu/h|cP|cSt)\b)");
  std::size_t said = 0;
  for (const std::string& text : talkative_cases()) {
    const report::Result result = rated(text);
    for (const auto& [system, foreign] : {std::pair(System::us, &not_us), std::pair(System::si, &not_si),
                                          std::pair(System::metric, &not_metric)})
      for (const std::string& sentence : sentences(result, system)) {
        CAPTURE(sentence);
        if (contains(sentence, "the case gives")) continue;  // quotes the file as it is typed
        CHECK(!std::regex_search(sentence, *foreign));
        CHECK(!contains(sentence, "{"));
        ++said;
      }
  }
  CHECK(said > 100);
}

TEST_CASE("report: a range is spoken of in metric, US and SI units") {
  const auto result = rated(good::with("temperature: 29 degC", "temperature: 0.2 degC"));
  const Finding* cold = find(result, "fluids.near_freezing");
  REQUIRE(cold != nullptr);
  CHECK(contains(report::sentence(*cold, System::metric), "at 0.2 degC is about to freeze (0.0 degC)"));
  CHECK(contains(report::sentence(*cold, System::us), "at 32.4 degF is about to freeze (32.0 degF)"));
  CHECK(contains(report::sentence(*cold, System::si), "is about to freeze (273.1 K)"));
}

TEST_CASE("report: no result is explained in the units of the page") {
  auto problem = case_io::build(case_io::read_document(std::string(good::oil_cooler), "case.yaml")).problem;
  problem.tube_side.inlet_temperature = 260.0;
  const auto said = [&](System words) {
    service::Service service;
    service.words = words;
    const std::string judged = service::judge(problem, service).rating.no_result;
    CHECK(service::assess(problem, service).rating.no_result == judged);
    return judged;
  };
  CHECK(contains(said(System::us),
                 "inlet, 8.3 degF, lies outside what is known of water: it freezes at 32.0 degF"));
  CHECK(contains(said(System::metric), "-13.1 degC"));
}

TEST_CASE("report: a surface that falls short says so in per cent, and what is to be decided") {
  const auto result = rated(good::with("at_least: 400 kW", "at_least: 700 kW"));
  const Finding* short_of = find(result, "service.fails_clean");
  REQUIRE(short_of != nullptr);
  const std::string said = report::sentence(*short_of, System::metric);
  CHECK(!contains(said, "less one"));
  CHECK(std::regex_search(said, std::regex("the surface is [0-9.]+ % less than what is needed")));
  CHECK(contains(flat(page(result)),
                 "Decide whether to add surface, to change a flow, or to ask for less duty"));
}

TEST_CASE("report: what is to be done is said in words, also of a finding of a single clause") {
  report::Result result = rated(std::string(good::oil_cooler));
  result.findings = {{.id = "tubeside.transition", .severity = Severity::should, .text = "Re is low"}};
  CHECK(contains(flat(page(result)),
                 "Treat small margins as none; more flow per tube would settle it "
                 "(tubeside.transition)."));
}

TEST_CASE("report: a liquid of constant properties has a sentence that reads well") {
  const auto result = rated(good::with("viscosity: 22 mPa.s", "viscosity: 2200 mPa.s"));
  const Finding* thick = find(result, "fluids.very_viscous");
  REQUIRE(thick != nullptr);
  CHECK(contains(report::sentence(*thick, System::metric),
                 "the viscosity of constant properties at 68.0 degC is 2200 mPa.s"));
}

TEST_CASE("report: a drop far above its allowance is so many times the limit") {
  const auto tight = rated(good::with("allowable_pressure_drop: 70 kPa", "allowable_pressure_drop: 1 kPa"));
  const std::string shown = page(tight);
  CHECK(std::regex_search(shown, std::regex("cooling water pressure drop .* [0-9]+ x limit +over")));
  CHECK(!std::regex_search(shown, std::regex("-[0-9]{3,}\\.[0-9] %")));
  const double drop = tight.assessment.rating.outcome->tube_drop.total();
  const auto with_limit = [&](double limit) {
    report::Result result = tight;
    result.assessment.service.tube_side_allowable_drop = limit;
    return page(result);
  };
  CHECK(contains(with_limit(drop / 1.99), "-99.0 %"));
  CHECK(contains(with_limit(drop / 2.01), "2.0 x limit"));
  CHECK(contains(with_limit(drop / 43.2), "43 x limit"));
}

TEST_CASE("report: a duty far above the required one is so many times what is needed") {
  const auto result = rated(good::with("at_least: 400 kW", "at_least: 4 kW",
                                       good::with("  shell_side_outlet: {at_most: 58 degC}\n", "")));
  CHECK(std::regex_search(page(result), std::regex("duty .* [0-9]+ x need +ok")));
}

TEST_CASE("report: where Kern's drop lies far off, the page says which one stands") {
  report::Result result = rated(std::string(good::oil_cooler));
  REQUIRE(result.assessment.second_opinion.has_value());
  const double ours = result.assessment.rating.outcome->shell_drop.total();
  const auto by_kern = [&](double ratio) {
    result.assessment.second_opinion->shell_drop = {.crossflow = ratio * ours};
    return flat(page(result));
  };
  const std::string believe =
      "Believe the drop by Bell-Delaware: Kern's has no leakage and no by-pass in it.";
  CHECK(contains(by_kern(1.51), believe));
  CHECK(contains(by_kern(1.0 / 1.51), believe));
  CHECK_FALSE(contains(by_kern(1.49), believe));
  CHECK_FALSE(contains(by_kern(1.0 / 1.49), believe));
}

TEST_CASE("report: the help of findings is whole, sorted, and names sources that there are") {
  const auto rows = report::all_finding_help();
  REQUIRE(rows.size() > 60);
  CHECK(std::ranges::is_sorted(rows, {}, &report::FindingHelp::id));
  CHECK(std::ranges::adjacent_find(rows, {}, &report::FindingHelp::id) == rows.end());
  for (const auto& row : rows) {
    CAPTURE(row.id);
    CHECK(report::find_finding_help(row.id) == &row);
    CHECK(!row.meaning.empty());
    CHECK(!row.criterion.empty());
    CHECK(!row.matters.empty());
    CHECK(row.remedy.ends_with('.'));
    CHECK((row.source.empty() || !sources::citation(row.source).empty()));
  }
  CHECK(report::find_finding_help("rating.no_such") == nullptr);
  CHECK(report::find_finding_help("") == nullptr);
}
