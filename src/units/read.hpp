#pragma once
#include <string>
#include <string_view>
#include <vector>

#include "expression.hpp"
#include "text.hpp"

/// Reading of folded texts; everything here refuses by throwing a Refusal.
namespace dutygauge::units {

struct Wanted {
  Kind kind = Kind::ratio;
  std::string_view fallback_unit{};  ///< of a number without a unit of its own
  bool standard_volumes = false;     ///< whether Nm3, Sm3 and scf may be read
};

struct Reading {
  Value value;
  const Unit* standard = nullptr;  ///< the standard volume it is written in
};

/// One value: plain, a range or with a deviation.
Reading read_folded(std::string_view text, const Wanted& wanted);

/// A plain value: neither a range nor with a deviation.
double read_plain(std::string_view text, Kind kind);

/// The unit that stands at the end of a value; empty if it ends with a number.
std::string_view unit_at_end(std::string_view text);

void add_note(std::vector<std::string>& notes, std::string note);

/// Runs a reader that may refuse: the one place where a Refusal becomes a Misread.
template <class T, class Reader>
Read<T> attempt(Reader reader) {
  try {
    return reader();
  } catch (Refusal& refusal) {
    return std::move(refusal.misread);
  }
}

}  // namespace dutygauge::units
