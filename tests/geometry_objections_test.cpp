#include <doctest/doctest.h>

#include <algorithm>
#include <limits>
#include <stdexcept>

#include "drawing.hpp"

using namespace dutygauge;
using namespace dutygauge::geometry;
using drawing::complete;

namespace {

/// Whether the only objections are to this key.
bool objects_to(const Description& d, const std::string& key) {
  const Objections found = objections(d);
  return !found.empty() && std::ranges::all_of(found, [&](const Objection& o) {
    return o.key == key && !o.what.empty() && !o.expected.empty() && !o.remedy.empty();
  });
}

}  // namespace

TEST_CASE("geometry: a material with a slip of the pen is answered with the nearest name") {
  Description d = complete();
  d.tube_material = "admirality brass";
  REQUIRE(objects_to(d, "exchanger.tubes.material"));
  CHECK(objections(d).front().expected.find("'admiralty brass'") != std::string::npos);
}

TEST_CASE("geometry: what cannot be is objected to by its key, and derive refuses it") {
  struct Row {
    const char* key;
    void (*spoil)(Description&);
  };
  const Row rows[] = {
      {"exchanger.tema", [](Description& d) { d.shell_type = 'K'; }},
      {"exchanger.tema", [](Description& d) { d.rear_head = 'Q'; }},
      {"exchanger.tema", [](Description& d) { d.front_head = 'E'; }},
      {"exchanger.shells.in_series", [](Description& d) { d.shells_in_series = 0; }},
      {"exchanger.shells.in_parallel", [](Description& d) { d.shells_in_parallel = 0; }},
      {"exchanger.shell.inside_diameter", [](Description& d) { d.shell_inside_diameter = 0; }},
      {"exchanger.shell.inside_diameter",
       [](Description& d) { d.shell_inside_diameter = std::numeric_limits<double>::quiet_NaN(); }},
      {"exchanger.shell.nozzle_in", [](Description& d) { d.shell_nozzle_in = 0.6; }},
      {"exchanger.tubes.count", [](Description& d) { d.tube_count = 0; }},
      {"exchanger.tubes.count", [](Description& d) { d.tube_count = 500; }},
      {"exchanger.tubes.count", [](Description& d) { d.rear_head = 'U', d.tube_count = 207; }},
      {"exchanger.tubes.plugged", [](Description& d) { d.plugged = 208; }},
      {"exchanger.tubes.plugged", [](Description& d) { d.plugged = -1; }},
      {"exchanger.tubes.plugged", [](Description& d) { d.plugged = 5, d.plugged_per_pass = {5}; }},
      {"exchanger.tubes.plugged",
       [](Description& d) {
         d.plugged = 5, d.plugged_per_pass = {2, 2};
       }},
      {"exchanger.tubes.plugged",
       [](Description& d) {
         d.plugged = 104, d.plugged_per_pass = {104, 0};
       }},
      {"exchanger.tubes.passes", [](Description& d) { d.tube_passes = 0; }},
      {"exchanger.tubes.passes", [](Description& d) { d.tube_passes = 210; }},
      {"exchanger.tubes.passes", [](Description& d) { d.rear_head = 'U', d.tube_passes = 1; }},
      {"exchanger.tubes.passes", [](Description& d) { d.rear_head = 'U', d.tube_passes = 3; }},
      {"exchanger.flow_direction", [](Description& d) { d.flow_direction = FlowDirection::parallel; }},
      {"exchanger.tubes.wall", [](Description& d) { d.tube_wall = 0.009525; }},
      {"exchanger.tubes.pitch", [](Description& d) { d.tube_pitch = 0.01905; }},
      {"exchanger.tubes.layout", [](Description& d) { d.layout = 31; }},
      {"exchanger.tubes.tubesheet_thickness", [](Description& d) { d.tubesheet_thickness = 2.44; }},
      {"exchanger.tubes.material", [](Description& d) { d.tube_material.clear(); }},
      {"exchanger.tubes.outside_diameter",
       [](Description& d) { d.tube_outside_diameter = 0.5, d.tube_pitch = 0.6, d.tube_count = 2; }},
      {"exchanger.clearances.bundle_to_shell",
       [](Description& d) { d.bundle_to_shell = 0.48, d.tube_count = 1, d.tube_passes = 1; }},
      {"exchanger.clearances.bundle_to_shell",  // what rear head T needs leaves no bundle in a 4 in shell
       [](Description& d) {
         d.rear_head = 'T', d.bundle_to_shell = {}, d.shell_inside_diameter = 0.1, d.tube_count = 4;
         d.shell_nozzle_in = d.shell_nozzle_out = d.tube_nozzle_in = d.tube_nozzle_out = {};
       }},
      {"exchanger.sealing_strip_pairs", [](Description& d) { d.sealing_strip_pairs = -1; }},
      {"exchanger.pass_lanes.along_flow", [](Description& d) { d.pass_lanes_along_flow = -1; }},
      {"exchanger.pass_lanes.along_flow", [](Description& d) { d.pass_lanes_along_flow = 26; }},
      {"exchanger.pass_lanes.along_flow", [](Description& d) { d.pass_lanes_along_flow = 2'000'000'000; }},
      {"exchanger.baffles.cut", [](Description& d) { d.baffle_cut = 0.0; }},
      {"exchanger.baffles.cut", [](Description& d) { d.baffle_cut = 0.5; }},
      {"exchanger.baffles.cut",
       [](Description& d) { d.baffle_cut = std::numeric_limits<double>::quiet_NaN(); }},
      {"exchanger.baffles.cut",  // a window full of tubes
       [](Description& d) {
         d.tube_pitch = 0.01906, d.tube_count = 680, d.bundle_to_shell = 0.0, d.baffle_cut = 0.45;
         d.tube_to_baffle = 0.0;
       }},
      {"exchanger.baffles.count", [](Description& d) { d.baffle_count = 0; }},
      {"exchanger.baffles.count", [](Description& d) { d.baffle_count = 40; }},
      {"exchanger.baffles.spacing", [](Description& d) { d.baffle_spacing = {}; }},
      {"exchanger.baffles.spacing", [](Description& d) { d.baffle_spacing = 4.8; }},
      {"exchanger.baffles.spacing", [](Description& d) { d.baffle_spacing = 1e-9, d.baffle_thickness = {}; }},
      {"exchanger.baffles.inlet_spacing", [](Description& d) { d.inlet_spacing = d.outlet_spacing = 2.5; }},
      {"exchanger.baffles.outlet_spacing",
       [](Description& d) { d.inlet_spacing = {}, d.outlet_spacing = 0.6, d.baffle_count = 29; }},
      {"exchanger.baffles.thickness", [](Description& d) { d.baffle_thickness = 0.15; }},
  };
  for (const Row& row : rows) {
    Description d = complete();
    row.spoil(d);
    const std::string key = row.key;
    CAPTURE(key);
    for (const Objection& o : objections(d)) {
      CAPTURE(o.key);
      CAPTURE(o.what);
      CHECK(o.key == row.key);
    }
    CHECK(objects_to(d, row.key));
    CHECK_THROWS_AS(derive(d), std::invalid_argument);
  }
}

TEST_CASE("geometry: all mistakes come at once") {
  Description d = complete();
  d.tube_wall = 0.02;
  d.layout = 20;
  d.baffle_cut = 0.7;
  d.tube_material = "wood";
  CHECK(objections(d).size() == 4);
}

TEST_CASE("geometry: a published tube count is never refused as too full, half as many again as fit is") {
  // Ray & Das, Process Equipment and Plant Design (2020), Table 4.8b after Kern (1950), one pass, 3/4 in
  // tubes on 15/16 in triangular pitch; beside it what an exact lattice count finds to fit (computed).
  struct Row {
    double shell;
    int published, fit;
  };
  const Row rows[] = {{0.2032, 36, 57},    {0.254, 62, 92},     {0.3048, 109, 134},
                      {0.38735, 170, 222}, {0.48895, 301, 361}, {0.53975, 361, 438}};
  Description d = complete();
  d.bundle_to_shell = {};
  d.rear_head = 'M';
  d.shell_nozzle_in = d.shell_nozzle_out = d.tube_nozzle_in = d.tube_nozzle_out = {};
  d.tube_pitch = 0.0238125;
  d.tube_passes = 1;
  for (const Row& row : rows) {
    CAPTURE(row.shell);
    d.shell_inside_diameter = row.shell;
    d.tube_count = row.published;
    CHECK(objections(d).empty());
    d.tube_count = row.fit;
    CHECK(objections(d).empty());
    d.tube_count = row.fit * 3 / 2;
    CHECK(objects_to(d, "exchanger.tubes.count"));
  }
}

TEST_CASE("geometry: baffle holes that meet are objected to, with the gap between tubes") {
  Description d = complete();  // 25.4 mm less 19.05 mm leave 6.35 mm
  d.tube_to_baffle = 0.00634;
  CHECK(objections(d).empty());
  d.tube_to_baffle = 0.00636;
  REQUIRE(objects_to(d, "exchanger.clearances.tube_to_baffle"));
  CHECK(objections(d).front().what.find("6.35 mm between two tubes") != std::string::npos);
  d.tube_to_baffle = d.tube_pitch - d.tube_outside_diameter;
  CHECK(objects_to(d, "exchanger.clearances.tube_to_baffle"));
}
