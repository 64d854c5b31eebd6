#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "sections.hpp"
#include "words.hpp"

namespace dutygauge::report {
namespace {

using units::Kind;

constexpr double worth_listing = 0.001;
constexpr std::size_t most_shown = 6;

/// "+0.9 K" of the outlet's margin, "+2.1 %" of the duty.
std::string gained(const Lever& lever, const Figures& figures) {
  return lever.in_kelvin ? figures.difference(lever.gain) : signed_percent(lever.gain);
}

std::string cost(const Lever& lever, const Figures& figures) {
  std::vector<std::string> drops;
  if (lever.costs_shell)
    drops.push_back("shell drop " + figures.with_unit(lever.shell_drop, Kind::pressure_difference, 3));
  if (lever.costs_tube)
    drops.push_back("tube drop " + figures.with_unit(lever.tube_drop, Kind::pressure_difference, 3));
  return drops.empty() ? "" : " (" + listed(drops) + ")";
}

std::string span(const Effect& effect, const Figures& figures) {
  const auto end = [&](const std::optional<double>& change) {
    if (!change) return std::string("no result");
    if (effect.margin == Effect::Margin::temperature) return figures.difference(*change);
    return signed_percent(*change);
  };
  const char* of = effect.margin == Effect::Margin::pressure_drop ? "drop"
                   : effect.margin == Effect::Margin::duty        ? "duty"
                                                                  : "outlet";
  return fmt::format("{} {} .. {}", of, end(effect.at_low), end(effect.at_high));
}

struct Weighed {
  const Assumption* assumption;
  const Effect* effect;
};

/// Those that can be seen in the result: what would change an answer first, then by size.
std::vector<Weighed> by_weight(const Result& result) {
  std::vector<Weighed> all;
  for (std::size_t i = 0; i < result.assumed.size(); ++i)
    if (const auto& effect = result.effects[i]; effect)
      if (effect->size >= worth_listing || effect->changes_answer)
        all.push_back({&result.assumed[i], &*effect});
  std::ranges::stable_sort(all, std::ranges::greater{}, [](const Weighed& one) {
    return std::pair(one.effect->changes_answer, one.effect->size);
  });
  return all;
}

std::string verdict_on(const std::vector<Weighed>& all) {
  std::vector<std::string> deciding;
  for (const Weighed& one : all)
    if (one.effect->changes_answer) {
      const std::string& where = one.assumption->look_in;
      deciding.push_back(plain_words(one.assumption->key) +
                         (where.empty() ? "" : " (look in: " + where + ")"));
    }
  if (deciding.empty()) return "None of them by itself would change an answer.";
  return fmt::format("{} would change an answer: {}.", deciding.size() == 1 ? "One" : "These",
                     listed(deciding));
}

}  // namespace

void levers(Page& page, const Result& result) {
  if (result.levers.empty()) return;
  const Figures figures(result.display);
  std::vector<std::string> words;
  for (const Lever& lever : result.levers)
    if (words.size() < most_shown)
      words.push_back(fmt::format("{} {}{}", lever.what, gained(lever, figures), cost(lever, figures)));
  std::string text = result.levers.front().in_kelvin ? "on the outlet that governs: " : "on the duty: ";
  for (std::size_t i = 0; i < words.size(); ++i) text += (i == 0 ? "" : " | ") + words[i];
  page.section("LEVERS", text);
}

void weighed_assumptions(Page& page, const Result& result) {
  const Figures figures(result.display);
  const auto all = by_weight(result);
  const std::size_t shown = std::min(all.size(), most_shown);
  std::vector<std::vector<std::string>> rows = {{"ASSUMED", "as", "margin moves, low .. high", "look in"}};
  for (std::size_t i = 0; i < shown; ++i)
    rows.push_back({"  " + plain_words(all[i].assumption->key),
                    as_typed(*all[i].assumption, result.display, 4), span(*all[i].effect, figures),
                    all[i].assumption->look_in});
  page.blank();
  if (shown > 0) page.table(rows, {Align::left, Align::left, Align::left, Align::left}, 0);
  const std::size_t left_out = result.assumed.size() - shown;
  if (shown == 0) {
    page.section("ASSUMED", fmt::format("{} value{}, none with an effect above 0.1 %: -v", left_out,
                                        left_out == 1 ? "" : "s"));
    return;
  }
  if (left_out > 0) page.line(fmt::format("  {} more, below 0.1 % or without a span: -v", left_out));
  page.paragraph("  ", verdict_on(all));
}

}  // namespace dutygauge::report
