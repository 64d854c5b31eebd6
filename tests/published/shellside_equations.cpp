// The Bell-Delaware equations of Taborek (Heat Exchanger Design Handbook 3.3, 1983) evaluated by a
// program written independently of this one, for an invented bundle. Not published results: they guard
// the reading of the equations. All digits given count, hence 1e-6.
#include <array>
#include <cmath>

#include "dutygauge/shellside.hpp"
#include "published/published.hpp"

namespace {

using namespace dutygauge;
using published::Known;
using published::Row;
using published::Rows;

const char* const source = "Taborek 1983 equations, independent evaluation";

/// What differs between the bundles; the shell is 590 mm, the tubes 19.05 mm. In the tables in this order.
struct Drawing {
  int layout, tube_count, baffles, strips;
  double pitch, cut, central, inlet, outlet, half_lane;
  bool tubes_in_window = true;
};

geometry::ShellSide shell(const Drawing& drawing) {
  geometry::ShellSide result;
  result.inside_diameter = 0.59;
  result.bundle_to_shell = 0.59 - 0.5715;
  result.tube_outside_diameter = 0.01905;
  result.pitch = drawing.pitch;
  result.layout = drawing.layout;
  result.tube_count = drawing.tube_count;
  result.tubes_in_window = drawing.tubes_in_window;
  result.baffle_cut = drawing.cut;
  result.central_spacing = drawing.central;
  result.inlet_spacing = drawing.inlet;
  result.outlet_spacing = drawing.outlet;
  result.baffles = drawing.baffles;
  result.tube_to_baffle = 0.794e-3;
  result.shell_to_baffle = 4.8e-3;
  result.sealing_strip_pairs = drawing.strips;
  result.pass_lane_half_width = drawing.half_lane;
  return result;
}

struct Flow {
  double mass_flow, density, viscosity, heat_capacity, conductivity;
  double wall_viscosity = 0;  ///< 0: as the bulk
  bool gas = false;
  double temperature = 300, wall_temperature = 300;
};

fluids::State bulk(const Flow& flow) {
  return {.temperature = flow.temperature,
          .density = flow.density,
          .heat_capacity = flow.heat_capacity,
          .conductivity = flow.conductivity,
          .viscosity = flow.viscosity,
          .phase = flow.gas ? fluids::Phase::gas : fluids::Phase::liquid};
}

fluids::State wall(const Flow& flow) {
  fluids::State state = bulk(flow);
  state.temperature = flow.wall_temperature;
  if (flow.wall_viscosity > 0.0) state.viscosity = flow.wall_viscosity;
  return state;
}

constexpr std::size_t count = 27;
constexpr const char* quantities[count] = {
    "S_m", "F_w", "r_lm", "r_s", "F_sbp",   "N_tcc",        "N_tcw",     "S_w",     "D_w",
    "G",   "Re",  "j",    "f",   "h_ideal", "J_c",          "J_l",       "J_b",     "J_s",
    "J_r", "h",   "R_l",  "R_b", "R_s",     "dp crossflow", "dp window", "dp ends", "dp"};
constexpr const char* unit_names[count] = {"m2",     "-",     "-", "-", "-",     "-",  "-",  "m2", "m",
                                           "kg/m2s", "-",     "-", "-", "W/m2K", "-",  "-",  "-",  "-",
                                           "-",      "W/m2K", "-", "-", "-",     "Pa", "Pa", "Pa", "Pa"};

struct Case {
  const char* name;
  Drawing drawing;
  Flow flow;
  std::array<double, count> expected;
};

// The published rows hold as they stand in all of these but the f of the second (see `reason`).
const Case cases[] = {
    {"water, 30 deg",
     {30, 430, 16, 2, 0.02381, 0.25, 0.25, 0.4, 0.35, 0.0095},
     {.mass_flow = 60.0,
      .density = 995.0,
      .viscosity = 0.0008,
      .heat_capacity = 4180.0,
      .conductivity = 0.615},
     {0.032235899, 0.17698299,  0.35827383, 0.25678343, 0.21714921,   14.306454,  4.9941647,
      0.031758424, 0.024559961, 1861.279,   44321.705,  0.0050660806, 0.10120646, 12746.738,
      1.0151445,   0.63299542,  0.91033283, 0.96393898, 1.0,          7187.4901,  0.40970262,
      0.75723837,  0.97484479,  46920.505,  57876.895,  10041.01,     114838.41}},
    {"cooled oil, 30 deg",
     {30, 430, 16, 0, 0.02381, 0.25, 0.25, 0.4, 0.35, 0.0},
     {.mass_flow = 25.0,
      .density = 820.0,
      .viscosity = 0.0016,
      .heat_capacity = 2100.0,
      .conductivity = 0.13,
      .wall_viscosity = 0.0032},
     {0.032235899, 0.17698299,  0.35827383, 0.25678343, 0.14347359,   14.306454,  4.9941647,
      0.031758424, 0.024559961, 775.5329,   9233.6886,  0.0093377256, 0.12501727, 1739.6559,
      1.0151445,   0.63299542,  0.83582001, 0.96393898, 1.0,          817.35343,  0.40970262,
      0.58810353,  0.97484479,  10449.045,  12192.478,  2236.1004,    24877.623}},
    {"heated oil, 45 deg",
     {45, 360, 16, 2, 0.0254, 0.25, 0.25, 0.4, 0.35, 0.0095},
     {.mass_flow = 30.0,
      .density = 870.0,
      .viscosity = 0.02,
      .heat_capacity = 2000.0,
      .conductivity = 0.13,
      .wall_viscosity = 0.012},
     {0.053455143, 0.17698299,  0.18991524, 0.29212758, 0.13095092,  16.424921,  5.7336895,
      0.035289519, 0.031857275, 561.21822,  534.56035,  0.031537647, 0.17539112, 776.68804,
      1.0151445,   0.76485459,  0.94038278, 0.96393898, 1.0,         587.17343,  0.53375515,
      0.83364628,  0.97484479,  12961.089,  12739.021,  2129.0353,   27829.146}},
    {"laminar oil, 90 deg",
     {90, 340, 16, 2, 0.0254, 0.25, 0.25, 0.4, 0.35, 0.0095},
     {.mass_flow = 8.0,
      .density = 900.0,
      .viscosity = 0.08,
      .heat_capacity = 1950.0,
      .conductivity = 0.13,
      .wall_viscosity = 0.16},
     {0.039153125, 0.17698299,  0.24909144, 0.30408614, 0.17878522, 11.614173,  4.0543307,
      0.036298403, 0.034413299, 204.32596,  48.65512,   0.07741988, 0.75429451, 273.16381,
      1.0151445,   0.70728957,  0.93036588, 0.97885809, 0.71367409, 115.68513,  0.47296704,
      0.78616297,  1.3392857,   4995.0837,  3531.7442,  1272.1347,  9798.9626}},
    {"oil, 90 deg",
     {90, 340, 16, 2, 0.0254, 0.25, 0.25, 0.4, 0.35, 0.0095},
     {.mass_flow = 12.0, .density = 800.0, .viscosity = 0.001, .heat_capacity = 2200.0, .conductivity = 0.12},
     {0.039153125, 0.17698299,  0.24909144, 0.30408614, 0.17878522,  11.614173,   4.0543307,
      0.036298403, 0.034413299, 306.48895,  5838.6144,  0.010647713, 0.098302249, 1032.6018,
      1.0151445,   0.70728957,  0.93535338, 0.96393898, 1.0,         668.47207,   0.47296704,
      0.82051803,  0.97484479,  1560.7439,  2124.2118,  289.32384,   3974.2796}},
    {"heated gas, 30 deg",
     {30, 430, 9, 2, 0.02381, 0.35, 0.45, 0.6, 0.6, 0.0095},
     {.mass_flow = 4.0,
      .density = 6.5,
      .viscosity = 2.2e-05,
      .heat_capacity = 1050.0,
      .conductivity = 0.033,
      .gas = true,
      .temperature = 380.0,
      .wall_temperature = 440.0},
     {0.058024618, 0.29957812,  0.17166348, 0.26661683, 0.21714921,   8.5838721,   7.2831973,
      0.048561448, 0.022970131, 68.936258,  59692.532,  0.0045118523, 0.097380234, 414.24746,
      0.83860751,  0.78696101,  0.94082601, 0.96036659, 1.0,          238.12276,   0.56272211,
      0.83480988,  1.1916268,   4593.4357,  14091.04,   2247.54,      20932.016}},
    {"dense strips, 30 deg",
     {30, 430, 16, 9, 0.02381, 0.25, 0.25, 0.4, 0.35, 0.0095},
     {.mass_flow = 40.0,
      .density = 995.0,
      .viscosity = 0.0008,
      .heat_capacity = 4180.0,
      .conductivity = 0.615},
     {0.032235899, 0.17698299,  0.35827383, 0.25678343, 0.21714921,   14.306454,  4.9941647,
      0.031758424, 0.024559961, 1240.8526,  29547.803,  0.0059324525, 0.10670999, 9951.0747,
      1.0151445,   0.63299542,  1.0,        0.96393898, 1.0,          6163.7918,  0.40970262,
      1.0,         0.97484479,  29036.51,   25723.064,  6213.8264,    60973.4}},
    {"no tubes in windows",
     {30, 330, 16, 2, 0.02381, 0.18, 0.25, 0.4, 0.35, 0.0095, false},
     {.mass_flow = 60.0,
      .density = 995.0,
      .viscosity = 0.0008,
      .heat_capacity = 4180.0,
      .conductivity = 0.615},
     {0.032235899, 0.0,        0.34780027, 0.28610025, 0.21714921,   18.312261,  0.0,
      0.03346443,  0.25890448, 1861.279,   44321.705,  0.0050660806, 0.10120646, 12746.738,
      1.0,         0.63322978, 0.89765863, 0.96393898, 1.0,          6984.2723,  0.40620545,
      0.72645578,  0.97484479, 57125.002,  21798.266,  9139.5475,    88062.815}},
};

std::array<double, count> ours(const Case& c) {
  const auto bundle = shellside::prepare(shell(c.drawing), shellside::Method::bell_delaware);
  const auto film = shellside::film(bundle, c.flow.mass_flow, bulk(c.flow), wall(c.flow));
  const auto drop = shellside::pressure_drop(bundle, c.flow.mass_flow, bulk(c.flow), wall(c.flow));
  const auto& set = film.reynolds <= 100.0 ? bundle.laminar : bundle.turbulent;
  return {bundle.centreline_area,
          bundle.window_tube_fraction,
          bundle.leakage_area_ratio,
          bundle.shell_leakage_share,
          bundle.bypass_area_ratio,
          bundle.rows_between_tips,
          bundle.rows_in_window,
          bundle.window_area,
          bundle.window_hydraulic_diameter,
          film.mass_flux,
          film.reynolds,
          shellside::colburn_factor(bundle.bank, film.reynolds),
          shellside::bank_friction(bundle.bank, film.reynolds),
          film.ideal,
          film.j_cut,
          film.j_leakage,
          film.j_bypass,
          film.j_spacing,
          film.j_laminar,
          film.coefficient,
          bundle.r_leakage,
          set.r_bypass,
          set.r_ends,
          drop.crossflow,
          drop.window,
          drop.ends,
          drop.total()};
}

/// f and the drops that follow from it.
bool by_friction(std::size_t i) {
  return i == 12 || i == 23 || i == 25 || i == 26;
}

Rows regression() {
  Rows rows;
  for (const Case& c : cases) {
    const auto values = ours(c);
    for (std::size_t i = 0; i < count; ++i) {
      const bool in_blend = &c == &cases[1] && by_friction(i);
      rows.push_back({.source = source,
                      .known = Known::computed,
                      .what = std::string(quantities[i]) + ", " + c.name,
                      .unit = unit_names[i],
                      .published = c.expected[i],
                      .ours = values[i],
                      .tolerance = in_blend ? 1e-3 : 1e-6,
                      .reason = in_blend
                                    ? "f: the rows meeting at Re 10 000 differ by 0.25 % here, we take the "
                                      "upper one with a weight of 0.24"
                                    : ""});
    }
  }
  return rows;
}

// --- with the go-over between the constants, laminar to turbulent and row to row

struct Blend {
  const char* name;
  Drawing drawing;
  Flow flow;
  std::array<double, 8> expected;  ///< Re, j, f, h, crossflow, window, ends, dp
};

const Blend blends[] = {
    {"30 deg, Re 89",
     {30, 430, 16, 2, 0.02381, 0.25, 0.25, 0.4, 0.35, 0.0095},
     {.mass_flow = 12.0, .density = 900.0, .viscosity = 0.08, .heat_capacity = 1950.0, .conductivity = 0.13},
     {88.64341, 0.073904903, 0.68719816, 251.37645, 13565.927, 5779.1205, 3545.2243, 22890.272}},
    {"30 deg, Re 118",
     {30, 430, 16, 2, 0.02381, 0.25, 0.25, 0.4, 0.35, 0.0095},
     {.mass_flow = 16.0, .density = 900.0, .viscosity = 0.08, .heat_capacity = 1950.0, .conductivity = 0.13},
     {118.19121, 0.062887184, 0.55810944, 304.69596, 19951.086, 6370.232, 4730.299, 31051.617}},
    {"45 deg, Re 109",
     {45, 430, 16, 2, 0.02381, 0.25, 0.25, 0.4, 0.35, 0.0095},
     {.mass_flow = 20.0, .density = 900.0, .viscosity = 0.08, .heat_capacity = 1950.0, .conductivity = 0.13},
     {109.0498, 0.07318078, 0.43529797, 369.71282, 19772.719, 10335.676, 4139.2169, 34247.612}},
    {"90 deg, Re 222",
     {90, 430, 16, 2, 0.02381, 0.25, 0.25, 0.4, 0.35, 0.0095},
     {.mass_flow = 30.0, .density = 900.0, .viscosity = 0.08, .heat_capacity = 1950.0, .conductivity = 0.13},
     {221.60853, 0.035273557, 0.28469464, 322.43486, 32418.388, 14711.254, 6937.5498, 54067.192}},
};

Rows blended() {
  Rows rows;
  for (const Blend& c : blends) {
    const auto bundle = shellside::prepare(shell(c.drawing), shellside::Method::bell_delaware);
    const auto film = shellside::film(bundle, c.flow.mass_flow, bulk(c.flow), wall(c.flow));
    const auto drop = shellside::pressure_drop(bundle, c.flow.mass_flow, bulk(c.flow), wall(c.flow));
    const double values[] = {film.reynolds,
                             shellside::colburn_factor(bundle.bank, film.reynolds),
                             shellside::bank_friction(bundle.bank, film.reynolds),
                             film.coefficient,
                             drop.crossflow,
                             drop.window,
                             drop.ends,
                             drop.total()};
    const char* const what[] = {"Re", "j", "f", "h", "dp crossflow", "dp window", "dp ends", "dp"};
    const char* const unit[] = {"-", "-", "-", "W/m2K", "Pa", "Pa", "Pa", "Pa"};
    for (std::size_t i = 0; i < 8; ++i)
      rows.push_back({.source = source,
                      .known = Known::computed,
                      .what = std::string(what[i]) + ", go-over, " + c.name,
                      .unit = unit[i],
                      .published = c.expected[i],
                      .ours = values[i],
                      .tolerance = 1e-6,
                      .reason = ""});
  }
  return rows;
}

const published::Registration regression_rows{&regression};
const published::Registration blended_rows{&blended};

}  // namespace
