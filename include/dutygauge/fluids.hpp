#pragma once
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/findings.hpp"
#include "dutygauge/fluids/models.hpp"

/// Fluid properties at temperature and pressure, each model with its source,
/// range and published uncertainty. Knows no exchanger and no file.
namespace dutygauge::fluids {

enum class Phase { liquid, gas };

/// All properties of a single-phase fluid at one temperature and pressure.
struct State {
  double temperature = 0;    ///< [K]
  double density = 0;        ///< [kg/m3]
  double heat_capacity = 0;  ///< [J/kg.K] isobaric
  double conductivity = 0;   ///< [W/m.K]
  double viscosity = 0;      ///< [Pa.s] dynamic
  double enthalpy = 0;       ///< [J/kg]; only differences within one fluid mean anything
  Phase phase = Phase::liquid;

  double prandtl() const { return viscosity * heat_capacity / conductivity; }
};

/// One row of user data. [K, kg/m3, J/kg.K, W/m.K, Pa.s]
struct PropertyRow {
  double temperature, density, heat_capacity, conductivity, viscosity;
};

/// Factors that carry a fluid's properties through what is given of them.
struct Scale {
  double density = 1, heat_capacity = 1, conductivity = 1, viscosity = 1;
};

/// A fluid in one phase: a model and what belongs to all models.
struct Fluid {
  Model model;
  Phase phase = Phase::liquid;
  std::string name;    ///< as a person would say it ("water")
  std::string source;  ///< key in sources.hpp; empty for user data
  Scale scale{};
};

/// The state at a temperature [K] and pressure [Pa]. Extrapolates; never throws, never
/// allocates. Outside `usable_temperatures` the numbers mean nothing.
State state(const Fluid& fluid, double temperature, double pressure);

/// Specific enthalpy [J/kg] alone: what `state` returns, cheaper.
double enthalpy(const Fluid& fluid, double temperature, double pressure);

/// The temperature [K] at which the fluid has `enthalpy` [J/kg]; inverse of
/// `enthalpy` within usable_temperatures, clamped to its ends.
double temperature_at(const Fluid& fluid, double enthalpy, double pressure);

/// Density [kg/m3] at the conditions a volume flow refers to, also where the fluid could not be rated.
double reference_density(const Fluid& fluid, double temperature, double pressure);

/// Where the model holds without remark. Not for inner loops: may search the phase boundary.
TemperatureRange valid_temperatures(const Fluid& fluid, double pressure);

/// Where a result is still given, with a finding: the policy is in limits.hpp of the module.
/// Ends where the fluid boils, condenses or freezes, as far as that is known.
TemperatureRange usable_temperatures(const Fluid& fluid, double pressure);

/// What stops the fluid at the ends of its usable range, for messages with units::mention
/// ("it boils at {temperature:431.95}", "the table ends at {temperature:363.15}").
std::string why_it_ends(const Fluid& fluid, double pressure, bool at_upper_end);

/// What one property rests on.
struct PropertyNote {
  std::string_view property;  ///< key of a case file ("heat_capacity")
  std::string_view source;    ///< key in sources.hpp; empty for user data
  TemperatureRange valid;     ///< [K]
  double uncertainty;         ///< of the source, 95 %, as a fraction; 0: unknown (user data)
};
std::vector<PropertyNote> notes(const Fluid& fluid);

/// Findings for a bulk temperature used by a result: outside the range, close to a change of
/// phase. `where` names it ("shell side, outlet"). Beyond the usable range: a `must`.
Findings check_bulk(const Fluid& fluid, double temperature, double pressure, std::string_view where);

/// Findings for a wall temperature (properties were taken at the end of the range).
Findings check_wall(const Fluid& fluid, double temperature, double pressure, std::string_view where);

struct Span {
  double inlet, outlet;  ///< [K]
};
/// Findings for the two ends of a stream together: constant properties over a wide span.
Findings check_span(const Fluid& fluid, Span temperatures, std::string_view where);

// --- making fluids. Mistakes in the data come back as objections with keys relative to `fluid`
// ("table.rows.2.viscosity", rows counted from 0; the empty key is `fluid` itself).

struct Made {
  Fluid fluid;
  Objections objections;  ///< if any, the fluid must not be used
  Findings findings;
  Assumptions assumed;
};

Made make_constant(const ConstantModel& values, Phase phase);
Made make_table(std::vector<PropertyRow> rows, Phase phase);

/// A sheet's inlet and outlet column: a table of two rows, in either order.
Made make_two_point(const PropertyRow& first, const PropertyRow& second, Phase phase);

/// Water in the phase it has at the inlet; objects to saturated and two-phase inlets.
Made make_water(double inlet_temperature, double inlet_pressure);

Made make_seawater(double salinity);
Made make_air();
Made make_gas(std::string_view name);
Made make_liquid(std::string_view name);

struct Inlet {
  double temperature, pressure;  ///< [K], [Pa]
};

/// A fluid that needs no more than its name; `ammonia` and `water` in the phase of the inlet.
Made make_named(std::string_view name, Inlet inlet);

struct GasShare {
  std::string name;  ///< "nitrogen" or "N2"; water vapour is "water"
  double mole_fraction;
};
Made make_gas_mixture(const std::vector<GasShare>& shares);

/// `name`: ethylene_glycol_water, propylene_glycol_water, sodium_chloride_brine, calcium_chloride_brine.
Made make_solution(std::string_view name, double mass_fraction);

struct ViscosityPoint {
  double temperature;    ///< [K]
  double viscosity;      ///< [m2/s], or [Pa.s] where dynamic
  bool dynamic = false;  ///< turned into a kinematic viscosity by the fluid's own density
};
enum class PetroleumKind { product, crude };
struct PetroleumData {
  std::optional<double> api{}, specific_gravity{};  ///< one of them; at 60/60 degF
  std::optional<double> watson_k{};
  std::vector<ViscosityPoint> viscosity{};  ///< two points, or none (estimated from watson_k)
  std::optional<PetroleumKind> kind{};
};
Made make_petroleum(const PetroleumData& data);

struct OilData {
  std::optional<double> iso_vg{};           ///< grade by ISO 3448, or
  std::vector<ViscosityPoint> viscosity{};  ///< two points
  std::optional<double> density_15c{}, viscosity_index{};
};
Made make_oil(const OilData& data);

/// A property the sheet gives at one temperature.
struct GivenProperty {
  std::string property;       ///< "density", "heat_capacity", "conductivity" or "viscosity"
  double value, temperature;  ///< SI, [K]
};

/// Scales each given property by one factor so that the fluid meets it at its temperature.
/// `family` is the key the data stood under ("petroleum"), for objections.
Made with_given(Made made, std::string_view family, const std::vector<GivenProperty>& given, double pressure);

/// Objections to an inlet the fluid cannot have: boiling, frozen, outside the model.
Objections object_to_inlet(const Fluid& fluid, Inlet inlet);

/// One line of the list of built-in fluids and families.
struct CatalogueEntry {
  std::string_view name;     ///< as written under `fluid`
  std::string_view written;  ///< what follows it: "" or "{salinity: 35 g/kg}"
  TemperatureRange valid;    ///< [K]; phase boundaries may narrow it
  std::string_view sources;  ///< keys in sources.hpp, blank between them
};
std::span<const CatalogueEntry> catalogue();

/// The built-in name nearest to a misspelt one; empty if none is near.
std::string nearest_name(std::string_view name);

}  // namespace dutygauge::fluids
