#pragma once
#include <optional>
#include <vector>

#include "dutygauge/case_io.hpp"
#include "dutygauge/report.hpp"

/// Internal to explore: how sure assessments are.
namespace dutygauge::explore {

/// What an assumption or a value typed with a spread may do to a case: the document rated by
/// mean properties with the key at both ends. Left out are those a method's scatter holds
/// already (clearances), and what no end gives a result for.
std::vector<uncertainty::Swing> swings_of(const case_io::Document& document, const case_io::Case& a_case);

/// Adds the spreads of all cases in all states, what they share drawn once, and puts the
/// grades into the sentences of their verdicts. `swings`: by case, or none at all.
void add_spreads(std::vector<report::RatedCase>& cases, const std::optional<report::Anchored>& anchored,
                 const std::vector<std::vector<uncertainty::Swing>>& swings);

}  // namespace dutygauge::explore
