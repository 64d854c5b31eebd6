#pragma once
#include <string>
#include <string_view>

#include "unit.hpp"

/// Internal to rating: what both solutions share in telling their outcome.
namespace dutygauge::rating {

/// Outlets, means and capacity rates of a trial.
void fill_streams(const Trial& trial, double duty, Outcome& outcome);

/// NTU, effectiveness, LMTD, F and the two routes to the duty, from U and the outlets of a trial.
void fill_dimensionless(const Unit& unit, const Trial& trial, Outcome& outcome);

/// Findings of the converged state.
Findings check_outcome(const Unit& unit, const Outcome& outcome);

/// What the arrangement itself has to say: F, room below its limit, crosses, splits.
void check_arrangement(const Unit& unit, const Outcome& outcome, Findings& findings);
void check_few_baffles(const Unit& unit, const Outcome& outcome, Findings& findings);

/// Why a stream cannot even enter: its inlet lies where its fluid has no properties; or empty.
std::string inlet_fault(const Stream& stream, std::string_view side);

/// The outlet temperature [K] of a stream that gains `heat_gained` [W].
double outlet_after(const Stream& stream, double heat_gained);

struct MarchResult {
  std::optional<Outcome> outcome;
  std::string fault;  ///< why there is no outcome
};

/// A march refined until its duty stands still.
MarchResult march_through(const Unit& unit, const Local& start, const Refinement& refinement = {});

}  // namespace dutygauge::rating
