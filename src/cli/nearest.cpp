#include <fmt/core.h>

#include <algorithm>

#include "command.hpp"

namespace dutygauge::cli {
namespace {

// Changes between two words, a swap of neighbours counting one (optimal string alignment).
std::size_t distance(std::string_view a, std::string_view b) {
  std::vector<std::vector<std::size_t>> d(a.size() + 1, std::vector<std::size_t>(b.size() + 1));
  for (std::size_t i = 0; i <= a.size(); ++i) d[i][0] = i;
  for (std::size_t j = 0; j <= b.size(); ++j) d[0][j] = j;
  for (std::size_t i = 1; i <= a.size(); ++i)
    for (std::size_t j = 1; j <= b.size(); ++j) {
      const std::size_t change = a[i - 1] == b[j - 1] ? 0 : 1;
      d[i][j] = std::min({d[i - 1][j] + 1, d[i][j - 1] + 1, d[i - 1][j - 1] + change});
      if (i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1])
        d[i][j] = std::min(d[i][j], d[i - 2][j - 2] + 1);
    }
  return d[a.size()][b.size()];
}

}  // namespace

std::string_view nearest(std::string_view typed, std::span<const std::string_view> known) {
  if (typed.empty() || typed.size() > 60) return {};
  const auto from_typed = [typed](std::string_view word) { return distance(typed, word); };
  const auto found = std::ranges::min_element(known, {}, from_typed);
  if (found == known.end()) return {};
  return from_typed(*found) <= std::max<std::size_t>(1, typed.size() / 3) ? *found : std::string_view{};
}

std::string did_you_mean(std::string_view typed, std::span<const std::string_view> known) {
  const auto near = nearest(typed, known);
  return near.empty() ? "" : fmt::format(" (did you mean '{}'?)", near);
}

}  // namespace dutygauge::cli
