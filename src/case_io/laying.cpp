#include "laying.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <chrono>
#include <set>

#include "fields.hpp"
#include "wording.hpp"

namespace dutygauge::case_io {
namespace {

/// The parts of a dotted key above it, the outermost first.
std::vector<std::string> ancestors(std::string_view key) {
  std::vector<std::string> all;
  for (key = parent_of(key); !key.empty(); key = parent_of(key)) all.emplace_back(key);
  std::ranges::reverse(all);
  return all;
}

bool is_index(std::string_view segment) {
  return !segment.empty() && std::ranges::all_of(segment, [](char c) { return c >= '0' && c <= '9'; });
}

/// YYYY-MM-DD, a day that exists.
bool is_date(std::string_view text) {
  const auto digits = [&](std::size_t at, std::size_t count) { return is_index(text.substr(at, count)); };
  if (text.size() != 10 || text[4] != '-' || text[7] != '-') return false;
  if (!digits(0, 4) || !digits(5, 2) || !digits(8, 2)) return false;
  const auto number = [&](std::size_t at, std::size_t count) {
    return static_cast<int>(*units::number(text.substr(at, count)));
  };
  return std::chrono::year_month_day(std::chrono::year(number(0, 4)),
                                     std::chrono::month(static_cast<unsigned>(number(5, 2))),
                                     std::chrono::day(static_cast<unsigned>(number(8, 2))))
      .ok();
}

/// The key of the whole format nearest to one that does not exist; null if none is near.
const Field* nearest_key(std::string_view key) {
  const Field* best = nullptr;
  std::size_t least = 0;
  for (const Field& field : case_fields().all()) {
    if (field.form == Form::block ||
        !is_one_of(field.key.substr(0, field.key.find('.')), blocks_that_may_differ))
      continue;
    const std::size_t d = distance(key, field.key);
    // A third of a long key would be another key altogether.
    if (d > std::max<std::size_t>(2, last_segment(field.key).size() / 2) || (best != nullptr && d >= least))
      continue;
    best = &field;
    least = d;
  }
  return best;
}

struct Objected {
  std::string what, expected, remedy;
};

Objected unknown(std::string_view key) {
  if (const Field* near = nearest_key(key)) return {"there is no such key", near->key, "write " + near->key};
  return {"there is no such key", "a dotted key such as streams.shell_side.flow",
          "correct the key, or leave it out"};
}

/// Why nothing can be laid at a key, whatever the value is.
std::optional<Objected> refused(std::string_view key, bool is_plain_block) {
  const Field* field = case_fields().find(key);
  if (field == nullptr && find_unread(key) != nullptr) return {};  // refused where the case is read
  if (field == nullptr) return unknown(key);
  const auto first = key.substr(0, key.find('.'));
  if (!is_one_of(first, blocks_that_may_differ))
    return Objected{fmt::format("{} is the same in every operating case", first),
                    "a key of exchanger, streams, service or methods", "leave it out here"};
  if (is_plain_block && field->form == Form::block)
    return Objected{"a block stands here; an overlay has one dotted key a value",
                    "a dotted key such as streams.shell_side.flow",
                    "write the whole key with its dots before the colon"};
  return {};
}

/// One document on which values are put.
class Laying {
 public:
  explicit Laying(Document& onto) : onto_(onto) {}

  void note(Position at, std::string_view key, Objected why) {
    onto_.mistakes.push_back(
        {at, std::string(key), std::move(why.what), std::move(why.expected), std::move(why.remedy)});
  }

  void put_leaf(const std::string& key, const Leaf& leaf) {
    const Field* field = case_fields().find(key);
    if (field != nullptr && field->form != Form::text && begins_like_a_factor(leaf.text))
      return multiply(key, leaf, *field);
    if (!make_room(key, leaf.key_at)) return;
    onto_.leaves.emplace(key, leaf);
  }

  /// A list or a fluid: all that stands below `source` in `from`.
  void put_block(const std::string& key, const Document& from, const std::string& source) {
    const Position at = from.blocks.at(source).at;
    if (!make_room(key, at)) return;
    const auto copy = [&](const auto& all, auto& to) {
      for (const auto& [name, item] : all)
        if (name == source || name.starts_with(source + '.'))
          to.emplace(key + name.substr(source.size()), item);
    };
    copy(from.blocks, onto_.blocks);
    copy(from.leaves, onto_.leaves);
  }

 private:
  void multiply(const std::string& key, const Leaf& leaf, const Field& field) {
    const auto factor = units::number(std::string_view(leaf.text).substr(1));
    if (!factor || !(*factor > 0.0))
      return note(leaf.value_at, key,
                  {fmt::format("'{}' is not a factor", shown(leaf.text)),
                   "x and a number above 0, such as x1.15", "correct it, or write the value itself"});
    const auto base = onto_.leaves.find(key);
    if (base == onto_.leaves.end())
      return note(
          leaf.value_at, key,
          {fmt::format("'{}' has no value to multiply: the case does not give this key", shown(leaf.text)),
           expected_of(field), "write the value itself"});
    base->second.factor *= *factor;
    base->second.key_at = leaf.key_at;
    base->second.value_at = leaf.value_at;
  }

  /// Clears the key and makes the blocks above it.
  bool make_room(const std::string& key, Position at) {
    const bool is_item = is_index(last_segment(key));
    if (is_item && !onto_.leaves.contains(key) && !onto_.blocks.contains(key)) return no_such_item(key, at);
    for (const auto& above : ancestors(key)) {
      if (onto_.leaves.contains(above)) {
        note(at, key,
             {fmt::format("{} is the single value '{}' here", above, shown(onto_.leaves.at(above).text)),
              "a key that stands in the case", fmt::format("replace {} as a whole", above)});
        return false;
      }
      if (is_index(last_segment(above)) && !onto_.blocks.contains(above)) return no_such_item(key, at);
      onto_.blocks.emplace(above, Block{at});
    }
    const auto goes = [&](const auto& item) {
      return item.first == key || item.first.starts_with(key + '.');
    };
    std::erase_if(onto_.leaves, goes);
    std::erase_if(onto_.blocks, goes);
    return true;
  }

  bool no_such_item(const std::string& key, Position at) {
    note(at, key,
         {"the list has no such item", "an item that stands in the case", "replace the list as a whole"});
    return false;
  }

  Document& onto_;
};

/// The keys below a block as they would be typed, in order; a block before what is in it.
std::set<std::string> keys_below(const Document& from, const std::string& block) {
  std::set<std::string> keys;
  const auto take = [&](const auto& all) {
    for (const auto& [key, item] : all)
      if (key.starts_with(block + '.')) keys.insert(key.substr(block.size() + 1));
  };
  take(from.blocks);
  take(from.leaves);
  return keys;
}

/// The day since when the unit is as described.
void check_since(const Leaf& leaf, Laying& laying) {
  if (!is_date(leaf.text))
    laying.note(leaf.value_at, "present.since",
                {fmt::format("'{}' is not a date", shown(leaf.text)), "a day such as 2026-01-31",
                 "write year-month-day"});
}

}  // namespace

void lay(const Document& from, const std::string& block, Document& onto) {
  Laying laying(onto);
  std::set<std::string> done;  // keys dealt with together with all below them
  for (const auto& key : keys_below(from, block)) {
    if (std::ranges::any_of(ancestors(key), [&](const auto& above) { return done.contains(above); }))
      continue;
    const std::string source = joined(block, key);
    const auto leaf = from.leaves.find(source);
    const bool is_leaf = leaf != from.leaves.end();
    done.insert(key);
    if (key == "since" && is_leaf && block == "present") {
      check_since(leaf->second, laying);
      continue;
    }
    const Block* found = is_leaf ? nullptr : &from.blocks.at(source);
    if (auto why = refused(key, found != nullptr && !found->is_list))
      laying.note(is_leaf ? leaf->second.key_at : found->at, key, std::move(*why));
    else if (is_leaf)
      laying.put_leaf(key, leaf->second);
    else
      laying.put_block(key, from, source);
  }
}

Document with_value(const Document& document, const std::string& key, const std::string& text) {
  Document result = document;
  Laying laying(result);
  Position at;
  if (const auto leaf = document.leaves.find(key); leaf != document.leaves.end()) at = leaf->second.value_at;
  const Field* field = case_fields().find(key);
  if (field != nullptr && field->form == Form::block)
    throw InputError(document.file, {{{}, key, "is a block", "a key with a value", "name one of its keys"}});
  if (auto why = refused(key, false))
    throw InputError(document.file, {{{}, key, why->what, why->expected, why->remedy}});
  laying.put_leaf(key, Leaf{text, false, at, at});
  if (result.mistakes.size() > document.mistakes.size())
    throw InputError(document.file, {result.mistakes.back()});
  keep_sheet(document, result);
  return result;
}

Document with_other_reading(const Document& document, const std::string& key, const std::string& text) {
  Document result = with_value(document, key, text);
  if (!result.sheet) return result;
  const auto typed = [&](const Document& from) {
    const auto leaf = from.leaves.find(key);
    return leaf == from.leaves.end() ? std::pair{std::string(), 1.0}
                                     : std::pair{leaf->second.text, leaf->second.factor};
  };
  // An operating case with a value of its own says nothing of the sheet's.
  if (typed(document) == typed(*result.sheet))
    result.sheet = std::make_shared<const Document>(with_value(*result.sheet, key, text));
  return result;
}

Document with_factor(const Document& document, const std::string& key, double factor) {
  return with_value(document, key, fmt::format("x{}", factor));
}

}  // namespace dutygauge::case_io
