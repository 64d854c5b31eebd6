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

}  // namespace

std::vector<std::optional<uncertainty::Result>> how_sure(
    std::span<const service::Assessment* const> assessments) {
  std::vector<uncertainty::Question> questions;
  for (const auto* assessment : assessments)
    if (assessment->rating.outcome) questions.push_back(question_of(*assessment));
  std::vector<std::optional<uncertainty::Result>> spreads(assessments.size());
  if (questions.empty()) return spreads;
  auto found = uncertainty::propagate_together(questions).each;
  auto next = found.begin();
  for (std::size_t i = 0; i < assessments.size(); ++i)
    if (assessments[i]->rating.outcome) spreads[i] = std::move(*next++);
  return spreads;
}

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

}  // namespace dutygauge::explore
