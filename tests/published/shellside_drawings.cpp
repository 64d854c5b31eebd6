// Whole drawings, invented, from lengths and baffles to film and pressure drop, beside what a program written
// independently of this one makes of them. Inputs are rounded on neither side, hence 1e-6.
#include <array>

#include "dutygauge/shellside.hpp"
#include "published/published.hpp"

namespace {

using namespace dutygauge;
using published::Known;
using published::Rows;

constexpr std::size_t count = 14;
constexpr const char* quantities[count] = {
    "area", "baffles of a run", "crossflow area", "Re",   "ideal film", "J_c", "J_l", "J_b", "J_s",
    "film", "crossflow",        "window",         "ends", "nozzles"};
constexpr const char* unit_names[count] = {"m2", "-", "m2",    "-",  "W/m2K", "-",  "-",
                                           "-",  "-", "W/m2K", "Pa", "Pa",    "Pa", "Pa"};

struct Case {
  const char* name = "";
  geometry::Description description;
  double mass_flow = 0;  ///< of one bank
  fluids::State bulk;
  double wall_temperature = 0;
  std::array<double, count> expected{};
};

Case lube_oil() {
  Case c;
  c.name = "lube oil, S head, 90 deg";
  auto& d = c.description;
  d.front_head = 'B';
  d.shell_type = 'E';
  d.rear_head = 'S';
  d.shell_inside_diameter = 1.143;
  d.tube_count = 696;
  d.tube_passes = 6;
  d.plugged = 12;
  d.tube_outside_diameter = 0.0254;
  d.tube_wall = 0.002769;
  d.tube_length = 4.88;
  d.tubesheet_thickness = 0.063;
  d.tube_pitch = 0.03175;
  d.layout = 90;
  d.tube_conductivity = 50.0;
  d.baffle_cut = 0.28;
  d.baffle_spacing = 0.3886;
  d.inlet_spacing = 0.5759;
  d.outlet_spacing = 0.6811;
  d.tube_to_baffle = 0.0008;
  d.shell_to_baffle = 0.00615;
  d.bundle_to_shell = 0.07431;
  d.sealing_strip_pairs = 0;
  c.mass_flow = 35.85;
  c.bulk = {.temperature = 336.2914537619698,
            .density = 855.1,
            .heat_capacity = 2058.0,
            .conductivity = 0.121,
            .viscosity = 0.04245,
            .phase = fluids::Phase::liquid};
  c.wall_temperature = 301.72687397282004;
  c.expected = {259.477,     10,          0.109961365, 195.076547, 312.088588, 0.974145317, 0.729937299,
                0.720156548, 0.933605552, 149.202992,  2065.25553, 1275.44024, 563.782271,  0};
  return c;
}

Case gas_oil() {
  Case c;
  c.name = "gas oil, M head, 45 deg";
  auto& d = c.description;
  d.front_head = 'B';
  d.shell_type = 'E';
  d.rear_head = 'M';
  d.shell_inside_diameter = 0.591;
  d.shell_nozzle_in = 0.104;
  d.shell_nozzle_out = 0.104;
  d.impingement_plate = true;
  d.tube_count = 176;
  d.tube_passes = 1;
  d.plugged = 2;
  d.tube_outside_diameter = 0.0254;
  d.tube_wall = 0.002108;
  d.tube_length = 6.1;
  d.tubesheet_thickness = 0.028;
  d.tube_pitch = 0.03556;
  d.layout = 45;
  d.tube_conductivity = 50.0;
  d.baffle_cut = 0.22;
  d.baffle_spacing = 0.2273;
  d.inlet_spacing = 0.2824;
  d.outlet_spacing = 0.3064;
  d.tube_to_baffle = 0.0004;
  d.shell_to_baffle = 0.00474;
  d.bundle_to_shell = 0.016;
  d.sealing_strip_pairs = 1;
  c.mass_flow = 11.37;
  c.bulk = {.temperature = 336.44599027873704,
            .density = 826.6,
            .heat_capacity = 2011.0,
            .conductivity = 0.114,
            .viscosity = 0.001911,
            .phase = fluids::Phase::liquid};
  c.wall_temperature = 303.466536050118;
  c.expected = {83.918419,   25,          0.0541137509, 2792.7101,  639.453893, 1.06657461, 0.839807898,
                0.961578009, 0.985978696, 543.040832,   1868.55518, 2612.95815, 218.112688, 3250.90043};
  return c;
}

Case water() {
  Case c;
  c.name = "water, N head, 60 deg";
  auto& d = c.description;
  d.front_head = 'A';
  d.shell_type = 'E';
  d.rear_head = 'N';
  d.shell_inside_diameter = 0.257048;
  d.shell_nozzle_in = 0.0519938;
  d.shell_nozzle_out = 0.0519938;
  d.tube_count = 64;
  d.tube_passes = 4;
  d.tube_outside_diameter = 0.01905;
  d.tube_wall = 0.002107946;
  d.tube_length = 6.096;
  d.tubesheet_thickness = 0.02199894;
  d.tube_pitch = 0.02380996;
  d.layout = 60;
  d.tube_conductivity = 50.0;
  d.baffle_cut = 0.18;
  d.baffle_spacing = 0.0931672;
  d.inlet_spacing = 0.1598168;
  d.outlet_spacing = 0.115443;
  d.tube_to_baffle = 0.0008001;
  d.shell_to_baffle = 0.0027686;
  d.bundle_to_shell = 0.01249934;
  d.sealing_strip_pairs = 0;
  c.mass_flow = 4.09367113925;
  c.bulk = {.temperature = 308.01638632324887,
            .density = 990.261405778,
            .heat_capacity = 4185.96264,
            .conductivity = 0.603334104568,
            .viscosity = 0.0005737,
            .phase = fluids::Phase::liquid};
  c.wall_temperature = 308.9007911051446;
  c.expected = {23.1805586,  63,          0.00601429708, 22601.549, 7470.56291, 1.15349047, 0.597938406,
                0.785029975, 0.990393046, 4006.06148,    15856.651, 21501.5481, 848.650069, 3753.96353};
  return c;
}

Case crude_oil() {
  Case c;
  c.name = "crude oil, J shell, 90 deg";
  auto& d = c.description;
  d.front_head = 'A';
  d.shell_type = 'J';
  d.rear_head = 'N';
  d.shell_inside_diameter = 0.591058;
  d.shell_nozzle_in = 0.1210056;
  d.shell_nozzle_out = 0.1210056;
  d.tube_count = 368;
  d.tube_passes = 4;
  d.tube_outside_diameter = 0.01905;
  d.tube_wall = 0.002107946;
  d.tube_length = 2.4380952;
  d.tubesheet_thickness = 0.0370078;
  d.tube_pitch = 0.02380996;
  d.layout = 90;
  d.tube_conductivity = 50.0;
  d.baffle_cut = 0.3;
  d.baffle_spacing = 0.1469898;
  d.inlet_spacing = 0.1797558;
  d.outlet_spacing = 0.267208;
  d.tube_to_baffle = 0.00039878;
  d.shell_to_baffle = 0.0041656;
  d.bundle_to_shell = 0.01599946;
  d.sealing_strip_pairs = 3;
  c.mass_flow = 14.3637583833;
  c.bulk = {.temperature = 345.5913861318959,
            .density = 867.559976334,
            .heat_capacity = 2045.2518,
            .conductivity = 0.127624374271,
            .viscosity = 0.009755,
            .phase = fluids::Phase::liquid};
  c.wall_temperature = 419.97096628000673;
  c.expected = {52.0660663, 6,           0.0186902994, 750.394329, 540.655686, 0.927720531, 0.630692883,
                0.97598035, 0.914573434, 282.368033,   793.860482, 434.274661, 657.120694,  1461.02754};
  return c;
}

Case nitrogen() {
  Case c;
  c.name = "nitrogen, X shell, 60 deg";
  auto& d = c.description;
  d.front_head = 'B';
  d.shell_type = 'X';
  d.rear_head = 'N';
  d.shell_inside_diameter = 0.54;
  d.shell_nozzle_in = 0.399;
  d.shell_nozzle_out = 0.399;
  d.tube_count = 218;
  d.tube_passes = 1;
  d.tube_outside_diameter = 0.0254;
  d.tube_wall = 0.002769;
  d.tube_length = 4.88;
  d.tubesheet_thickness = 0.029;
  d.tube_pitch = 0.03175;
  d.layout = 60;
  d.tube_conductivity = 50.0;
  d.baffle_cut = 0.22;
  d.baffle_spacing = 0.9644;
  d.tube_to_baffle = 0.0008;
  d.shell_to_baffle = 0.00459;
  d.bundle_to_shell = 0.016;
  d.sealing_strip_pairs = 0;
  c.mass_flow = 27.66;
  c.bulk = {.temperature = 413.62356850818566,
            .density = 12.88,
            .heat_capacity = 1052.0,
            .conductivity = 0.02881,
            .viscosity = 1.978e-05,
            .phase = fluids::Phase::gas};
  c.wall_temperature = 313.3655570643546;
  c.expected = {83.8817126,  0, 0.632389569, 56166.1826, 264.07449, 1, 1,
                0.858558092, 1, 226.72329,   583.070614, 0,         0, 3799.41859};
  return c;
}

Case u_tubes() {
  Case c;
  c.name = "gas oil, U-tubes, defaults";
  auto& d = c.description;
  d.front_head = 'A';
  d.shell_type = 'E';
  d.rear_head = 'U';
  d.shell_inside_diameter = 0.205;
  d.shell_nozzle_in = 0.061;
  d.shell_nozzle_out = 0.061;
  d.tube_count = 16;
  d.tube_passes = 4;
  d.tube_outside_diameter = 0.0254;
  d.tube_wall = 0.002108;
  d.tube_length = 2.44;
  d.tubesheet_thickness = 0.024;
  d.tube_pitch = 0.03175;
  d.layout = 90;
  d.tube_conductivity = 50.0;
  d.baffle_cut = 0.28;
  d.baffle_spacing = 0.141;
  d.inlet_spacing = 0.2445;
  d.outlet_spacing = 0.1971;
  c.mass_flow = 4.429;
  c.bulk = {.temperature = 410.7253325671069,
            .density = 832.0,
            .heat_capacity = 2287.0,
            .conductivity = 0.1127,
            .viscosity = 0.004168,
            .phase = fluids::Phase::liquid};
  c.wall_temperature = 325.2835567827981;
  c.expected = {3.0846117,   15,          0.00613914, 4396.47036, 1001.61049, 1.01232654, 0.733797782,
                0.760746232, 0.929407065, 526.067731, 1055.0225,  5446.58971, 144.505426, 2760.5075};
  return c;
}

std::array<double, count> ours(const Case& c) {
  const auto exchanger = geometry::derive(c.description).value;
  const auto bundle = shellside::prepare(exchanger.shell_side, shellside::Method::bell_delaware);
  fluids::State wall = c.bulk;
  wall.temperature = c.wall_temperature;
  const auto film = shellside::film(bundle, c.mass_flow, c.bulk, wall);
  const auto drop = shellside::pressure_drop(bundle, c.mass_flow, c.bulk, wall);
  return {exchanger.area_per_shell,
          static_cast<double>(exchanger.shell_side.baffles),
          film.crossflow_area,
          film.reynolds,
          film.ideal,
          film.j_cut,
          film.j_leakage,
          film.j_bypass,
          film.j_spacing,
          film.coefficient,
          drop.crossflow,
          drop.window,
          drop.ends,
          drop.nozzles};
}

Rows drawings() {
  Rows rows;
  for (const Case& c : {lube_oil(), gas_oil(), water(), crude_oil(), nitrogen(), u_tubes()}) {
    const auto values = ours(c);
    for (std::size_t i = 0; i < count; ++i)
      rows.push_back({.source = "invented drawings, independent evaluation",
                      .known = Known::computed,
                      .what = std::string(quantities[i]) + ", " + c.name,
                      .unit = unit_names[i],
                      .published = c.expected[i],
                      .ours = values[i],
                      .tolerance = 1e-6,
                      .reason = ""});
  }
  return rows;
}

const published::Registration registration{&drawings};

}  // namespace
