#include <fmt/core.h>

#include <algorithm>
#include <cctype>
#include <cmath>
#include <iterator>
#include <utility>

#include "dutygauge/report/finding_help.hpp"
#include "dutygauge/sources.hpp"
#include "sections.hpp"
#include "words.hpp"

namespace dutygauge::report {
namespace {

using units::Kind;

constexpr std::size_t most_findings_of_cases = 3;  // a page of several cases is one screen too
constexpr std::size_t most_assumptions = 5, most_findings = 5, most_tasks = 3, most_named = 4;
constexpr std::string_view unchecked = "Tube vibration and mechanical strength are not checked.";

// "12 % lower", "3 % higher", "2.8 times as high", "within 1 %".
std::string against(double other, double ours) {
  const double fraction = other / ours - 1.0;
  if (std::abs(fraction) < 0.01) return "within 1 %";
  if (fraction >= 1.0) return fmt::format("{:.1f} times as high", other / ours);
  return fmt::format("{:.0f} % {}", 100.0 * std::abs(fraction), fraction < 0.0 ? "lower" : "higher");
}

// Which of two shell-side drops to believe, where they lie far apart. A page of several cases has no room for
// it.
std::string drop_to_believe(double kern, double ours, bool has_room) {
  constexpr double far_apart = 1.5;
  if (!has_room) return "";
  if (kern <= far_apart * ours && ours <= far_apart * kern) return "";
  return " Believe the drop by Bell-Delaware: Kern's has no leakage and no by-pass in it.";
}

// Whether the stated service comes out the same with the other method; empty without a service.
std::string same_answer(const service::Assessment& assessment) {
  if (!assessment.verdict.met) return "";
  const auto holds = [&](const service::Demand& d) { return service::holds(d, *assessment.second_opinion); };
  const bool met = std::ranges::all_of(assessment.service.demands, holds);
  if (met != *assessment.verdict.met)
    return fmt::format(" By that method the service would {}be met: the answer hangs on the shell film.",
                       met ? "" : "not ");
  return fmt::format(" By that method the service is {} too.", met ? "met" : "missed");
}

std::size_t remarks_on_methods(const Findings& findings) {
  return static_cast<std::size_t>(std::ranges::count_if(
      findings, [](const Finding& f) { return f.ground == Ground::method && f.severity != Severity::note; }));
}

std::string tightest_line(const service::Assessment& assessment) {
  const auto& demands = assessment.service.demands;
  const auto found = std::ranges::find_if(demands, [&](const service::Demand& demand) {
    return service::key_of(demand.quantity) == assessment.verdict.limited_by;
  });
  if (found == demands.end()) return "";
  if (found->quantity == service::Quantity::duty) return "duty";
  const bool shell = found->quantity == service::Quantity::shell_side_outlet;
  return stream_name(assessment.problem, shell ? Side::shell : Side::tube) + " outlet";
}

std::string where_the_difference_goes(const service::Assessment& assessment) {
  std::vector<std::string> parts;
  for (const auto& share : shares(assessment.problem, assessment.rating.outcome->local.resistances))
    if (share.fraction >= 0.005)
      parts.push_back(fmt::format("{:.0f} % across {}", 100.0 * share.fraction, share.across));
  return "The temperature difference goes " + listed(parts);
}

// What a finding says to do: its last clause. Where it has but one, what its kind asks for.
std::string task_from(const Finding& finding, units::System system) {
  const std::string text = sentence(finding, system);
  const auto at = std::max(text.rfind("; ") + 1, text.rfind(". ") + 1);  // npos + 1 is 0
  const auto* help = find_finding_help(finding.id);
  if (at == 0 && help != nullptr)
    return fmt::format("{} ({}).", help->remedy.substr(0, help->remedy.size() - 1), finding.id);
  std::string clause = at == 0 ? text : text.substr(at + 1);
  clause.front() = static_cast<char>(std::toupper(static_cast<unsigned char>(clause.front())));
  return fmt::format("{} ({}).", clause, finding.id);
}

std::vector<std::string> tasks_from_findings(const Result& result) {
  std::vector<std::string> tasks;
  for (const auto& finding : result.findings) {
    if (finding.severity == Severity::note) continue;
    auto task = task_from(finding, result.display);
    if (std::ranges::find(tasks, task) == tasks.end()) tasks.push_back(std::move(task));
  }
  return tasks;
}

// One task for each document that would settle assumptions, the most telling first.
std::vector<std::string> tasks_from_assumptions(const Assumptions& assumptions) {
  std::vector<std::pair<std::string, std::vector<std::string>>> documents;
  for (const auto& one : assumptions) {
    if (one.look_in.empty()) continue;
    auto found = std::ranges::find(documents, one.look_in, &decltype(documents)::value_type::first);
    if (found == documents.end()) found = documents.insert(documents.end(), {one.look_in, {}});
    found->second.push_back(plain_words(one.key));
  }
  std::ranges::stable_sort(documents, std::ranges::greater{}, [](const auto& d) { return d.second.size(); });
  std::vector<std::string> tasks;
  for (auto& [document, names] : documents) {
    const std::size_t left_out = names.size() > most_named ? names.size() - most_named : 0;
    if (left_out > 0) {
      names.resize(most_named);
      names.push_back(fmt::format("{} more", left_out));
    }
    tasks.push_back(fmt::format("Look in the {} for {}.", document, listed(names)));
  }
  return tasks;
}

std::vector<std::string> assumption_row(const Assumption& one, const Result& result, bool all) {
  std::string why = reason(one, result.display);
  if (all && one.low && one.high)
    why += fmt::format("; may lie between {} and {}", units::typed(*one.low, one.kind, result.display, 4),
                       units::typed(*one.high, one.kind, result.display, 4));
  if (all && !one.look_in.empty()) why += "; look in: " + one.look_in;
  return {"  " + (all ? one.key : plain_words(one.key)), as_typed(one, result.display, 4), why};
}

// "1 must, 2 should, 4 notes": what there is none of is not named.
std::string counted(const Findings& findings) {
  std::vector<std::string> parts;
  for (const auto severity : {Severity::must, Severity::should, Severity::note}) {
    const auto number = std::ranges::count(findings, severity, &Finding::severity);
    const bool several_notes = severity == Severity::note && number > 1;
    if (number > 0) parts.push_back(fmt::format("{} {}{}", number, word(severity), several_notes ? "s" : ""));
  }
  return listed(parts);
}

// "1 accepted (id)", or nothing.
std::string accepted_in_words(const std::vector<AcceptedFinding>& accepted) {
  if (accepted.empty()) return "";
  std::vector<std::string> ids;
  for (const auto& one : accepted)
    if (std::ranges::find(ids, one.finding.id) == ids.end()) ids.push_back(one.finding.id);
  return fmt::format("{} accepted ({})", ids.size(), listed(ids));
}

// "In the case hot water, " where there are several.
std::string in_the_case(const Result& result) {
  if (result.cases.size() < 2) return "";
  return fmt::format("In the case {}, ", ascii(result.cases[result.governing].name));
}

}  // namespace

void how_sure(Page& page, const Result& result) {
  const auto& assessment = result.assessment;
  const std::size_t remarks = remarks_on_methods(result.findings);
  auto spread = today_in_words(result);
  std::ranges::move(spread_in_words(result), std::back_inserter(spread));
  if (spread.empty() && !assessment.second_opinion && remarks == 0) return;
  page.blank();
  std::string name = "HOW SURE";
  for (const auto& said : spread) page.section(std::exchange(name, ""), said);
  if (assessment.second_opinion) {
    const auto& ours = *assessment.rating.outcome;
    const auto& other = *assessment.second_opinion;
    page.section(
        name, fmt::format(
                  "Kern's method, a second one for the shell, puts the film {}, the duty {} and the "
                  "pressure drop {}.{}{}",
                  against(other.local.shell_film.coefficient, ours.local.shell_film.coefficient),
                  against(other.duty, ours.duty), against(other.shell_drop.total(), ours.shell_drop.total()),
                  drop_to_believe(other.shell_drop.total(), ours.shell_drop.total(), result.cases.size() < 2),
                  same_answer(assessment)));
    name.clear();
  }
  if (remarks > 0)
    page.section(name, fmt::format("A method is used where it is less certain in {} place{}: see RULES.",
                                   remarks, remarks == 1 ? "" : "s"));
}

void what_limits(Page& page, const Result& result) {
  const auto& assessment = result.assessment;
  std::string name = "WHAT LIMITS";
  if (const auto line = tightest_line(assessment); !line.empty()) {
    page.section(name, fmt::format("{} {} is the tightest line of the service.",
                                   result.cases.size() > 1 ? in_the_case(result) + "the" : "The", line));
    name.clear();
  }
  page.section(name, where_the_difference_goes(assessment) + ".");
}

void assumed(Page& page, const Result& result, const TextOptions& options) {
  if (result.assumed.empty()) return;
  if (!options.all && !result.effects.empty()) return weighed_assumptions(page, result);
  Assumptions shown = result.assumed;
  // Those with a span are the ones that can move the result.
  std::ranges::stable_sort(shown, std::ranges::greater{},
                           [](const Assumption& a) { return a.low || a.high; });
  const std::size_t left_out =
      options.all || shown.size() <= most_assumptions ? 0 : shown.size() - most_assumptions;
  shown.resize(shown.size() - left_out);
  std::vector<std::vector<std::string>> rows = {{"ASSUMED", "as", "why"}};
  for (const auto& one : shown) rows.push_back(assumption_row(one, result, options.all));
  page.blank();
  page.table(rows, {Align::left, Align::left, Align::left}, 0);
  if (left_out > 0) page.line(fmt::format("  {} more: -v", left_out));
}

void rules(Page& page, const Result& result, const TextOptions& options) {
  const auto& findings = result.findings;
  const std::string decided = accepted_in_words(result.accepted);
  if (findings.empty()) {
    page.section("RULES",
                 fmt::format("No {}finding from the checks made{}. {}", decided.empty() ? "" : "other ",
                             decided.empty() ? "" : "; " + decided, unchecked));
    return;
  }
  page.section("RULES",
               fmt::format("{}{}. {}", counted(findings), decided.empty() ? "" : "; " + decided, unchecked));
  const std::size_t most = result.cases.size() > 1 ? most_findings_of_cases : most_findings;
  const std::size_t shown = options.all ? findings.size() : std::min(findings.size(), most);
  for (std::size_t i = 0; i < shown; ++i) {
    const auto& finding = findings[i];
    std::string said = fmt::format("{} ({})", sentence(finding, result.display), finding.id);
    const auto citation = sources::citation(finding.source);
    if (options.all && !citation.empty()) said += fmt::format(" [{}]", citation);
    page.paragraph(fmt::format("  {:<8}", word(finding.severity)), said);
  }
  for (const auto& one : result.accepted)
    if (options.all)
      page.paragraph(fmt::format("  {:<8}", "accepted"),
                     fmt::format("{} ({}): {}; {}", sentence(one.finding, result.display), one.finding.id,
                                 one.because, one.by));
  if (shown < findings.size()) page.line(fmt::format("  {} more: -v", findings.size() - shown));
}

void next_steps(Page& page, const Result& result) {
  auto tasks = tasks_from_findings(result);
  const auto& margins = result.assessment.margins;
  if (margins.surface.value_or(0.0) < 0.0 && margins.surface_clean.value_or(-1.0) >= 0.0)
    tasks.insert(tasks.begin(),
                 fmt::format("Clean it, or agree a lower fouling: without deposits the surface margin is {}.",
                             signed_percent(*margins.surface_clean)));
  auto look_ups = tasks_from_assumptions(result.assumed);
  // One place is kept for what a drawing or a list would settle.
  if (!look_ups.empty()) tasks.resize(std::min(tasks.size(), most_tasks - 1));
  std::ranges::move(look_ups, std::back_inserter(tasks));
  if (tasks.empty()) tasks.emplace_back("Nothing stands open in this rating.");
  tasks.resize(std::min(tasks.size(), most_tasks));
  for (std::size_t i = 0; i < tasks.size(); ++i)
    page.paragraph(fmt::format("{:<13}{} ", i == 0 ? "NEXT" : "", i + 1), tasks[i]);
}

}  // namespace dutygauge::report
