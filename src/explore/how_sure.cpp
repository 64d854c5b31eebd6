#include "how_sure.hpp"

#include <fmt/core.h>

#include <algorithm>
#include <iterator>

namespace dutygauge::explore {
namespace {

uncertainty::Predicate meets(const service::Assessment& assessment) {
  if (assessment.service.demands.empty()) return {};
  return [&demands = assessment.service.demands](const rating::Outcome& sample) {
    return std::ranges::all_of(demands,
                               [&](const service::Demand& demand) { return service::holds(demand, sample); });
  };
}

uncertainty::Question question_of(const service::Assessment& assessment,
                                  const std::vector<uncertainty::Swing>& swings) {
  const rating::Outcome& outcome = *assessment.rating.outcome;
  return {.problem = assessment.problem,
          .nominal = outcome,
          .sources = uncertainty::sources_of(assessment.problem, outcome),
          .swings = swings,
          .meets = meets(assessment)};
}

/// What is open about a stream stays open today; what is open about the unit is in the reading.
bool is_of_streams(const uncertainty::Swing& swing) {
  return swing.key.ends_with("_side.flow") || swing.key.ends_with("_side.inlet.temperature");
}

uncertainty::Question question_of_today(const uncertainty::Anchor& anchor, const rating::Problem& problem,
                                        const rating::Outcome& outcome) {
  return {.problem = problem,
          .nominal = outcome,
          .sources = uncertainty::sources_of_today(anchor, problem, outcome),
          .anchor = anchor};
}

/// Puts the grade into the verdict's sentence. Where the service states a confidence, the
/// sentence begins with yes only if the probability reaches it.
void qualify(service::Assessment& assessment, const std::optional<uncertainty::Result>& spread) {
  if (!spread || !spread->probability || !assessment.verdict.met) return;
  const double probability = *spread->probability;
  std::string& text = assessment.verdict.text;
  const auto confidence = assessment.service.confidence;
  const bool too_unsure = *assessment.verdict.met && confidence && probability < *confidence;
  constexpr std::string_view yes = "Yes:";
  if (too_unsure && text.starts_with(yes)) text.replace(0, yes.size(), "Not sure enough for a yes:");
  if (text.ends_with('.')) text.pop_back();
  std::string grade(uncertainty::word(uncertainty::grade_of(probability)));
  std::ranges::replace(grade, '_', ' ');
  text += fmt::format("; {}, probability {}", grade, uncertainty::in_words(probability));
  if (too_unsure) text += fmt::format(" where {:.0f} % is asked for", 100.0 * *confidence);
  text += ".";
}

}  // namespace

void add_spreads(std::vector<report::RatedCase>& cases, const std::optional<report::Anchored>& anchored,
                 const std::vector<std::vector<uncertainty::Swing>>& swings) {
  struct State {
    service::Assessment* assessment;
    std::optional<uncertainty::Result>* spread;
    std::optional<uncertainty::Spreads>* change = nullptr;
  };
  std::vector<State> states;
  std::vector<uncertainty::Question> questions;
  // The reading's own conditions come first: what the cases change is told from there.
  if (anchored) {
    const auto& anchor = anchored->anchor;
    questions.push_back(
        question_of_today(anchor, uncertainty::today(anchor, anchor.unit), anchored->outcome));
    states.push_back({nullptr, nullptr});
  }
  for (std::size_t i = 0; i < cases.size(); ++i) {
    auto& one = cases[i];
    const auto of_case = i < swings.size() ? swings[i] : std::vector<uncertainty::Swing>{};
    for (const State& state : {State{&one.design_fouling, &one.spread}, State{&one.clean, &one.spread_clean}})
      if (state.assessment->rating.outcome) {
        states.push_back(state);
        questions.push_back(question_of(*state.assessment, of_case));
      }
    if (!one.today || !one.today->assessment.rating.outcome) continue;
    const auto& assessment = one.today->assessment;
    states.push_back({&one.today->assessment, &one.today->spread, &one.today->change});
    questions.push_back(question_of_today(anchored->anchor, assessment.problem, *assessment.rating.outcome));
    std::ranges::copy_if(of_case, std::back_inserter(questions.back().swings), is_of_streams);
    questions.back().meets = meets(assessment);
  }
  if (questions.empty()) return;
  auto found = uncertainty::propagate_together(questions);
  for (std::size_t i = 0; i < states.size(); ++i) {
    if (states[i].assessment == nullptr) continue;
    if (states[i].change != nullptr) *states[i].change = std::move(found.less_first[i]);
    *states[i].spread = std::move(found.each[i]);
    qualify(*states[i].assessment, *states[i].spread);
  }
}

}  // namespace dutygauge::explore
