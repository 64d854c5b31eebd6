#include "dutygauge/field/cycles.hpp"

#include <algorithm>
#include <cmath>

#include "shape_fit.hpp"

namespace dutygauge::field {
namespace {

constexpr std::size_t enough_points = 15;  // of a cycle that stands on its own
constexpr std::size_t levels = 5;          // days that make a level

/// What ends a cycle, or moves its level.
struct Break {
  double at = 0;
  double jump = 0;
  bool cleaning = false;
};

std::vector<Break> breaks_of(const Events& events) {
  std::vector<Break> breaks;
  for (const Event& event : events) {
    const bool cleaning = event.what == What::cleaning && (event.logged || event.seen);
    if (cleaning || (event.what != What::outage && event.fouling))
      breaks.push_back({event.at, event.fouling.value_or(0.0), cleaning});
  }
  std::ranges::stable_sort(breaks, {}, &Break::at);
  return breaks;
}

/// Where a cycle begins and ends, by its law where it has one.
double level_at(const Cycle& cycle, bool end) {
  const Trend& points = cycle.points;
  if (cycle.choice) return cycle.choice->best().law.at(end ? points.back().time : points.front().time);
  std::vector<double> values;
  const std::size_t count = std::min(levels, points.size());
  for (std::size_t i = 0; i < count; ++i) values.push_back(points[end ? points.size() - 1 - i : i].value);
  return median_of(values);
}

/// The cycle before, moved so that it begins with the present one and meets its level.
Trend borrowed(const Cycle& before, const Trend& present) {
  const double later = present.front().time - before.points.front().time;
  const Law& law = before.choice->best().law;
  std::vector<double> offsets;
  for (const TrendPoint& point : present) offsets.push_back(point.value - law.at(point.time - later));
  const double higher = median_of(offsets);
  Trend moved;
  for (TrendPoint point : before.points) {
    point.time += later;
    point.value += higher;
    moved.push_back(point);
  }
  return moved;
}

}  // namespace

Cycles cycles_of(const Trend& fouling, const Events& events) {
  Cycles cycles;
  const auto breaks = breaks_of(events);
  std::size_t next = 0;
  for (const TrendPoint& point : fouling) {
    if (cycles.empty()) cycles.emplace_back();
    for (; next < breaks.size() && point.time > breaks[next].at; ++next) {
      if (cycles.back().points.empty()) continue;
      if (breaks[next].cleaning) {
        cycles.emplace_back();
        continue;
      }
      cycles.back().lifts.push_back({breaks[next].at, breaks[next].jump});
      for (TrendPoint& before : cycles.back().points) before.value += breaks[next].jump;
    }
    cycles.back().points.push_back(point);
  }
  for (std::size_t i = 0; i < cycles.size(); ++i) {
    cycles[i].choice = choose_law(cycles[i].points);
    if (i == 0) continue;
    const double before = level_at(cycles[i - 1], true);
    if (before > 0.0) cycles[i].residue = level_at(cycles[i], false) / before;
  }
  return cycles;
}

std::optional<Forecast> forecast(const Cycles& cycles, const Allowed& allowed,
                                 const ForecastOptions& options) {
  if (cycles.empty()) return {};
  const Trend& present = cycles.back().points;
  const bool lean = present.size() < enough_points && cycles.size() > 1;
  const Cycle* before = lean ? &cycles[cycles.size() - 2] : nullptr;
  if (!before || !before->choice || before->points.size() < 2 * enough_points)
    return forecast(present, allowed, {options.courses, options.seed, cycles.back().lifts});
  auto result = forecast(borrowed(*before, present), allowed, options);
  if (!result) return {};
  result->as_of = present.back().time;
  result->lost_already = result->lost.middle && *result->lost.middle <= result->as_of;
  result->beyond_record = result->lost.middle && *result->lost.middle > result->as_of + result->record;
  return result;
}

}  // namespace dutygauge::field
