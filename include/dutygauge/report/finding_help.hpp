#pragma once
#include <span>
#include <string_view>

/// What a finding's id means, for whoever meets it on a page or in JSON.
namespace dutygauge::report {

/// One kind of finding. Numbers in these texts are limits of the check, with their units.
struct FindingHelp {
  std::string_view id;         ///< "module.what"
  std::string_view meaning;    ///< what is found
  std::string_view criterion;  ///< when it is said: the formula and its limits
  std::string_view matters;    ///< why it matters
  std::string_view remedy;     ///< what to do, as a sentence
  std::string_view source;     ///< key of an entry in sources.hpp, or empty
};

/// Every kind of finding the program can make, by id.
std::span<const FindingHelp> all_finding_help();

/// The row of an id; null if there is none.
const FindingHelp* find_finding_help(std::string_view id);

}  // namespace dutygauge::report
