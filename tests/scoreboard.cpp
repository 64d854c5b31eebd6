#include <fmt/core.h>

#include <algorithm>
#include <cmath>
#include <cstring>
#include <map>
#include <string>
#include <vector>

#include "published/published.hpp"

namespace {

const char* word(published::Known known) {
  switch (known) {
    case published::Known::seen:
      return "seen";
    case published::Known::computed:
      return "computed";
    case published::Known::memory:
      return "memory";
    case published::Known::practice:
      return "common practice, no source";
  }
  return "";
}

double difference(const published::Row& row) {
  return row.published == 0.0 ? row.ours : row.ours / row.published - 1.0;
}

void print_rows(const std::vector<const published::Row*>& rows) {
  for (const auto* row : rows) {
    fmt::print("  {:<52.52} {:>13.7g} {:>13.7g} {:<9.9} {:>+9.3g} %  {}\n", row->what, row->published,
               row->ours, row->unit, 100.0 * difference(*row), word(row->known));
    if (!row->reason.empty()) fmt::print("    why: {}\n", row->reason);
  }
}

void print_summary(const std::string& source, const std::vector<const published::Row*>& rows) {
  std::vector<double> sizes;
  for (const auto* row : rows) sizes.push_back(std::abs(difference(*row)));
  std::ranges::sort(sizes);
  fmt::print("{:<72.72} {:>5} {:>9.2g} % {:>9.2g} %\n", source, rows.size(), 100.0 * sizes[sizes.size() / 2],
             100.0 * sizes.back());
}

}  // namespace

int main(int argc, char** argv) {
  const bool summary_only = argc > 1 && std::strcmp(argv[1], "--summary") == 0;
  const auto all = published::all();
  std::map<std::string, std::vector<const published::Row*>> by_source;
  for (const auto& row : all) by_source[row.source].push_back(&row);
  if (!summary_only) {
    for (const auto& [source, rows] : by_source) {
      fmt::print("{}\n  {:<52} {:>13} {:>13} {:<9} {:>11}  known\n", source, "quantity", "published", "ours",
                 "unit", "difference");
      print_rows(rows);
      fmt::print("\n");
    }
  }
  fmt::print("{:<72} {:>5} {:>11} {:>11}\n", "source", "count", "median", "worst");
  for (const auto& [source, rows] : by_source) print_summary(source, rows);
}
