#include "how_sure.hpp"

#include <fmt/core.h>

#include <algorithm>

namespace dutygauge::explore {
namespace {

uncertainty::Question question_of(const service::Assessment& assessment) {
  const rating::Outcome& outcome = *assessment.rating.outcome;
  uncertainty::Question question{.problem = assessment.problem,
                                 .nominal = outcome,
                                 .sources = uncertainty::sources_of(assessment.problem, outcome)};
  if (!assessment.service.demands.empty())
    question.meets = [&demands = assessment.service.demands](const rating::Outcome& sample) {
      return std::ranges::all_of(
          demands, [&](const service::Demand& demand) { return service::holds(demand, sample); });
    };
  return question;
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

void add_spreads(std::vector<report::RatedCase>& cases) {
  struct State {
    service::Assessment* assessment;
    std::optional<uncertainty::Result>* spread;
  };
  std::vector<State> states;
  std::vector<uncertainty::Question> questions;
  for (auto& one : cases)
    for (const State& state : {State{&one.design_fouling, &one.spread}, State{&one.clean, &one.spread_clean}})
      if (state.assessment->rating.outcome) {
        states.push_back(state);
        questions.push_back(question_of(*state.assessment));
      }
  if (questions.empty()) return;
  auto found = uncertainty::propagate_together(questions).each;
  for (std::size_t i = 0; i < states.size(); ++i) {
    *states[i].spread = std::move(found[i]);
    qualify(*states[i].assessment, *states[i].spread);
  }
}

}  // namespace dutygauge::explore
