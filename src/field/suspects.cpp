#include "dutygauge/field/suspects.hpp"

#include <algorithm>
#include <cmath>
#include <functional>
#include <limits>

#include "balance.hpp"
#include "regression.hpp"

namespace dutygauge::field {
namespace {

constexpr double nothing = std::numeric_limits<double>::quiet_NaN();
constexpr double year = 365.0;         // [d]
constexpr double window = 20.0;        // days looked at on each side of a step
constexpr double refined = 5.0;        // days a step's date may be moved
constexpr double no_different = 3.84;  // chi-square of one degree of freedom, 5 %
constexpr double least_change = 0.01, errors_clear = 4.0;

bool is_flow(Channel channel) {
  return channel == Channel::hot_flow || channel == Channel::cold_flow;
}

/// Kinds of fault a channel may have.
std::vector<FaultKind> kinds_of(Channel channel) {
  if (is_flow(channel)) return {FaultKind::gain, FaultKind::zero};
  return {FaultKind::bias};
}

/// Instruments as the median of a day has them.
Instruments of_a_day(Instruments instruments, int readings) {
  for (Instrument& i : instruments) i.random *= std::sqrt(1.57 / std::max(1, readings));
  return instruments;
}

std::optional<Apparent> apparent_of(const Plant& plant, const Instruments& instruments, const Day& day) {
  return apparent(plant, of_a_day(instruments, day.count), day.value);
}

/// Change of ln(hot/cold duty) with one unit of a fault on a day.
std::optional<double> effect(const Plant& plant, const Day& day, Channel channel, FaultKind kind) {
  const auto balance = balance_of(plant, day.value);
  if (!balance || balance->missing) return {};
  const double slope = gradient_of_closure(*balance).channel[index_of(channel)];
  return kind == FaultKind::gain ? slope * day.value[index_of(channel)] : slope;
}

/// Rows of a regression with their values.
struct Course {
  std::vector<std::vector<double>> rows;
  std::vector<double> y;
  void add(std::vector<double> row, double value) {
    if (!std::isfinite(value) || !std::ranges::all_of(row, [](double x) { return std::isfinite(x); })) return;
    rows.push_back(std::move(row));
    y.push_back(value);
  }
  std::optional<Regression> fit(Outliers outliers) const { return regress(rows, y, outliers); }
};

/// A step of a daily quantity at `at`, the same slope on both sides.
struct Jump {
  double value = 0, standard_error = 0, loss = 0, effective = 0;
};

std::optional<Jump> jump_of(const Days& days, double at, Outliers outliers,
                            const std::function<double(const Day&)>& quantity) {
  constexpr int fewest = 6;
  Course course;
  int before = 0, after = 0;
  for (const Day& day : days) {
    if (std::abs(day.day - at) > window) continue;
    const std::size_t had = course.y.size();
    course.add({1.0, day.day - at, day.day >= at ? 1.0 : 0.0}, quantity(day));
    if (course.y.size() > had) (day.day >= at ? after : before) += 1;
  }
  if (before < fewest || after < fewest) return {};
  const auto fit = course.fit(outliers);
  if (!fit) return {};
  return Jump{fit->coefficient[2], fit->standard_error[2], fit->loss, fit->effective};
}

/// The day [d] near which the closure steps most clearly: between two days.
double refine(const Days& days, double near) {
  double best = near, least = HUGE_VAL;
  for (const Day& day : days) {
    if (std::abs(day.day - near) > refined) continue;
    const double at = day.day - 0.5;
    const auto jump = jump_of(days, at, Outliers::kept, [](const Day& d) { return d.apparent.closure; });
    if (jump && jump->loss < least) best = at, least = jump->loss;
  }
  return best;
}

/// ln(drop/flow^n) of a flow's own side.
double drop_at_flow(const Plant& plant, const Day& day, Channel flow) {
  const bool in_shell = plant.prepared.shell_side_is_hot() == (flow == Channel::hot_flow);
  const double drop = day.value[index_of(in_shell ? Channel::shell_dp : Channel::tube_dp)];
  return std::log(drop) - drop_exponent(plant, flow) * std::log(day.value[index_of(flow)]);
}

/// Days with a channel left out: their fouling. NaN where nothing is left.
double fouling_without(const Plant& plant, const Instruments& instruments, Day day, Channel channel) {
  day.value[index_of(channel)] = nothing;
  const auto a = apparent_of(plant, instruments, day);
  return a ? a->fouling : nothing;
}

/// What a channel shows more than the balance of the others, as the fault's kind counts it.
double excess_of(const Plant& plant, const Instruments& instruments, const Day& day, Channel channel,
                 FaultKind kind) {
  const double reading = day.value[index_of(channel)];
  const auto others = inferred(plant, instruments, day.value, channel);
  if (!others) return nothing;
  return kind == FaultKind::gain ? reading / others->value - 1.0 : reading - others->value;
}

/// What a fault of unit kind does to ln(drop/flow^n) of a flow's side, in small.
double on_drop(const Plant& plant, const Days& days, const Fault& fault, Channel flow) {
  if (fault.channel != flow) return 0.0;
  double relative = fault.magnitude;
  if (fault.kind == FaultKind::zero) {
    double sum = 0.0, count = 0.0;
    for (const Day& day : days) {
      const double reading = day.value[index_of(flow)];
      if (reading > 0.0) sum += 1.0 / reading, count += 1.0;
    }
    relative *= count > 0.0 ? sum / count : 0.0;
  }
  return -drop_exponent(plant, flow) * std::log1p(std::max(relative, -0.9));
}

/// A change of ln(drop/flow^n), by side, as far as it is known.
struct DropChange {
  Channel flow;
  double value, standard_error;
};

double against_drops(const Plant& plant, const Days& days, const Fault& fault,
                     const std::vector<DropChange>& changes) {
  double sum = 0.0;
  for (const DropChange& change : changes)
    sum += std::pow((change.value - on_drop(plant, days, fault, change.flow)) / change.standard_error, 2);
  return sum;
}

/// A fault and how well the closure's course and the rest go with it.
struct Trial {
  Suspect suspect;
  double closure_loss = HUGE_VAL, closure_effective = 0;
};

/// Chi-squares above the best of each kind, the best suspect first.
void compare(std::vector<Trial>& trials, Accusation& accusation) {
  double closure = HUGE_VAL, fouling = HUGE_VAL, drop = HUGE_VAL;
  for (const Trial& t : trials) {
    closure = std::min(closure, t.closure_loss);
    fouling = std::min(fouling, t.suspect.against_fouling);
    drop = std::min(drop, t.suspect.against_drop);
  }
  accusation.fouling_steps_too = fouling > errors_clear * errors_clear;
  for (Trial& t : trials) {
    Suspect& s = t.suspect;
    s.against_closure = closure > 0.0 ? t.closure_effective * (t.closure_loss / closure - 1.0) : 0.0;
    s.against_fouling = accusation.fouling_steps_too ? 0.0 : s.against_fouling - fouling;
    s.against_drop -= drop;
  }
  std::ranges::stable_sort(trials, {}, [](const Trial& t) { return t.suspect.chi_square(); });
  for (const Trial& t : trials) {
    const bool known = std::ranges::any_of(
        accusation.suspects, [&](const Suspect& s) { return s.fault.channel == t.suspect.fault.channel; });
    if (!known) accusation.suspects.push_back(t.suspect);
  }
  for (const Suspect& s : accusation.suspects)
    if (s.chi_square() <= accusation.suspects.front().chi_square() + no_different) ++accusation.inseparable;
}

/// Every channel of the balance with every kind of fault it may have.
std::vector<Fault> all_faults(bool drifts, double since) {
  std::vector<Fault> faults;
  for (std::size_t i = 0; i < balance_channels; ++i)
    for (const FaultKind kind : kinds_of(static_cast<Channel>(i)))
      faults.push_back({.channel = static_cast<Channel>(i), .kind = kind, .drifts = drifts, .since = since});
  return faults;
}

double typical_resistance(const Days& days) {
  std::vector<double> resistance;
  for (const Day& day : days)
    if (day.apparent.u > 0.0) resistance.push_back(1.0 / day.apparent.u);
  if (resistance.empty()) return 0.0;
  const auto middle = resistance.begin() + static_cast<std::ptrdiff_t>(resistance.size() / 2);
  std::ranges::nth_element(resistance, middle);
  return *middle;
}

std::optional<Trial> try_step(const Plant& plant, const Instruments& instruments, const Days& days,
                              const Fault& fault, const std::vector<DropChange>& drops) {
  Trial trial;
  Suspect& s = trial.suspect;
  s.fault = fault;
  const auto size = jump_of(days, fault.since, Outliers::left_out, [&](const Day& day) {
    return excess_of(plant, instruments, day, fault.channel, fault.kind);
  });
  const auto fouling = jump_of(days, fault.since, Outliers::left_out, [&](const Day& day) {
    return fouling_without(plant, instruments, day, fault.channel);
  });
  if (!size || !fouling) return {};
  s.fault.magnitude = size->value;
  s.fault.standard_uncertainty = size->standard_error;
  s.fouling_step = fouling->value;
  // Films and straight lines are good for a hundredth of the whole resistance.
  s.against_fouling =
      std::pow(fouling->value / std::hypot(fouling->standard_error, 0.01 * typical_resistance(days)), 2);
  s.against_drop = against_drops(plant, days, s.fault, drops);
  Course closure;
  for (const Day& day : days) {
    if (std::abs(day.day - fault.since) > window) continue;
    const auto unit = effect(plant, day, fault.channel, fault.kind);
    closure.add({1.0, day.day - fault.since, day.day >= fault.since ? unit.value_or(nothing) : 0.0},
                day.apparent.closure);
  }
  const auto fit = closure.fit(Outliers::kept);
  if (!fit) return {};
  trial.closure_loss = fit->loss, trial.closure_effective = fit->effective;
  return trial;
}

/// The record with what is known taken off by its magnitude.
Days corrected_by_magnitude(const Plant& plant, const Instruments& instruments, const Days& days,
                            std::span<const Fault> known) {
  Days result;
  for (Day day : days) {
    for (const Fault& fault : known) {
      double& reading = day.value[index_of(fault.channel)];
      if (day.day >= fault.since) reading = truth_of(fault, reading, day.day);
    }
    if (const auto a = apparent_of(plant, instruments, day)) {
      day.apparent = *a;
      result.push_back(day);
    }
  }
  return result;
}

/// Beside what is regressed: one, and an offset from each known fault on, whose magnitude is
/// not known to the last digit.
std::vector<double> with_offsets(const Day& day, std::span<const Fault> known) {
  std::vector<double> row = {1.0};
  for (const Fault& fault : known) row.push_back(day.day >= fault.since ? 1.0 : 0.0);
  return row;
}

/// Drift of ln(drop/flow^n) in 365 days that does not go with the fouling.
std::optional<DropChange> drop_drift(const Plant& plant, const Days& days, Channel flow) {
  const double scale = typical_resistance(days);
  Course course;
  for (const Day& day : days) {
    const double deposit = day.apparent.fouling / scale;
    course.add({1.0, day.day / year, deposit, deposit * deposit}, drop_at_flow(plant, day, flow));
  }
  const auto fit = course.fit(Outliers::left_out);
  if (!fit) return {};
  return DropChange{flow, fit->coefficient[1], std::hypot(fit->standard_error[1], 0.02)};
}

std::optional<Trial> try_drift(const Plant& plant, const Days& days, std::span<const Fault> known,
                               Fault fault, const std::vector<DropChange>& drops) {
  Course course;
  for (const Day& day : days) {
    const auto unit = effect(plant, day, fault.channel, fault.kind);
    std::vector<double> row = with_offsets(day, known);
    row.push_back(unit.value_or(nothing) * (day.day - fault.since) / year);
    course.add(std::move(row), day.apparent.closure);
  }
  const auto fit = course.fit(Outliers::kept);
  if (!fit) return {};
  fault.magnitude = fit->coefficient.back();
  fault.standard_uncertainty = fit->standard_error.back();
  Trial trial;
  trial.suspect.fault = fault;
  trial.closure_loss = fit->loss, trial.closure_effective = fit->effective;
  trial.suspect.against_drop = against_drops(plant, days, fault, drops);
  return trial;
}

}  // namespace

double truth_of(const Fault& fault, double reading, double day) {
  const double error = fault.drifts ? fault.magnitude * (day - fault.since) / year : fault.magnitude;
  return fault.kind == FaultKind::gain ? reading / (1.0 + error) : reading - error;
}

std::optional<Accusation> accuse_step(const Plant& plant, const Instruments& instruments, const Days& days,
                                      double near) {
  Accusation accusation;
  accusation.since = refine(days, near);
  const auto closure = jump_of(days, accusation.since, Outliers::left_out,
                               [](const Day& day) { return day.apparent.closure; });
  if (!closure || !(std::abs(closure->value) > least_change) ||
      !(std::abs(closure->value) > errors_clear * closure->standard_error))
    return {};
  accusation.closure_change = closure->value;
  accusation.standard_error = closure->standard_error;
  std::vector<DropChange> drops;
  for (const Channel flow : {Channel::hot_flow, Channel::cold_flow})
    if (const auto jump = jump_of(days, accusation.since, Outliers::left_out,
                                  [&](const Day& day) { return drop_at_flow(plant, day, flow); }))
      drops.push_back({flow, jump->value, std::hypot(jump->standard_error, 0.01)});
  std::vector<Trial> trials;
  for (const Fault& fault : all_faults(false, accusation.since))
    if (auto trial = try_step(plant, instruments, days, fault, drops)) trials.push_back(*trial);
  if (trials.empty()) return {};
  compare(trials, accusation);
  return accusation;
}

std::optional<Accusation> accuse_drift(const Plant& plant, const Instruments& instruments, const Days& days,
                                       std::span<const Fault> known) {
  const Days corrected = corrected_by_magnitude(plant, instruments, days, known);
  if (corrected.empty()) return {};
  Accusation accusation;
  accusation.drifts = true;
  accusation.since = corrected.front().day;
  Course course;
  for (const Day& day : corrected) {
    std::vector<double> row = with_offsets(day, known);
    row.push_back((day.day - accusation.since) / year);
    course.add(std::move(row), day.apparent.closure);
  }
  const auto fit = course.fit(Outliers::kept);
  if (!fit) return {};
  accusation.closure_change = fit->coefficient.back();
  accusation.standard_error = fit->standard_error.back();
  const double over_record = accusation.closure_change * (corrected.back().day - accusation.since) / year;
  if (!(std::abs(over_record) > least_change) ||
      !(std::abs(accusation.closure_change) > errors_clear * accusation.standard_error))
    return {};
  std::vector<DropChange> drops;
  for (const Channel flow : {Channel::hot_flow, Channel::cold_flow})
    if (const auto drift = drop_drift(plant, corrected, flow)) drops.push_back(*drift);
  std::vector<Trial> trials;
  for (const Fault& fault : all_faults(true, accusation.since))
    if (auto trial = try_drift(plant, corrected, known, fault, drops)) trials.push_back(*trial);
  if (trials.empty()) return {};
  compare(trials, accusation);
  return accusation;
}

std::vector<Accusation> accuse(const Plant& plant, const Instruments& instruments, const Days& days,
                               std::span<const double> closure_steps) {
  std::vector<double> dates(closure_steps.begin(), closure_steps.end());
  std::ranges::sort(dates);
  std::vector<Accusation> accusations;
  for (const double near : dates) {
    auto step = accuse_step(plant, instruments, days, near);
    const bool again = step && !accusations.empty() && step->since - accusations.back().since < refined;
    if (step && !again) accusations.push_back(std::move(*step));
  }
  const std::vector<Fault> known = faults_of(accusations);
  if (auto drift = accuse_drift(plant, instruments, days, known)) accusations.push_back(std::move(*drift));
  return accusations;
}

std::vector<Fault> faults_of(std::span<const Accusation> accusations) {
  std::vector<Fault> faults;
  for (const Accusation& accusation : accusations) faults.push_back(accusation.suspects.front().fault);
  return faults;
}

Channels without_faults(const Channels& reading, double day, std::span<const Fault> faults) {
  Channels result = reading;
  for (const Fault& fault : faults) {
    if (day < fault.since) continue;
    double& value = result[index_of(fault.channel)];
    const bool all_there = std::all_of(result.begin(), result.begin() + balance_channels,
                                       [](double x) { return !std::isnan(x); });
    value = all_there ? nothing : truth_of(fault, value, day);
  }
  return result;
}

Days without_faults(const Plant& plant, const Instruments& instruments, const Days& days,
                    std::span<const Fault> faults) {
  Days result;
  for (Day day : days) {
    day.value = without_faults(day.value, day.day, faults);
    if (const auto a = apparent_of(plant, instruments, day)) {
      day.apparent = *a;
      result.push_back(day);
    }
  }
  return result;
}

}  // namespace dutygauge::field
