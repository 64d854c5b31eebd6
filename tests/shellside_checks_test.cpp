#include <doctest/doctest.h>

#include <algorithm>

#include "dutygauge/shellside.hpp"
#include "dutygauge/sources.hpp"

using namespace dutygauge;
using namespace dutygauge::shellside;

namespace {

/// An invented 590 mm shell that nothing is to be said of.
geometry::ShellSide shell() {
  geometry::ShellSide s;
  s.inside_diameter = 0.59;
  s.bundle_to_shell = 0.0127;
  s.tube_outside_diameter = 0.01905;
  s.pitch = 0.0254;
  s.layout = 30;
  s.tube_count = 340;
  s.baffle_cut = 0.25;
  s.central_spacing = s.inlet_spacing = s.outlet_spacing = 0.30;
  s.baffles = 14;
  s.tube_to_baffle = 0.4e-3;
  s.shell_to_baffle = 3.2e-3;
  s.effective_length = 4.5;
  return s;
}

Findings about(const geometry::ShellSide& s, Method method = Method::bell_delaware) {
  return check_bundle(prepare(s, method));
}

Findings about(double reynolds, Method method = Method::bell_delaware) {
  Film film;
  film.reynolds = reynolds;
  return check_film(prepare(shell(), method), film);
}

bool has(const Findings& findings, const std::string& id) {
  return std::ranges::find(findings, id, &Finding::id) != findings.end();
}

}  // namespace

TEST_CASE("shellside: nothing is said of a sound bundle in turbulent flow") {
  CHECK(about(shell()).empty());
  CHECK(about(2e4).empty());
}

TEST_CASE("shellside: each limit of the drawing is judged on both sides") {
  struct Row {
    const char* id;
    double inside, outside;
    void (*set)(geometry::ShellSide&, double);
  };
  const auto cut = [](geometry::ShellSide& s, double value) { s.baffle_cut = value; };
  const auto spacing = [](geometry::ShellSide& s, double value) { s.central_spacing = value * 0.59; };
  const auto pitch = [](geometry::ShellSide& s, double value) { s.pitch = value * 0.01905; };
  const auto holes = [](geometry::ShellSide& s, double value) { s.tube_to_baffle = value; };
  const Row rows[] = {
      {"shellside.cut", 0.1501, 0.1499, cut},         {"shellside.cut", 0.4499, 0.4501, cut},
      {"shellside.spacing", 0.201, 0.199, spacing},   {"shellside.spacing", 0.999, 1.001, spacing},
      {"shellside.pitch_ratio", 1.2498, 1.24, pitch},  // 23.81 mm on 19.05 mm is meant as 1.25
      {"shellside.pitch_ratio", 1.50, 1.51, pitch},   {"shellside.leakage", 0.4e-3, 3.0e-3, holes},
  };
  for (const Row& row : rows) {
    CAPTURE(row.inside);
    geometry::ShellSide s = shell();
    row.set(s, row.inside);
    CHECK(!has(about(s), row.id));
    row.set(s, row.outside);
    CHECK(has(about(s), row.id));
  }
}

TEST_CASE("shellside: layouts and shells without data of their own are named") {
  geometry::ShellSide s = shell();
  s.layout = 60;
  CHECK(has(about(s), "shellside.layout_60"));
  s = shell();
  for (const char type : {'E', 'F', 'J'}) {
    s.shell_type = type;
    CHECK(!has(about(s), "shellside.shell_type"));
  }
  for (const char type : {'G', 'H', 'X'}) {
    s.shell_type = type;
    CHECK(has(about(s), "shellside.shell_type"));
  }
}

TEST_CASE("shellside: each Reynolds limit is judged on both sides") {
  CHECK(!has(about(1e5), "shellside.reynolds_high"));
  CHECK(has(about(1.001e5), "shellside.reynolds_high"));
  CHECK(!has(about(50.0), "shellside.transition"));
  CHECK(has(about(50.1), "shellside.transition"));
  CHECK(has(about(199.9), "shellside.transition"));
  CHECK(!has(about(200.0), "shellside.transition"));
  CHECK(!has(about(10.0), "shellside.reynolds_low"));
  CHECK(has(about(9.99), "shellside.reynolds_low"));
}

TEST_CASE("shellside: little is left of the ideal film below 0.4") {
  const Bundle b = prepare(shell(), Method::bell_delaware);
  Film film;
  film.reynolds = 2e4;
  film.j_bypass = 0.401;
  CHECK(check_film(b, film).empty());
  film.j_bypass = 0.399;
  CHECK(has(check_film(b, film), "shellside.streams"));
  film.j_bypass = 1.0;
  film.j_laminar = 0.39;  // laminar flow is no fault of the gaps
  CHECK(check_film(b, film).empty());
}

TEST_CASE("shellside: Kern's method says what it leaves out and where it ends") {
  CHECK(has(about(shell(), Method::kern), "shellside.kern"));
  CHECK(!has(about(shell(), Method::kern), "shellside.kern_cut"));
  geometry::ShellSide s = shell();
  s.baffle_cut = 0.31;
  CHECK(has(about(s, Method::kern), "shellside.kern_cut"));
  CHECK(about(2000.0, Method::kern).empty());
  CHECK(has(about(1999.0, Method::kern), "shellside.kern_range"));
  CHECK(about(1e6, Method::kern).empty());
  CHECK(has(about(1.001e6, Method::kern), "shellside.kern_range"));
}

TEST_CASE("shellside: every finding has a text, a value and a source that exists") {
  geometry::ShellSide s = shell();
  s.baffle_cut = 0.02;
  s.central_spacing = 0.7;
  s.pitch = 0.0288;
  s.layout = 60;
  s.shell_type = 'G';
  s.tube_to_baffle = 20e-3;
  Findings all = about(s);
  CHECK(all.size() == 7);
  for (const Findings& more :
       {about(s, Method::kern), about(5.0), about(100.0), about(2e5), about(5.0, Method::kern)})
    all.insert(all.end(), more.begin(), more.end());
  for (const Finding& finding : all) {
    CAPTURE(finding.id);
    CHECK(finding.id.starts_with("shellside."));
    CHECK(finding.text.size() > 60);
    CHECK(!sources::citation(finding.source).empty());
  }
}
