#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "dutygauge/units/mention.hpp"
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

/// With the two inlets exchanged, a line that should ask for heat only limits it, and holds by doing nothing.
void check_asking(const rating::Problem& problem, const Service& service, Findings& findings) {
  const auto asks = [&](const Demand& demand) { return asks_for_heat(demand, problem); };
  if (service.demands.empty() || std::ranges::any_of(service.demands, asks)) return;
  const bool shell_is_hot = rating::shell_side_is_hot(problem);
  const rating::Stream& hot = shell_is_hot ? problem.shell_side : problem.tube_side;
  const rating::Stream& cold = shell_is_hot ? problem.tube_side : problem.shell_side;
  findings.push_back(
      {.id = "service.asks_no_heat",
       .severity = Severity::should,
       .text = fmt::format(
           "no line of the service asks for heat: as typed the {} stream ({}) is the hot one, {{value}} "
           "against {{limit}}, and every line only limits what is exchanged. Check the two inlet "
           "temperatures, and whether at_least and at_most are meant so",
           shell_is_hot ? "shell-side" : "tube-side", hot.name),
       .ground = Ground::arithmetic,
       .value = hot.inlet_temperature,
       .limit = cold.inlet_temperature,
       .kind = units::Kind::temperature});
}

/// More pressure than there is cannot be lost. Drops are found at the inlet's pressure, so nothing else says
/// so.
void check_inlet_pressure(std::string_view side, const rating::Stream& stream, double drop,
                          Findings& findings) {
  if (!stream.pressure_is_known || drop <= stream.inlet_pressure) return;
  findings.push_back(
      {.id = "rating.drop_above_inlet",
       .severity = Severity::must,
       .text =
           fmt::format("the {} pressure drop {{value}} is more than the whole absolute inlet pressure, {}: "
                       "this flow cannot pass, and every number of this page is for a flow that does not "
                       "exist; check flow, nozzles, tube count and passes, and the inlet pressure",
                       side, units::mention(stream.inlet_pressure, units::Kind::pressure)),
       .ground = Ground::arithmetic,
       .value = drop,
       .limit = stream.inlet_pressure,
       .kind = units::Kind::pressure_difference});
}

void check_inlet_pressures(const rating::Problem& problem, const rating::Outcome& outcome,
                           Findings& findings) {
  check_inlet_pressure("shell-side", problem.shell_side, outcome.shell_drop.total(), findings);
  check_inlet_pressure("tube-side", problem.tube_side, outcome.tube_drop.total(), findings);
}

}  // namespace

Assessment judge(const rating::Problem& problem, const Service& service) {
  Assessment result;
  result.problem = problem;
  result.service = service;
  const bool by_march = problem.methods.solution == rating::Solution::march;
  result.rating = by_march ? rating::rate_march(problem) : rating::rate_mean(problem);
  result.rating.no_result = units::spoken(result.rating.no_result, service.words);
  result.findings = result.rating.findings;
  check_asking(problem, service, result.findings);
  if (const auto& outcome = result.rating.outcome) {
    result.margins = running_margins(problem, service, *outcome, result.findings);
    check_drops(problem, service, *outcome, result.findings);
    check_inlet_pressures(problem, *outcome, result.findings);
  }
  result.verdict = verdict_of(service, problem, result.rating, result.margins);
  return result;
}

Assessment assess(const rating::Problem& problem, const Service& service) {
  Assessment result;
  result.problem = problem;
  result.service = service;
  result.rating = rating::rate(problem);
  result.rating.no_result = units::spoken(result.rating.no_result, service.words);
  result.findings = result.rating.findings;
  check_asking(problem, service, result.findings);
  if (const auto& outcome = result.rating.outcome) {
    result.margins = margins_of(problem, service, *outcome, result.findings);
    check_drops(problem, service, *outcome, result.findings);
    check_inlet_pressures(problem, *outcome, result.findings);
    rating::Problem by_kern = problem;
    by_kern.methods.shell_side = shellside::Method::kern;
    const bool is_computed = problem.exchanger.shell_drawn && !problem.shell_side.film_law;
    if (is_computed && shellside::objections(problem.exchanger.shell_side, shellside::Method::kern).empty())
      result.second_opinion = rating::rate(by_kern).outcome;
  }
  result.verdict = verdict_of(service, problem, result.rating, result.margins);
  return result;
}

}  // namespace dutygauge::service
