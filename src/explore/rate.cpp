#include <algorithm>
#include <filesystem>
#include <limits>
#include <tuple>

#include <tbb/parallel_for.h>

#include "dutygauge/explore.hpp"
#include "how_sure.hpp"

namespace dutygauge::explore {
namespace {

using Swings = std::vector<std::vector<uncertainty::Swing>>;

rating::Problem without_fouling(rating::Problem problem) {
  problem.shell_side.fouling_resistance = 0.0;
  problem.tube_side.fouling_resistance = 0.0;
  return problem;
}

service::Service service_of(const case_io::Case& a_case) {
  service::Service service = a_case.service;
  service.words = a_case.display;
  return service;
}

service::Holding held(const service::Assessment& running_free, service::Control control) {
  const auto& required = running_free.margins.required_duty;
  if (!required) return {{}, "no line of the service asks for a duty"};
  return service::hold(running_free.problem, control, *required);
}

report::RatedCase rated(const case_io::Case& a_case) {
  const auto service = service_of(a_case);
  report::RatedCase result{.name = a_case.operating_case,
                           .design_fouling = assess_both_ways(a_case.problem, service),
                           .clean = service::assess(without_fouling(a_case.problem), service),
                           .findings = a_case.findings};
  const auto& judged = result.design_fouling.findings;
  result.findings.insert(result.findings.end(), judged.begin(), judged.end());
  if (a_case.control) {
    result.held = held(result.design_fouling, *a_case.control);
    result.held_clean = held(result.clean, *a_case.control);
  }
  return result;
}

std::size_t governing(const std::vector<report::RatedCase>& cases) {
  constexpr double none = std::numeric_limits<double>::infinity();
  const auto room = [none](const report::RatedCase& one) {
    const auto& margins = one.design_fouling.margins;
    const auto probability = one.spread ? one.spread->probability : std::nullopt;
    return std::tuple(one.design_fouling.rating.outcome.has_value(), probability.value_or(none),
                      one.design_fouling.verdict.met.value_or(true), margins.duty.value_or(none),
                      margins.temperature.value_or(none));
  };
  return static_cast<std::size_t>(std::ranges::min_element(cases, {}, room) - cases.begin());
}

/// Whether two findings say the same, numbers apart. Notes may name the numbers in their text.
bool is_same(const Finding& a, const Finding& b) {
  return a.id == b.id && a.severity == b.severity && (a.severity == Severity::note || a.text == b.text);
}

/// The same to the letter: both streams are of one kind.
bool is_repeated(const Finding& a, const Finding& b) {
  return a.id == b.id && a.text == b.text && a.value == b.value && a.limit == b.limit;
}

/// Those of the governing case, and what only other cases have to say, with their names.
Findings all_findings(const std::vector<report::RatedCase>& cases, std::size_t governing) {
  Findings all;
  for (const Finding& finding : cases[governing].findings)
    if (std::ranges::none_of(all, [&](const Finding& other) { return is_repeated(other, finding); }))
      all.push_back(finding);
  for (const auto& one : cases) {
    const Findings so_far = all;
    for (Finding finding : one.findings) {
      const auto is_known = [&](const Finding& other) { return is_same(other, finding); };
      if (&one == &cases[governing] || std::ranges::any_of(so_far, is_known)) continue;
      finding.text = "case " + one.name + ": " + finding.text;
      all.push_back(std::move(finding));
    }
  }
  std::ranges::stable_sort(all, std::ranges::greater{}, &Finding::severity);
  return all;
}

/// Those of the governing case, and what only other cases had to assume.
Assumptions all_assumed(const std::vector<case_io::Case>& cases, std::size_t governing) {
  Assumptions all = cases[governing].assumed;
  for (const auto& one : cases) {
    const Assumptions so_far = all;
    for (const Assumption& assumption : one.assumed)
      if (std::ranges::find(so_far, assumption.key, &Assumption::key) == so_far.end())
        all.push_back(assumption);
  }
  return all;
}

/// Takes out the findings somebody has decided on.
std::vector<report::AcceptedFinding> take_accepted(Findings& findings,
                                                   const std::vector<case_io::Accepted>& decisions) {
  std::vector<report::AcceptedFinding> accepted;
  for (const auto& decision : decisions) {
    for (const Finding& finding : findings)
      if (finding.id == decision.id) accepted.push_back({finding, decision.because, decision.by});
    std::erase_if(findings, [&](const Finding& finding) { return finding.id == decision.id; });
  }
  return accepted;
}

/// The unit of today under the reading's conditions; what the reading cannot be goes to the findings.
std::optional<report::Anchored> anchored_to(const std::optional<case_io::AnchorReading>& read,
                                            Findings& findings) {
  if (!read) return {};
  const auto* found = std::get_if<case_io::FoundFouling>(&read->reading);
  auto anchor = found
                    ? uncertainty::anchor_to_fouling(read->unit, found->value, found->sigma)
                    : uncertainty::anchor_to(read->unit, std::get<uncertainty::SteadyReading>(read->reading));
  if (found && anchor.value) anchor.value->reading.taken = found->taken;
  findings.insert(findings.end(), anchor.findings.begin(), anchor.findings.end());
  if (!anchor.value) return {};
  const auto rated = rating::rate(uncertainty::today(*anchor.value, anchor.value->unit));
  if (!rated.outcome) return {};
  return report::Anchored{std::move(*anchor.value), *rated.outcome};
}

report::Today rated_today(const report::Anchored& anchored, const case_io::Case& a_case) {
  report::Today today{
      .assessment = service::assess(uncertainty::today(anchored.anchor, a_case.problem), service_of(a_case))};
  if (a_case.control) today.held = held(today.assessment, *a_case.control);
  return today;
}

/// Everything but the claims.
report::Result without_claims(const std::vector<case_io::Case>& cases, const Swings& swings) {
  std::vector<report::RatedCase> all(cases.size());
  tbb::parallel_for(std::size_t{0}, cases.size(), [&](std::size_t i) { all[i] = rated(cases[i]); });
  Findings of_anchor;
  const auto anchored = anchored_to(cases.front().anchor, of_anchor);
  for (auto& one : all) one.findings.insert(one.findings.end(), of_anchor.begin(), of_anchor.end());
  if (anchored)
    for (std::size_t i = 0; i < cases.size(); ++i) all[i].today = rated_today(*anchored, cases[i]);
  add_spreads(all, anchored, swings);
  const std::size_t worst = governing(all);
  const case_io::Case& a_case = cases[worst];
  report::Result result{.file = std::filesystem::path(a_case.file).filename().string(),
                        .title = a_case.title,
                        .tag = a_case.tag,
                        .input_sha256 = a_case.sha256,
                        .display = a_case.display,
                        .assessment = all[worst].design_fouling,
                        .spread = all[worst].spread,
                        .inputs = a_case.inputs,
                        .assumed = all_assumed(cases, worst),
                        .findings = all_findings(all, worst),
                        .governing = worst,
                        .present_since = a_case.present_since,
                        .anchored = anchored};
  result.cases = std::move(all);
  return result;
}

/// Adds the verdicts on the claims of a case, and settles what has been accepted.
report::Result completed(report::Result result, const case_io::Case& claimed,
                         const service::Assessment& assessment) {
  result.claims = bids::audit(claimed.claims, assessment);
  const auto contradictions = bids::findings_of(result.claims);
  result.findings.insert(result.findings.end(), contradictions.begin(), contradictions.end());
  std::ranges::stable_sort(result.findings, std::ranges::greater{}, &Finding::severity);
  result.accepted = take_accepted(result.findings, claimed.accepted);
  return result;
}

}  // namespace

service::Assessment assess_both_ways(const rating::Problem& problem, const service::Service& service) {
  service::Assessment assessment = service::assess(problem, service);
  const Findings more = rating::compare_solutions(problem, assessment.rating);
  assessment.findings.insert(assessment.findings.end(), more.begin(), more.end());
  return assessment;
}

report::Result rate(const case_io::Document& document, std::optional<units::System> display) {
  auto cases = case_io::build_all(document);
  for (auto& one : cases) one.display = display.value_or(one.display);
  Swings swings;
  for (const auto& one : cases)
    swings.push_back(swings_of(case_io::overlaid(document, one.operating_case), one));
  auto result = without_claims(cases, swings);
  const auto found = std::ranges::find(cases, cases[0].claims.operating_case, &case_io::Case::operating_case);
  const std::size_t named = found == cases.end() ? 0 : static_cast<std::size_t>(found - cases.begin());
  if (!document.blocks.contains("present")) {
    const service::Assessment assessment = result.cases[named].design_fouling;
    return completed(std::move(result), cases[named], assessment);
  }
  const auto as_built = case_io::build(case_io::as_built(document, cases[named].operating_case));
  return completed(std::move(result), as_built, service::assess(as_built.problem, service_of(as_built)));
}

report::Result rate(const case_io::Case& a_case) {
  auto result = without_claims({a_case}, {});
  const service::Assessment assessment = result.assessment;
  return completed(std::move(result), a_case, assessment);
}

}  // namespace dutygauge::explore
