#include "dutygauge/report/finding_help.hpp"

#include <algorithm>
#include <vector>

#include "finding_rows.hpp"

namespace dutygauge::report {
namespace {

const std::vector<FindingHelp>& table() {
  static const std::vector<FindingHelp> rows = [] {
    std::vector<FindingHelp> all;
    for (const auto part : {rows_of_fluids(), rows_of_sides(), rows_of_unit()})
      all.insert(all.end(), part.begin(), part.end());
    std::ranges::sort(all, {}, &FindingHelp::id);
    return all;
  }();
  return rows;
}

}  // namespace

std::span<const FindingHelp> all_finding_help() {
  return table();
}

const FindingHelp* find_finding_help(std::string_view id) {
  const auto found = std::ranges::lower_bound(table(), id, {}, &FindingHelp::id);
  return found == table().end() || found->id != id ? nullptr : &*found;
}

}  // namespace dutygauge::report
