#include <fmt/format.h>

#include "arrangement_rows.hpp"
#include "published/published.hpp"

namespace {

using published::Known, published::Row, published::Rows;

/// What a value of each kind is good for. Charts of F are read to about 0.015; where the
/// source rounds P and R to two digits first, near the steep end, 0.04. The tables of
/// others state 1e-6 to 2e-5.
double tolerance_of(const support::CsvRow& row) {
  if (row.at("quantity") == "P") return 2e-5;
  return row.at("note").find("rounding") != std::string::npos ? 0.04 : 0.015;
}

Row row_of(const support::CsvRow& row) {
  const std::string& quantity = row.at("quantity");
  const std::string& source = row.at("source");
  const bool is_p = quantity == "P";
  return {
      .source = source.substr(0, source.find(" [")),
      .known = Known::seen,
      .what = fmt::format("{} of {}, {} passes, {} shells, R {:.4g}, {} {:.4g}", quantity,
                          row.at("arrangement"), row.at("tube_passes"), row.at("shells_in_series"),
                          std::stod(row.at("R")), is_p ? "NTU" : "P", std::stod(row.at(is_p ? "NTU" : "P"))),
      .unit = "-",
      .published = std::stod(row.at(quantity + "_published")),
      .ours = arrangement_rows::ours_of_printed(row),
      .tolerance = tolerance_of(row),
      .relative = false,
      .reason = row.at("note")};
}

Rows printed_values() {
  Rows rows;
  for (const auto& row : support::read_csv(TEST_DATA "/pntu-published.csv")) rows.push_back(row_of(row));
  return rows;
}

const published::Registration registered{&printed_values};

}  // namespace
