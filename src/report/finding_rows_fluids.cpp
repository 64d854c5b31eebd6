#include "finding_rows.hpp"

namespace dutygauge::report {
namespace {

constexpr FindingHelp rows[] = {
    {"fluids.beyond_usable", "a stream's inlet or outlet lies where its fluid cannot be computed",
     "outside the data's range by more than 5 % of its span or 10 K, whichever is less, or past a change of "
     "phase",
     "the numbers of this side rest on properties the fluid does not have there",
     "Give two_point or table data that reach the temperature, or mend inlet, pressure or service.", ""},
    {"fluids.constant_over_wide_span", "constant properties are used over a wide change of temperature",
     "|inlet - outlet| above 30 K in a liquid, above 100 K in a gas, with the fluid given as constant",
     "viscosity and heat capacity drift over such a span, and films and duty with them",
     "Give the properties at two points or as a table.", "common_practice"},
    {"fluids.dense_gas", "a gas is so compressed that its model is no longer reliable",
     "the temperature is below the one from which the gas model is valid at this pressure",
     "density and heat capacity may be 5 to 10 % wrong, and the pressure drop with them",
     "Give the gas as a table made for this pressure.", ""},
    {"fluids.extrapolated", "a property is followed past the end of its data",
     "a bulk temperature is more than 0.05 K outside the range of a property, and still inside what is "
     "usable",
     "the trend is continued, which the source of the data does not vouch for",
     "Give data that reach this temperature.", ""},
    {"fluids.fractions_scaled", "the mole fractions of a gas mixture do not add up to one",
     "|sum - 1| above 1e-9; each was divided by the sum", "a component may be missing from the list",
     "Compare the list with the gas analysis.", ""},
    {"fluids.given_far_from_model", "a property given for a known fluid is far from the fluid's own",
     "|given/model - 1| at that temperature above 5 % of density, 20 % of heat capacity, 30 % of "
     "conductivity or 100 % "
     "of viscosity; factors outside 0.2 to 5 are refused",
     "such a factor is more often a unit or another fluid than a measured difference",
     "Check the value, its unit and the fluid's name.", "common_practice"},
    {"fluids.inhibited_glycol", "a glycol solution is taken as free of inhibitors",
     "said of every glycol and water mixture; commercial coolants hold 3 to 6 % of inhibitors",
     "density is then about 0.5 % higher, viscosity and conductivity within 3 %",
     "Take the supplier's table if the margin is as small as that.", "melinder_2010"},
    {"fluids.near_boiling", "a liquid is close to its boiling point",
     "T above T_boil(p_inlet) - 3 K at an inlet or outlet",
     "the pressure drop alone may make it flash, and no two-phase flow is considered",
     "Check the lowest pressure on the way against the vapour pressure.", ""},
    {"fluids.near_condensing", "a gas is close to its dew point",
     "T below T_dew(p_inlet) + 3 K at an inlet or outlet",
     "colder walls will be wet and take more heat than is computed",
     "Check the dew point and the coldest wall.", ""},
    {"fluids.near_freezing", "a liquid is about to freeze",
     "water below 274 K; other liquids with a known freezing point less than 3 K above it",
     "ice or crystals would block tubes or bundle", "Keep the outlet and the coldest wall warmer.", ""},
    {"fluids.phase_not_checked", "it is not checked whether petroleum begins to evaporate",
     "said of every petroleum: it boils over a range, and no model knows where that begins",
     "light ends, dissolved gas or water may evaporate before, and two-phase flow is not considered",
     "Check the bubble point at the lowest pressure.", "common_practice"},
    {"fluids.seawater_enthalpy", "two published fits of seawater disagree at this state",
     "the slope of the enthalpy and the heat capacity differ by more than 1.5 %",
     "a duty or a flow found from it may be wrong by as much",
     "Give the heat capacity as a table if that decides.", "nayar_2016"},
    {"fluids.unusual_trend", "given properties change with temperature as those of few fluids do",
     "liquid: viscosity rises with temperature, or falls faster than exp(-0.25 per K), or density rises by "
     "more than "
     "1 %; gas: viscosity falls, or rises more than threefold",
     "it is mostly an exchanged column, a wrong unit or a wrong phase",
     "Check the values, their unit and the phase.", "common_practice"},
    {"fluids.unusual_value", "a given property lies outside what fluids have",
     "liquid: density 300 to 3000 kg/m3, heat capacity 500 to 15000 J/kg.K, conductivity 0.03 to 1 W/m.K, "
     "viscosity "
     "3e-5 to 100 Pa.s; gas: 0.01 to 300, 500 to 15000, 0.003 to 0.6, 3e-6 to 3e-4",
     "a slipped unit moves films, drops and duty by its whole factor", "Check the value and its unit.",
     "common_practice"},
    {"fluids.very_viscous", "a liquid hardly flows at an inlet or outlet",
     "dynamic viscosity above 1 Pa.s or kinematic viscosity above 1e-3 m2/s",
     "near its pour point it may not flow at all, and the channels share the flow unevenly",
     "Compare the pour point, and consider heating it before the unit.", "common_practice"},
    {"fluids.viscosity_estimated", "the viscosity of a petroleum is estimated, not given",
     "said where it follows from gravity and Watson factor alone",
     "it may be 30 to 50 % wrong, most of all for crude and residue", "Give two measured viscosities.",
     "twu_1985"},
    {"fluids.wall_changes_phase", "the wall is past the temperature where the fluid changes its phase",
     "the wetted wall at the stream's outlet lies past its boiling, dew or freezing temperature at inlet "
     "pressure",
     "the film is computed in one phase, with the properties at that limit",
     "Expect boiling, wetting or ice at that end, or keep the wall away from it by another flow.", ""},
    {"fluids.wall_outside", "the wall is outside the range of the fluid's data",
     "the mean wetted wall is more than 0.05 K outside, without a change of phase",
     "the wall correction uses the properties at the end of the range, a small error",
     "Give data that reach the wall, if the film decides.", ""},
};

}  // namespace

std::span<const FindingHelp> rows_of_fluids() {
  return rows;
}

}  // namespace dutygauge::report
