#pragma once
#include <vector>

#include "dutygauge/report.hpp"

/// Internal to explore: how sure assessments are.
namespace dutygauge::explore {

/// Adds the spreads of all cases in both states, what they share drawn once, and puts the
/// grades into the sentences of their verdicts.
void add_spreads(std::vector<report::RatedCase>& cases);

}  // namespace dutygauge::explore
