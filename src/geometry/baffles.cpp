#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "parts.hpp"

namespace dutygauge::geometry {
namespace {

/// Both ends where at least one is given; the other is taken equal.
Baffles with_ends(const Description& d) {
  Baffles baffles;
  baffles.inlet = d.inlet_spacing ? *d.inlet_spacing : *d.outlet_spacing;
  baffles.outlet = d.outlet_spacing ? *d.outlet_spacing : *d.inlet_spacing;
  return baffles;
}

Baffles from_spacing(const Description& d, double run) {
  Baffles baffles;
  if (d.inlet_spacing || d.outlet_spacing) {
    baffles = with_ends(d);
    baffles.central = *d.baffle_spacing;
    const double middle = run - baffles.inlet - baffles.outlet;
    baffles.count = std::max(1, nearest(middle / baffles.central) + 1);
    return baffles;
  }
  baffles.central = *d.baffle_spacing;
  baffles.count = std::max(1, nearest(run / baffles.central) - 1);
  baffles.inlet = baffles.outlet = 0.5 * (run - (baffles.count - 1) * baffles.central);
  return baffles;
}

Baffles from_count(const Description& d, double run, int count) {
  Baffles baffles;
  if (d.baffle_spacing) {
    const double rest = run - (count - 1) * *d.baffle_spacing;
    baffles.central = *d.baffle_spacing;
    baffles.inlet = d.inlet_spacing    ? *d.inlet_spacing
                    : d.outlet_spacing ? rest - *d.outlet_spacing
                                       : 0.5 * rest;
    baffles.outlet = d.outlet_spacing ? *d.outlet_spacing : rest - baffles.inlet;
  } else if (d.inlet_spacing || d.outlet_spacing) {
    baffles = with_ends(d);
    baffles.central = count == 1 ? 0.5 * (baffles.inlet + baffles.outlet)
                                 : (run - baffles.inlet - baffles.outlet) / (count - 1);
  } else {
    baffles.central = baffles.inlet = baffles.outlet = run / (count + 1);
  }
  baffles.count = count;
  return baffles;
}

/// Why the missing end spacings are what they are; empty if they follow from the rest.
std::string why_ends(const Description& d) {
  const bool one_end = d.inlet_spacing || d.outlet_spacing;
  if (d.baffle_spacing && d.baffle_count)
    return one_end ? "" : "what count and spacing leave of the length, shared equally by both ends";
  if (one_end) return "taken equal to the other end";
  return d.baffle_spacing ? "what whole spacings leave of the length, shared equally by both ends"
                          : "all baffle spaces taken equal";
}

}  // namespace

int runs_along(char shell_type) {
  if (shell_type == 'G' || shell_type == 'J') return 2;
  return shell_type == 'H' ? 4 : 1;
}

double run_length(const Description& d) {
  return effective_length(d) / runs_along(d.shell_type);
}

Baffles place_baffles(const Description& d) {
  if (d.shell_type == 'X') {
    const double between_supports = d.baffle_spacing.value_or(0.0);
    return {.count = 0, .central = between_supports, .inlet = between_supports, .outlet = between_supports};
  }
  const double run = run_length(d);
  return d.baffle_count ? from_count(d, run, *d.baffle_count / runs_along(d.shell_type))
                        : from_spacing(d, run);
}

void report_baffles(const Description& d, const Baffles& baffles, Checked<Exchanger>& out) {
  if (d.shell_type == 'X') return;
  const std::string why = why_ends(d);
  const auto assume = [&](const char* key, double value) {
    out.assumed.push_back(
        {.key = key, .value = value, .kind = units::Kind::length, .why = why, .look_in = "bundle drawing"});
  };
  if (!d.inlet_spacing && !why.empty()) assume("exchanger.baffles.inlet_spacing", baffles.inlet);
  if (!d.outlet_spacing && !why.empty()) assume("exchanger.baffles.outlet_spacing", baffles.outlet);

  const double run = run_length(d), drawn = baffles.length();
  if (std::abs(drawn / run - 1.0) <= 0.02) return;
  out.findings.push_back(
      {.id = "geometry.spacing_closure",
       .severity = Severity::should,
       .text =
           fmt::format("{} baffles with their central and end spacings take up {{value}}, but the run they "
                       "stand in is {{limit}} long ({:+.1f} %). They are used as given, so shell film and "
                       "pressure drop are those of a shell of that other length. Check spacing, count, end "
                       "spacings and tube length against the bundle drawing",
                       baffles.count, 100.0 * (drawn / run - 1.0)),
       .ground = Ground::arithmetic,
       .value = drawn,
       .limit = run,
       .kind = units::Kind::length});
}

}  // namespace dutygauge::geometry
