#pragma once
#include <span>

#include "dutygauge/report/finding_help.hpp"

/// The rows of the findings' help, by where the findings come from.
namespace dutygauge::report {

std::span<const FindingHelp> rows_of_fluids();
std::span<const FindingHelp> rows_of_sides();
std::span<const FindingHelp> rows_of_unit();

}  // namespace dutygauge::report
