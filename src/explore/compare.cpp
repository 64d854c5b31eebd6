#include <map>

#include "vary.hpp"

namespace dutygauge::explore {
namespace {

using Texts = std::map<std::string, std::string>;

/// Inputs by key as they stand in the file, or as they were assumed.
Texts texts_of(const case_io::Document& document, const case_io::Case& a_case) {
  Texts texts;
  for (const auto& [key, leaf] : document.leaves) texts[key] = leaf.text;
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

}  // namespace

report::Comparison compare(const case_io::Document& a, const case_io::Document& b) {
  const case_io::Case case_a = case_io::build(a), case_b = case_io::build(b);
  report::Comparison result{.a = name_of(case_a), .b = name_of(case_b)};
  result.inputs = changes(texts_of(a, case_a), texts_of(b, case_b));
  const Point before = rated(a), after = rated(b);
  const auto take = [](const Point& point, auto& numbers, std::string& why, std::string& verdict) {
    why = point.why;
    if (!point.assessment) return;
    numbers = running(*point.assessment);
    verdict = point.assessment->verdict.text;
  };
  take(before, result.before, result.no_result_before, result.verdict_before);
  take(after, result.after, result.no_result_after, result.verdict_after);
  return result;
}

}  // namespace dutygauge::explore
