#include "day_book.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

namespace dutygauge::field {
namespace {

/// Of the finite ones; NaN without any.
double median_of(std::vector<double>& values) {
  std::erase_if(values, [](double value) { return !std::isfinite(value); });
  if (values.empty()) return std::numeric_limits<double>::quiet_NaN();
  const auto middle = values.begin() + static_cast<std::ptrdiff_t>(values.size() / 2);
  std::ranges::nth_element(values, middle);
  if (values.size() % 2 == 1) return *middle;
  return 0.5 * (*middle + *std::max_element(values.begin(), middle));
}

constexpr double Apparent::*members[] = {&Apparent::hot_duty,
                                         &Apparent::cold_duty,
                                         &Apparent::duty,
                                         &Apparent::closure,
                                         &Apparent::closure_uncertainty,
                                         &Apparent::u,
                                         &Apparent::u_clean,
                                         &Apparent::fouling,
                                         &Apparent::fouling_random,
                                         &Apparent::fouling_systematic,
                                         &Apparent::noise_amplification};
static_assert(sizeof(Apparent) == std::size(members) * sizeof(double));

}  // namespace

void DayBook::add(const Reading& reading, const Apparent& apparent) {
  constexpr std::int64_t length = 86400;
  const std::int64_t day = (reading.time - start_) / length;
  if (day != day_) close();
  day_ = day;
  if (seen_++ % stride_ != 0) return;
  if (used_.size() == most) {
    std::size_t kept = 0;
    for (std::size_t i = 0; i < used_.size(); i += 2) used_[kept++] = used_[i];
    used_.resize(kept);
    stride_ *= 2;
    if ((seen_ - 1) % stride_ != 0) return;
  }
  used_.push_back({reading.value, apparent});
}

void DayBook::close() {
  if (!used_.empty()) {
    Day day{.day = static_cast<double>(day_) + 0.5, .count = static_cast<int>(seen_)};
    std::vector<double> values;
    const auto median = [&](auto&& take) {
      values.clear();
      for (const Used& used : used_) values.push_back(take(used));
      return median_of(values);
    };
    for (std::size_t c = 0; c < channel_count; ++c)
      day.value[c] = median([c](const Used& used) { return used.value[c]; });
    for (const auto member : members)
      day.apparent.*member = median([member](const Used& used) { return used.apparent.*member; });
    days_.push_back(day);
  }
  used_.clear();
  stride_ = 1;
  seen_ = 0;
}

}  // namespace dutygauge::field
