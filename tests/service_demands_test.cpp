#include <doctest/doctest.h>

#include <algorithm>
#include <string>

#include "case_io_good.hpp"
#include "dutygauge/case_io.hpp"
#include "dutygauge/report.hpp"
#include "dutygauge/service.hpp"

// What is said of lines that ask for nothing and of pressures that are not there. The case is invented.

namespace {

using namespace dutygauge;

case_io::Case case_of(const std::string& text) {
  return case_io::build(case_io::read_document(text, "case.yaml"));
}

const Finding* find(const service::Assessment& assessment, const std::string& id) {
  const auto found = std::ranges::find(assessment.findings, id, &Finding::id);
  return found == assessment.findings.end() ? nullptr : &*found;
}

bool contains(const std::string& text, const std::string& part) {
  return text.find(part) != std::string::npos;
}

}  // namespace

TEST_CASE("service: with the inlets exchanged, it is said that no line asks for heat") {
  // An oil outlet of at most 58 degC, asked of an oil that enters at 20 degC.
  const std::string exchanged = good::with("  duty: {at_least: 400 kW}\n", "",
                                           good::with("temperature: 68 degC", "temperature: 20 degC"));
  const case_io::Case a_case = case_of(exchanged);
  for (const auto& assessment :
       {service::assess(a_case.problem, a_case.service), service::judge(a_case.problem, a_case.service)}) {
    CHECK(assessment.verdict.met == true);
    const Finding* said = find(assessment, "service.asks_no_heat");
    REQUIRE(said != nullptr);
    CHECK(said->severity == Severity::should);
    const std::string text = report::sentence(*said, units::System::metric);
    CHECK(contains(text, "the tube-side stream (cooling water) is the hot one, 29.0 degC against 20.0 degC"));
  }
}

TEST_CASE("service: one line that asks for heat is enough, and no line at all is no complaint") {
  case_io::Case a_case = case_of(std::string(good::oil_cooler));
  CHECK(find(service::assess(a_case.problem, a_case.service), "service.asks_no_heat") == nullptr);
  a_case.service.demands = {{service::Quantity::duty, false, 1e6},
                            {service::Quantity::shell_side_outlet, false, 331.15}};
  CHECK(find(service::assess(a_case.problem, a_case.service), "service.asks_no_heat") == nullptr);
  a_case.service.demands = {{service::Quantity::duty, false, 1e6}};
  CHECK(find(service::assess(a_case.problem, a_case.service), "service.asks_no_heat") != nullptr);
  a_case.service.demands = {};
  CHECK(find(service::assess(a_case.problem, a_case.service), "service.asks_no_heat") == nullptr);
}

TEST_CASE("service: a drop above the whole inlet pressure cannot be") {
  case_io::Case a_case = case_of(std::string(good::oil_cooler));
  CHECK(a_case.problem.shell_side.pressure_is_known);
  const auto judged = [&] { return service::judge(a_case.problem, a_case.service); };
  const double drop = judged().rating.outcome->shell_drop.total();
  a_case.problem.factors.shell_drop = 6e5 / drop * 0.999;
  CHECK(find(judged(), "rating.drop_above_inlet") == nullptr);
  a_case.problem.factors.shell_drop = 6e5 / drop * 1.001;
  const auto assessment = judged();
  const Finding* said = find(assessment, "rating.drop_above_inlet");
  REQUIRE(said != nullptr);
  CHECK(said->severity == Severity::must);
  CHECK(said->limit == doctest::Approx(6e5));
  CHECK(
      contains(report::sentence(*said, units::System::metric), "the whole absolute inlet pressure, 6 bara"));
  CHECK(contains(report::sentence(*said, units::System::us), "87.02 psia"));
  CHECK(find(service::assess(a_case.problem, a_case.service), "rating.drop_above_inlet") != nullptr);
  a_case.problem.shell_side.pressure_is_known = false;
  CHECK(find(judged(), "rating.drop_above_inlet") == nullptr);
}

TEST_CASE("service: a drop in the tubes is held against the pressure in the tubes") {
  case_io::Case a_case = case_of(std::string(good::oil_cooler));
  const double drop = service::judge(a_case.problem, a_case.service).rating.outcome->tube_drop.total();
  a_case.problem.factors.tube_drop = 4.5e5 / drop;
  const auto assessment = service::judge(a_case.problem, a_case.service);
  const Finding* said = find(assessment, "rating.drop_above_inlet");
  REQUIRE(said != nullptr);
  CHECK(contains(said->text, "the tube-side pressure drop"));
}
