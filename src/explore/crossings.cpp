#include <algorithm>
#include <cmath>
#include <limits>
#include <numeric>

#include "dutygauge/numerics.hpp"
#include "dutygauge/report.hpp"
#include "scan.hpp"

namespace dutygauge::explore {
namespace {

constexpr double rounding = 1e-9;
constexpr double fine = 1e-9;  // width of a crossing, relative to the pair it lies in
constexpr int most_halvings = 40;

bool holds(const Reading& reading, std::size_t condition) {
  return reading.room[condition] >= -rounding;
}

const Finding* remark(const Reading& reading, const std::string& id) {
  const auto found = std::ranges::find(reading.remarks, id, &Finding::id);
  return found == reading.remarks.end() ? nullptr : &*found;
}

/// Remarks that one reading has and the other has not.
std::vector<std::string> remarks_that_differ(const Reading& low, const Reading& high) {
  std::vector<std::string> ids;
  for (const auto* one : {&low, &high})
    for (const Finding& finding : one->remarks)
      if (!remark(low, finding.id) != !remark(high, finding.id) &&
          std::ranges::find(ids, finding.id) == ids.end())
        ids.push_back(finding.id);
  return ids;
}

}  // namespace

/// Halves the pair until it is narrow: `low` and `high` keep their different answers.
template <class Holds>
std::pair<Reading, Reading> Follower::narrowed(Reading low, Reading high, Holds&& holds_at) const {
  const double width = fine * std::abs(high.value - low.value);
  const bool at_low = holds_at(low);
  for (int i = 0; i < most_halvings && std::abs(high.value - low.value) > width; ++i) {
    if (dial_.is_whole && std::abs(high.value - low.value) <= 1.0) break;
    double middle = 0.5 * (low.value + high.value);
    if (dial_.is_whole) middle = std::floor(middle);
    Reading reading = at(middle);
    if (reading.unsettled) break;  // the pair stays as wide as it is known
    (holds_at(reading) == at_low ? low : high) = std::move(reading);
  }
  return {std::move(low), std::move(high)};
}

/// Where a condition with a room changes; both ends have a result. Whole numbers: the last that holds.
double Follower::crossing(std::size_t condition, const Reading& low, const Reading& high) const {
  const auto room = [&](double value) {
    const Reading reading = at(value);
    return reading.has_result() ? reading.room[condition] : std::numeric_limits<double>::quiet_NaN();
  };
  if (!dial_.is_whole)
    if (const auto root = numerics::find_root(room, {low.value, high.value}, fine * (high.value - low.value)))
      return *root;
  const auto [a, b] = narrowed(low, high, [condition](const Reading& reading) {
    return reading.has_result() && holds(reading, condition);
  });
  return a.has_result() && holds(a, condition) ? a.value : b.value;
}

/// Both have a result: which conditions and remarks differ.
void Follower::compare(const Reading& low, const Reading& high, std::vector<report::Limit>& found) const {
  for (std::size_t i = 0; i < conditions_.size(); ++i)
    if (holds(low, i) != holds(high, i))
      found.push_back({.name = conditions_[i].name,
                       .what = conditions_[i].what,
                       .value = crossing(i, low, high),
                       .fails_above = holds(low, i)});
  for (const std::string& id : remarks_that_differ(low, high)) {
    const auto without = [&id](const Reading& reading) {
      return !reading.has_result() || remark(reading, id) == nullptr;
    };
    const auto [a, b] = narrowed(low, high, without);
    const Reading& with = without(a) ? b : a;
    const Finding* finding = remark(with, id);
    found.push_back({.name = id,
                     .what = finding ? report::sentence(*finding, case_.display) : "",
                     .value = with.value,
                     .fails_above = without(a),
                     .stops = false});
  }
}

void Follower::between(const Reading& low, const Reading& high, std::vector<report::Limit>& found) const {
  if (low.has_result() && high.has_result()) return compare(low, high, found);
  if (!low.has_result() && !high.has_result()) return;
  // Up to the last value that has a result, everything else is compared as usual.
  const auto [a, b] = narrowed(low, high, [](const Reading& reading) { return reading.has_result(); });
  const Reading& end = a.has_result() ? a : b;
  const Reading& beyond = a.has_result() ? b : a;
  if (low.has_result())
    compare(low, end, found);
  else
    compare(end, high, found);
  found.push_back(
      {.name = beyond.stopper, .what = beyond.why, .value = end.value, .fails_above = low.has_result()});
}

std::vector<report::Limit> Follower::crossings(const std::vector<Reading>& readings) const {
  std::vector<report::Limit> found;
  for (std::size_t i = 0; i + 1 < readings.size(); ++i) between(readings[i], readings[i + 1], found);
  std::ranges::stable_sort(found, {}, &report::Limit::value);
  return found;
}

namespace {

/// A stretch between two neighbouring stops.
struct Stretch {
  double from, to;
  std::optional<report::Limit> below, above;
};

/// Stops of whole numbers are the last value that holds: the stretch begins or ends beside it.
std::vector<Stretch> stretches(const std::vector<report::Limit>& limits, double from, double to, bool whole) {
  std::vector<Stretch> all = {{from, to, {}, {}}};
  for (const auto& limit : limits) {
    if (!limit.stops) continue;
    all.back().to = limit.value - (whole && !limit.fails_above ? 1.0 : 0.0);
    all.back().above = limit;
    all.push_back({limit.value + (whole && limit.fails_above ? 1.0 : 0.0), to, limit, {}});
  }
  return all;
}

double distance_from(const Stretch& stretch, double own) {
  return std::max({stretch.from - own, own - stretch.to, 0.0});
}

}  // namespace

std::optional<report::Room> Follower::room(const std::vector<report::Limit>& limits, double from,
                                           double to) const {
  const double own = *dial_.own;
  auto all = stretches(limits, from, to, dial_.is_whole);
  std::erase_if(all, [&](const Stretch& one) {
    return dial_.is_whole ? one.to < one.from : one.to - one.from <= 10.0 * fine * (to - from);
  });
  std::ranges::stable_sort(all, {}, [own](const Stretch& one) { return distance_from(one, own); });
  for (const Stretch& one : all) {
    double probe = std::midpoint(one.from, one.to);
    if (dial_.is_whole) probe = std::floor(probe);
    const Reading reading = at(probe);
    if (reading.has_result() && broken(*this, reading).empty()) return report::Room{one.below, one.above};
  }
  return {};
}

}  // namespace dutygauge::explore
