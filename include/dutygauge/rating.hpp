#pragma once
#include <optional>
#include <string>
#include <vector>

#include "dutygauge/arrangement.hpp"
#include "dutygauge/findings.hpp"
#include "dutygauge/fluids.hpp"
#include "dutygauge/geometry.hpp"
#include "dutygauge/overall.hpp"
#include "dutygauge/shellside.hpp"
#include "dutygauge/tubeside.hpp"

/// The solvers: an exchanger and two streams to outlets, duty, films, drops.
namespace dutygauge::rating {

/// A film that is known instead of computed:
///
///     h = value (m/at_flow)^flow_exponent (1 + temperature_slope (T - at_temperature))
///
/// and, with `at_state`, times (k/k0)^(2/3) (cp/cp0)^(1/3) (mu0/mu)^(4/15), which is what
/// Re^0.6 Pr^(1/3) k leaves beside the flow. Without exponent and slope: a fixed film.
struct FilmLaw {
  double value = 0;                                  ///< on the stream's own surface [W/m2.K]
  double at_flow = 1, flow_exponent = 0;             ///< [kg/s] of the whole unit, [-]
  double temperature_slope = 0, at_temperature = 0;  ///< [1/K], [K]
  std::optional<fluids::State> at_state{};           ///< where `value` holds

  double at(double mass_flow, const fluids::State& bulk) const;
};

/// A pressure drop of the whole unit that is known: value (m/at_flow)^flow_exponent [Pa],
/// and with `at_state` times (rho0/rho) (mu/mu0)^0.2.
struct DropLaw {
  double value = 0;                       ///< [Pa]
  double at_flow = 1, flow_exponent = 0;  ///< [kg/s], [-]
  std::optional<fluids::State> at_state{};

  double at(double mass_flow, const fluids::State& bulk) const;
};

/// One stream as it enters the whole unit.
struct Stream {
  std::string name;
  fluids::Fluid fluid;
  double mass_flow = 0;               ///< of the whole unit [kg/s]
  double inlet_temperature = 0;       ///< [K]
  double inlet_pressure = 0;          ///< [Pa] absolute
  double fouling_resistance = 0;      ///< on the surface it sits on [m2.K/W]
  std::optional<FilmLaw> film_law{};  ///< in place of the correlation
  std::optional<DropLaw> drop_law{};  ///< the same
  bool pressure_is_known = true;      ///< else it stands for one that nothing depends on
};

/// How the outlets are found.
enum class Solution {
  mean,   ///< properties at the streams' mean temperatures, closed form of the arrangement
  march,  ///< along the two streams' paths, with local properties, films and walls
};

struct Methods {
  shellside::Method shell_side = shellside::Method::bell_delaware;
  Solution solution = Solution::march;
};

/// Factors on what the methods give: 1 as published. For a film multiplier the user has
/// reason for, and for swinging a method within its scatter.
struct Factors {
  double tube_film = 1, shell_film = 1, tube_drop = 1, shell_drop = 1;
};

/// What is to be rated.
struct Problem {
  geometry::Exchanger exchanger;
  Stream shell_side, tube_side;
  Methods methods;
  Factors factors{};
};

/// Films, walls and U with both streams at given bulk temperatures.
struct Local {
  fluids::State tube_bulk, shell_bulk, tube_wall, shell_wall;
  tubeside::Film tube_film;
  shellside::Film shell_film;
  overall::Resistances resistances;
  overall::WallTemperatures walls;
  double fin_effectiveness = 1;     ///< heat of the finned surface / with fins as hot as their root
  double u_dirty = 0, u_clean = 0;  ///< [W/m2.K]
  bool converged = false;
};

/// One place along a tube pass of a march.
struct ProfilePoint {
  int shell = 1, pass = 1;  ///< of the train along the shell stream; tube pass
  double position = 0;      ///< along the tube stream's own way through this stretch, 0 to 1
  double tube = 0, shell_side = 0, wall = 0;  ///< bulk of both streams, mean metal [K]
  double u = 0;                               ///< [W/m2.K]
  double flux = 0;                            ///< from shell to tube side [W/m2]
};

/// What leaves one shell of a train.
struct ShellEnd {
  int bank = 1, position = 1;                ///< position along the shell stream; bank 1 stands for
                                             ///< all where they share both streams
  double shell_outlet = 0, tube_outlet = 0;  ///< [K]
};

/// The outlet state of the unit. Found by a march, films and resistances are those that
/// the whole unit shows: weighted with the flux, so that U A F LMTD is the duty.
struct Outcome {
  Solution solution = Solution::mean;
  double duty = 0;                                             ///< [W]
  double shell_outlet = 0, tube_outlet = 0;                    ///< [K]
  double shell_mean = 0, tube_mean = 0;                        ///< bulk means [K]
  double shell_capacity_rate = 0, tube_capacity_rate = 0;      ///< mean, whole streams [W/K]
  double ntu_tube = 0, r_tube = 0, p_tube = 0;                 ///< referred to the tube side
  double effectiveness = 0, ntu = 0, capacity_ratio = 0;       ///< on the smaller capacity rate
  double log_mean = 0, f_correction = 0, mean_difference = 0;  ///< [K], [-], [K]
  double duty_ntu = 0, duty_lmtd = 0;                          ///< the two routes at the solution [W]
  double balance_error = 0;                                    ///< |Q_hot - Q_cold|/Q from enthalpies
  Local local;                           ///< at the bulk means; a march puts its films, U and walls in
  tubeside::PressureDrop tube_drop;      ///< one bank, all its shells in series
  shellside::PressureDrop shell_drop;    ///< the same
  std::vector<ProfilePoint> profile;     ///< march only
  std::vector<ShellEnd> between_shells;  ///< along the shell stream; march only
};

/// A rating, or why there is none.
struct Rating {
  std::optional<Outcome> outcome;
  std::string no_result;                        ///< why not, with units::mention; empty with an outcome
  double largest_duty = 0;                      ///< what an endless surface in counterflow would do [W]
  std::optional<double> mean_duty, march_duty;  ///< of the solutions that were found [W]
  Findings findings;
};

/// Rates by the solution the problem names.
Rating rate(const Problem& problem);

/// Puts the duty of the other solution beside a rating; a finding where the two differ by
/// more than 1 %, with why, and where few baffles cost more than 1 % of the duty.
Findings compare_solutions(const Problem& problem, Rating& rating);

/// Rates by mean properties: one trial duty fixes the outlets, films and U are
/// taken at the bulk means, and the arrangement closes the balance in one bracketed
/// root. No outcome where a stream would leave the range of its fluid.
Rating rate_mean(const Problem& problem);

/// How far a march is refined: slices of each line are doubled from the first number until
/// the duty moves by less than the tolerance, or the most is reached.
struct Refinement {
  int first_slices = 4, most_slices = 64;
  double tolerance = 1e-5;  ///< relative, of the duty
};

/// Rates along the paths of the two streams. Every stretch of a stream is cut into
/// slices with the heat balance held in enthalpy (collocation of order 4); films, walls
/// and properties are those of each place, and slices are doubled until the duty moves
/// by less than 1e-5. With constant properties it tends to the closed form. The shell
/// stream is continuous along its run: what few baffles cost is not in it.
/// No outcome where a stream leaves the range of its fluid, or where the temperatures
/// do not settle.
Rating rate_march(const Problem& problem, const Refinement& refinement = {});

/// What a duty asks of the surface: outlets, films and U are those at that duty.
struct Needed {
  double u_required = 0;      ///< duty / (installed area x F x LMTD at the duty) [W/m2.K]
  double surface_margin = 0;  ///< installed / needed - 1
  double fouling_spare = 0;   ///< further resistance it can carry, outside area [m2.K/W]
};

/// Empty when no surface of this arrangement is enough; a finding then says what
/// stands in the way and what would change it. Needs: duty > 0.
Checked<std::optional<Needed>> needed_for(const Problem& problem, double duty);

/// The largest duty [W] the two streams allow: endless surface in counterflow, or the
/// end of a fluid's range.
struct DutyLimit {
  double duty = 0;
  bool tube_side_governs = false;  ///< the side whose range of temperature is used up first
  bool fluid_ends = false;         ///< by its fluid's range, not by the other inlet
};
DutyLimit duty_limit(const Problem& problem);

/// The duty [W] that brings a stream to an outlet temperature [K] inside its usable
/// range; negative when that means exchanging heat the other way round.
double duty_to_reach(const Stream& stream, double outlet_temperature, bool is_hot);

/// Whether the shell side is the hot one.
bool shell_side_is_hot(const Problem& problem);

/// The arrangement a problem is rated with.
arrangement::Arrangement arrangement_of(const geometry::Exchanger& exchanger);

}  // namespace dutygauge::rating
