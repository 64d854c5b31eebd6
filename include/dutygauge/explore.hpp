#pragma once
#include <optional>

#include "dutygauge/case_io.hpp"
#include "dutygauge/report.hpp"

/// A case rated as a whole.
namespace dutygauge::explore {

/// Judges a problem by its own solution and puts the other one's duty beside it.
service::Assessment assess_both_ways(const rating::Problem& problem, const service::Service& service);

/// What `dutygauge rate` does with one file: rates and judges every operating case as the
/// unit is, clean and at design fouling, and audits the claims as built. The worst governs:
/// the case without a result, else the one with the lowest probability, then the smallest duty
/// margin, then the smallest temperature margin, then the first. `display`: units of the words, else the file's.
/// Throws case_io::InputError.
report::Result rate(const case_io::Document& document, std::optional<units::System> display = {});

/// The same of one case that is built already; its claims are audited as it stands.
report::Result rate(const case_io::Case& a_case);

}  // namespace dutygauge::explore
