#include <fmt/format.h>

#include <algorithm>
#include <stdexcept>

#include "dutygauge/case_io.hpp"
#include "laying.hpp"
#include "parts.hpp"
#include "wording.hpp"

// Operating cases and the state of the unit: which overlays a file has, and what
// document each makes.

namespace dutygauge::case_io {
namespace {

const std::string cases_block = "operating_cases";
const std::string present_block = "present";
constexpr std::size_t most_cases = 100;

bool is_within(std::string_view key, std::string_view block) {
  return key == block || (key.starts_with(block) && key[block.size()] == '.');
}

struct Child {
  std::string name;
  Position at;
  bool is_block = false, is_list = false;
  std::string text{};
};

/// What stands directly in a block, in file order.
std::vector<Child> children_of(const Document& document, const std::string& block) {
  std::vector<Child> children;
  const auto name_of = [&](const std::string& key) { return key.substr(block.size() + 1); };
  const auto is_child = [&](const std::string& key) {
    return is_within(key, block) && key != block && name_of(key).find('.') == std::string::npos;
  };
  for (const auto& [key, found] : document.blocks)
    if (is_child(key)) children.push_back({name_of(key), found.at, true, found.is_list});
  for (const auto& [key, leaf] : document.leaves)
    if (is_child(key)) children.push_back({name_of(key), leaf.key_at, false, false, leaf.text});
  std::ranges::stable_sort(children, {}, [](const Child& c) { return std::pair(c.at.line, c.at.column); });
  return children;
}

bool holds_anything(const Document& document, const std::string& block) {
  const auto is_below = [&](const auto& item) { return item.first.starts_with(block + '.'); };
  return std::ranges::any_of(document.leaves, is_below) || std::ranges::any_of(document.blocks, is_below);
}

/// The document without its overlays.
Document plain(const Document& document) {
  const auto is_overlay = [](const auto& item) {
    return is_within(item.first, cases_block) || is_within(item.first, present_block);
  };
  Document result = document;
  std::erase_if(result.leaves, is_overlay);
  std::erase_if(result.blocks, is_overlay);
  return result;
}

/// What is wrong with the shape of the two blocks, whatever stands in them.
std::vector<Mistake> shape_mistakes(const Document& document) {
  std::vector<Mistake> mistakes;
  constexpr std::string_view dotted = "dotted keys and values, such as {streams.shell_side.flow: x1.15}";
  const auto refuse = [&](Position at, const std::string& key, std::string what, std::string_view expected) {
    mistakes.push_back({at, key, std::move(what), std::string(expected), "correct it, or leave it out"});
  };
  for (const auto& block : {cases_block, present_block}) {
    const std::string_view expected = block == present_block ? dotted : "a block with a name for each case";
    if (const auto leaf = document.leaves.find(block); leaf != document.leaves.end())
      refuse(leaf->second.key_at, block,
             leaf->second.text.empty() ? "has no value" : "a single value stands here", expected);
    const auto found = document.blocks.find(block);
    if (found == document.blocks.end()) continue;
    if (found->second.is_list)
      refuse(found->second.at, block, "a list stands here", expected);
    else if (!holds_anything(document, block))
      refuse(found->second.at, block, "the block is empty", expected);
  }
  const auto names = children_of(document, cases_block);
  if (names.size() > most_cases)
    refuse(names[most_cases].at, cases_block, fmt::format("more than {} operating cases", most_cases),
           "a few cases of one unit");
  if (const auto found = document.blocks.find(cases_block);
      found != document.blocks.end() && !found->second.is_list)
    for (const Child& child : names)
      if (child.is_list || (!child.is_block && !child.text.empty()))
        refuse(child.at, joined(cases_block, child.name),
               child.is_list ? "a list stands here" : "a single value stands here", dotted);
  return mistakes;
}

Document laid(const Document& document, const std::string& operating_case, bool as_is) {
  const auto names = operating_cases(document);
  if (std::ranges::find(names, operating_case) == names.end())
    throw std::invalid_argument("case_io: the file has no operating case '" + operating_case + "'");
  Document result = plain(document);
  if (document.of_cases.empty()) result.of_cases = names;
  for (Mistake& mistake : shape_mistakes(document)) result.mistakes.push_back(std::move(mistake));
  if (as_is) lay(document, present_block, result);
  lay(document, joined(cases_block, operating_case), result);
  return result;
}

Document made(const Document& document, const std::string& operating_case, bool as_is) {
  Document result = laid(document, operating_case, as_is);
  keep_sheet(document, result);
  return result;
}

/// The operating case the sheet speaks of; the first where it names none of the file's.
std::string case_of_sheet(const Document& document) {
  const auto names = operating_cases(document);
  const auto named = document.leaves.find("claims.for");
  const bool is_known =
      named != document.leaves.end() && std::ranges::find(names, named->second.text) != names.end();
  return is_known ? named->second.text : names.front();
}

/// The reading and the unit it was taken of, as they stand without a case's overlay. Where the
/// file is no case without one, as they stand in the first.
void share_anchor(const Document& document, std::vector<Case>& cases) {
  if (!document.blocks.contains("anchor") || !document.blocks.contains(cases_block)) return;
  Document base = plain(document);
  base.of_cases = operating_cases(document);
  if (document.blocks.contains(present_block)) lay(document, present_block, base);
  keep_sheet(document, base);
  auto anchor = cases.front().anchor;
  try {
    anchor = build_plain(base).anchor;
  } catch (const InputError&) {
    // What is missing stands in the overlays.
  }
  for (Case& one : cases) one.anchor = anchor;
}

/// The same mistake in two operating cases.
bool is_same(const Mistake& a, const Mistake& b) {
  return a.at.line == b.at.line && a.at.column == b.at.column && a.key == b.key && a.what == b.what;
}

struct CaseMistake {
  Mistake mistake;
  std::vector<std::string> cases;
};

/// Each mistake once; those of some cases only say of which.
std::vector<Mistake> merged(std::vector<CaseMistake> all, std::size_t case_count) {
  std::vector<Mistake> mistakes;
  for (auto& [mistake, cases] : all) {
    if (cases.size() < case_count)
      mistake.what += fmt::format(" (operating case {})", fmt::join(cases, ", "));
    mistakes.push_back(std::move(mistake));
  }
  return mistakes;
}

}  // namespace

void keep_sheet(const Document& before, Document& after) {
  const auto is = [&](const char* key, std::string_view word) {
    const auto leaf = after.leaves.find(key);
    return leaf != after.leaves.end() && leaf->second.text == word;
  };
  constexpr const char* method = "methods.shell_side";
  const bool is_scaled = is(method, "scaled");
  const bool needs_sheet =
      is_scaled || is("streams.shell_side.flow", "from_duty") || is("streams.tube_side.flow", "from_duty");
  if (after.sheet || !needs_sheet) return;
  Document sheet = laid(before, case_of_sheet(before), false);
  if (is_scaled) sheet.leaves.insert_or_assign(method, after.leaves.at(method));
  after.sheet = std::make_shared<const Document>(std::move(sheet));
}

std::vector<std::string> operating_cases(const Document& document) {
  const auto block = document.blocks.find(cases_block);
  std::vector<std::string> names;
  if (block != document.blocks.end() && !block->second.is_list)
    for (Child& child : children_of(document, cases_block)) names.push_back(std::move(child.name));
  if (names.size() > most_cases) names.resize(most_cases);  // refused where they are built
  return names.empty() ? std::vector<std::string>{"base"} : names;
}

Document overlaid(const Document& document, const std::string& operating_case) {
  return made(document, operating_case, true);
}

Document as_built(const Document& document, const std::string& operating_case) {
  return made(document, operating_case, false);
}

std::vector<Case> build_all(const Document& document) {
  std::vector<Case> cases;
  std::vector<CaseMistake> mistakes;
  const auto names = operating_cases(document);
  const auto since = document.leaves.find(joined(present_block, "since"));
  for (const auto& name : names) {
    try {
      cases.push_back(build_plain(overlaid(document, name)));
      cases.back().operating_case = name;
      if (since != document.leaves.end()) cases.back().present_since = since->second.text;
    } catch (const InputError& error) {
      for (const Mistake& mistake : error.mistakes()) {
        const auto known = std::ranges::find_if(
            mistakes, [&](const CaseMistake& other) { return is_same(other.mistake, mistake); });
        if (known == mistakes.end())
          mistakes.push_back({mistake, {name}});
        else if (known->cases.back() != name)
          known->cases.push_back(name);
      }
    }
  }
  if (!mistakes.empty()) throw InputError(document.file, merged(std::move(mistakes), names.size()));
  share_anchor(document, cases);
  return cases;
}

Case build(const Document& document) {
  return build_all(document).front();
}

}  // namespace dutygauge::case_io
