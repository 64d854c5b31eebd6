#include <doctest/doctest.h>

#include <nlohmann/json.hpp>
#include <sstream>

#include "claims_support.hpp"
#include "dutygauge/cli.hpp"
#include "dutygauge/explore.hpp"

using namespace dutygauge;
using namespace claims_support;

namespace {

std::string eight_slips() {
  return support::read_text(TEST_DATA "/claims/eight-slips.yaml");
}

std::string page_of(const std::string& text, bool all = false) {
  return report::text(explore::rate(built(text)), {.all = all});
}

bool has(const std::string& text, std::string_view part) {
  return text.find(part) != std::string::npos;
}

}  // namespace

TEST_CASE("report: a sheet that contradicts itself is told on top, before the answer") {
  const auto page = page_of(eight_slips());
  CHECK(has(page, "SHEET        contradicts itself in 8 places: duty, effective area"));
  CHECK(page.find("SHEET") < page.find("ANSWER"));
  CHECK(!has(page_of(sound_sheet()), "SHEET "));
}

TEST_CASE("report: page one holds contradictions and questions, -v every claim, in 100 columns") {
  const auto page = page_of(eight_slips()), all = page_of(eight_slips(), true);
  CHECK(has(page, "CLAIMS       15 claims of the sheet: 8 contradict and 7 agree."));
  CHECK(has(page, "area is gross, not effective"));
  CHECK(has(page, "7 more: -v"));
  CHECK(!has(page, "u service"));
  CHECK(has(all, "u service"));
  CHECK(!has(page_of(sound_sheet().substr(0, sound_sheet().find("claims:"))), "CLAIMS"));
  for (const auto* text : {&page, &all}) {
    std::istringstream lines(*text);
    for (std::string line; std::getline(lines, line);) CHECK(line.size() <= 100);
  }
}

TEST_CASE("report: the JSON has one entry a claim, temperatures in degC") {
  const auto result = explore::rate(built(eight_slips()));
  const auto claims = nlohmann::json::parse(report::json(result)).at("claims");
  REQUIRE(claims.size() == 15);
  const auto& duty = claims[0];
  CHECK(duty.at("key") == "duty");
  CHECK(duty.at("stated").get<double>() == doctest::Approx(2.3e6));
  CHECK(duty.at("computed").get<double>() == doctest::Approx(2.09e6));
  CHECK(duty.at("ratio").get<double>() == doctest::Approx(2.3 / 2.09));
  CHECK(duty.at("unit") == "W");
  CHECK(duty.at("ground") == "arithmetic");
  CHECK(duty.at("verdict") == "contradicts");
  CHECK(duty.at("likely") == "duty of another operating case, or of other flows");
  CHECK(claims[1].at("key") == "shell_side_outlet");
  CHECK(claims[1].at("computed").get<double>() == doctest::Approx(66.25));
  CHECK(claims[1].at("unit") == "degC");
}

TEST_CASE("explore: contradictions are findings that should be mended and change no status") {
  const auto result = explore::rate(built(eight_slips()));
  CHECK(std::ranges::count(result.findings, "claims.contradicts", &Finding::id) == 8);
  for (const auto& finding : result.findings)
    if (finding.id == "claims.contradicts") CHECK(finding.severity == Severity::should);
  std::ostringstream out, err;
  CHECK(cli::run({"rate", TEST_DATA "/claims/eight-slips.yaml"}, out, err) == 0);
}

TEST_CASE("explore: the quoted cooler shows the two slips its header tells of") {
  const auto result =
      explore::rate(case_io::build(case_io::read_file(SOURCE_DIR "/cases/quoted-oil-cooler.yaml")));
  CHECK(keys_with(result.claims, bids::Agreement::contradicts) == "area.effective surface_margin");
  CHECK(keys_with(result.claims, bids::Agreement::ask) == "");
  CHECK(of(result.claims, "area.effective").likely == "area is gross, not effective");
  CHECK(of(result.claims, "surface_margin").likely ==
        "margin is on the clean coefficient, not at design fouling");
}
