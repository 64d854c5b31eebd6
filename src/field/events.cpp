#include <algorithm>
#include <cmath>
#include <stdexcept>

#include "dutygauge/field/changes.hpp"
#include "quantities.hpp"

namespace dutygauge::field {
namespace {

constexpr double together = 2.0;        // days within which changes are one event
constexpr double logged_nearby = 3.0;   // days between what was written down and what is seen
constexpr double located_nearby = 5.0;  // days between an event and a suspicion of a channel
constexpr double no_readings = 2.5;     // days between two used days that make an outage
constexpr double drift_floor = 0.015;   // change of the closure over the record that is a drift
constexpr double clear = 4.0;           // standard errors
constexpr int absent = 3;               // days in a row without a channel that make it absent

/// Below these a step says nothing.
double floor_of(Quantity quantity) {
  switch (quantity) {
    case Quantity::fouling:
      return 15e-6;
    case Quantity::closure:
      return 0.015;
    case Quantity::tube_drop:
    case Quantity::shell_drop:
      return 0.05;
    case Quantity::hot_flow:
    case Quantity::cold_flow:
      return 0.1;
    default:
      return 2.0;
  }
}

/// What came together.
struct Group {
  double from = 0, to = 0;
  std::map<Quantity, Step> steps = {};
  bool outage = false, outage_logged = false;
  double outage_at = 0;
  std::optional<double> cleaning_logged = {};
  std::optional<Channel> came_or_went = {};  ///< a channel that was absent before or after

  bool has(Quantity quantity) const { return steps.contains(quantity); }
  double jump(Quantity quantity) const {
    const auto found = steps.find(quantity);
    return found == steps.end() ? 0.0 : found->second.jump;
  }
  bool near(double day, double within) const { return day > from - within && day < to + within; }
};

/// A gap in the used days; of a record that ends before it begins again nothing is known.
std::vector<Logged> outages_seen(const Days& days) {
  std::vector<Logged> outages;
  for (std::size_t i = 1; i < days.size(); ++i)
    if (days[i].day - days[i - 1].day > no_readings)
      outages.push_back({days[i - 1].day + 0.5, days[i].day - 0.5, What::outage});
  return outages;
}

bool overlap(const Logged& a, const Logged& b, double within) {
  return a.from < b.to + within && b.from < a.to + within;
}

std::vector<Group> outage_groups(const Days& days, const std::vector<Logged>& logged) {
  std::vector<Group> groups;
  const auto seen = outages_seen(days);
  for (const Logged& outage : seen)
    groups.push_back({.from = outage.from, .to = outage.to, .outage = true, .outage_at = outage.from});
  for (const Logged& entry : logged) {
    if (entry.what != What::outage) continue;
    bool known = false;
    for (std::size_t i = 0; i < seen.size(); ++i)
      if (overlap(seen[i], entry, together)) {
        groups[i].outage_logged = known = true;
        groups[i].outage_at = entry.from;
        groups[i].from = std::min(groups[i].from, entry.from);
        groups[i].to = std::max(groups[i].to, entry.to);
      }
    if (!known)
      groups.push_back({.from = entry.from,
                        .to = entry.to,
                        .outage = true,
                        .outage_logged = true,
                        .outage_at = entry.from});
  }
  return groups;
}

Group& group_at(std::vector<Group>& groups, double day) {
  for (Group& group : groups)
    if (group.near(day, together)) return group;
  return groups.emplace_back(Group{.from = day, .to = day});
}

std::vector<Group> groups_of(const std::map<Quantity, Trend>& series, std::vector<Group> groups) {
  // The series that say most first: the others gather round them.
  for (const auto& [quantity, trend] : series)
    for (const Step& step : steps(trend, floor_of(quantity))) {
      Group& group = group_at(groups, step.at);
      group.steps.emplace(quantity, step);
      if (group.outage) continue;
      group.from = std::min(group.from, step.at);
      group.to = std::max(group.to, step.at);
    }
  return groups;
}

/// Where a channel goes missing for days, or comes back: the balance then infers something else.
void add_absences(std::vector<Group>& groups, const Days& days) {
  for (std::size_t channel = 0; channel <= index_of(Channel::cold_out); ++channel) {
    int run = absent;
    for (std::size_t i = 1; i < days.size(); ++i) {
      const bool here = std::isfinite(days[i].value[channel]);
      if (here == std::isfinite(days[i - 1].value[channel])) {
        ++run;
        continue;
      }
      const double at = 0.5 * (days[i - 1].day + days[i].day);
      for (Group& group : groups)
        if (run >= absent && group.near(at, together)) group.came_or_went = static_cast<Channel>(channel);
      run = 1;
    }
  }
}

/// When a group happened: where the series that says most jumps; an outage's end, as work shows then.
double time_of(const Group& group, Quantity quantity) {
  return group.outage ? group.to : group.steps.at(quantity).at;
}

/// The sensor that moved the closure: the one suspected, or the only reading that stepped.
std::optional<Channel> shifted_channel(const Group& group, const std::vector<Suspicion>& suspicions) {
  for (const Suspicion& suspicion : suspicions)
    if (suspicion.channels.size() == 1 && group.near(suspicion.since, located_nearby))
      return suspicion.channels.front();
  std::optional<Channel> only;
  for (const auto& [quantity, step] : group.steps) {
    if (quantity < Quantity::hot_flow) continue;
    if (only) return {};
    only = channel_of(quantity);
  }
  return only;
}

std::optional<Channel> load_channel(const Group& group) {
  for (const Quantity quantity :
       {Quantity::hot_flow, Quantity::cold_flow, Quantity::hot_in, Quantity::cold_in})
    if (group.has(quantity)) return channel_of(quantity);
  return {};
}

bool load_changed(const Group& group) {
  return group.has(Quantity::hot_flow) || group.has(Quantity::cold_flow) || group.has(Quantity::hot_in) ||
         group.has(Quantity::cold_in);
}

bool drop_fell(const Group& group) {
  return group.jump(Quantity::tube_drop) < 0.0 || group.jump(Quantity::shell_drop) < 0.0;
}

/// What a step up of the fouling was: the drops tell.
What cause_of_rise(const Group& group) {
  const double tube = group.jump(Quantity::tube_drop), shell = group.jump(Quantity::shell_drop);
  if (tube > 0.0) return group.outage ? What::plugging : What::blockage;
  if (tube < 0.0) return What::leak;
  if (shell < 0.0) return What::bypass;
  if (shell > 0.0) return What::blockage;
  return load_changed(group) ? What::load_change : What::unexplained;
}

Event event_of(const Group& group, Quantity quantity, What what, std::optional<Channel> channel = {}) {
  Event event{.at = time_of(group, quantity), .what = what, .channel = channel};
  if (group.has(Quantity::fouling)) event.fouling = group.jump(Quantity::fouling);
  if (group.has(Quantity::closure)) event.closure = group.jump(Quantity::closure);
  return event;
}

/// Which event a step of the closure was. A meter that shifts steps alone with the drop over its
/// flow; where two or more of flows and inlets moved, a constant error showed through a new load.
Event closure_event(const Group& group, const std::vector<Suspicion>& suspicions) {
  Event event = event_of(group, Quantity::closure, What::sensor_shift);
  event.channel = shifted_channel(group, suspicions);
  if (!event.channel && load_changed(group)) {
    event.what = What::load_change;
    event.channel = load_channel(group);
  }
  return event;
}

std::optional<Event> fouling_event(const Group& group) {
  if (!group.has(Quantity::fouling)) return {};
  if (group.came_or_went && !group.cleaning_logged) {
    Event event = event_of(group, Quantity::fouling, What::sensor_shift);
    event.channel = group.came_or_went;
    return event;
  }
  const bool closure = group.has(Quantity::closure);
  if (group.jump(Quantity::fouling) < 0.0) {
    // A sensor touched at an outage also lowers the fouling seen: without a drop that fell and
    // without a word in the log that is no cleaning.
    if (closure && !drop_fell(group) && !group.cleaning_logged) return {};
    if (load_changed(group) && !group.outage && !drop_fell(group) && !group.cleaning_logged)
      return event_of(group, Quantity::fouling, What::load_change, load_channel(group));
    return event_of(group, Quantity::fouling, What::cleaning);
  }
  if (closure) return {};
  Event event = event_of(group, Quantity::fouling, cause_of_rise(group));
  if (event.what == What::load_change) event.channel = load_channel(group);
  return event;
}

/// Steps of readings alone.
std::optional<Event> quiet_event(const Group& group) {
  for (const Quantity quantity :
       {Quantity::hot_flow, Quantity::cold_flow, Quantity::hot_in, Quantity::cold_in})
    if (group.has(quantity)) {
      Event event = event_of(group, quantity, What::load_change);
      event.channel = channel_of(quantity);
      return event;
    }
  for (const Quantity quantity : {Quantity::tube_drop, Quantity::shell_drop})
    if (group.has(quantity)) {
      Event event = event_of(group, quantity, What::sensor_shift);
      event.channel = channel_of(quantity);
      return event;
    }
  return {};
}

Events events_of_group(const Group& group, const std::vector<Suspicion>& suspicions) {
  Events events;
  if (group.outage)
    events.push_back({.at = group.outage_at, .what = What::outage, .logged = group.outage_logged});
  auto fouling = fouling_event(group);
  if (fouling && fouling->what == What::cleaning && group.cleaning_logged) {
    fouling->at = *group.cleaning_logged;
    fouling->logged = true;
  }
  if (!fouling && group.cleaning_logged)
    fouling = Event{.at = *group.cleaning_logged, .what = What::cleaning, .logged = true, .seen = false};
  if (fouling) events.push_back(*fouling);
  if (group.has(Quantity::closure)) events.push_back(closure_event(group, suspicions));
  // Readings step with every outage; on their own they are worth a word only in between.
  if (events.empty())
    if (const auto quiet = quiet_event(group)) events.push_back(*quiet);
  return events;
}

/// A common slope of the closure between its steps.
std::optional<Event> drift_of(const Trend& closure, const std::vector<Suspicion>& suspicions) {
  if (closure.size() < 30) return {};
  const auto breaks = steps(closure, floor_of(Quantity::closure));
  double weight = 0.0, slope = 0.0;
  Trend piece;
  std::size_t next = 0;
  const auto take = [&] {
    const auto line = fit(piece, LawKind::linear);
    piece.clear();
    if (!line || !(line->standard_error[1] > 0.0)) return;
    const double w = 1.0 / (line->standard_error[1] * line->standard_error[1]);
    weight += w;
    slope += w * line->law.rise;
  };
  for (const TrendPoint& point : closure) {
    if (next < breaks.size() && point.time > breaks[next].at) {
      take();
      ++next;
    }
    piece.push_back(point);
  }
  take();
  if (!(weight > 0.0)) return {};
  slope /= weight;
  const double change = slope * (closure.back().time - closure.front().time);
  if (std::abs(change) < drift_floor || std::abs(slope) * std::sqrt(weight) < clear) return {};
  Event event{.at = closure.front().time, .what = What::sensor_drift, .closure = change};
  for (const Suspicion& suspicion : suspicions)
    if (suspicion.channels.size() == 1 && suspicion.since - closure.front().time < located_nearby)
      event.channel = suspicion.channels.front();
  return event;
}

void add_cleanings(std::vector<Group>& groups, const std::vector<Logged>& logged) {
  for (const Logged& entry : logged) {
    if (entry.what != What::cleaning) continue;
    const double at = entry.to;
    const auto nearby =
        std::ranges::find_if(groups, [at](const Group& g) { return g.near(at, logged_nearby); });
    Group& group = nearby == groups.end() ? groups.emplace_back(Group{.from = at, .to = at}) : *nearby;
    group.cleaning_logged = at;
  }
}

/// What was written down and is of another kind: shown as written.
void add_others(Events& events, const std::vector<Logged>& logged) {
  for (const Logged& entry : logged) {
    if (entry.what == What::outage || entry.what == What::cleaning) continue;
    const auto same = [&entry](const Event& event) {
      return event.what == entry.what && event.at > entry.from - logged_nearby &&
             event.at < entry.to + logged_nearby;
    };
    const auto found = std::ranges::find_if(events, same);
    if (found != events.end())
      found->logged = true;
    else
      events.push_back({.at = entry.from, .what = entry.what, .logged = true, .seen = false});
  }
}

}  // namespace

std::string_view name_of(What what) {
  switch (what) {
    case What::cleaning:
      return "cleaning";
    case What::plugging:
      return "plugging";
    case What::blockage:
      return "blockage";
    case What::bypass:
      return "by-pass";
    case What::leak:
      return "leak";
    case What::sensor_shift:
      return "sensor shift";
    case What::sensor_drift:
      return "sensor drift";
    case What::load_change:
      return "load change";
    case What::outage:
      return "outage";
    case What::unexplained:
      return "unexplained step";
  }
  throw std::logic_error("field: an event without a name");
}

Events events_of(const Days& days, const DropLaws& laws, const std::vector<Logged>& logged,
                 const std::vector<Suspicion>& suspicions) {
  const auto series = series_of(days, laws);
  auto groups = groups_of(series, outage_groups(days, logged));
  add_cleanings(groups, logged);
  add_absences(groups, days);
  Events events;
  for (const Group& group : groups)
    for (const Event& event : events_of_group(group, suspicions)) events.push_back(event);
  if (const auto closure = series.find(Quantity::closure); closure != series.end())
    if (const auto drift = drift_of(closure->second, suspicions)) events.push_back(*drift);
  add_others(events, logged);
  std::ranges::stable_sort(events, {}, &Event::at);
  return events;
}

}  // namespace dutygauge::field
