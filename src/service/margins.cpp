#include <fmt/core.h>

#include <algorithm>
#include <cmath>
#include <stdexcept>

#include "judge.hpp"

namespace dutygauge::service {

double actual(const Demand& demand, const rating::Outcome& outcome) {
  switch (demand.quantity) {
    case Quantity::shell_side_outlet:
      return outcome.shell_outlet;
    case Quantity::tube_side_outlet:
      return outcome.tube_outlet;
    case Quantity::duty:
      return outcome.duty;
  }
  throw std::invalid_argument("service::actual: no such quantity");
}

std::string_view key_of(Quantity quantity) {
  switch (quantity) {
    case Quantity::shell_side_outlet:
      return "service.shell_side_outlet";
    case Quantity::tube_side_outlet:
      return "service.tube_side_outlet";
    case Quantity::duty:
      return "service.duty";
  }
  throw std::invalid_argument("service::key_of: no such quantity");
}

double distance(const Demand& demand, const rating::Outcome& outcome) {
  const double value = actual(demand, outcome);
  return demand.at_least ? value - demand.limit : demand.limit - value;
}

bool holds(const Demand& demand, const rating::Outcome& outcome) {
  const double tolerance = demand.quantity == Quantity::duty ? 1e-9 * std::abs(demand.limit) : 1e-6;
  return distance(demand, outcome) >= -tolerance;
}

bool asks_for_heat(const Demand& demand, const rating::Problem& problem) {
  if (demand.quantity == Quantity::duty) return demand.at_least;
  const bool of_hot_side =
      (demand.quantity == Quantity::shell_side_outlet) == rating::shell_side_is_hot(problem);
  return of_hot_side != demand.at_least;
}

namespace {

/// The duty [W] a line asks for. Outlets beyond the fluid's range come back as the
/// duty at its end, with a finding.
double duty_of(const Demand& demand, const rating::Problem& problem, Findings& findings) {
  if (demand.quantity == Quantity::duty) return demand.limit;
  const bool shell = demand.quantity == Quantity::shell_side_outlet;
  const rating::Stream& stream = shell ? problem.shell_side : problem.tube_side;
  const auto usable = fluids::usable_temperatures(stream.fluid, stream.inlet_pressure);
  const double limit = std::clamp(demand.limit, usable.low, usable.high);
  if (limit != demand.limit)
    findings.push_back(
        {.id = "service.outlet_out_of_range",
         .severity = Severity::must,
         .text = "the outlet asked for, {value}, cannot be: what is known of " + stream.fluid.name +
                 " ends at {limit} (" +
                 fluids::why_it_ends(stream.fluid, stream.inlet_pressure, demand.limit > limit) +
                 "); mend the service line or describe the fluid further",
         .ground = Ground::arithmetic,
         .value = demand.limit,
         .limit = limit,
         .kind = units::Kind::temperature});
  return rating::duty_to_reach(stream, limit, shell == rating::shell_side_is_hot(problem));
}

rating::Problem without_fouling(rating::Problem problem) {
  problem.shell_side.fouling_resistance = 0.0;
  problem.tube_side.fouling_resistance = 0.0;
  return problem;
}

void fill_surface(const rating::Problem& problem, double required, Margins& margins, Findings& findings) {
  const auto needed = rating::needed_for(problem, required);
  findings.insert(findings.end(), needed.findings.begin(), needed.findings.end());
  if (!needed.value) return;
  margins.u_required = needed.value->u_required;
  margins.surface = needed.value->surface_margin;
  margins.fouling_spare = needed.value->fouling_spare;
  if (const auto clean = rating::needed_for(without_fouling(problem), required).value)
    margins.surface_clean = clean->surface_margin;
  if (margins.surface_clean.value_or(0.0) < 0.0)
    findings.push_back(
        {.id = "service.fails_clean",
         .severity = Severity::should,
         .text =
             fmt::format("even without any fouling the surface is {:.3g} % less than what is needed, so "
                         "cleaning alone will not bring the service back; decide whether to add surface, to "
                         "change a flow, or to ask for less duty",
                         -100.0 * *margins.surface_clean),
         .ground = Ground::arithmetic,
         .value = *margins.surface_clean,
         .limit = 0.0});
}

}  // namespace

Margins running_margins(const rating::Problem& problem, const Service& service,
                        const rating::Outcome& outcome, Findings& findings) {
  Margins margins;
  std::optional<double> required;
  for (const Demand& demand : service.demands) {
    if (demand.quantity != Quantity::duty) {
      const double to_limit = distance(demand, outcome);
      margins.temperature = std::min(margins.temperature.value_or(to_limit), to_limit);
    }
    if (!asks_for_heat(demand, problem)) continue;
    const double duty = duty_of(demand, problem, findings);
    required = std::max(required.value_or(duty), duty);
  }
  if (!required || *required <= 0.0) return margins;
  margins.required_duty = required;
  margins.duty = outcome.duty / *required - 1.0;
  return margins;
}

Margins margins_of(const rating::Problem& problem, const Service& service, const rating::Outcome& outcome,
                   Findings& findings) {
  Margins margins = running_margins(problem, service, outcome, findings);
  if (margins.required_duty) fill_surface(problem, *margins.required_duty, margins, findings);
  return margins;
}

}  // namespace dutygauge::service
