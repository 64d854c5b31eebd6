#include "suggestions.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <vector>

#include "wording.hpp"

namespace dutygauge::case_io {
namespace {

/// The keys directly in a block, in table order.
std::vector<const Field*> children(const FieldTable& table, std::string_view block) {
  const Field* row = block.empty() ? nullptr : table.find(block);
  const std::string_view pattern = row == nullptr ? block : std::string_view(row->key);
  std::vector<const Field*> result;
  for (const Field& field : table.all())
    if (parent_of(field.key) == pattern) result.push_back(&field);
  return result;
}

/// How many leading segments two keys share.
std::size_t shared_segments(std::string_view a, std::string_view b) {
  std::size_t count = 0;
  const auto rest = [](std::string_view key) {
    const auto dot = first_dot(key);
    return dot == std::string_view::npos ? std::string_view{} : key.substr(dot + 1);
  };
  while (!a.empty() && !b.empty() && a.substr(0, first_dot(a)) == b.substr(0, first_dot(b))) {
    ++count;
    a = rest(a);
    b = rest(b);
  }
  return count;
}

const Field* nearest_child(const FieldTable& table, std::string_view block, std::string_view typed) {
  const Field* best = nullptr;
  std::size_t best_distance = 0;
  for (const Field* field : children(table, block)) {
    const auto name = last_segment(field->key);
    if (!is_near(typed, name)) continue;
    const std::size_t d = distance(typed, name);
    if (best != nullptr && d >= best_distance) continue;
    best = field;
    best_distance = d;
  }
  return best;
}

/// The one key of the block that begins with what was typed: len for length.
const Field* abbreviated(const FieldTable& table, std::string_view block, std::string_view typed) {
  constexpr std::size_t shortest = 3;
  if (typed.size() < shortest) return nullptr;
  const Field* found = nullptr;
  for (const Field* field : children(table, block)) {
    if (!last_segment(field->key).starts_with(typed)) continue;
    if (found != nullptr) return nullptr;
    found = field;
  }
  return found;
}

/// A key of that name in another block: the one whose block is nearest.
const Field* elsewhere(const FieldTable& table, std::string_view key) {
  const auto typed = last_segment(key);
  const Field* best = nullptr;
  std::size_t best_shared = 0, best_depth = 0;
  for (const Field& field : table.all()) {
    const auto name = last_segment(field.key);
    if (name.size() < 2 || distance(typed, name) > 0) continue;
    const std::size_t shared = shared_segments(field.key, key);
    const auto depth = static_cast<std::size_t>(std::ranges::count(field.key, '.'));
    const bool is_nearer = shared > best_shared || (shared == best_shared && depth < best_depth);
    if (best != nullptr && !is_nearer) continue;
    best = &field;
    best_shared = shared;
    best_depth = depth;
  }
  return best;
}

bool begins_like_a_number(std::string_view text) {
  return !text.empty() && text.front() >= '0' && text.front() <= '9';
}

}  // namespace

std::string keys_of(const FieldTable& table, std::string_view block) {
  constexpr std::size_t most_listed = 12;
  std::string names;
  const auto fields = children(table, block);
  for (std::size_t i = 0; i < fields.size() && i < most_listed; ++i) {
    const auto name = last_segment(fields[i]->key);
    names += fmt::format("{}{}", i == 0 ? "" : ", ",
                         name == "?" ? fmt::format("any name ({})", fields[i]->help) : std::string(name));
  }
  if (fields.size() > most_listed) names += ", ...";
  return fmt::format("{} {}", block.empty() ? "one of" : "a block with", names);
}

Suggestion suggest(const FieldTable& table, std::string_view key) {
  const auto block = parent_of(key), typed = last_segment(key);
  if (begins_like_a_number(typed))
    return {"", "a word",
            "inside { } a comma separates keys: write a decimal with a point (0.75 in), not a comma"};
  const Field* near = nearest_child(table, block, typed);
  if (near == nullptr) near = abbreviated(table, block, typed);
  if (near != nullptr) {
    const auto name = last_segment(near->key);
    return {joined(block, name), std::string(name), fmt::format("write {}", name)};
  }
  if (const Field* other = elsewhere(table, key)) {
    const auto home = parent_of(other->key);
    return {"", other->key,
            home.empty() ? std::string("it belongs into no block: move it to the left margin")
                         : fmt::format("it belongs under {}: move it there", home)};
  }
  return {"", keys_of(table, block), "correct the key, or leave it out"};
}

}  // namespace dutygauge::case_io
