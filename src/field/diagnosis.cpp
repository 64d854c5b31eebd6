#include "dutygauge/field/diagnosis.hpp"

#include <fmt/core.h>

#include <algorithm>
#include <cmath>
#include <span>
#include <stdexcept>

#include "dutygauge/field/causes.hpp"
#include "dutygauge/field/suspects.hpp"

namespace dutygauge::field {
namespace {

constexpr std::size_t most_hypotheses = 3;
constexpr std::size_t week = 7;  // days that are compared

std::string said_of(const Fault& fault) {
  const auto name_of_channel = name(fault.channel);
  const char* rate = fault.drifts ? " a year" : "";
  const std::string size = fault.kind == FaultKind::bias ? fmt::format("{:+.1f} K{}", fault.magnitude, rate)
                           : fault.kind == FaultKind::gain
                               ? fmt::format("{:+.1f} %{}", 100.0 * fault.magnitude, rate)
                               : fmt::format("{:+.2g} kg/s at any flow{}", fault.magnitude, rate);
  return fmt::format("{} {} by {}", name_of_channel, fault.drifts ? "drifts" : "is off", size);
}

Doubt doubt_of(const Accusation& accusation) {
  Doubt doubt{.channels = {}, .since = accusation.since, .text = {}};
  const std::size_t count = std::max<std::size_t>(accusation.inseparable, 1);
  for (std::size_t i = 0; i < count && i < accusation.suspects.size(); ++i) {
    const Fault& fault = accusation.suspects[i].fault;
    doubt.channels.push_back(fault.channel);
    doubt.text += (i == 0 ? "" : ", or ") + said_of(fault);
  }
  if (count > 1) doubt.text += ": the readings do not say which";
  return doubt;
}

std::vector<Accusation> accusations_of(const Evidence& evidence, const Plant& plant,
                                       const Instruments& instruments) {
  const Days& days = evidence.hypotheses.front().days;
  std::vector<double> closure_steps;
  for (const Event& event : events_of(days, evidence.drop_laws, evidence.logged, {}))
    if (event.closure && event.what != What::sensor_drift) closure_steps.push_back(event.at);
  auto found = accuse(plant, instruments, days, closure_steps);
  std::erase_if(found, [](const Accusation& accusation) { return accusation.suspects.empty(); });
  return found;
}

/// The best suspect of each accusation; of one of them another.
std::vector<Fault> faults_of(const std::vector<Accusation>& accusations, std::size_t changed,
                             std::size_t suspect) {
  std::vector<Fault> faults;
  for (std::size_t i = 0; i < accusations.size(); ++i)
    faults.push_back(accusations[i].suspects[i == changed ? suspect : 0].fault);
  return faults;
}

std::string name_of(const std::vector<Fault>& faults) {
  std::string text;
  for (const Fault& fault : faults) text += (text.empty() ? "" : " and ") + std::string(name(fault.channel));
  return text + (faults.size() == 1 ? " is wrong" : " are wrong");
}

std::vector<Hypothesis> without(const std::vector<Accusation>& accusations, const Evidence& evidence,
                                const Plant& plant, const Instruments& instruments) {
  const Days& days = evidence.hypotheses.front().days;
  std::vector<Hypothesis> hypotheses;
  const auto add = [&](const std::vector<Fault>& faults) {
    Hypothesis hypothesis{name_of(faults), without_faults(plant, instruments, days, faults)};
    const auto same = [&](const Hypothesis& other) { return other.name == hypothesis.name; };
    if (hypotheses.size() < most_hypotheses && !hypothesis.days.empty() &&
        std::ranges::none_of(hypotheses, same))
      hypotheses.push_back(std::move(hypothesis));
  };
  add(faults_of(accusations, 0, 0));
  for (std::size_t i = 0; i < accusations.size(); ++i)
    for (std::size_t s = 1; s < std::min(accusations[i].inseparable, accusations[i].suspects.size()); ++s)
      add(faults_of(accusations, i, s));
  return hypotheses;
}

/// A balance that was off from the first day: the duty of either side may be right.
std::vector<Hypothesis> either_side(const Evidence& evidence, const Plant& plant,
                                    const Instruments& instruments) {
  const Days& days = evidence.hypotheses.front().days;
  const double first = days.front().day - 1.0;
  std::vector<Hypothesis> hypotheses;
  for (const Channel wrong : {Channel::hot_flow, Channel::cold_flow}) {
    const Fault fault{
        .channel = wrong, .kind = FaultKind::gain, .since = first, .magnitude = *closure_of(days).median};
    const char* name = wrong == Channel::hot_flow ? "the cold side is right" : "the hot side is right";
    hypotheses.push_back({name, without_faults(plant, instruments, days, std::span(&fault, 1))});
    // The meter its user doubts is the one to leave out first.
    if (instruments[index_of(wrong)].doubtful) std::swap(hypotheses.front(), hypotheses.back());
  }
  std::erase_if(hypotheses, [](const Hypothesis& hypothesis) { return hypothesis.days.empty(); });
  return hypotheses;
}

/// The days as read, with what is known to be wrong taken off by its magnitude: an outlet that is left out
/// and inferred would hide what it shows. The fouling is that of the hypothesis used.
Days to_rank(const Evidence& evidence, const std::vector<Fault>& faults) {
  const Days& used = evidence.hypotheses.front().days;
  if (evidence.as_read.empty() || faults.empty()) return used;
  Days days = evidence.as_read;
  for (Day& day : days) {
    for (const Fault& fault : faults)
      if (double& value = day.value[index_of(fault.channel)]; day.day > fault.since)
        value = truth_of(fault, value, day.day);
    const auto same = std::ranges::find(used, day.day, &Day::day);
    if (same != used.end()) day.apparent = same->apparent;
  }
  return days;
}

/// From the first week since the last cleaning to the last week. Where the fouling stepped up in between what
/// comes at once may be the cause, too.
std::vector<WeighedCause> rank(const Evidence& evidence, const Plant& plant, const Instruments& instruments,
                               const std::vector<Fault>& faults) {
  const Days days = to_rank(evidence, faults);
  double since = 0.0;
  Onset onset = Onset::gradual;
  for (const Event& event :
       events_of(evidence.hypotheses.front().days, evidence.drop_laws, evidence.logged, {})) {
    if (event.what == What::cleaning) {
      since = event.at;
      onset = Onset::gradual;
    } else if (event.fouling.value_or(0.0) > 0.0 && event.what != What::sensor_shift) {
      onset = Onset::sudden;
    }
  }
  const auto begin = std::ranges::find_if(days, [since](const Day& day) { return day.day > since; });
  const std::span<const Day> cycle(begin, days.end());
  if (cycle.size() < 3 * week) return {};
  const auto ranking = rank_over_days(plant, instruments, cycle.first(week), cycle.last(week), onset);
  std::vector<WeighedCause> causes;
  if (ranking)
    for (const NamedWeight& named : weights_of(*ranking, cycle.back().value))
      causes.push_back({named.name, named.weight});
  return causes;
}

}  // namespace

void diagnose(Evidence& evidence, const Plant& plant, const Instruments& instruments) {
  if (evidence.hypotheses.size() != 1) throw std::invalid_argument("field::diagnose: needs one hypothesis");
  if (evidence.hypotheses.front().days.empty()) return;
  const auto accusations = accusations_of(evidence, plant, instruments);
  for (const Accusation& accusation : accusations) evidence.suspects.push_back(doubt_of(accusation));
  auto hypotheses = !accusations.empty() ? without(accusations, evidence, plant, instruments)
                    : closure_of(evidence.hypotheses.front().days).verdict == "does not close"
                        ? either_side(evidence, plant, instruments)
                        : std::vector<Hypothesis>{};
  if (!hypotheses.empty()) {
    evidence.as_read = std::move(evidence.hypotheses.front().days);
    evidence.hypotheses = std::move(hypotheses);
  }
  evidence.causes = rank(evidence, plant, instruments, faults_of(accusations));
}

}  // namespace dutygauge::field
