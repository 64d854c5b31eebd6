#include <fmt/format.h>

#include <map>

#include "vary.hpp"

namespace dutygauge::explore {
namespace {

using Texts = std::map<std::string, std::string>;

/// Inputs by key as they stand in the file, or as they were assumed.
Texts texts_of(const case_io::Document& document, const case_io::Case& a_case) {
  Texts texts;
  for (const auto& [key, leaf] : document.leaves)
    texts[key] = leaf.factor == 1.0 ? leaf.text : fmt::format("{} x{}", leaf.text, leaf.factor);
  for (const Input& input : a_case.inputs)
    if (input.origin != "typed") texts.try_emplace(input.key, input.as_typed + " (" + input.origin + ")");
  return texts;
}

std::vector<report::InputChange> changes(const Texts& before, const Texts& after) {
  std::vector<report::InputChange> all;
  for (const auto& [key, text] : before) {
    const auto other = after.find(key);
    if (other == after.end())
      all.push_back({key, text, ""});
    else if (other->second != text)
      all.push_back({key, text, other->second});
  }
  for (const auto& [key, text] : after)
    if (!before.contains(key)) all.push_back({key, "", text});
  return all;
}

/// The spread of what b has less what a has; empty where either has no result.
std::optional<uncertainty::Spreads> spread_between(const service::Assessment& a,
                                                   const service::Assessment& b) {
  std::vector<uncertainty::Question> questions;
  for (const auto* one : {&a, &b})
    questions.push_back({.problem = one->problem,
                         .nominal = *one->rating.outcome,
                         .sources = uncertainty::sources_of(one->problem, *one->rating.outcome)});
  return uncertainty::propagate_together(questions).less_first.back();
}

report::Compared compared(const case_io::Document& document, const Point& point) {
  const case_io::Case a_case = case_io::build(document);
  report::Compared one{
      .about = name_of(a_case), .inputs = texts_of(document, a_case), .no_result = point.why};
  if (!point.assessment) return one;
  one.running = running(*point.assessment);
  one.verdict = point.assessment->verdict.text;
  return one;
}

}  // namespace

report::Compared compared(const case_io::Document& document) {
  return compared(document, rated(document));
}

report::Comparison compare(report::Compared a, report::Compared b) {
  auto inputs = changes(a.inputs, b.inputs);
  return {.before = std::move(a), .after = std::move(b), .inputs = std::move(inputs)};
}

report::Comparison compare(const case_io::Document& a, const case_io::Document& b) {
  const Point before = rated(a), after = rated(b);
  auto result = compare(compared(a, before), compared(b, after));
  if (before.assessment && after.assessment)
    result.spread = spread_between(*before.assessment, *after.assessment);
  return result;
}

}  // namespace dutygauge::explore
