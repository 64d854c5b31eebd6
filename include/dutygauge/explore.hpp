#pragma once
#include "dutygauge/case_io.hpp"
#include "dutygauge/report.hpp"

/// A case rated as a whole.
namespace dutygauge::explore {

/// Rates and judges a case: what `dutygauge rate` does with one file.
report::Result rate(const case_io::Case& a_case);

}  // namespace dutygauge::explore
