#include <algorithm>
#include <array>
#include <cmath>

#include "dutygauge/field/screening.hpp"

namespace dutygauge::field {

void Thinned::add(double value) {
  if (to_skip_ > 0) {
    --to_skip_;
    return;
  }
  values_.push_back(value);
  if (values_.size() == most_) {
    std::size_t kept = 0;
    for (std::size_t i = 0; i < values_.size(); i += 2) values_[kept++] = values_[i];
    values_.resize(kept);
    stride_ *= 2;
  }
  to_skip_ = stride_ - 1;
}

double Thinned::median() const {
  if (values_.empty()) return 0.0;
  std::vector<double> sorted = values_;
  const auto middle = sorted.begin() + static_cast<std::ptrdiff_t>(sorted.size() / 2);
  std::ranges::nth_element(sorted, middle);
  return *middle;
}

Survey survey_of(Record& record, std::uint64_t most, const std::function<void(const Reading&)>& keep) {
  Survey survey;
  Thinned hot, cold, intervals;
  std::array<Thinned, 4> changes;
  constexpr std::array channels = {Channel::hot_flow, Channel::cold_flow, Channel::hot_in, Channel::cold_in};
  Reading reading, last;
  while (survey.rows < most && record.next(reading)) {
    if (survey.rows++ == 0)
      survey.start = reading.time;
    else
      intervals.add(static_cast<double>(reading.time - last.time));
    for (std::size_t i = 0; i < channels.size(); ++i) {
      const double now = reading.value[index_of(channels[i])], before = last.value[index_of(channels[i])];
      const double change = std::abs(now - before) / (is_flow(channels[i]) ? std::abs(before) : 1.0);
      if (survey.rows > 1 && std::isfinite(change)) changes[i].add(change);
    }
    last = reading;
    for (auto& [flows, channel] : {std::pair{&hot, Channel::hot_flow}, std::pair{&cold, Channel::cold_flow}})
      if (const double flow = reading.value[index_of(channel)]; flow > 0.0) flows->add(flow);
    if (keep) keep(reading);
  }
  survey.whole = survey.rows < most;
  survey.hot_flow = hot.median();
  survey.cold_flow = cold.median();
  survey.hot_flow_change = changes[0].median();
  survey.cold_flow_change = changes[1].median();
  survey.hot_in_change = changes[2].median();
  survey.cold_in_change = changes[3].median();
  survey.interval = intervals.median();
  return survey;
}

}  // namespace dutygauge::field
