#include <fmt/format.h>

#include <algorithm>
#include <tuple>

#include "dutygauge/case_io.hpp"
#include "wording.hpp"

namespace dutygauge::case_io {
namespace {

constexpr std::size_t most_lines = 20;
constexpr std::size_t longest_key = 120;

std::string line_of(const std::string& file, const Mistake& mistake) {
  std::string line = shown(file, file.size());
  if (mistake.at.line > 0) line += fmt::format(":{}:{}", mistake.at.line, mistake.at.column);
  line += ": error: ";
  if (!mistake.key.empty()) line += shown(mistake.key, longest_key) + ": ";
  line += mistake.what;
  if (!mistake.expected.empty())
    line +=
        (mistake.expected.find("expected") != std::string::npos ? "; " : "; expected ") + mistake.expected;
  if (!mistake.remedy.empty()) line += "; " + mistake.remedy;
  return line;
}

std::vector<Mistake> in_file_order(std::vector<Mistake> mistakes) {
  std::ranges::stable_sort(mistakes, {}, [](const Mistake& m) { return std::tuple(m.at.line, m.at.column); });
  return mistakes;
}

std::vector<std::string> lines_of(const std::string& file, const std::vector<Mistake>& mistakes) {
  std::vector<std::string> lines;
  for (const auto& mistake : mistakes) {
    if (lines.size() == most_lines) {
      lines.push_back(
          fmt::format("{}: and {} more mistakes", shown(file, file.size()), mistakes.size() - most_lines));
      break;
    }
    lines.push_back(line_of(file, mistake));
  }
  return lines;
}

}  // namespace

InputError::InputError(std::string file, std::vector<Mistake> mistakes)
    : std::runtime_error(file + ": input at fault"),
      mistakes_(in_file_order(std::move(mistakes))),
      lines_(lines_of(file, mistakes_)) {}

}  // namespace dutygauge::case_io
