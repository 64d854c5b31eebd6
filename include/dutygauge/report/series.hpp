#pragma once
#include <string>
#include <string_view>

#include "dutygauge/field/history.hpp"

/// The series of a record as CSV, row by row.
namespace dutygauge::report {

/// Names of the columns, with a line end.
std::string_view series_header();

/// Appends one row with its line end: SI, seven digits, empty where nothing is known.
void append_series_row(const field::SeriesRow& row, std::string& text);

}  // namespace dutygauge::report
