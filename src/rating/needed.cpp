#include <fmt/core.h>

#include <cmath>

#include "unit.hpp"

namespace dutygauge::rating {
namespace {

constexpr int most_shells_tried = 8;

Finding too_much(const Problem& problem, double duty, const DutyLimit& limit) {
  const bool tube = limit.tube_side_governs;
  const Stream& stream = tube ? problem.tube_side : problem.shell_side;
  const std::string reason =
      limit.fluid_ends
          ? fluids::why_it_ends(stream.fluid, stream.inlet_pressure, tube == shell_side_is_hot(problem))
          : "it would have to leave beyond the other stream's inlet temperature";
  return {
      .id = "service.beyond_streams",
      .severity = Severity::must,
      .text = fmt::format("the required duty {{value}} is more than these two streams can exchange, "
                          "{{limit}}, with any surface: the {} stream sets the limit, {}. Only other flows "
                          "or inlet temperatures can change that",
                          tube ? "tube-side" : "shell-side", reason),
      .ground = Ground::arithmetic,
      .value = duty,
      .limit = limit.duty,
      .kind = units::Kind::power};
}

/// What would reach the effectiveness: the same shells, more of them in series.
std::string cure(arrangement::Arrangement arrangement, double r, double p) {
  const int now = arrangement.shells_in_series;
  if (arrangement.flow == arrangement::Flow::counter) {
    for (int n = now + 1; n <= most_shells_tried; ++n) {
      arrangement.shells_in_series = n;
      if (arrangement::ntu_for(arrangement, r, p))
        return fmt::format(
            "{} such shells in series would reach it with enough surface, pure counterflow too", n);
    }
  }
  return "only flow nearer to pure counterflow, other flows or other inlet temperatures would reach it";
}

Finding out_of_reach(const Unit& unit, const Trial& trial, double p) {
  const Problem& problem = *unit.problem;
  const bool crossing = unit.direction * (trial.tube_outlet - trial.shell_outlet) > 0.0;
  return {
      .id = "arrangement.infeasible",
      .severity = Severity::must,
      .text = fmt::format(
          "the required duty needs a temperature effectiveness P of {{value}} (tube side, R = {:.3f}), and "
          "this "
          "arrangement of {} shell(s) in series with {} tube pass(es) cannot pass {{limit}} with any "
          "surface{}; {}",
          trial.r, problem.exchanger.shells_in_series, unit.arrangement.tube_passes,
          crossing ? fmt::format(", because the outlets would cross by {}",
                                 units::typed(std::abs(trial.tube_outlet - trial.shell_outlet),
                                              units::Kind::temperature_difference, units::System::metric, 3))
                   : "",
          cure(unit.arrangement, trial.r, p)),
      .ground = Ground::arithmetic,
      .value = p,
      .limit = arrangement::largest_effectiveness(unit.arrangement, trial.r),
      .source = "bowman_1940"};
}

}  // namespace

Checked<std::optional<Needed>> needed_for(const Problem& problem, double duty) {
  const DutyLimit limit = duty_limit(problem);
  if (!(duty < limit.duty)) return {{}, {too_much(problem, duty, limit)}, {}};
  const Unit unit = prepare(problem);
  const Trial trial = follow(unit, duty, {});
  const double p = duty / (trial.tube_capacity_rate * std::abs(problem.shell_side.inlet_temperature -
                                                               problem.tube_side.inlet_temperature));
  const auto ntu = arrangement::ntu_for(unit.arrangement, trial.r, p);
  if (!ntu) return {{}, {out_of_reach(unit, trial, p)}, {}};

  Needed needed;
  needed.u_required = *ntu * trial.tube_capacity_rate / problem.exchanger.area;
  needed.surface_margin = trial.local.u_dirty / needed.u_required - 1.0;
  const Local loaded = local(unit, trial.means, {.fixed_u = needed.u_required});
  if (!trial.local.converged || !loaded.converged)
    return {{},
            {{.id = "service.walls",
              .severity = Severity::should,
              .text = "the wall temperatures do not settle at the required duty {value}: surface and fouling "
                      "margins are not given",
              .value = duty,
              .kind = units::Kind::power}},
            {}};
  needed.fouling_spare = 1.0 / needed.u_required - loaded.resistances.sum();
  return {needed, {}, {}};
}

}  // namespace dutygauge::rating
