#pragma once
#include <span>
#include <string_view>

#include "dutygauge/geometry.hpp"

/// Pieces of `derive` and `objections`, each with its own file.
namespace dutygauge::geometry {

inline bool has_u_tubes(const Description& d) {
  return d.rear_head == 'U';
}

/// floor(z + 0.5): how this module rounds everywhere.
int nearest(double z);

// --- lengths (derive.cpp)

/// As given, or max(20 mm, 0.05 D_s) [m]. Common practice, no source.
double tubesheet_thickness(const Description& d);

/// Tube length exposed to the shell [m]: less two tubesheets, with U-tubes one.
double effective_length(const Description& d);

/// Everything but the checks: needs the drawing's own numbers to be possible.
Checked<Exchanger> build(const Description& d);

// --- wall, layers, fins (tube_wall.cpp)

/// Outside surface of one metre of tube, fins and all [m2/m].
double outside_per_length(const Description& d);

/// Of the open tube, layers in it [m]. With fins the wall is counted from their root.
double bore(const Description& d);

void check_wall(const Description& d, Objections& out);

/// Resistances between the two surfaces, their ratio, and the fins.
void set_wall_path(const Description& d, Exchanger& exchanger);

// --- known by its area (known_area.cpp)

Objections objections_to_area(const Description& d);
Exchanger build_by_area(const Description& d);

// --- plugging (plugging.cpp)

/// Holes plugged in one shell, the mean of all shells.
double plugged_in_shell(const Description& d);

void check_plugging(const Description& d, Objections& out);
void report_plugging(const Description& d, Findings& findings, Assumptions& assumed);

// --- baffles (baffles.cpp)

/// Baffles of one run, on the straight tubes.
struct Baffles {
  int count = 0;                              ///< N_b
  double central = 0, inlet = 0, outlet = 0;  ///< spacings [m]
  double length() const { return inlet + outlet + (count - 1) * central; }
};

/// In how many runs the baffles seen along the shell are shared: 1 (E, F), 2 (G, J), 4 (H).
int runs_along(char shell_type);

/// Length of one baffled run [m].
double run_length(const Description& d);

/// Needs a spacing or a count, each above zero; X shells have no baffles.
Baffles place_baffles(const Description& d);

/// What was assumed of the end spacings, and whether they close on the length.
void report_baffles(const Description& d, const Baffles& baffles, Checked<Exchanger>& out);

// --- clearances, strips, lanes (clearances.cpp)

/// Diametral gap between bundle and shell [m]: as given, or usual for the rear head.
double bundle_gap(const Description& d);

/// Fills the clearances of `shell`; its diameters must be set.
void set_clearances(const Description& d, const Baffles& baffles, ShellSide& shell, Assumptions& assumed);

/// Fills strips and lanes; the clearances must be set.
void set_seals(const Description& d, ShellSide& shell, Assumptions& assumed);

// --- materials (materials.cpp)

struct Span {
  double value, low, high;
};

struct ConductivityPoint {
  double celsius, value;  ///< [degC, W/m.K]
};

struct Material {
  std::string_view name;
  std::string_view also;  ///< other names, each between semicolons
  Span roughness;         ///< [m]
  std::span<const ConductivityPoint> conductivity;
};

/// The material of that name in any case, or null.
const Material* find_material(std::string_view name);

/// The known name most like this one.
std::string_view nearest_material(std::string_view name);

/// Roughness where no material is named [m].
Span unnamed_roughness();

}  // namespace dutygauge::geometry
