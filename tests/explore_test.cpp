#include <doctest/doctest.h>

#include <algorithm>

#include "dutygauge/explore.hpp"

using namespace dutygauge;

namespace {

case_io::Case kerosene_cooler() {
  return case_io::build(case_io::read_file(SOURCE_DIR "/cases/kerosene-rundown-cooler.yaml"));
}

}  // namespace

TEST_CASE("explore: a rated case keeps its inputs and assumptions and names its file without a folder") {
  const auto a_case = kerosene_cooler();
  const auto result = explore::rate(a_case);
  CHECK(result.file == "kerosene-rundown-cooler.yaml");
  CHECK(result.tag == a_case.tag);
  CHECK(result.input_sha256 == a_case.sha256);
  CHECK(result.inputs.size() == a_case.inputs.size());
  CHECK(result.assumed.size() == a_case.assumed.size());
  CHECK(result.assessment.rating.outcome.has_value());
}

TEST_CASE("explore: findings of the file and of the rating stand together, the gravest first") {
  auto a_case = kerosene_cooler();
  a_case.findings = {{.id = "first", .severity = Severity::note, .text = "n"},
                     {.id = "second", .severity = Severity::must, .text = "m"},
                     {.id = "third", .severity = Severity::note, .text = "n"}};
  const auto result = explore::rate(a_case);
  CHECK(result.findings.size() == 3 + result.assessment.findings.size());
  CHECK(std::ranges::is_sorted(result.findings, std::ranges::greater{}, &Finding::severity));
  const auto at = [&result](const char* id) {
    return std::ranges::find(result.findings, id, &Finding::id) - result.findings.begin();
  };
  CHECK(at("second") == 0);
  CHECK(at("first") < at("third"));
}

TEST_CASE("explore: the sentence speaks the units of the page") {
  auto a_case = kerosene_cooler();
  a_case.display = units::System::us;
  CHECK(explore::rate(a_case).assessment.verdict.text.find("degF") != std::string::npos);
  a_case.display = units::System::metric;
  CHECK(explore::rate(a_case).assessment.verdict.text.find("degC") != std::string::npos);
}

TEST_CASE("explore: a case with a service has a probability, and its grade stands in the sentence") {
  auto a_case = kerosene_cooler();
  const auto result = explore::rate(a_case);
  REQUIRE(result.spread.has_value());
  REQUIRE(result.spread->probability.has_value());
  const double probability = *result.spread->probability;
  CHECK((probability > 0.2 && probability < 0.8));
  CHECK(result.assessment.verdict.text.find("; too close, probability") != std::string::npos);
  a_case.service.demands.clear();
  const auto without = explore::rate(a_case);
  REQUIRE(without.spread.has_value());
  CHECK_FALSE(without.spread->probability.has_value());
  CHECK(without.assessment.verdict.text.find("probability") == std::string::npos);
}

TEST_CASE("explore: the sentence begins with yes only where the stated confidence is reached") {
  auto a_case = kerosene_cooler();
  a_case.service.demands.front().limit += 3.0;  // the rated numbers meet this
  CHECK(explore::rate(a_case).assessment.verdict.text.starts_with("Yes: "));
  a_case.service.confidence = 0.95;
  const auto unsure = explore::rate(a_case);
  CHECK(unsure.assessment.verdict.met == true);
  CHECK(unsure.assessment.verdict.text.starts_with("Not sure enough for a yes: "));
  CHECK(unsure.assessment.verdict.text.ends_with("where 95 % is asked for."));
  a_case.service.confidence = 0.5;
  CHECK(explore::rate(a_case).assessment.verdict.text.starts_with("Yes: "));
}

TEST_CASE("explore: a case without a result has no spread") {
  auto a_case = kerosene_cooler();
  a_case.problem.tube_side.inlet_temperature = 600.0;
  const auto result = explore::rate(a_case);
  REQUIRE_FALSE(result.assessment.rating.outcome.has_value());
  CHECK_FALSE(result.spread.has_value());
}
