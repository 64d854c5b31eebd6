#pragma once
#include "dutygauge/field.hpp"
#include "dutygauge/field/mapping.hpp"
#include "dutygauge/field/plant.hpp"
#include "dutygauge/service.hpp"

/// What an analysis stands on beside the days: which instruments to believe, what may have
/// done it, what is asked of the unit and what is planned.
namespace dutygauge::field {

/// Held against the first hypothesis of the evidence: every instrument is right.
///
/// Steps and drifts of the closure accuse channels. Where one stands alone the days are taken
/// without it; where several cannot be told apart there is a hypothesis for each, three at
/// most. A balance that never closed leaves two: either side is right. Then causes are ranked
/// over what changed from the first week since the last cleaning to the last week.
/// Needs: one hypothesis.
void diagnose(Evidence& evidence, const Plant& plant, const Instruments& instruments);

/// Allowed fouling at the service's conditions, the margin there today, duty lost by fouling,
/// and the plan. Without a demand for heat nothing is allowed or forbidden.
/// Needs: hypotheses. Call it after `diagnose`.
void ask(Evidence& evidence, const Plant& plant, const service::Service& service, const Planned& planned);

/// The fouling at which the tightest demand for heat just holds at the problem's own flows and
/// inlets; 0 where even the clean unit does not, empty without a demand or a result.
std::optional<double> allowed_fouling(const Plant& plant, const service::Service& service);

}  // namespace dutygauge::field
