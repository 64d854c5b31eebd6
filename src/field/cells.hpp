#pragma once
#include <array>
#include <charconv>
#include <cmath>
#include <cstring>
#include <string>
#include <string_view>
#include <vector>

/// Fields of one line and the numbers in them; nothing here allocates.
namespace dutygauge::field {

inline std::string_view without_blanks(std::string_view text) {
  while (!text.empty() && (text.front() == ' ' || text.front() == '\t')) text.remove_prefix(1);
  while (!text.empty() && (text.back() == ' ' || text.back() == '\t')) text.remove_suffix(1);
  return text;
}

/// Takes the next field off a line: without its blanks and quotes; a doubled quote inside
/// stays doubled. `more` tells whether a separator followed.
inline std::string_view take_cell(std::string_view& line, char separator, bool& more) {
  std::size_t begin = 0;
  while (begin < line.size() && line[begin] == ' ') ++begin;
  if (begin < line.size() && line[begin] == '"') {
    std::size_t end = begin + 1;
    while (end < line.size() && (line[end] != '"' || (end + 1 < line.size() && line[end + 1] == '"')))
      end += line[end] == '"' ? 2 : 1;
    end = end < line.size() ? end : line.size();
    const std::string_view cell = line.substr(begin + 1, end - begin - 1);
    const std::size_t next = line.find(separator, end);
    more = next != std::string_view::npos;
    line.remove_prefix(more ? next + 1 : line.size());
    return without_blanks(cell);
  }
  const void* found = line.empty() ? nullptr : std::memchr(line.data(), separator, line.size());
  more = found != nullptr;
  const std::size_t length =
      more ? static_cast<std::size_t>(static_cast<const char*>(found) - line.data()) : line.size();
  const std::string_view cell = line.substr(0, length);
  line.remove_prefix(more ? length + 1 : length);
  return without_blanks(cell);
}

/// All fields of a line, at most `most`.
inline void split(std::string_view line, char separator, std::size_t most,
                  std::vector<std::string_view>& cells) {
  cells.clear();
  bool more = true;
  while (more && cells.size() < most) cells.push_back(take_cell(line, separator, more));
}

enum class CellKind { number, missing, bad };

/// The number in a field; `decimal` is '.' or ','.
inline CellKind read_cell(std::string_view cell, char decimal, double& value) {
  if (cell.empty()) return CellKind::missing;
  std::array<char, 40> buffer;
  if (decimal == ',' && cell.size() <= buffer.size() && cell.find('.') == std::string_view::npos) {
    for (std::size_t i = 0; i < cell.size(); ++i) buffer[i] = cell[i] == ',' ? '.' : cell[i];
    cell = {buffer.data(), cell.size()};
  }
  const char* begin = cell.data();
  const char* const end = begin + cell.size();
  if (*begin == '+' && cell.size() > 1 && begin[1] != '-') ++begin;
  const char first = *begin == '-' && begin + 1 < end ? begin[1] : *begin;
  if ((first >= '0' && first <= '9') || first == '.') {
    const auto [stop, fault] = std::from_chars(begin, end, value);
    if (fault == std::errc{} && stop == end && std::isfinite(value)) return CellKind::number;
    return CellKind::bad;
  }
  const bool is_missing = cell == "-" || cell == "nan" || cell == "NaN" || cell == "NA";
  return is_missing ? CellKind::missing : CellKind::bad;
}

/// Digits behind the decimal mark of a plain number.
inline int decimals_of(std::string_view cell, char decimal) {
  const auto mark = cell.find(decimal);
  if (mark == std::string_view::npos || cell.find_first_of("eE") != std::string_view::npos) return 0;
  return static_cast<int>(cell.size() - mark - 1);
}

}  // namespace dutygauge::field
