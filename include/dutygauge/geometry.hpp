#pragma once
#include <optional>
#include <string>
#include <vector>

#include "dutygauge/findings.hpp"

/// The exchanger as drawn, and what follows from it. Knows no fluid and no flow.
namespace dutygauge::geometry {

enum class FlowDirection { counter, parallel };

/// How the first tube pass runs beside the shell stream.
enum class FirstTubePass { against_shell_flow, with_shell_flow };

/// A layer on the tube metal: a liner or coating, or the other metal of a duplex tube.
struct Layer {
  bool inside = true;       ///< in the bore, which it narrows; else on the tube's outside diameter
  double thickness = 0;     ///< [m]
  double conductivity = 0;  ///< [W/m.K]
};

/// Low fins rolled from the tube wall.
struct Fins {
  double per_length = 0;                       ///< fins of one metre [1/m]
  double tip_diameter = 0, root_diameter = 0;  ///< [m]
  double thickness = 0;                        ///< mean of one fin [m]
};

/// The exchanger as the case gives it; one shell where not said otherwise. SI.
struct Description {
  char front_head = 'B', shell_type = 'E', rear_head = 'M';  ///< TEMA letters
  bool vertical = false;
  int shells_in_series = 1, shells_in_parallel = 1;
  bool tube_side_in_series = false;             ///< the tube stream passes the parallel shells in turn
  std::optional<FlowDirection> flow_direction;  ///< one-pass units
  FirstTubePass first_tube_pass = FirstTubePass::against_shell_flow;

  double shell_inside_diameter = 0;                         ///< [m]
  std::optional<double> shell_nozzle_in, shell_nozzle_out;  ///< bores [m]
  bool impingement_plate = false;

  int tube_count = 0;                  ///< holes in one tubesheet
  int plugged = 0;                     ///< holes plugged in each shell
  std::vector<int> plugged_per_pass;   ///< where given by pass (sums to `plugged`)
  std::vector<int> plugged_per_shell;  ///< where given by shell, along the shell stream, bank by bank
  std::optional<int> plugged_in_unit;  ///< where only the sum of all shells is known
  int tube_passes = 1;
  double tube_outside_diameter = 0, tube_wall = 0, tube_length = 0;  ///< [m]; straight, outer faces
  std::optional<double> tubesheet_thickness;                         ///< [m]
  double tube_pitch = 0;                                             ///< [m]
  int layout = 30;                                                   ///< [deg]
  std::string tube_material;                              ///< a name of the material table, or empty
  std::optional<double> tube_conductivity;                ///< [W/m.K]
  std::optional<double> tube_roughness;                   ///< [m]
  std::optional<double> tube_nozzle_in, tube_nozzle_out;  ///< bores [m]
  std::vector<Layer> layers;                              ///< each side outwards from the metal
  std::optional<Fins> fins;

  bool baffles_known = true;  ///< false: the shell side is not drawn, its film comes from elsewhere
  double baffle_cut = 0.25;   ///< window height / shell inside diameter [-]
  std::optional<double> baffle_spacing, inlet_spacing, outlet_spacing;  ///< [m]
  std::optional<int> baffle_count;                                      ///< along the whole shell
  std::optional<double> baffle_thickness;                               ///< [m]

  std::optional<double> tube_to_baffle, shell_to_baffle, bundle_to_shell;  ///< diametral [m]
  std::optional<int> sealing_strip_pairs;
  std::optional<int> pass_lanes_along_flow;
  std::optional<double> pass_lane_width;  ///< [m]

  /// Known by these alone: the effective outside area of the whole unit [m2] and the wall's
  /// resistance on it [m2.K/W]. Of the rest only letters, shells, passes and flow count then.
  std::optional<double> area, wall_resistance;
};

/// Conductivity of the tube metal, linear between rows [K, W/m.K]; held at the ends.
struct Conductivity {
  std::vector<double> temperature, value;
  double at(double metal_temperature) const;
};

/// What a film or pressure drop needs to know of the tube side of one shell.
struct TubeSide {
  double inside_diameter = 0;   ///< [m]
  double outside_diameter = 0;  ///< [m]
  double flow_area = 0;         ///< of one pass, open tubes only [m2]
  double heated_length = 0;     ///< between channels: one pass, U-tubes both legs [m]
  double friction_length = 0;   ///< of all passes, full length plus bends [m]
  double roughness = 0;         ///< [m]
  int passes = 1;
  bool u_tubes = false;
  double nozzle_in_area = 0, nozzle_out_area = 0;  ///< [m2]; 0: not given, no drop counted
};

/// What a film or pressure drop needs to know of the shell side of one shell.
struct ShellSide {
  char shell_type = 'E';
  double inside_diameter = 0;                                           ///< D_s [m]
  double tube_outside_diameter = 0;                                     ///< D_t [m]
  double pitch = 0;                                                     ///< [m]
  int layout = 30;                                                      ///< [deg]
  int tube_count = 0;                                                   ///< holes, plugged ones too
  double baffle_cut = 0;                                                ///< fraction of D_s
  double central_spacing = 0, inlet_spacing = 0, outlet_spacing = 0;    ///< outlet with D_s/2 for U-tubes [m]
  int baffles = 0;                                                      ///< N_b of one run
  double tube_to_baffle = 0, shell_to_baffle = 0, bundle_to_shell = 0;  ///< diametral [m]
  int sealing_strip_pairs = 0;
  double pass_lane_half_width = 0;  ///< L_pl, of all lanes along the flow together [m]
  double effective_length = 0;      ///< [m] tube length exposed to the shell
  bool impingement_plate = false;
  std::optional<double> blocked_diameter{};        ///< finned: of the plain tube as wide to the flow [m]
  bool tubes_in_window = true;                     ///< false: drawn without tubes in the windows
  double nozzle_in_area = 0, nozzle_out_area = 0;  ///< [m2]; 0: not given, no drop counted

  /// Diameter that counts for free area and Re [m]: D_t, of fins that of the plain tube as wide to the flow.
  double flow_diameter() const { return blocked_diameter.value_or(tube_outside_diameter); }

  double tube_centre_circle() const {  ///< D_ctl, through the outermost tube centres [m]
    return inside_diameter - bundle_to_shell - tube_outside_diameter;
  }
};

/// How the tube rows lie to the crossflow, rows counted singly.
///
///     layout   row distance       gap divisor
///     30       sqrt(3)/2 pitch    pitch
///     60       pitch/2            sqrt(3)/2 pitch
///     45       pitch/sqrt(2)      pitch/sqrt(2)
///     90       pitch              pitch
///
/// The smallest gap across the flow lies on the diagonal while pitch/D_t < 1.71 (45)
/// and < 3.7 (60); the divisors hold below that.
/// Source: Taborek, HEDH 3.3 (1983) for 30, 45, 90; 60 is plain geometry.
struct Rows {
  double distance;     ///< along the flow [m]
  double gap_divisor;  ///< in the crossflow area [m]
};
Rows rows(const ShellSide& shell);

/// What one segmental baffle leaves open and what the flow meets there.
///
///     F_w = (theta_ctl - sin theta_ctl)/(2 pi),  theta_ctl = 2 acos((D_s/D_ctl)(1 - 2c))
///     N_tcc = (D_s/L_pp)(1 - 2c)
///     N_tcw = (0.8/L_pp)[c D_s - (D_s - D_ctl)/2], not below 0
///     S_w = (D_s^2/8)(theta_ds - sin theta_ds) - N_t F_w pi D_t^2/4,  theta_ds = 2 acos(1 - 2c)
///     D_w = 4 S_w/(pi D_t N_t F_w + D_s theta_ds/2)
///
/// Counts are not rounded. Windows without tubes (drawn so, or the cut does not
/// reach the bundle): F_w = N_tcw = 0.
/// Source: Taborek, HEDH 3.3 (1983).
struct Window {
  double angle;               ///< theta_ds, of the shell cut off by the baffle edge [rad]
  double tube_fraction;       ///< F_w [-]
  double rows_between_tips;   ///< N_tcc [-]
  double rows;                ///< N_tcw [-]
  double area;                ///< S_w [m2]
  double hydraulic_diameter;  ///< D_w [m]
};
Window window(const ShellSide& shell);

/// Fins as their efficiency needs them. Areas are those of one tube.
struct FinnedSurface {
  double fin_share = 0;    ///< surface of the fins / whole outside surface [-]
  double root_radius = 0;  ///< [m]
  double reach = 0;        ///< r_1 (r_2/r_1 - 1)(1 + 0.35 ln(r_2/r_1)), half a fin added to r_2 [m]
  double thickness = 0;    ///< [m]
};

/// The exchanger ready to be rated.
struct Exchanger {
  Description as_described;
  TubeSide tube_side;
  ShellSide shell_side;
  Conductivity wall_conductivity;
  bool tubes_drawn = true;        ///< false: `tube_side` holds no dimensions, its film is a law
  bool shell_drawn = true;        ///< false: the same of `shell_side`
  double wall_length = 0;         ///< resistance of the tube metal on the outside area x conductivity [m]
  double layer_resistance = 0;    ///< of layers, or of a wall known so, on the outside area [m2.K/W]
  double outside_per_inside = 1;  ///< outside area / area of the bore [-]
  std::optional<FinnedSurface> finned;
  int shells_in_series = 1, shells_in_parallel = 1;
  bool tube_side_in_series = false;  ///< only the shell stream is shared by what is in parallel
  FlowDirection flow_direction = FlowDirection::counter;
  FirstTubePass first_tube_pass = FirstTubePass::against_shell_flow;
  double effective_length = 0;     ///< L_eff [m]
  double tubesheet_thickness = 0;  ///< [m]
  double tubes_open = 0;           ///< holes open to flow, of the mean shell
  double area_per_shell = 0;       ///< effective outside area, fins and all [m2]
  double area = 0;                 ///< of all shells [m2]

  /// How many ways the tube stream is shared.
  int tube_banks() const { return tube_side_in_series ? 1 : shells_in_parallel; }
};

/// What cannot be built or rated, by key of the case file. Empty: `derive` may be called.
Objections objections(const Description& description);

/// Everything that follows from the drawing, by rating-procedure section 1; what
/// was left out is filled by trade practice and listed as assumed.
/// Needs: objections(description) is empty; throws std::invalid_argument otherwise.
Checked<Exchanger> derive(const Description& description);

/// Names of the tube materials known, for messages and `schema`.
std::vector<std::string> tube_materials();

}  // namespace dutygauge::geometry
