#include <doctest/doctest.h>

#include <algorithm>

#include "case_io_good.hpp"
#include "case_io_refused.hpp"
#include "dutygauge/explore.hpp"
#include "support.hpp"

// Plugged holes said by pass, by shell or of the whole unit.

using namespace dutygauge;
using good::with;
using support::relative;

namespace {

/// The oil cooler of the tests as three shells in series, with what is said of the plugs.
std::string train(const std::string& plugged) {
  return with("    plugged: 4\n", plugged, with("in_series: 1", "in_series: 3"));
}

case_io::Case built(const std::string& text) {
  return case_io::build(case_io::read_document(text, "x"));
}

bool has_finding(const Findings& findings, std::string_view id) {
  return std::ranges::any_of(findings, [&](const Finding& finding) { return finding.id == id; });
}

}  // namespace

TEST_CASE("plugging: by shell and of the unit take the same surface as the same holes in each shell") {
  const auto each = built(train("    plugged: 8\n"));
  const auto by_shell = built(train("    plugged_per_shell: [14, 10, 0]\n"));
  const auto of_unit = built(train("    plugged_in_unit: 24\n"));
  for (const auto* one : {&by_shell, &of_unit}) {
    const auto& exchanger = one->problem.exchanger;
    CHECK(relative(exchanger.area, each.problem.exchanger.area) < 1e-14);
    CHECK(relative(exchanger.tube_side.flow_area, each.problem.exchanger.tube_side.flow_area) < 1e-14);
  }
  CHECK(has_finding(by_shell.findings, "geometry.unequal_plugging"));
  CHECK_FALSE(has_finding(of_unit.findings, "geometry.unequal_plugging"));
  const auto shared =
      std::ranges::find(of_unit.assumed, "exchanger.tubes.plugged_per_shell", &Assumption::key);
  REQUIRE(shared != of_unit.assumed.end());
  CHECK(shared->word == "8 in each");
}

TEST_CASE("plugging: a sum that does not divide counts its fraction") {
  const auto one = built(train("    plugged_in_unit: 10\n"));
  CHECK(relative(one.problem.exchanger.tubes_open, 208.0 - 10.0 / 3.0) < 1e-14);
  const auto none = built(train(""));
  CHECK(relative(one.problem.exchanger.area, none.problem.exchanger.area * (624.0 - 10.0) / 624.0) < 1e-14);
}

TEST_CASE("plugging: renewed tubes are a lever, whichever way the plugs are said") {
  for (const char* plugged :
       {"    plugged: [8, 4]\n", "    plugged_per_shell: [14, 10, 0]\n", "    plugged_in_unit: 24\n"}) {
    CAPTURE(plugged);
    const auto levers = explore::levers(case_io::read_document(train(plugged), "x"));
    CHECK(std::ranges::any_of(levers, [](const auto& one) { return one.what == "plugged tubes renewed"; }));
  }
}

TEST_CASE("geometry: a vertical unit has a note, and is rated as a horizontal one") {
  const auto vertical = built(with("orientation: horizontal", "orientation: vertical"));
  CHECK(has_finding(vertical.findings, "geometry.vertical"));
  CHECK(vertical.problem.exchanger.area == built(std::string(good::oil_cooler)).problem.exchanger.area);
}

TEST_CASE("plugging: two ways at once, a wrong number of shells and no tube left are refused") {
  refused::check({
      {"two ways",
       train("    plugged: 4\n    plugged_in_unit: 12\n"),
       {"plugged_in_unit", "stands beside plugged", "leave the other out"}},
      {"two numbers",
       train("    plugged_per_shell: [4, 4]\n"),
       {"plugged_per_shell", "2 numbers for 3 shells"}},
      {"all of one",
       train("    plugged_per_shell: [208, 0, 0]\n"),
       {"plugged_per_shell", "208 of 208 tubes leave none open"}},
      {"all of the unit", train("    plugged_in_unit: 624\n"), {"plugged_in_unit", "leave none open"}},
      {"no list", train("    plugged_per_shell: 4\n"), {"plugged_per_shell", "a single value stands here"}},
  });
}
