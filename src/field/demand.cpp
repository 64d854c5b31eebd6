#include <algorithm>
#include <cmath>
#include <memory>

#include "balance.hpp"
#include "dutygauge/field/diagnosis.hpp"
#include "dutygauge/numerics.hpp"
#include "shape_fit.hpp"

namespace dutygauge::field {
namespace {

constexpr std::size_t fewest_days = 3;  // that say how dirty a unit is
constexpr double seconds_per_day = 86400.0;
constexpr double most_fouling = 0.05;  // [m2.K/W]: beyond it nothing is left to lose
constexpr std::size_t table_points = 60;
constexpr std::size_t latest_days = 7;
// Of the change of calibrated films with flow and temperature: what an overall U with all geometry known
// is usually wrong by [judgement].
constexpr double calibrated_share = 0.1;

const rating::Problem& problem_of(const Plant& plant) {
  return plant.prepared.problem();
}

Conditions service_conditions(const Plant& plant) {
  const auto &hot = hot_stream(plant), &cold = cold_stream(plant);
  return {hot.mass_flow, cold.mass_flow, hot.inlet_temperature, cold.inlet_temperature};
}

std::optional<Response> at_service(const Plant& plant, double fouling) {
  return respond(plant, service_conditions(plant), {.tube_deposit = fouling});
}

/// Duty over what a line asks for, less 1; of an outlet by its change of temperature.
double margin_of(const service::Demand& demand, const Plant& plant, const Response& response) {
  if (demand.quantity == service::Quantity::duty) return response.duty / demand.limit - 1.0;
  const bool shell = demand.quantity == service::Quantity::shell_side_outlet;
  const bool hot = shell == rating::shell_side_is_hot(problem_of(plant));
  const double in = hot ? hot_stream(plant).inlet_temperature : cold_stream(plant).inlet_temperature;
  return (in - (hot ? response.hot_out : response.cold_out)) / (in - demand.limit) - 1.0;
}

/// Of the tightest line that asks for heat.
std::optional<double> margin_at(const Plant& plant, const service::Service& service, double fouling) {
  const auto response = at_service(plant, fouling);
  if (!response) return {};
  std::optional<double> least;
  for (const service::Demand& demand : service.demands)
    if (service::asks_for_heat(demand, problem_of(plant))) {
      const double margin = margin_of(demand, plant, *response);
      if (std::isfinite(margin)) least = std::min(least.value_or(margin), margin);
    }
  return least;
}

/// Medians of the last week of what the readings say.
std::optional<double> latest(const Days& days, double Apparent::*what) {
  std::vector<double> values;
  for (std::size_t i = days.size(); i > 0 && values.size() < latest_days; --i)
    if (const double value = days[i - 1].apparent.*what; std::isfinite(value) && value > 0.0)
      values.push_back(value);
  return values.empty() ? std::nullopt : std::optional(median_of(values));
}

/// Under the hypothesis used; a fouling below zero is none.
std::optional<double> fouling_today(const Days& days) {
  std::vector<double> values;
  for (std::size_t i = days.size(); i > 0 && values.size() < latest_days; --i)
    if (std::isfinite(days[i - 1].apparent.fouling)) values.push_back(days[i - 1].apparent.fouling);
  if (values.size() < fewest_days) return {};
  return std::max(median_of(values), 0.0);
}

/// What the films' error leaves between the service's conditions and those of the last week: its share of the
/// change of 1/u_clean. The error that is alike at both is in the level and in what is allowed, and cancels.
double uncertainty_of_allowed(const Evidence& evidence, const Plant& plant) {
  const Days& days = evidence.hypotheses.front().days;
  const auto u_clean = latest(days, &Apparent::u_clean), u = latest(days, &Apparent::u);
  const auto clean = at_service(plant, 0.0);
  if (!u_clean || !u || !clean) return 0.0;
  const bool hot_in_shell = plant.prepared.shell_side_is_hot();
  const auto &hot = hot_stream(plant), &cold = cold_stream(plant);
  const double hot_mean = 0.5 * (hot.inlet_temperature + clean->hot_out);
  const double cold_mean = 0.5 * (cold.inlet_temperature + clean->cold_out);
  const auto films = plant.prepared.films({.tube_flow = hot_in_shell ? cold.mass_flow : hot.mass_flow,
                                           .shell_flow = hot_in_shell ? hot.mass_flow : cold.mass_flow,
                                           .tube_mean = hot_in_shell ? cold_mean : hot_mean,
                                           .shell_mean = hot_in_shell ? hot_mean : cold_mean,
                                           .u = *u});
  const double share = evidence.calibrated ? calibrated_share : evidence.film_uncertainty * *u_clean;
  return share * std::abs(plant.calibration.factor * films.sum() - 1.0 / *u_clean);
}

/// Duty lost by fouling, from a table: it is asked for a million times.
std::function<double(double)> duty_lost(const Plant& plant, double largest) {
  const auto clean = at_service(plant, 0.0);
  auto lost = std::make_shared<std::vector<double>>();
  for (std::size_t i = 0; clean && i <= table_points; ++i)
    if (const auto response = at_service(plant, largest * static_cast<double>(i) / table_points))
      lost->push_back(clean->duty - response->duty);
  if (lost->size() < 2) return {};
  const double step = largest / table_points;
  return [lost, step](double fouling) {
    const double at = std::clamp(fouling / step, 0.0, static_cast<double>(lost->size() - 1));
    const std::size_t below = std::min(static_cast<std::size_t>(at), lost->size() - 2);
    return (*lost)[below] + (at - static_cast<double>(below)) * ((*lost)[below + 1] - (*lost)[below]);
  };
}

std::optional<Economics> economics_of(const Planned& planned, const Plant& plant, double largest) {
  if (!planned.cleaning_cost || !planned.lost_duty_value) return {};
  Economics money{.cost = {.cleaning = *planned.cleaning_cost,
                           .downtime = planned.cleaning_time.value_or(0.0) / seconds_per_day},
                  .heat_price = *planned.lost_duty_value,
                  .currency = planned.currency,
                  .duty_lost = duty_lost(plant, largest)};
  const auto clean = at_service(plant, 0.0);
  if (!clean || !money.duty_lost) return {};
  money.cost.down_rate = clean->duty * *planned.lost_duty_value * seconds_per_day;
  return money;
}

}  // namespace

std::optional<double> allowed_fouling(const Plant& plant, const service::Service& service) {
  const auto clean = margin_at(plant, service, 0.0);
  if (!clean) return {};
  if (*clean <= 0.0) return 0.0;
  const auto margin = [&](double fouling) {
    return margin_at(plant, service, fouling).value_or(std::nan(""));
  };
  if (margin(most_fouling) > 0.0) return most_fouling;
  return numerics::find_root(margin, {0.0, most_fouling}, 1e-10);
}

void ask(Evidence& evidence, const Plant& plant, const service::Service& service, const Planned& planned) {
  const auto today = fouling_today(evidence.hypotheses.front().days);
  if (const auto allowed = allowed_fouling(plant, service)) {
    evidence.allowed = Allowed{*allowed, uncertainty_of_allowed(evidence, plant)};
    const auto margin = today ? margin_at(plant, service, *today) : std::nullopt;
    if (margin) evidence.margins.push_back({"at the service's conditions, as dirty as today", *margin});
  }
  Plan& plan = evidence.plan;
  const Days& days = evidence.hypotheses.front().days;
  if (planned.next_stop && !days.empty()) {
    const double stop = static_cast<double>(*planned.next_stop - evidence.start) / seconds_per_day;
    plan.stop_has_passed = stop <= days.back().day;
    if (!plan.stop_has_passed) plan.next_stop = stop;
  }
  if (planned.recovery_low || planned.recovery_high) {
    const double low = planned.recovery_low.value_or(*planned.recovery_high);
    plan.residue = 1.0 - 0.5 * (low + planned.recovery_high.value_or(low));
  }
  const double level = std::max(today.value_or(0.0), evidence.allowed ? evidence.allowed->fouling : 0.0);
  if (level > 0.0) plan.economics = economics_of(planned, plant, 5.0 * level);
}

}  // namespace dutygauge::field
