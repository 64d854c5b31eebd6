#include <fmt/format.h>
#include <tbb/parallel_for.h>

#include <algorithm>

#include "scan.hpp"

namespace dutygauge::explore {
namespace {

using units::Kind;

constexpr double liquid_velocity_limit = 3.0;  // common practice, no source [m/s]
constexpr double rounding = 1e-9;
// What these say is among the conditions with a room of its own, or is not about this value.
constexpr std::string_view known_otherwise[] = {"rating.pressure_drop", "tubeside.velocity_high", "service.",
                                                "rating.mean_misleads"};

bool is_known_otherwise(const std::string& id) {
  return std::ranges::any_of(known_otherwise,
                             [&id](std::string_view start) { return id.starts_with(start); });
}

Condition of_demand(const service::Demand& demand, const case_io::Case& a_case) {
  const auto names = name_of(a_case);
  const bool duty = demand.quantity == service::Quantity::duty;
  const std::string subject =
      duty ? "duty"
           : (demand.quantity == service::Quantity::shell_side_outlet ? names.shell_side : names.tube_side) +
                 " outlet";
  const double limit = demand.limit;
  return {
      .name = std::string(service::key_of(demand.quantity)),
      .what = fmt::format("{} {} {}", subject, demand.at_least ? "at least" : "at most",
                          units::typed(limit, duty ? Kind::power : Kind::temperature, a_case.display, 4))};
}

Condition of_drop(const std::string& side, const std::string& stream, double allowable,
                  units::System display) {
  return {.name = side + ".allowable_pressure_drop",
          .what = fmt::format("{} pressure drop at most {}", stream,
                              units::typed(allowable, Kind::pressure_difference, display, 4))};
}

std::vector<Condition> conditions_of(const case_io::Case& a_case) {
  std::vector<Condition> all;
  const auto names = name_of(a_case);
  const auto& service = a_case.service;
  for (const auto& demand : service.demands) all.push_back(of_demand(demand, a_case));
  if (service.shell_side_allowable_drop)
    all.push_back(
        of_drop("shell_side", names.shell_side, *service.shell_side_allowable_drop, a_case.display));
  if (service.tube_side_allowable_drop)
    all.push_back(of_drop("tube_side", names.tube_side, *service.tube_side_allowable_drop, a_case.display));
  if (a_case.problem.tube_side.fluid.phase == fluids::Phase::liquid)
    all.push_back(
        {.name = "tube_side.velocity",
         .what = fmt::format("{} velocity in the tubes at most {}", names.tube_side,
                             units::typed(liquid_velocity_limit, Kind::velocity, a_case.display, 3))});
  return all;
}

std::vector<double> rooms_of(const service::Assessment& one, bool with_velocity) {
  const auto& outcome = *one.rating.outcome;
  std::vector<double> rooms;
  for (const auto& demand : one.service.demands)
    rooms.push_back(service::distance(demand, outcome) /
                    (demand.quantity == service::Quantity::duty ? demand.limit : 1.0));
  const auto drop = [&rooms](const std::optional<double>& allowable, double actual) {
    if (allowable) rooms.push_back(1.0 - actual / *allowable);
  };
  drop(one.service.shell_side_allowable_drop, outcome.shell_drop.total());
  drop(one.service.tube_side_allowable_drop, outcome.tube_drop.total());
  if (with_velocity) rooms.push_back(1.0 - outcome.local.tube_film.velocity / liquid_velocity_limit);
  return rooms;
}

}  // namespace

Follower::Follower(const case_io::Document& document, const Dial& dial)
    : document_(document),
      dial_(dial),
      case_(case_io::build(document)),
      shell_is_hot_(rating::shell_side_is_hot(case_.problem)),
      conditions_(conditions_of(case_)) {}

Reading Follower::at(double value) const {
  Reading reading{.value = value};
  const Point point = rated(document_, {{dial_, value}});
  if (!point.assessment) {
    reading.unsettled = point.unsettled;
    reading.stopper = point.stopper;
    reading.why = point.why;
    return reading;
  }
  const auto& one = *point.assessment;
  if (rating::shell_side_is_hot(one.problem) != shell_is_hot_) {
    reading.stopper = "streams.inlet_temperatures";
    reading.why = "the inlet temperatures meet, and the heat would flow the other way";
    return reading;
  }
  const bool with_velocity = !conditions_.empty() && conditions_.back().name == "tube_side.velocity";
  reading.room = rooms_of(one, with_velocity);
  for (const Finding& finding : one.findings)
    if (finding.severity != Severity::note && !is_known_otherwise(finding.id))
      reading.remarks.push_back(finding);
  return reading;
}

std::vector<Reading> readings(const Follower& follower, const std::vector<double>& values, int& unsettled) {
  std::vector<Reading> all(values.size());
  tbb::parallel_for(std::size_t{0}, values.size(), [&](std::size_t i) { all[i] = follower.at(values[i]); });
  // A point that did not settle says nothing: its neighbours are compared with each other.
  unsettled += static_cast<int>(std::erase_if(all, [](const Reading& one) { return one.unsettled; }));
  return all;
}

std::vector<std::string> broken(const Follower& follower, const Reading& reading) {
  if (!reading.has_result()) return {reading.why};
  std::vector<std::string> words;
  for (std::size_t i = 0; i < reading.room.size(); ++i)
    if (reading.room[i] < -rounding) words.push_back(follower.conditions()[i].what);
  return words;
}

}  // namespace dutygauge::explore
