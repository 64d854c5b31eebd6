#include "dutygauge/arrangement.hpp"

#include <algorithm>
#include <cmath>
#include <string>

#include "published/published.hpp"
#include "support.hpp"

// F read from charts in worked examples, for the arrangements that are built.

namespace published {
namespace {

using namespace dutygauge;

double correction(const arrangement::Arrangement& a, double r, double p) {
  const auto ntu = arrangement::ntu_for(a, r, p);
  return ntu ? arrangement::lmtd_correction(a, r, *ntu).value_or(0.0) : 0.0;
}

/// Which E shells a chart of the example is drawn for. An F shell of four passes is two 1-2 shells in series.
arrangement::Arrangement arrangement_of(const support::CsvRow& line) {
  arrangement::Arrangement a{.tube_passes = std::stoi(line.at("tube_passes")),
                             .shells_in_series = std::stoi(line.at("shells_in_series"))};
  if (line.at("arrangement") == "F") a.tube_passes /= 2, a.shells_in_series *= 2;
  return a;
}

/// Author, title and place: what stands before the first bracket.
std::string citation(std::string source) {
  source = source.substr(0, std::min(source.find(" ["), source.find(" (")));
  std::ranges::replace(source, ';', ',');
  return source;
}

Rows rows_of_this_file() {
  Rows rows;
  for (const auto& line : support::read_csv(TEST_DATA "/pntu-published.csv")) {
    const std::string& shell = line.at("arrangement");
    if (line.at("quantity") != "F" || (shell != "E" && shell != "F")) continue;
    const auto a = arrangement_of(line);
    const double r = std::stod(line.at("R")), p = std::stod(line.at("P"));
    const double ours = correction(a, r, p);
    // F and P are each read to 0.01, and F falls steeply with P.
    const double slope = std::abs(correction(a, r, p + 1e-4) - correction(a, r, p - 1e-4)) / 2e-4;
    rows.push_back({.source = citation(line.at("source")),
                    .known = Known::seen,
                    .what = "F, " + line.at("id"),
                    .unit = "-",
                    .published = std::stod(line.at("F_published")),
                    .ours = ours,
                    .tolerance = 0.01 * (1.0 + slope),
                    .relative = false,
                    .reason = "read from a chart: F and P each to 0.01"});
  }
  return rows;
}

const Registration registration{&rows_of_this_file};

}  // namespace
}  // namespace published
