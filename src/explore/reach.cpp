#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "scan.hpp"

namespace dutygauge::explore {
namespace {

using units::Kind;

constexpr double largest_factor = 5.0;   // beyond, it is another exchanger
constexpr double temperature_span = 60;  // either way [K]
constexpr int points_each_way = 40;
constexpr double rounding = 1e-9, worth_pulling = 1e-3;

std::vector<double> unique_and_rising(std::vector<double> values) {
  std::ranges::sort(values);
  values.erase(std::ranges::unique(values).begin(), values.end());
  return values;
}

/// Values looked at: the own one among them.
std::vector<double> values_to_try(const Dial& dial, const std::optional<Variation>& range) {
  const double own = *dial.own;
  std::vector<double> values = range ? range->values : std::vector<double>{};
  values.push_back(own);
  if (!range)
    for (int i = -points_each_way; i <= points_each_way; ++i) {
      const double share = static_cast<double>(i) / points_each_way;
      const double value = dial.kind == Kind::temperature ? own + temperature_span * share
                                                          : own * std::pow(largest_factor, share);
      if (i != 0) values.push_back(dial.is_whole ? std::round(value) : value);
    }
  return unique_and_rising(std::move(values));
}

std::optional<double> room_of(const Follower& follower, const std::string& name, const Reading& reading) {
  for (std::size_t i = 0; i < follower.conditions().size() && i < reading.room.size(); ++i)
    if (follower.conditions()[i].name == name) return reading.room[i];
  return {};
}

/// The lever that gives most room at the limit; empty where none gives any.
std::string relief(const case_io::Document& document, const Dial& pushed, const Follower& follower,
                   const report::Limit& limit) {
  const auto here = room_of(follower, limit.name, follower.at(limit.value));
  if (!here) return "";
  std::string best;
  double most = worth_pulling;
  for (const Pull& pull : pulls(turned(document, pushed, limit.value))) {
    if (pull.key == pushed.key) continue;
    Dial same = pushed;
    same.own = limit.value;
    const Follower pulled(pull.document, same);
    const auto there = room_of(pulled, limit.name, pulled.at(limit.value));
    if (!there || *there - *here <= most) continue;
    most = *there - *here;
    best = pull.what;
  }
  return best;
}

/// From the own value upwards, then downwards.
std::vector<report::Limit> in_order_met(std::vector<report::Limit> limits, double own) {
  std::ranges::stable_sort(limits, {}, [own](const report::Limit& limit) {
    return std::pair(limit.value < own, std::abs(limit.value - own));
  });
  return limits;
}

Inputs held(const case_io::Case& a_case, const Dial& pushed, const std::optional<Variation>& over) {
  Inputs all;
  for (const Input& input : a_case.inputs) {
    const bool stream = input.key.ends_with("_side.flow") || input.key.ends_with(".inlet.temperature") ||
                        input.key.ends_with("_side.fouling");
    if (stream && input.key != pushed.key && !(over && input.key == over->dial.key)) all.push_back(input);
  }
  return all;
}

report::ReachRow row_at(const case_io::Document& document, const Dial& pushed,
                        const std::vector<double>& values, const Variation& over, double value) {
  report::ReachRow row{.over = value, .room = {}, .no_room = {}};
  try {
    const case_io::Document changed = turned(document, over.dial, value);
    const Follower follower(changed, pushed);
    int unsettled = 0;
    const auto found = readings(follower, values, unsettled);
    if (found.empty()) {
      row.no_room = "the calculation does not settle";
      return row;
    }
    row.room = follower.room(follower.crossings(found), found.front().value, found.back().value);
    if (!row.room) {
      const auto words = broken(follower, follower.at(*pushed.own));
      row.no_room = words.empty() ? "no value in the range holds everything" : words.front();
    }
  } catch (const case_io::InputError& error) {
    row.no_room = fmt::format("{}: {}", error.mistakes().front().key, error.mistakes().front().what);
  }
  return row;
}

}  // namespace

report::Reach reach(const case_io::Document& document, const Dial& pushed,
                    const std::optional<Variation>& range, const std::optional<Variation>& over) {
  const auto values = values_to_try(pushed, range);
  const Follower follower(document, pushed);
  report::Reach result{.about = name_of(follower.base()),
                       .pushed = {pushed.key, pushed.kind, pushed.own},
                       .from = values.front(),
                       .to = values.back()};
  const double own = *pushed.own;
  const auto found = readings(follower, values, result.unsettled);
  const Reading here = follower.at(own);
  if (!here.unsettled) result.broken = broken(follower, here);
  if (!found.empty()) {
    auto limits = follower.crossings(found);
    result.room = follower.room(limits, found.front().value, found.back().value);
    for (report::Limit& limit : limits) limit.relieved_by = relief(document, pushed, follower, limit);
    result.limits = in_order_met(std::move(limits), own);
  }
  result.held = held(follower.base(), pushed, over);
  if (!over) return result;
  result.over = {over->dial.key, over->dial.kind, over->dial.own};
  for (const double value : over->values)
    result.map.push_back(row_at(document, pushed, values, *over, value));
  return result;
}

}  // namespace dutygauge::explore
