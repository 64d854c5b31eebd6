#include <fmt/core.h>

#include <cmath>

#include "dutygauge/numerics.hpp"
#include "dutygauge/units/mention.hpp"
#include "outcome.hpp"

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
                                 units::mention(std::abs(trial.tube_outlet - trial.shell_outlet),
                                                units::Kind::temperature_difference))
                   : "",
          cure(unit.arrangement, trial.r, p)),
      .ground = Ground::arithmetic,
      .value = p,
      .limit = arrangement::largest_effectiveness(unit.arrangement, trial.r),
      .source = "bowman_1940"};
}

Checked<std::optional<Needed>> needed_by_mean(const Problem& problem, double duty) {
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
                      "margins are not given; judge by the duty running free",
              .value = duty,
              .kind = units::Kind::power}},
            {}};
  needed.fouling_spare = 1.0 / needed.u_required - loaded.resistances.sum();
  return {needed, {}, {}};
}

/// The duty of a march with the surface multiplied by a factor and a resistance added
/// outside; empty where there is no result.
std::optional<double> duty_with(Problem problem, double area_factor, double resistance) {
  problem.exchanger.area *= area_factor;
  problem.shell_side.fouling_resistance += resistance;
  const Unit unit = prepare(problem);
  const Bulk inlets{problem.tube_side.inlet_temperature, problem.shell_side.inlet_temperature};
  const auto result = march_through(unit, local(unit, inlets, {}));
  if (!result.outcome) return {};
  return result.outcome->duty;
}

/// Ends on either side of the factor at which a march does the duty, widened from a first
/// guess; empty where more surface stops helping before.
std::optional<numerics::Bracket> bracket_area(const Problem& problem, double duty, double guess) {
  constexpr double widen = 1.6;
  constexpr int most_steps = 20;
  numerics::Bracket ends{guess / 1.15, guess * 1.15};
  for (int step = 0;; ++step) {
    const auto least = duty_with(problem, ends.low, 0.0);
    if (!least || step == most_steps) return {};
    if (*least <= duty) break;
    ends.low /= widen;
  }
  double before = 0.0;
  for (int step = 0;; ++step) {
    const auto most = duty_with(problem, ends.high, 0.0);
    if (!most || step == most_steps || *most <= before) return {};
    if (*most >= duty) return ends;
    before = *most;
    ends.high *= widen;
  }
}

/// The resistance that brings the duty down (or up) to the one asked for. Less than no
/// fouling at all cannot be marched; there the surface margin stands for it.
double spare_by_march(const Problem& problem, double duty, double u_required, double u_there) {
  const double all_fouling = problem.shell_side.fouling_resistance +
                             problem.tube_side.fouling_resistance * problem.exchanger.outside_per_inside;
  const auto excess = [&](double resistance) {
    return duty_with(problem, 1.0, resistance).value_or(NAN) - duty;
  };
  const auto at_mean = needed_by_mean(problem, duty).value;
  const double scale = 1.0 / u_required;
  const double guess = at_mean ? at_mean->fouling_spare : 0.0;
  double low = std::max(-all_fouling, guess - 0.05 * scale), high = guess + 0.05 * scale;
  if (!(excess(low) >= 0.0)) low = -all_fouling;
  if (!(excess(low) >= 0.0)) return 1.0 / u_required - 1.0 / u_there;
  if (!(excess(high) <= 0.0)) high = 10.0 * scale;
  const auto root = numerics::find_root(excess, {low, high}, 1e-12 * scale);
  return root.value_or(1.0 / u_required - 1.0 / u_there);
}

Checked<std::optional<Needed>> needed_by_march(const Problem& problem, double duty) {
  const DutyLimit limit = duty_limit(problem);
  if (!(duty < limit.duty)) return {{}, {too_much(problem, duty, limit)}, {}};
  const auto at_mean = needed_by_mean(problem, duty);
  const double guess = at_mean.value ? 1.0 / (1.0 + at_mean.value->surface_margin) : 1.0;
  const auto ends = bracket_area(problem, duty, guess);
  const auto excess = [&](double factor) { return duty_with(problem, factor, 0.0).value_or(NAN) - duty; };
  const auto factor = ends ? numerics::find_root(excess, *ends, 1e-10 * ends->high) : std::nullopt;
  if (!factor) {
    const Unit unit = prepare(problem);
    const Trial trial = follow(unit, duty, {});
    const double p = duty / (trial.tube_capacity_rate * std::abs(problem.shell_side.inlet_temperature -
                                                                 problem.tube_side.inlet_temperature));
    return {{}, {out_of_reach(unit, trial, p)}, {}};
  }
  Problem reduced = problem;
  reduced.exchanger.area *= *factor;
  const Rating there = rate_march(reduced);
  Needed needed;
  needed.surface_margin = 1.0 / *factor - 1.0;
  needed.u_required = there.outcome->local.u_dirty * *factor;
  needed.fouling_spare = spare_by_march(problem, duty, needed.u_required, there.outcome->local.u_dirty);
  return {needed, {}, {}};
}

}  // namespace

Checked<std::optional<Needed>> needed_for(const Problem& problem, double duty) {
  return problem.methods.solution == Solution::march ? needed_by_march(problem, duty)
                                                     : needed_by_mean(problem, duty);
}

}  // namespace dutygauge::rating
