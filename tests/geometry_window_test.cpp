#include <doctest/doctest.h>

#include <cmath>
#include <numbers>

#include "drawing.hpp"
#include "support.hpp"

using namespace dutygauge::geometry;
using drawing::complete;
using std::numbers::pi;
using support::relative;

TEST_CASE("geometry: rows lie as the layout says") {
  ShellSide shell;
  shell.pitch = 0.025;
  const auto is = [&](int layout, double distance, double divisor) {
    shell.layout = layout;
    CHECK(relative(rows(shell).distance, distance) < 1e-12);
    CHECK(relative(rows(shell).gap_divisor, divisor) < 1e-12);
  };
  is(30, 0.025 * std::sqrt(3.0) / 2, 0.025);
  is(60, 0.0125, 0.025 * std::sqrt(3.0) / 2);
  is(45, 0.025 / std::sqrt(2.0), 0.025 / std::sqrt(2.0));
  is(90, 0.025, 0.025);
}

TEST_CASE("geometry: the window holds the tubes whose centres lie beyond the cut") {
  ShellSide shell = derive(complete()).value.shell_side;
  const double centres = shell.tube_centre_circle();
  for (const double cut : {0.1, 0.2, 0.3, 0.45}) {
    CAPTURE(cut);
    shell.baffle_cut = cut;
    const Window w = window(shell);
    // The share of the centre circle beyond the chord, and the segment of the shell, by quadrature.
    const auto segment = [&](double diameter) {
      const double from = (0.5 - cut) * shell.inside_diameter, radius = 0.5 * diameter;
      double area = 0;
      for (int i = 0; i < 20000; ++i) {
        const double y = from + (radius - from) * (i + 0.5) / 20000;
        if (from < radius) area += 2.0 * std::sqrt(radius * radius - y * y) * (radius - from) / 20000;
      }
      return area;
    };
    CHECK(relative(w.tube_fraction, segment(centres) / (0.25 * pi * centres * centres)) < 1e-4);
    const double tubes = w.tube_fraction * 208 * 0.25 * pi * 0.01905 * 0.01905;
    CHECK(relative(w.area + tubes, segment(shell.inside_diameter)) < 1e-4);
  }
  shell.baffle_cut = 0.06;  // the cut ends outside the centre circle
  CHECK(window(shell).tube_fraction == 0.0);
  CHECK(window(shell).rows == 0.0);
}
