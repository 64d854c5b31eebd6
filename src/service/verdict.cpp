#include <fmt/core.h>

#include <cmath>
#include <string>

#include "judge.hpp"

namespace dutygauge::service {
namespace {

/// A line's room on a common scale: of the duty for duties, of the inlet difference for outlets.
double relative_distance(const Demand& demand, const rating::Problem& problem,
                         const rating::Outcome& outcome) {
  const double scale =
      demand.quantity == Quantity::duty
          ? std::abs(demand.limit)
          : std::abs(problem.shell_side.inlet_temperature - problem.tube_side.inlet_temperature);
  return distance(demand, outcome) / scale;
}

const Demand* tightest(const Service& service, const rating::Problem& problem,
                       const rating::Outcome& outcome) {
  const Demand* found = nullptr;
  for (const Demand& demand : service.demands)
    if (!found || relative_distance(demand, problem, outcome) < relative_distance(*found, problem, outcome))
      found = &demand;
  return found;
}

std::string subject(const Demand& demand, const rating::Problem& problem) {
  if (demand.quantity == Quantity::duty) return "the duty";
  const bool shell = demand.quantity == Quantity::shell_side_outlet;
  const std::string& name = (shell ? problem.shell_side : problem.tube_side).name;
  return "the " + (name.empty() ? std::string(shell ? "shell-side stream" : "tube-side stream") : name) +
         " outlet";
}

units::Kind kind_of(const Demand& demand) {
  return demand.quantity == Quantity::duty ? units::Kind::power : units::Kind::temperature;
}

std::string sentence(const Demand& demand, const rating::Problem& problem, const rating::Outcome& outcome,
                     units::System words) {
  return fmt::format("{} is {} against {} {}", subject(demand, problem),
                     units::typed(actual(demand, outcome), kind_of(demand), words, 4),
                     demand.at_least ? "at least" : "at most",
                     units::typed(demand.limit, kind_of(demand), words, 4));
}

std::string per_cent(double fraction) {
  if (fraction > 10.0) return fmt::format("{:.0f} times what is required", 1.0 + fraction);
  return fmt::format("{:+.1f} %", 100.0 * fraction);
}

}  // namespace

Verdict verdict_of(const Service& service, const rating::Problem& problem, const rating::Rating& rating,
                   const Margins& margins) {
  Verdict verdict;
  if (!rating.outcome) {
    verdict.limited_by = "no result";
    verdict.text = "No result: " + rating.no_result + ".";
    return verdict;
  }
  const rating::Outcome& outcome = *rating.outcome;
  const Demand* line = tightest(service, problem, outcome);
  if (!line) {
    verdict.text = fmt::format("No service is stated: running free it exchanges {}.",
                               units::typed(outcome.duty, units::Kind::power, service.words, 4));
    return verdict;
  }
  verdict.met = true;
  for (const Demand& demand : service.demands) verdict.met = *verdict.met && holds(demand, outcome);
  verdict.limited_by = key_of(line->quantity);
  verdict.text =
      fmt::format("{}: {}", *verdict.met ? "Yes" : "No", sentence(*line, problem, outcome, service.words));
  if (margins.duty && line->quantity != Quantity::duty)
    verdict.text += fmt::format(", duty {}", per_cent(*margins.duty));
  if (margins.duty && line->quantity == Quantity::duty)
    verdict.text += fmt::format(" ({})", per_cent(*margins.duty));
  verdict.text += ".";
  return verdict;
}

}  // namespace dutygauge::service
