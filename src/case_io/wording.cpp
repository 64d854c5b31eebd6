#include "wording.hpp"

#include <algorithm>
#include <numeric>
#include <vector>

namespace dutygauge::case_io {
namespace {

char folded(char c) {
  if (c >= 'A' && c <= 'Z') return static_cast<char>(c - 'A' + 'a');
  return c == '-' || c == ' ' ? '_' : c;
}

/// Calls `use` with each word of "this|that|other".
template <class Use>
void for_each_word(std::string_view words, Use use) {
  while (!words.empty()) {
    const auto bar = words.find('|');
    use(words.substr(0, bar));
    words = bar == std::string_view::npos ? std::string_view{} : words.substr(bar + 1);
  }
}

bool is_decimal_point(std::string_view key, std::size_t dot) {
  const auto is_digit = [](char c) { return c >= '0' && c <= '9'; };
  return dot > 0 && dot + 1 < key.size() && is_digit(key[dot - 1]) && is_digit(key[dot + 1]);
}

std::size_t last_dot(std::string_view key) {
  auto dot = key.rfind('.');
  while (dot != std::string_view::npos && is_decimal_point(key, dot))
    dot = dot == 0 ? std::string_view::npos : key.rfind('.', dot - 1);
  return dot;
}

}  // namespace

std::string shown(std::string_view text, std::size_t longest) {
  std::size_t end = std::min(text.size(), longest);
  while (end < text.size() && end > 0 && (static_cast<unsigned char>(text[end]) & 0xC0) == 0x80) --end;
  std::string result(text.substr(0, end));
  for (char& c : result)
    if (static_cast<unsigned char>(c) < 0x20 || c == 0x7F) c = '?';
  if (end < text.size()) result += "...";
  return result;
}

std::size_t distance(std::string_view a, std::string_view b) {
  std::vector<std::size_t> two_ago(b.size() + 1), ago(b.size() + 1), row(b.size() + 1);
  std::iota(ago.begin(), ago.end(), std::size_t{0});
  for (std::size_t i = 1; i <= a.size(); ++i) {
    row[0] = i;
    for (std::size_t j = 1; j <= b.size(); ++j) {
      const std::size_t change = folded(a[i - 1]) == folded(b[j - 1]) ? 0 : 1;
      row[j] = std::min({ago[j] + 1, row[j - 1] + 1, ago[j - 1] + change});
      if (i > 1 && j > 1 && folded(a[i - 1]) == folded(b[j - 2]) && folded(a[i - 2]) == folded(b[j - 1]))
        row[j] = std::min(row[j], two_ago[j - 2] + 1);
    }
    std::swap(two_ago, ago);
    std::swap(ago, row);
  }
  return ago[b.size()];
}

bool is_near(std::string_view typed, std::string_view known) {
  const std::size_t allowed = std::max<std::size_t>(1, known.size() / 3);
  if (typed.size() > known.size() + allowed || known.size() > typed.size() + allowed) return false;
  return distance(typed, known) <= allowed;
}

bool is_one_of(std::string_view word, std::string_view words) {
  bool found = false;
  for_each_word(words, [&](std::string_view known) { found = found || known == word; });
  return found;
}

std::string listed(std::string_view words) {
  std::string result;
  for_each_word(words, [&](std::string_view word) {
    const bool is_last = word.data() + word.size() == words.data() + words.size();
    if (!result.empty()) result += is_last ? " or " : ", ";
    result += word;
  });
  return result;
}

std::string_view nearest(std::string_view typed, std::string_view words) {
  std::string_view best;
  std::size_t best_distance = 0;
  for_each_word(words, [&](std::string_view known) {
    if (!is_near(typed, known)) return;
    const std::size_t d = distance(typed, known);
    if (best.empty() || d < best_distance) {
      best = known;
      best_distance = d;
    }
  });
  return best;
}

std::size_t first_dot(std::string_view key) {
  auto dot = key.find('.');
  while (dot != std::string_view::npos && is_decimal_point(key, dot)) dot = key.find('.', dot + 1);
  return dot;
}

bool begins_like_a_factor(std::string_view text) {
  return text.size() > 1 && text[0] == 'x' && std::string_view("0123456789.+-").find(text[1]) != text.npos;
}

std::string_view last_segment(std::string_view key) {
  const auto dot = last_dot(key);
  return dot == std::string_view::npos ? key : key.substr(dot + 1);
}

std::string_view parent_of(std::string_view key) {
  const auto dot = last_dot(key);
  return dot == std::string_view::npos ? std::string_view{} : key.substr(0, dot);
}

std::string joined(std::string_view parent, std::string_view child) {
  if (parent.empty() || child.empty()) return std::string(parent.empty() ? child : parent);
  return std::string(parent) + '.' + std::string(child);
}

}  // namespace dutygauge::case_io
