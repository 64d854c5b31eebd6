#pragma once
#include <string>
#include <string_view>
#include <utility>
#include <vector>

#include "dutygauge/report/field.hpp"

/// Internal to report: what the page and the file for a browser say alike.
namespace dutygauge::report {

/// "2027-05-14", of a day since the first reading.
std::string iso_date(std::int64_t start, double day);
/// "14 May 2027".
std::string spoken_date(std::int64_t start, double day);

/// A resistance in the reader's units with two digits: "2.9e-4".
std::string resistance(double si, units::System display);
/// Its unit.
std::string resistance_unit(units::System display);

/// A section's name and its lines.
struct Fact {
  std::string name;
  std::vector<std::string> lines;
};

/// Everything the page says in sentences, in its order; what is not known is left out.
std::vector<Fact> facts_of(const CaseName& about, const field::FieldResult& result);

/// What to do next, each a task.
std::vector<std::string> next_of(const field::FieldResult& result);

/// The hypotheses one below the other, and the ways to go on with their cost; no rows where there is nothing to say.
using Rows = std::vector<std::vector<std::string>>;
Rows hypotheses_table(const CaseName& about, const field::FieldResult& result);
Rows options_table(const field::FieldResult& result);

/// "events: outage 28 June 2021 (written down)", one each.
std::vector<std::string> events_in_words(const CaseName& about, const field::FieldResult& result);

}  // namespace dutygauge::report
