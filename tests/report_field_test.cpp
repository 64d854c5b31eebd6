#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <nlohmann/json.hpp>
#include <sstream>
#include <string>

#include "dutygauge/report/field.hpp"
#include "field_days.hpp"

using namespace dutygauge;
using field::What;

namespace {

const report::CaseName about{.file = "cooler.yaml",
                             .title = "Cooler",
                             .tag = "E-1",
                             .input_sha256 = "0123456789abcdef",
                             .display = units::System::metric};

/// A year with a cleaning, a service, a plan and something of everything. 2021-01-01 is day 0.
field::Evidence full() {
  field::Evidence evidence{
      .start = 1609459200,
      .rows = {.read = 8760, .used = 8000, .dropped = {{"unsteady", 500}, {"off-line", 260}}},
      .hypotheses = {{"the cold meter is right", series::days(300,
                                                              [](int i, series::Settings& s) {
                                                                s.running = i < 178 || i >= 182;
                                                                s.fouling = i < 182 ? 1e-6 * i
                                                                                    : 1e-6 * (i - 182) + 1e-5;
                                                                s.tube_factor = i < 182 ? 1.1 : 1.0;
                                                              })}},
      .logged = {{178, 182, What::outage}, {182, 182, What::cleaning}},
      .suspects = {{{field::Channel::cold_flow}, 10.0, "the cold meter reads 8 % low, constant in %"}},
      .causes = {{"by-pass", 0.1}, {"tube-side deposit", 0.85}, {"plugging", 0.05}},
      .allowed = field::Allowed{2e-4, 1e-5},
      .margins = {{"as running", 0.06}, {"at 31 degC water", -0.02}}};
  evidence.plan = {.horizon = 200, .next_stop = 330.0};
  evidence.plan.economics = field::Economics{.cost = {20000.0, 2.0, 1000.0},
                                             .heat_price = 0.05 / 3.6e6,
                                             .currency = "EUR",
                                             .duty_lost = [](double r) { return 1e9 * r; }};
  return evidence;
}

bool has(const std::string& text, const std::string& part) {
  return text.find(part) != std::string::npos;
}

}  // namespace

TEST_CASE("report: the page of a record says what is asked, in order, within 100 columns") {
  const std::string page = report::text(about, field::analyse(full()));
  std::istringstream lines(page);
  for (std::string line; std::getline(lines, line);) CHECK(line.size() <= 100);
  std::size_t at = 0;
  for (const char* name :
       {"E-1  readings 2021-01-01 to 2021-10-27", "8760 rows, 8000 used", "ANSWER",
        "DOES IT STILL DO THE DUTY", "HOW DIRTY", "UNTIL WHEN", "INSTRUMENTS", "WHAT IT IS", "EVENTS", "COST",
        "DATA", "NEXT", "Never open or isolate on this result alone."}) {
    CAPTURE(name);
    const auto found = page.find(name, at);
    REQUIRE(found != std::string::npos);
    at = found;
  }
  CHECK(has(page, "as running: yes, +6.0 %"));
  CHECK(has(page, "at 31 degC water: no, short by 2.0 %"));
  CHECK(has(page, "tube-side deposit 0.85, by-pass 0.10, plugging 0.05"));
  CHECK(has(page, "No single cause above 0.9"));
  CHECK(has(page, "2 July 2021 cleaning"));
  CHECK(has(page, "unsteady 500") == false);
  CHECK(has(page, "500 unsteady, 260 off-line"));
}

TEST_CASE("report: what is not known is absent from the page") {
  field::Evidence evidence{.start = 1609459200,
                           .hypotheses = {{"as read", series::days(100, [](int, series::Settings&) {})}}};
  for (field::Day& day : evidence.hypotheses[0].days)
    day.apparent.closure = day.apparent.closure_uncertainty = std::nan("");
  const auto result = field::analyse(evidence);
  const std::string page = report::text(about, result);
  for (const char* name :
       {"DOES IT", "UNTIL WHEN", "SAME EITHER WAY", "WHAT IT IS", "COST", "WAYS", "EVENTS", "DATA", "nan"}) {
    CAPTURE(name);
    CHECK_FALSE(has(page, name));
  }
  CHECK(has(page, "no trend found; anything above"));
  CHECK(has(page, "per month would have been seen"));
  CHECK(has(page, "heat balance not tested: a flow or a temperature is missing"));
  const auto json = nlohmann::json::parse(report::json(about, result));
  CHECK(json["closure"]["median"].is_null());
  CHECK(json["lost_on"].is_null());
  CHECK(json["same_either_way"].is_null());
  CHECK(json["events"].empty());
  CHECK(json["fouling"]["law"] == "no trend");
  CHECK(json["advice"] == "not_needed");
  // No days at all.
  const auto nothing = field::analyse(field::Evidence{.hypotheses = {{"as read", {}}}});
  CHECK(has(report::text(about, nothing), "Settle first: too few days"));
  CHECK(nlohmann::json::parse(report::json(about, nothing))["fouling"].is_null());
  CHECK(has(report::html(about, nothing), "</html>"));
}

TEST_CASE("report: the object of a record has every key") {
  const auto json = nlohmann::json::parse(report::json(about, field::analyse(full())));
  CHECK(json["rows"]["read"] == 8760);
  CHECK(json["rows"]["dropped"]["off-line"] == 260);
  CHECK(json["closure"]["verdict"] == "closes");
  CHECK(json["fouling"]["now_m2K_W"].get<double>() == doctest::Approx(1.28e-4).epsilon(0.05));
  CHECK(json["fouling"]["rate_m2K_W_per_day"].get<double>() == doctest::Approx(1e-6).epsilon(0.1));
  CHECK(json["fouling"]["u95_level_m2K_W"].get<double>() > json["fouling"]["u95_change_m2K_W"].get<double>());
  CHECK(json["fouling"]["law"] == "linear");
  REQUIRE(json["lost_on"].size() == 3);
  // 1e-5 on day 182 and 1e-6 a day: 2e-4 on day 372, 2022-01-08.
  CHECK(json["lost_on"][0] < "2022-01-08");
  CHECK(json["lost_on"][0] > "2021-11-01");
  CHECK((json["lost_on"][2].is_null() || json["lost_on"][2] > "2022-01-08"));
  const auto& events = json["events"];
  const auto cleaning = std::ranges::find_if(events, [](const auto& e) { return e["what"] == "cleaning"; });
  REQUIRE(cleaning != events.end());
  CHECK((*cleaning)["at"] == "2021-07-02");
  CHECK((*cleaning)["channel"].is_null());
  CHECK(json["suspects"][0]["channels"][0] == "cold_flow");
  CHECK(json["suspects"][0]["since"] == "2021-01-11");
  CHECK(json["causes"][0]["name"] == "tube-side deposit");
  CHECK(json["options"].size() == 3);
  CHECK(json["options"][0]["cost"]["currency"] == "EUR");
  CHECK(json["hypotheses"].size() == 1);
  CHECK(json["advice"] == "next_stop");
}

TEST_CASE("report: two readings of one record stand side by side") {
  auto evidence = full();
  auto other = evidence.hypotheses[0];
  other.name = "the hot meter is right";
  for (field::Day& day : other.days) day.apparent.fouling += 8e-5;
  evidence.hypotheses.push_back(other);
  const auto result = field::analyse(evidence);
  CHECK(result.same_either_way == false);
  CHECK(result.advice == field::Advice::settle_first);
  const std::string page = report::text(about, result);
  CHECK(has(page, "SAME EITHER WAY?"));
  CHECK(has(page, "if the hot meter is right"));
  CHECK(has(page, "if the cold meter is right (used above)"));
  CHECK(has(page, "-> NOT THE SAME"));
  CHECK(has(page, "Settle first: the advice depends on which instrument is right"));
  // Nearly alike: the same advice.
  for (field::Day& day : evidence.hypotheses[1].days) day.apparent.fouling -= 7.5e-5;
  const auto alike = field::analyse(evidence);
  CHECK(alike.same_either_way == true);
  CHECK(alike.advice == field::Advice::next_stop);
  CHECK(has(report::text(about, alike), "-> SAME"));
}

TEST_CASE("report: three long hypotheses keep within the page") {
  auto evidence = full();
  for (const char* name :
       {"cold_out and hot_flow and hot_in are wrong", "cold_out and cold_flow and hot_in are wrong"})
    evidence.hypotheses.push_back({name, evidence.hypotheses[0].days});
  std::istringstream lines(report::text(about, field::analyse(evidence)));
  bool whole = false;
  for (std::string line; std::getline(lines, line);) {
    CHECK(line.size() <= 100);
    whole = whole || (has(line, "if cold_out and cold_flow and hot_in are wrong") && has(line, "next stop"));
  }
  CHECK(whole);
}

TEST_CASE("report: a heat balance that does not close is settled first") {
  auto evidence = full();
  for (field::Day& day : evidence.hypotheses[0].days) day.apparent.closure -= 0.2;
  const auto result = field::analyse(evidence);
  CHECK(result.closure.verdict == "does not close");
  CHECK(result.advice == field::Advice::settle_first);
  // The words follow the distance in standard uncertainties.
  const auto verdict = [](double closure) {
    field::Day day;
    day.apparent.closure = closure;
    day.apparent.closure_uncertainty = 0.02;
    return field::closure_of({day}).verdict;
  };
  CHECK(verdict(-0.02) == "closes");
  CHECK(verdict(0.021) == "closes within uncertainty");
  CHECK(verdict(0.041) == "doubtful");
  CHECK(verdict(-0.061) == "does not close");
}

TEST_CASE("report: no cleaning is advised against what a cleaning does not mend") {
  auto evidence = full();
  evidence.causes = {{"partition leak", 0.95}, {"tube-side deposit", 0.05}};
  const auto result = field::analyse(evidence);
  CHECK(result.advice == field::Advice::settle_first);
  CHECK(has(result.why, "partition leak"));
}

TEST_CASE("report: a service that is lost says since when") {
  auto evidence = full();
  evidence.allowed = field::Allowed{8e-5, 1e-6};
  const auto result = field::analyse(evidence);
  const std::string page = report::text(about, result);
  CHECK(has(page, "The service is lost since "));
  CHECK(result.advice == field::Advice::stop_now);
  // 1e-5 on day 182 and 1e-6 a day: 8e-5 on day 252, 2021-09-10; the band is some weeks wide.
  const auto lost = nlohmann::json::parse(report::json(about, result))["lost_on"];
  CHECK(lost[0] <= "2021-09-10");
  CHECK(lost[2] >= "2021-09-10");
}

TEST_CASE("report: the file for a browser needs nothing else and escapes what it is given") {
  report::CaseName hostile = about;
  hostile.tag = "<script>alert(1)</script>&\"'";
  hostile.title = "</title><b>";
  auto evidence = full();
  evidence.suspects[0].text = "<img id=x onerror=alert(1)>";
  evidence.hypotheses[0].name = "</script>";
  const std::string html = report::html(hostile, field::analyse(evidence));
  CHECK_FALSE(has(html, "<script>alert"));
  CHECK_FALSE(has(html, "<img"));
  CHECK_FALSE(has(html, "<b>"));
  CHECK(has(html, "&lt;script&gt;alert(1)&lt;/script&gt;&amp;&quot;&#39;"));
  // Two scripts of its own, each closed once.
  std::size_t closes = 0;
  for (auto at = html.find("</script>"); at != std::string::npos; at = html.find("</script>", at + 1))
    ++closes;
  CHECK(closes == 2);
  for (const char* remote : {"http://", "https://", "src=", "url(", "@import", "<link"}) {
    CAPTURE(remote);
    const std::string without = html.substr(0, html.find("http://www.w3.org/2000/svg")) +
                                html.substr(html.find("http://www.w3.org/2000/svg") + 26);
    CHECK_FALSE(has(without, remote));  // the namespace of SVG is a name, nothing is fetched
  }
}

TEST_CASE("report: the trend is drawn without a script, titled, and told in a table") {
  const auto evidence = full();
  const std::string html = report::html(about, field::analyse(evidence));
  const auto svg = html.substr(html.find("<svg"), html.find("</svg>") - html.find("<svg"));
  CHECK(has(svg, "role=\"img\""));
  CHECK(has(svg, "<title id=\"trend-title\">"));
  CHECK(has(svg, "class=\"range\""));
  CHECK(has(svg, "class=\"law\""));
  CHECK(has(svg, "class=\"allowed\""));
  CHECK(has(svg, "class=\"event\""));
  CHECK_FALSE(has(svg, "nan"));
  CHECK_FALSE(has(svg, "inf"));
  std::size_t rows = 0;
  for (auto at = html.find("<th scope=\"row\">"); at != std::string::npos;
       at = html.find("<th scope=\"row\">", at + 1))
    ++rows;
  CHECK(rows == evidence.hypotheses[0].days.size());
  CHECK(has(html, "Two standard") == false);
  CHECK(has(html, "two standard deviations of the day"));
  for (const char* name : {"<h2>ANSWER</h2>", "<h2>HOW DIRTY</h2>", "<h2>UNTIL WHEN</h2>",
                           "<h2>WHAT IT IS</h2>", "<h2>NEXT</h2>"})
    CHECK(has(html, name));
  // With the readings' own ranges the words change.
  auto ranged = evidence;
  for (const field::Day& day : ranged.hypotheses[0].days) ranged.ranges.push_back({day.day, 0.0, 3e-4});
  CHECK(has(report::html(about, field::analyse(ranged)), "least to greatest reading of a day"));
}

TEST_CASE("field: an analysis needs something to analyse") {
  CHECK_THROWS_AS(field::analyse(field::Evidence{.hypotheses = {}}), std::invalid_argument);
}
