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

/// The greatest rise of the fouling that came at once since the last cleaning.
struct Rise {
  double since = 0;  ///< begin of the cycle [d]
  std::optional<Event> at_once{};
};

Rise rise_of(const Events& events) {
  Rise rise;
  for (const Event& event : events) {
    if (event.what == What::cleaning) rise = {.since = event.at};
    if (event.what == What::cleaning || event.what == What::sensor_shift) continue;
    const double more = event.fouling.value_or(0.0);
    if (more > 0.0 && (!rise.at_once || more > *rise.at_once->fouling)) rise.at_once = event;
  }
  return rise;
}

std::vector<WeighedCause> rank_between(const Plant& plant, const Instruments& instruments,
                                       std::span<const Day> before, std::span<const Day> after, Onset onset) {
  const auto ranking = rank_over_days(plant, instruments, before, after, onset);
  std::vector<WeighedCause> causes;
  if (ranking)
    for (const NamedWeight& named : weights_of(*ranking, after.back().value))
      causes.push_back({named.name, named.weight});
  return causes;
}

/// Both lists in one, each weight times the list's share; the greatest first.
std::vector<WeighedCause> mixed(const std::vector<WeighedCause>& first, double share,
                                const std::vector<WeighedCause>& second) {
  std::vector<WeighedCause> all;
  const auto add = [&all](const std::vector<WeighedCause>& list, double part) {
    for (const WeighedCause& cause : list) {
      const auto same = std::ranges::find(all, cause.name, &WeighedCause::name);
      if (same == all.end())
        all.push_back({cause.name, part * cause.weight});
      else
        same->weight += part * cause.weight;
    }
  };
  add(first, second.empty() ? 1.0 : share);
  add(second, first.empty() ? 1.0 : 1.0 - share);
  std::ranges::stable_sort(all, std::ranges::greater{}, &WeighedCause::weight);
  return all;
}

double median_fouling(std::span<const Day> days) {
  std::vector<double> values;
  for (const Day& day : days)
    if (std::isfinite(day.apparent.fouling)) values.push_back(day.apparent.fouling);
  if (values.empty()) return 0.0;
  const auto middle = values.begin() + static_cast<std::ptrdiff_t>(values.size() / 2);
  std::ranges::nth_element(values, middle);
  return *middle;
}

/// What grew over some days: from their first week to their last.
std::vector<WeighedCause> rank_growth(const Plant& plant, const Instruments& instruments,
                                      std::span<const Day> days) {
  if (days.size() < 3 * week) return {};
  return rank_between(plant, instruments, days.first(week), days.last(week), Onset::gradual);
}

/// Since the last cleaning. Where the fouling stepped up in between, what came at once and what grew are
/// ranked by themselves, and weighed by their parts of the whole rise.
std::vector<WeighedCause> rank(const Evidence& evidence, const Plant& plant, const Instruments& instruments,
                               const std::vector<Fault>& faults) {
  const Days days = to_rank(evidence, faults);
  const Rise rise =
      rise_of(events_of(evidence.hypotheses.front().days, evidence.drop_laws, evidence.logged, {}));
  const auto first_after = [&days](double at) {
    return std::ranges::find_if(days, [at](const Day& day) { return day.day > at; });
  };
  const std::span<const Day> cycle(first_after(rise.since), days.end());
  if (cycle.size() < 3 * week) return {};
  if (!rise.at_once) return rank_growth(plant, instruments, cycle);
  const std::span<const Day> after(first_after(rise.at_once->at), days.end());
  const std::span<const Day> before = cycle.first(cycle.size() - after.size());
  const auto growth = rank_growth(plant, instruments, before.size() > after.size() ? before : after);
  if (before.size() < week || after.size() < week) return growth;
  const auto step = rank_between(plant, instruments, before.last(week), after.first(week), Onset::sudden);
  const double whole = median_fouling(cycle.last(week)) - median_fouling(cycle.first(week));
  const double share = whole > 0.0 ? std::clamp(*rise.at_once->fouling / whole, 0.0, 1.0) : 1.0;
  return mixed(step, share, growth);
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
