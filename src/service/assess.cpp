#include <fmt/core.h>

#include <cmath>

#include "judge.hpp"

namespace dutygauge::service {
namespace {

/// The velocity heads counted for a shell's two nozzles differ between sources; the
/// smallest published sum is 1.5 (Serth 2007) against our 2.0, so half a head is convention.
double convention_part(const rating::Problem& problem, const rating::Outcome& outcome) {
  const geometry::ShellSide& shell = problem.exchanger.shell_side;
  if (shell.nozzle_in_area <= 0.0) return 0.0;
  const double mass_flux =
      problem.shell_side.mass_flow / problem.exchanger.shells_in_parallel / shell.nozzle_in_area;
  const double head = mass_flux * mass_flux / (2.0 * outcome.local.shell_bulk.density);
  return 0.5 * head * problem.exchanger.shells_in_series;
}

void check_drop(std::string_view side, double drop, std::optional<double> allowable, double convention,
                Findings& findings) {
  if (!allowable || drop <= *allowable) return;
  const bool by_convention = drop - convention <= *allowable;
  findings.push_back(
      {.id = "rating.pressure_drop",
       .severity = by_convention ? Severity::should : Severity::must,
       .text = fmt::format(
           "the {} pressure drop {{value}} is above the allowable {{limit}}{}; less flow, or a "
           "revised allowance from whoever owns the pump, would settle it",
           side, by_convention ? " only because of how many velocity heads are counted for the nozzles" : ""),
       .ground = Ground::arithmetic,
       .value = drop,
       .limit = *allowable,
       .kind = units::Kind::pressure_difference});
}

void check_drops(const rating::Problem& problem, const Service& service, const rating::Outcome& outcome,
                 Findings& findings) {
  check_drop("shell-side", outcome.shell_drop.total(), service.shell_side_allowable_drop,
             convention_part(problem, outcome), findings);
  check_drop("tube-side", outcome.tube_drop.total(), service.tube_side_allowable_drop, 0.0, findings);
}

}  // namespace

Assessment judge(const rating::Problem& problem, const Service& service) {
  Assessment result;
  result.problem = problem;
  result.service = service;
  const bool by_march = problem.methods.solution == rating::Solution::march;
  result.rating = by_march ? rating::rate_march(problem) : rating::rate_mean(problem);
  result.findings = result.rating.findings;
  if (const auto& outcome = result.rating.outcome) {
    result.margins = running_margins(problem, service, *outcome, result.findings);
    check_drops(problem, service, *outcome, result.findings);
  }
  result.verdict = verdict_of(service, problem, result.rating, result.margins);
  return result;
}

Assessment assess(const rating::Problem& problem, const Service& service) {
  Assessment result;
  result.problem = problem;
  result.service = service;
  result.rating = rating::rate(problem);
  result.findings = result.rating.findings;
  if (const auto& outcome = result.rating.outcome) {
    result.margins = margins_of(problem, service, *outcome, result.findings);
    check_drops(problem, service, *outcome, result.findings);
    rating::Problem by_kern = problem;
    by_kern.methods.shell_side = shellside::Method::kern;
    if (shellside::objections(problem.exchanger.shell_side, shellside::Method::kern).empty())
      result.second_opinion = rating::rate(by_kern).outcome;
  }
  result.verdict = verdict_of(service, problem, result.rating, result.margins);
  return result;
}

}  // namespace dutygauge::service
