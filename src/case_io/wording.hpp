#pragma once
#include <string>
#include <string_view>

/// Words of the messages about a file: what was written, shown safely, and near misses.
namespace dutygauge::case_io {

/// Text of a file as it may stand in a message: control characters as '?', at most
/// `longest` bytes, cut between characters.
std::string shown(std::string_view text, std::size_t longest = 60);

/// Changes between two words, a swap of neighbours counting one (optimal string
/// alignment), without regard to capitals; '-' and ' ' count as '_'.
std::size_t distance(std::string_view a, std::string_view b);

/// Whether one word may be a misspelling of the other: distance <= max(1, length/3).
bool is_near(std::string_view typed, std::string_view known);

/// `words` is "this|that|other": one of them?
bool is_one_of(std::string_view word, std::string_view words);

/// "this, that or other" from "this|that|other".
std::string listed(std::string_view words);

/// The word of "this|that|other" nearest to what was typed; empty if none is near.
std::string_view nearest(std::string_view typed, std::string_view words);

/// Where the first segment of a dotted key ends, or npos. A dot between two digits is a
/// decimal point: the key of a viscosity is a temperature ("37.8 degC").
std::size_t first_dot(std::string_view key);

/// Whether a text reads like "x1.15".
bool begins_like_a_factor(std::string_view text);

/// The last segment of a dotted key, and all before it.
std::string_view last_segment(std::string_view key);
std::string_view parent_of(std::string_view key);

/// Joins two parts of a dotted key; either may be empty.
std::string joined(std::string_view parent, std::string_view child);

}  // namespace dutygauge::case_io
