#include "sample.hpp"

#include "anchoring.hpp"

namespace dutygauge::uncertainty {
namespace {

/// What stands between two figures of one kind; 1 where there is nothing to relate.
double ratio(double value, double reference) {
  return reference == 0.0 ? 1.0 : value / reference;
}

double carried_outlet(double outlet, double inlet, const rating::Stream& stream, double by_means,
                      double nominal) {
  const double as_shown = ratio(nominal - stream.inlet_temperature, by_means - stream.inlet_temperature);
  return inlet + (outlet - inlet) * as_shown;
}

/// A sample's deviation from the rating by means, put on the outcome as shown.
rating::Outcome carried(const Question& question, const Sample& mean, Sample sample) {
  const rating::Outcome &nominal = question.nominal, &by_means = mean.outcome;
  const rating::Problem& base = question.problem;
  rating::Outcome& outcome = sample.outcome;
  outcome.duty *= ratio(nominal.duty, by_means.duty);
  outcome.shell_outlet = carried_outlet(outcome.shell_outlet, sample.problem.shell_side.inlet_temperature,
                                        base.shell_side, by_means.shell_outlet, nominal.shell_outlet);
  outcome.tube_outlet = carried_outlet(outcome.tube_outlet, sample.problem.tube_side.inlet_temperature,
                                       base.tube_side, by_means.tube_outlet, nominal.tube_outlet);
  outcome.shell_drop =
      outcome.shell_drop.times(ratio(nominal.shell_drop.total(), by_means.shell_drop.total()));
  outcome.tube_drop = outcome.tube_drop.times(ratio(nominal.tube_drop.total(), by_means.tube_drop.total()));
  return std::move(outcome);
}

bool is_of_reading(const Source& source) {
  return source.varied == Varied::read_flow || source.varied == Varied::read_inlet ||
         source.varied == Varied::read_outlet;
}

/// The unit's problem at deviates of its sources, tied to what the reading would then say.
/// What is wrong in one case alone, and a film away from the reading, is not in the tie.
std::optional<rating::Problem> tied(const Question& question, std::span<const double> deviates) {
  rating::Problem problem = question.problem;
  rating::Problem there = question.anchor->at_reading;
  SteadyReading reading = question.anchor->reading;
  double more = 0.0;  // of a fouling that was given
  for (std::size_t i = 0; i < deviates.size(); ++i) {
    const Source& source = question.sources[i];
    if (source.varied == Varied::found_fouling) {
      more += drawn(source, deviates[i]);
      continue;
    }
    if (is_of_reading(source)) {
      apply(source, deviates[i], reading);
      continue;
    }
    apply(source, deviates[i], problem);
    if (source.common && source.varied != Varied::film_with_flow) apply(source, deviates[i], there);
  }
  const auto duties = duties_of(there, reading, question.anchor->shell_weight);
  // Within its error a small change of temperature may have been none: then no resistance explains it.
  if (!(duties.weighted > 0.0)) return {};
  there = at_reading(std::move(there), reading, duties);
  there.methods.solution = rating::Solution::mean;
  const auto needed = rating::needed_for(there, duties.weighted).value;
  if (!needed) return {};
  return with_resistance(std::move(problem), question.problem, needed->fouling_spare + more);
}

std::optional<Sample> sample_of(const Question& question, std::span<const double> deviates) {
  std::optional<rating::Problem> problem;
  if (question.anchor)
    problem = tied(question, deviates);
  else {
    problem = question.problem;
    for (std::size_t i = 0; i < deviates.size(); ++i) apply(question.sources[i], deviates[i], *problem);
  }
  if (!problem) return {};
  auto rated = rating::rate_mean(*problem);
  if (!rated.outcome) return {};
  return Sample{std::move(*problem), std::move(*rated.outcome)};
}

}  // namespace

std::optional<Sample> nominal_by_means(const Question& question) {
  return sample_of(question, {});
}

std::optional<rating::Outcome> shown_sample(const Question& question, const Sample& by_means,
                                            std::span<const double> deviates) {
  auto sample = sample_of(question, deviates.first(question.sources.size()));
  if (!sample) return {};
  auto outcome = carried(question, by_means, std::move(*sample));
  for (std::size_t i = 0; i < question.swings.size(); ++i)
    apply(question.swings[i], deviates[question.sources.size() + i], outcome);
  return outcome;
}

}  // namespace dutygauge::uncertainty
