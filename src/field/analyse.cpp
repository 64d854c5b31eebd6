#include <algorithm>
#include <cmath>
#include <stdexcept>

#include "dutygauge/field.hpp"
#include "dutygauge/field/mapping.hpp"
#include "shape_fit.hpp"

namespace dutygauge::field {
namespace {

constexpr double z95 = 2.0;  // as for all expanded uncertainties
// Share of the variance of the instruments' constant errors that is left in a difference: 1 - r, with r = 0.9
// at similar flows.
constexpr double left_of_constant = 0.1;
constexpr double near = 10.0;  // [d] that make the films of a day

double or_zero(const std::vector<double>& values) {
  return values.empty() ? 0.0 : median_of(values);
}

Trend fouling_of(const Days& days) {
  Trend trend;
  for (const Day& day : days)
    if (std::isfinite(day.apparent.fouling))
      trend.push_back({.time = day.day,
                       .value = day.apparent.fouling,
                       .sigma = day.apparent.fouling_random / std::sqrt(std::max(day.count, 1))});
  return trend;
}

double systematic_of(const Days& days) {
  std::vector<double> values;
  for (const Day& day : days)
    if (std::isfinite(day.apparent.fouling_systematic)) values.push_back(day.apparent.fouling_systematic);
  return or_zero(values);
}

/// Variance of the sum of the parameters, each times its part.
double variance(const Fit& fit, const std::array<double, 3>& part) {
  double sum = 0.0;
  for (std::size_t a = 0; a < 3; ++a)
    for (std::size_t b = 0; b < 3; ++b) sum += part[a] * part[b] * fit.covariance[a][b];
  return std::max(sum, 0.0);
}

/// Derivatives of something of a law with respect to its parameters.
template <class F>
std::array<double, 3> slopes_of(const Law& law, F&& something) {
  std::array<double, 3> slopes{};
  const std::array<double Law::*, 3> members = {&Law::r0, &Law::rise, &Law::shape};
  for (std::size_t i = 0; i < 3; ++i) {
    Law low = law, high = law;
    const double step = 1e-5 * std::max(std::abs(law.*members[i]), 1e-12);
    if (i == 2 && law.shape == 0.0) continue;
    low.*members[i] -= step;
    high.*members[i] += step;
    slopes[i] = (something(high) - something(low)) / (2.0 * step);
  }
  return slopes;
}

/// What the films' own error, a share of 1/u_clean, leaves in a change between two days: that share of what
/// 1/u_clean itself changed with flows and temperatures, or of its spread in between.
double film_in_change(const Days& days, const FoulingNow& now, double end, double film_uncertainty) {
  std::vector<double> all, first, last;
  for (const Day& day : days) {
    const double resistance = 1.0 / day.apparent.u_clean;
    if (!std::isfinite(resistance) || day.day < now.since || day.day > end) continue;
    all.push_back(resistance);
    if (day.day < now.since + near) first.push_back(resistance);
    if (day.day > end - near) last.push_back(resistance);
  }
  if (first.empty() || last.empty()) return film_uncertainty;
  const double middle = median_of(all);
  std::vector<double> distances;
  for (const double resistance : all) distances.push_back(std::abs(resistance - middle));
  const double moved = std::max(std::abs(median_of(last) - median_of(first)), 1.4826 * median_of(distances));
  return film_uncertainty * std::min(moved / middle, 1.0);
}

std::optional<FoulingNow> fouling_now(const Cycles& cycles, const Days& days, const Evidence& evidence) {
  if (cycles.empty() || !cycles.back().choice) return {};
  const Cycle& cycle = cycles.back();
  const double begin = cycle.points.front().time, end = cycle.points.back().time;
  FoulingNow now{.since = begin, .choice = *cycle.choice};
  const Fit& fit = now.choice.best();
  const Law& law = fit.law;
  const double level = variance(fit, slopes_of(law, [end](const Law& l) { return l.at(end); }));
  const double change = variance(fit, slopes_of(law, [=](const Law& l) { return l.at(end) - l.at(begin); }));
  const double rate = variance(fit, slopes_of(law, [end](const Law& l) { return l.rate_at(end); }));
  const double constant = std::pow(systematic_of(days), 2), film = evidence.film_uncertainty;
  now.now = law.at(end);
  now.u95_level =
      z95 * std::sqrt(level + (evidence.calibrated ? left_of_constant : 1.0) * constant + film * film);
  now.change = law.at(end) - law.at(begin);
  now.u95_change = z95 * std::sqrt(change + left_of_constant * constant +
                                   std::pow(film_in_change(days, now, end, film), 2));
  now.rate = law.rate_at(end);
  now.rate_low = now.rate - z95 * std::sqrt(rate);
  now.rate_high = now.rate + z95 * std::sqrt(rate);
  now.asymptote_known = asymptote_identified(fit, end - begin);
  if (evidence.plan.economics && evidence.plan.economics->duty_lost)
    now.duty_lost = evidence.plan.economics->duty_lost(std::max(now.now, 0.0));
  return now;
}

Decision no_decision(const std::string& why) {
  return {.advice = Advice::settle_first, .why = why};
}

/// A cleaning helps against a deposit, and against what sits in front of the tubes.
bool cleaning_helps(const std::vector<WeighedCause>& causes) {
  if (causes.empty() || causes.front().weight < 0.5) return true;
  const std::string& name = causes.front().name;
  return name.ends_with("deposit") || name == "none";
}

Decision decision_of(const Outcome& outcome, const Evidence& evidence,
                     const std::vector<WeighedCause>& causes) {
  if (!outcome.fouling) return no_decision("too few days are left to say how the fouling goes");
  if (!evidence.allowed) {
    if (outcome.fouling->choice.trend)
      return no_decision("no service is stated, so nothing says what fouling is too much");
    return {.advice = Advice::not_needed, .why = "nothing grows"};
  }
  if (!outcome.forecast) return no_decision("too few days since the last change for a forecast");
  Decision decision = decide(*outcome.forecast, evidence.plan);
  if (decision.advice == Advice::not_needed || cleaning_helps(causes)) return decision;
  decision.advice = Advice::settle_first;
  decision.why = causes.front().name + " is the most likely cause: a cleaning would not mend it";
  for (Option& option : decision.options) option.recommended = false;
  return decision;
}

Outcome outcome_of(const Hypothesis& hypothesis, const Evidence& evidence, const Events& events,
                   const std::vector<WeighedCause>& causes) {
  Outcome outcome{.name = hypothesis.name};
  const auto cycles = cycles_of(fouling_of(hypothesis.days), events);
  const double systematic = systematic_of(hypothesis.days);
  outcome.fouling = fouling_now(cycles, hypothesis.days, evidence);
  if (evidence.allowed) {
    // The films are in both the level and what is allowed, and cancel; the instruments do not.
    const double constant = systematic * std::sqrt(evidence.calibrated ? left_of_constant : 1.0);
    const Allowed allowed{evidence.allowed->fouling,
                          std::hypot(evidence.allowed->standard_uncertainty, constant)};
    outcome.forecast = forecast(cycles, allowed);
  }
  outcome.decision = decision_of(outcome, evidence, causes);
  return outcome;
}

std::vector<Suspicion> suspicions_of(const std::vector<Doubt>& suspects) {
  std::vector<Suspicion> suspicions;
  for (const Doubt& suspect : suspects) suspicions.push_back({suspect.channels, suspect.since});
  return suspicions;
}

bool is_of_instruments(const Event& event) {
  return event.what == What::sensor_drift || (event.what == What::sensor_shift && event.closure);
}

/// What happened: to the unit by the days used, to its instruments by the days as they were read.
Events all_events(const Events& used, const Evidence& evidence) {
  if (evidence.as_read.empty()) return used;
  Events events;
  for (const Event& event :
       events_of(evidence.as_read, evidence.drop_laws, evidence.logged, suspicions_of(evidence.suspects)))
    if (is_of_instruments(event)) events.push_back(event);
  for (const Event& event : used)
    if (event.what != What::sensor_shift && event.what != What::sensor_drift) events.push_back(event);
  std::ranges::stable_sort(events, {}, &Event::at);
  return events;
}

/// The advice of all hypotheses, where they agree; of the used one, where nothing is in doubt.
void conclude(FieldResult& result, bool faults_left_out) {
  const Decision& used = result.used().decision;
  result.advice = used.advice;
  result.why = used.why;
  const auto same = [&used](const Outcome& outcome) { return outcome.decision.advice == used.advice; };
  if (result.outcomes.size() > 1) result.same_either_way = std::ranges::all_of(result.outcomes, same);
  // Where the instruments at fault are named and left out the rest may be believed.
  const bool doubt =
      (result.closure.verdict == "does not close" && !faults_left_out) || result.outcomes.size() > 1;
  if (!doubt || result.same_either_way.value_or(false)) return;
  result.advice = Advice::settle_first;
  result.why = result.outcomes.size() > 1 ? "the advice depends on which instrument is right"
                                          : "the heat balance does not close";
}

}  // namespace

Closure closure_of(const Days& days) {
  std::vector<double> values, uncertainties, moves;
  for (const Day& day : days)
    if (std::isfinite(day.apparent.closure) && std::isfinite(day.apparent.closure_uncertainty)) {
      const double per_reading = std::sqrt(0.5 * std::max(day.count, 1));
      if (!values.empty()) moves.push_back(std::abs(day.apparent.closure - values.back()) * per_reading);
      values.push_back(day.apparent.closure);
      uncertainties.push_back(day.apparent.closure_uncertainty);
    }
  if (days.empty()) return {.verdict = "not tested: no day could be used"};
  if (values.empty()) return {.verdict = "not tested: a flow or a temperature is missing"};
  // A median of many days has lost the scatter of the readings; their constant errors stay.
  const double median = median_of(values), both = median_of(uncertainties), scatter = 1.4826 * or_zero(moves);
  const double u = std::sqrt(std::max(both * both - scatter * scatter, 0.25 * both * both));
  Closure closure{.median = median, .u95 = z95 * u};
  const double size = std::abs(median);
  closure.verdict = size <= u         ? "closes"
                    : size <= 2.0 * u ? "closes within uncertainty"
                    : size <= 3.0 * u ? "doubtful"
                                      : "does not close";
  return closure;
}

FieldResult analyse(const Evidence& evidence) {
  if (evidence.hypotheses.empty()) throw std::invalid_argument("field::analyse: no hypothesis");
  const Days& days = evidence.hypotheses.front().days;
  FieldResult result{.start = evidence.start + evidence.offset,
                     .rows = evidence.rows,
                     .closure = closure_of(evidence.as_read.empty() ? days : evidence.as_read),
                     .suspects = evidence.suspects,
                     .causes = evidence.causes,
                     .allowed = evidence.allowed,
                     .margins = evidence.margins,
                     .plan = evidence.plan,
                     .outcomes = {},
                     .days = days,
                     .ranges = evidence.ranges};
  std::ranges::stable_sort(result.causes, std::ranges::greater{}, &WeighedCause::weight);
  for (const Hypothesis& hypothesis : evidence.hypotheses) {
    // What stepped under one hypothesis may not have under another.
    const Events events =
        events_of(hypothesis.days, evidence.drop_laws, evidence.logged, suspicions_of(evidence.suspects));
    if (result.outcomes.empty()) result.events = all_events(events, evidence);
    result.outcomes.push_back(outcome_of(hypothesis, evidence, events, result.causes));
  }
  conclude(result, !evidence.as_read.empty());
  return result;
}

}  // namespace dutygauge::field
