#pragma once
#include <string>
#include <string_view>
#include <vector>

#include "table.hpp"
#include "text.hpp"

namespace dutygauge::units {

/// One unit of a compound with its power as read strictly from left to right.
struct Term {
  const Unit* unit = nullptr;
  int power = 1;
  bool behind_slash = false;

  int power_below_line() const { return behind_slash && power > 0 ? -power : power; }
};

struct Expression {
  std::string text;  ///< as folded, for messages
  std::vector<Term> terms;
  int slashes = 0;
  bool parentheses = false;

  bool alone() const { return terms.size() == 1 && terms.front().power == 1; }
  /// Whether a single slash may be a line with everything behind it below.
  bool has_line() const { return slashes == 1 && !parentheses; }
  bool is_mass_ratio() const;
  Dimension dimension(bool below_line) const;
};

/// Reads a folded, not empty unit text; `kind` only serves the messages.
Expression parse_expression(std::string_view text, Kind kind);

}  // namespace dutygauge::units
