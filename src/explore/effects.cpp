#include <algorithm>
#include <cmath>

#include "vary.hpp"

namespace dutygauge::explore {
namespace {

using Margin = report::Effect::Margin;

constexpr double worth_listing = 0.001;

bool drops_hold(const service::Assessment& one) {
  const auto& outcome = *one.rating.outcome;
  return outcome.shell_drop.total() <= one.service.shell_side_allowable_drop.value_or(1e300) &&
         outcome.tube_drop.total() <= one.service.tube_side_allowable_drop.value_or(1e300);
}

bool same_answer(const service::Assessment& here, const Point& there) {
  if (!there.assessment) return there.unsettled;
  return here.verdict.met == there.assessment->verdict.met &&
         drops_hold(here) == drops_hold(*there.assessment);
}

double drop(const service::Assessment& one, bool shell) {
  const auto& outcome = *one.rating.outcome;
  return shell ? outcome.shell_drop.total() : outcome.tube_drop.total();
}

/// Largest relative change of something between here and the two ends.
template <class Of>
double largest_change(const service::Assessment& here, const std::vector<Point>& there, Of&& of) {
  double largest = 0;
  for (const Point& point : there)
    if (point.assessment) largest = std::max(largest, std::abs(of(*point.assessment) / of(here) - 1.0));
  return largest;
}

/// The governing margin of the heat, on an absolute scale so that it can be subtracted.
double heat_margin(const service::Assessment& one, const service::Demand* line) {
  if (line != nullptr && line->quantity != service::Quantity::duty)
    return service::distance(*line, *one.rating.outcome);
  return one.rating.outcome->duty;
}

std::optional<double> change(const service::Assessment& here, const Point& there, Margin margin, bool shell) {
  if (!there.assessment) return {};
  if (margin == Margin::pressure_drop) {
    const auto& allowable =
        shell ? here.service.shell_side_allowable_drop : here.service.tube_side_allowable_drop;
    const double scale = allowable.value_or(drop(here, shell));
    return (drop(here, shell) - drop(*there.assessment, shell)) / scale;
  }
  const auto* line = tightest(here);
  const double moved = heat_margin(*there.assessment, line) - heat_margin(here, line);
  if (margin == Margin::temperature) return moved;
  return moved / here.margins.required_duty.value_or(here.rating.outcome->duty);
}

report::Effect effect_of(const service::Assessment& here, const std::vector<Point>& there) {
  const auto duty = [](const service::Assessment& one) { return one.rating.outcome->duty; };
  const auto shell_drop = [](const service::Assessment& one) { return drop(one, true); };
  const auto tube_drop = [](const service::Assessment& one) { return drop(one, false); };
  const double heat = largest_change(here, there, duty);
  const double in_shell = largest_change(here, there, shell_drop);
  const double in_tubes = largest_change(here, there, tube_drop);
  const bool shell = in_shell >= in_tubes;
  const auto* line = tightest(here);
  report::Effect effect;
  effect.changes_answer =
      !std::ranges::all_of(there, [&here](const Point& point) { return same_answer(here, point); });
  effect.margin =
      line != nullptr && line->quantity != service::Quantity::duty ? Margin::temperature : Margin::duty;
  effect.size = heat;
  const bool only_the_drop = effect.changes_answer && std::ranges::all_of(there, [&here](const Point& point) {
                               return point.assessment && point.assessment->verdict.met == here.verdict.met;
                             });
  if (only_the_drop || (heat < worth_listing && std::max(in_shell, in_tubes) > heat)) {
    effect.margin = Margin::pressure_drop;
    effect.size = std::max(in_shell, in_tubes);
  }
  effect.at_low = change(here, there.front(), effect.margin, shell);
  effect.at_high = change(here, there.back(), effect.margin, shell);
  return effect;
}

}  // namespace

std::vector<std::optional<report::Effect>> effects(const case_io::Document& document,
                                                   const report::Result& result) {
  std::vector<std::optional<report::Effect>> all(result.assumed.size());
  const Point here = rated(document);
  if (!here.assessment) return all;
  for (std::size_t i = 0; i < all.size(); ++i) {
    const Assumption& one = result.assumed[i];
    const auto found = one.low && one.high ? dial(document, one.key) : std::nullopt;
    if (!found) continue;
    const std::vector<Point> there = {read_as(document, *found, *one.low),
                                      read_as(document, *found, *one.high)};
    const bool known = std::ranges::any_of(there, [](const Point& p) { return p.assessment.has_value(); });
    if (known) all[i] = effect_of(*here.assessment, there);
  }
  return all;
}

void weigh(const case_io::Document& document, report::Result& result) {
  if (!result.assessment.rating.outcome) return;
  result.levers = levers(document);
  result.effects = effects(document, result);
}

}  // namespace dutygauge::explore
