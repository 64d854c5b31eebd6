#pragma once
#include "dutygauge/field.hpp"
#include "dutygauge/field/history.hpp"

/// From a record as it was read to what an analysis stands on.
namespace dutygauge::field {

/// Rows, days, logged events, and how well the level is known. One hypothesis: every
/// instrument is right. Suspects, causes, service and plan are for whoever knows them.
Evidence evidence_of(const rating::Problem& problem, const Mapping& mapping, const History& history);

}  // namespace dutygauge::field
