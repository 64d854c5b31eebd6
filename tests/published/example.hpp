#pragma once
#include <cmath>

#include "dutygauge/arrangement.hpp"
#include "dutygauge/geometry.hpp"
#include "dutygauge/overall.hpp"
#include "dutygauge/tubeside.hpp"

/// Rating examples of textbooks, as our modules take them.
namespace published::example {

using namespace dutygauge;

struct Bundle {
  double shell_diameter, outside_diameter, inside_diameter, length, tubesheet;  // [m]
  int tubes, passes;
  double pitch;  // [m]
  int layout;
  double spacing;  // [m]
};

/// Tubes of unnamed steel, as most of these books leave the material open.
inline geometry::Exchanger exchanger(const Bundle& bundle) {
  geometry::Description d;
  d.rear_head = 'S';
  d.shell_inside_diameter = bundle.shell_diameter;
  d.tube_outside_diameter = bundle.outside_diameter;
  d.tube_wall = 0.5 * (bundle.outside_diameter - bundle.inside_diameter);
  d.tube_length = bundle.length;
  d.tubesheet_thickness = bundle.tubesheet;
  d.tube_count = bundle.tubes;
  d.tube_passes = bundle.passes;
  d.tube_pitch = bundle.pitch;
  d.layout = bundle.layout;
  d.baffle_spacing = bundle.spacing;
  d.tube_conductivity = 45.0;
  return geometry::derive(d).value;
}

/// The stream in the tubes; its viscosity at the wall where the source has one, else the bulk's.
struct InTubes {
  double mass_flow, density, viscosity, heat_capacity, conductivity, wall_viscosity;

  fluids::State bulk() const {
    return {.temperature = 300.0,  // of no effect on a liquid's film
            .density = density,
            .heat_capacity = heat_capacity,
            .conductivity = conductivity,
            .viscosity = viscosity,
            .phase = fluids::Phase::liquid};
  }
  fluids::State wall() const {
    fluids::State state = bulk();
    state.viscosity = wall_viscosity;
    return state;
  }
};

inline tubeside::Film film(const geometry::TubeSide& tubes, const InTubes& stream) {
  return tubeside::film(tubes, stream.mass_flow, stream.bulk(), stream.wall());
}

inline tubeside::PressureDrop drop(const geometry::TubeSide& tubes, const InTubes& stream) {
  return tubeside::pressure_drop(tubes, stream.mass_flow, stream.bulk(), stream.wall());
}

/// Inlet and outlet temperatures [degC] of the shell side and the tube side.
struct Terminals {
  double shell_in, shell_out, tube_in, tube_out;

  double log_mean() const {
    return arrangement::log_mean(std::abs(shell_in - tube_out), std::abs(shell_out - tube_in));
  }
  double correction(const arrangement::Arrangement& a) const {
    const double p = (tube_out - tube_in) / (shell_in - tube_in);
    const double r = (shell_in - shell_out) / (tube_out - tube_in);
    const auto ntu = arrangement::ntu_for(a, r, p);
    return ntu ? arrangement::lmtd_correction(a, r, *ntu).value_or(0.0) : 0.0;
  }
};

/// U [W/m2.K] of two films [W/m2.K] both on the outside area, and a deposit there [m2.K/W].
inline double u_of(double tube_film_outside, double shell_film, double deposit = 0.0) {
  return 1.0 / overall::Resistances{.tube_film = 1.0 / tube_film_outside,
                                    .shell_fouling = deposit,
                                    .shell_film = 1.0 / shell_film}
                   .sum();
}

}  // namespace published::example
