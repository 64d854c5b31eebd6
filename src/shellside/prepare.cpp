#include <algorithm>
#include <cmath>
#include <numbers>
#include <stdexcept>

#include "dutygauge/shellside.hpp"

namespace dutygauge::shellside {
namespace {

using std::numbers::pi;

/// How a shell is reduced to an E shell of full cross-section.
struct Reduction {
  double flow_share;
  int runs;
  double area_share;  ///< real crossflow area of one stream / S_m
};

Reduction reduction(char shell_type) {
  switch (shell_type) {
    case 'F':
      return {2.0, 2, 0.5};
    case 'G':
      return {1.0, 2, 0.5};
    case 'J':
      return {0.5, 1, 1.0};
    case 'H':
      return {0.5, 2, 0.5};
    default:
      return {1.0, 1, 1.0};
  }
}

/// Free area at the centreline per length of tube [m].
double area_per_length(const geometry::ShellSide& shell) {
  return shell.bundle_to_shell + shell.tube_centre_circle() / geometry::rows(shell).gap_divisor *
                                     (shell.pitch - shell.flow_diameter());
}

/// exp{-C F_sbp [1 - (2 r_ss)^(1/3)]}, 1 from one strip pair per two rows on.
double bypass_factor(const Bundle& bundle, double constant) {
  const double strips = bundle.drawing.sealing_strip_pairs / bundle.rows_between_tips;  // r_ss
  if (strips >= 0.5) return 1.0;
  return std::exp(-constant * bundle.bypass_area_ratio * (1.0 - std::cbrt(2.0 * strips)));
}

/// Bypass and end spacings: the constants of the two regimes, n and n' as in the source.
Bundle::Constants constants(const Bundle& bundle, bool laminar) {
  const geometry::ShellSide& shell = bundle.drawing;
  Bundle::Constants set;
  set.j_bypass = bypass_factor(bundle, laminar ? 1.35 : 1.25);
  set.r_bypass = bypass_factor(bundle, laminar ? 4.5 : 3.7);
  if (shell.shell_type == 'X') return set;
  const double inlet = shell.inlet_spacing / shell.central_spacing;
  const double outlet = shell.outlet_spacing / shell.central_spacing;
  const double n = laminar ? 1.0 / 3.0 : 0.6, n_drop = laminar ? 1.0 : 0.2;
  const double inner = shell.baffles - 1;
  set.j_spacing = (inner + std::pow(inlet, 1.0 - n) + std::pow(outlet, 1.0 - n)) / (inner + inlet + outlet);
  set.r_ends = std::pow(outlet, n_drop - 2.0) + std::pow(inlet, n_drop - 2.0);
  return set;
}

void set_leakage(Bundle& bundle, double window_angle) {
  const geometry::ShellSide& shell = bundle.drawing;
  const double tube = shell.tube_outside_diameter, hole = tube + shell.tube_to_baffle;
  const double tube_leakage =
      0.25 * pi * (hole * hole - tube * tube) * shell.tube_count * (1.0 - bundle.window_tube_fraction);
  const double shell_leakage =
      0.5 * shell.inside_diameter * shell.shell_to_baffle * (pi - 0.5 * window_angle);
  const double leakage = tube_leakage + shell_leakage;
  bundle.leakage_area_ratio = leakage / bundle.centreline_area;
  bundle.shell_leakage_share = leakage > 0.0 ? shell_leakage / leakage : 0.0;

  const double r_lm = bundle.leakage_area_ratio, r_s = bundle.shell_leakage_share;
  const double at_much = 0.44 * (1.0 - r_s);
  bundle.j_leakage = at_much + (1.0 - at_much) * std::exp(-2.2 * r_lm);
  bundle.r_leakage = std::exp(-1.33 * (1.0 + r_s) * std::pow(r_lm, 0.8 - 0.15 * (1.0 + r_s)));
}

/// What the drops of the zones are multiples of.
void set_zones(Bundle& bundle) {
  const geometry::ShellSide& shell = bundle.drawing;
  const double all = bundle.runs, baffles = shell.baffles * bundle.r_leakage * all;
  const double tcc = bundle.rows_between_tips, tcw = bundle.rows_in_window;
  const double gap = shell.pitch - shell.tube_outside_diameter, width = bundle.window_hydraulic_diameter;
  bundle.crossflow_rows = (shell.baffles - 1) * tcc * bundle.r_leakage * all;
  bundle.end_rows = (tcc + tcw) * all;
  bundle.window_turns = baffles;
  bundle.window_heads = baffles * (1.0 + 0.3 * tcw);
  bundle.window_viscous = 26.0 * baffles * (tcw / gap + shell.central_spacing / (width * width));
  bundle.area_ratio_root = std::sqrt(bundle.centreline_area / bundle.window_area);
}

void prepare_baffled(Bundle& bundle) {
  const geometry::ShellSide& shell = bundle.drawing;
  const geometry::Window window = geometry::window(shell);
  bundle.centreline_area = shell.central_spacing * area_per_length(shell);
  bundle.window_tube_fraction = window.tube_fraction;
  bundle.rows_between_tips = window.rows_between_tips;
  bundle.rows_in_window = window.rows;
  bundle.window_area = window.area;
  bundle.window_hydraulic_diameter = window.hydraulic_diameter;
  bundle.bypass_area_ratio =
      shell.central_spacing * (shell.bundle_to_shell + shell.pass_lane_half_width) / bundle.centreline_area;
  // Without tubes in the windows the line would give 1.27, but there is nothing to gain from windows.
  bundle.j_cut = window.tube_fraction > 0.0 ? 0.55 + 0.72 * (1.0 - 2.0 * window.tube_fraction) : 1.0;
  const double rows_crossed = (window.rows_between_tips + window.rows) * (shell.baffles + 1) * bundle.runs;
  bundle.j_laminar_20 = std::pow(10.0 / rows_crossed, 0.18);
  set_leakage(bundle, window.angle);
  set_zones(bundle);
}

/// One crossing of the whole bundle; support plates do not count.
void prepare_pure_crossflow(Bundle& bundle) {
  const geometry::ShellSide& shell = bundle.drawing;
  bundle.centreline_area = shell.effective_length * area_per_length(shell);
  bundle.rows_between_tips = shell.tube_centre_circle() / geometry::rows(shell).distance;
  bundle.bypass_area_ratio = shell.effective_length * shell.bundle_to_shell / bundle.centreline_area;
  bundle.crossflow_rows = bundle.rows_between_tips;
}

void prepare_kern(Bundle& bundle) {
  const geometry::ShellSide& shell = bundle.drawing;
  const double tube = shell.tube_outside_diameter, pitch = shell.pitch;
  const bool square = shell.layout == 45 || shell.layout == 90;
  // One pitch cell: its free area over the tube perimeter in it. Kern prints sqrt(3)/4 as 0.433.
  const double cell = square ? pitch * pitch : 0.5 * std::numbers::sqrt3 * pitch * pitch;
  bundle.kern_equivalent_diameter = 4.0 * (cell - 0.25 * pi * tube * tube) / (pi * tube);
  bundle.centreline_area = shell.inside_diameter * (pitch - tube) * shell.central_spacing / pitch;
  bundle.kern_lengths =
      bundle.runs * shell.inside_diameter * (shell.baffles + 1) / (2.0 * bundle.kern_equivalent_diameter);
}

/// Velocity heads of both nozzles for a flow of 1 kg/s [1/m4]. J has two outlets; H has two
/// inlets and two outlets, which share the flow.
double nozzle_factor(const geometry::ShellSide& shell) {
  const auto heads = [](double count, double nozzles, double area) {
    return area > 0.0 ? 0.5 * count / (nozzles * nozzles * area * area) : 0.0;
  };
  const bool h = shell.shell_type == 'H', j = shell.shell_type == 'J';
  return heads(shell.impingement_plate ? 2.5 : 1.5, h ? 2.0 : 1.0, shell.nozzle_in_area) +
         heads(0.5, h || j ? 2.0 : 1.0, shell.nozzle_out_area);
}

}  // namespace

Objections objections(const geometry::ShellSide& drawing, Method method) {
  if (method == Method::kern && drawing.blocked_diameter)
    return {
        {"methods.shell_side", "Kern's method has no finned tubes", "bell_delaware", "leave the method out"}};
  if (method != Method::kern || drawing.shell_type != 'X') return {};
  return {{"methods.shell_side", "Kern's method has no pure crossflow shell (X)", "bell_delaware",
           "leave the method out"}};
}

Bundle prepare(const geometry::ShellSide& drawing, Method method) {
  if (!objections(drawing, method).empty()) throw std::invalid_argument("the method cannot rate this shell");
  Bundle bundle;
  bundle.drawing = drawing;
  bundle.method = method;
  const Reduction reduced = reduction(drawing.shell_type);
  bundle.flow_share = reduced.flow_share;
  bundle.runs = reduced.runs;
  bundle.nozzle_factor = nozzle_factor(drawing);
  if (method == Method::kern) {
    prepare_kern(bundle);
  } else {
    bundle.bank = ideal_bank(drawing.layout, drawing.pitch / drawing.tube_outside_diameter);
    if (drawing.shell_type == 'X')
      prepare_pure_crossflow(bundle);
    else
      prepare_baffled(bundle);
    bundle.laminar = constants(bundle, true);
    bundle.turbulent = constants(bundle, false);
  }
  bundle.crossflow_area = bundle.centreline_area * reduced.area_share;
  return bundle;
}

}  // namespace dutygauge::shellside
