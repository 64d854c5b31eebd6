#pragma once
#include "dutygauge/case_io.hpp"
#include "dutygauge/report.hpp"

/// A case rated as a whole.
namespace dutygauge::explore {

/// Judges a problem by its own solution and puts the other one's duty beside it.
service::Assessment assess_both_ways(const rating::Problem& problem, const service::Service& service);

/// Rates and judges a case: what `dutygauge rate` does with one file.
report::Result rate(const case_io::Case& a_case);

}  // namespace dutygauge::explore
