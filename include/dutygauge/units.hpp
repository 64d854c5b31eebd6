#pragma once
#include <optional>
#include <string>
#include <string_view>
#include <variant>
#include <vector>

/// Written values and what they mean: the only place where units are converted.
/// Everything else in the library is SI: kg m s K Pa W, fractions, absolute pressure.
namespace dutygauge::units {

/// What a number stands for. Kinds of the same dimension differ in what may be
/// written for them: a temperature has a zero point, a difference has none; a
/// pressure may be gauge, a pressure drop may not.
enum class Kind {
  ratio,                   ///< [-], written bare or in %
  count,                   ///< [-], a whole number without unit
  length,                  ///< [m]
  area,                    ///< [m2]
  time,                    ///< [s]
  mass,                    ///< [kg]
  temperature,             ///< [K]
  temperature_difference,  ///< [K]
  pressure,                ///< [Pa] absolute
  pressure_difference,     ///< [Pa]
  mass_flow,               ///< [kg/s]
  volume_flow,             ///< [m3/s] at flowing conditions
  power,                   ///< [W]
  density,                 ///< [kg/m3]
  heat_capacity,           ///< [J/kg.K]
  conductivity,            ///< [W/m.K]
  viscosity,               ///< [Pa.s] dynamic
  kinematic_viscosity,     ///< [m2/s]
  enthalpy,                ///< [J/kg]
  film_coefficient,        ///< [W/m2.K], also U
  fouling_resistance,      ///< [m2.K/W]
  thermal_conductance,     ///< [W/K], UA and capacity rates
  velocity,                ///< [m/s]
  mass_flux,               ///< [kg/m2.s]
  momentum_flux,           ///< [kg/m.s2], rho v2
  per_length,              ///< [1/m], fins
  per_temperature,         ///< [1/K]
  mass_fraction,           ///< [kg/kg], written bare, in % or in g/kg
  angle,                   ///< [deg] kept in degrees: layout angles are names
};

/// The three ways results can be shown. SI: K, Pa, W. Metric: degC, kPa, kW. US: degF, psi, Btu/h.
enum class System { si, metric, us };

/// Where a written volume flow is measured.
enum class FlowBasis {
  mass,           ///< it is a mass flow
  inlet,          ///< at the stream's inlet conditions
  inlet_assumed,  ///< the same, but the text does not say so
  temperature,    ///< at the stated temperature (101325 Pa)
};

/// A written value in SI.
struct Value {
  double si = 0;
  std::optional<double> low, high;             ///< ends of a written range, SI
  std::optional<double> standard_deviation;    ///< of a written +-, SI (as a difference)
  std::vector<std::string> taken_for_granted;  ///< what the text left open ("bar read as absolute")
  bool bare_pressure = false;                  ///< a pressure without a datum: read as absolute
};

/// A written flow: mass, or volume with the place where it is measured.
struct Flow {
  Value amount;  ///< [kg/s] or [m3/s]; its own notes stand in the list below
  FlowBasis basis = FlowBasis::mass;
  double basis_temperature = 0;                ///< [K], for FlowBasis::temperature
  std::vector<std::string> taken_for_granted;  ///< of amount and place
};

/// A written pair "a -> b": the inlet and the outlet column of a sheet.
struct Pair {
  Value first, second;
};

/// A property at a temperature: "0.55 Btu/lb.degF at 135 degF".
struct ValueAt {
  Value value;
  double temperature = 0;  ///< [K]
};

/// Why a text could not be read: what is wrong; what was expected; what to do.
struct Misread {
  std::string what, expected, remedy;
};

template <class T>
using Read = std::variant<T, Misread>;

/// Reads `text` as a value of `kind`. Accepts everything of the value grammar
/// that has a single meaning: quantities with or without a blank before the
/// unit, inch fractions ("3/4 in", "1 1/4 in"), ranges ("10..14 in"),
/// deviations ("12 +- 1 in", "12 in +- 5 %"). Bare numbers only for ratio,
/// count, mass_fraction and angle. One unit at the end serves both numbers of a
/// range or a deviation. Never throws on a text, whatever is in it.
Read<Value> read(std::string_view text, Kind kind);

/// A mass flow, or a volume flow "at inlet", "at 60 degF" or in Nm3, Sm3, scf.
Read<Flow> read_flow(std::string_view text);

/// "165 -> 105 degF": one unit at the end serves both.
Read<Pair> read_pair(std::string_view text, Kind kind);

/// "0.55 Btu/lb.degF at 135 degF".
Read<ValueAt> read_value_at(std::string_view text, Kind kind);

/// Tube wall [m]: a length, or a gauge ("14 BWG"). "14 BWG min" is 1.10 x the
/// gauge, with 1.0 and 1.2 x the gauge as low and high.
Read<Value> read_wall(std::string_view text);

/// Bore [m]: a length, or a nominal pipe ("NPS 8 sch 40", "DN 200"). Without a
/// schedule: standard wall, taken for granted.
Read<Value> read_bore(std::string_view text);

/// A whole-field number: no blanks, no comma, finite; empty otherwise.
std::optional<double> number(std::string_view text);

/// Converts a number with a unit; throws std::invalid_argument on an unknown unit
/// or one of another kind (for callers with fixed units: tests, tables).
double to_si(double amount, std::string_view unit, Kind kind);

/// The number of `unit` that is `si`; the inverse of to_si.
double from_si(double si, std::string_view unit, Kind kind);

/// The unit in which a kind is shown in a system ("degF"; empty for plain numbers).
std::string_view shown_unit(Kind kind, System system);

/// The SI unit of a kind as used in the JSON result ("W/m2.K"; temperatures: "degC").
std::string_view json_unit(Kind kind);

/// si as it would be shown: the number with `significant` digits, no unit. Plain
/// digits from 1e-5 to 1e9; temperatures with `significant` - 3 decimals, as the
/// zero of their scale does not make them more exact. Throws on NaN and infinity.
std::string shown_number(double si, Kind kind, System system, int significant = 4);

/// si as it would be typed: number, blank, unit ("19.05 mm"); `read` takes it back.
std::string typed(double si, Kind kind, System system = System::metric, int significant = 5);

/// The kind's name in words ("a length"), for messages.
std::string_view name(Kind kind);

}  // namespace dutygauge::units
