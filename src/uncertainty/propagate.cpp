#include <algorithm>
#include <map>
#include <stdexcept>

#include "dutygauge/uncertainty.hpp"

namespace dutygauge::uncertainty {
namespace {

using Values = std::array<double, output_count>;

Values values_of(const rating::Outcome& outcome) {
  return {outcome.duty, outcome.shell_outlet, outcome.tube_outlet, outcome.shell_drop.total(),
          outcome.tube_drop.total()};
}

/// One question with its rating by mean properties, which its samples deviate from.
struct Asked {
  const Question* question;
  rating::Outcome by_means;
  std::vector<std::size_t> inputs;  ///< by source: which of all deviates is its own
};

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
rating::Outcome carried(const Asked& asked, const rating::Problem& problem, rating::Outcome sample) {
  const rating::Outcome &nominal = asked.question->nominal, &by_means = asked.by_means;
  const rating::Problem& base = asked.question->problem;
  sample.duty *= ratio(nominal.duty, by_means.duty);
  sample.shell_outlet = carried_outlet(sample.shell_outlet, problem.shell_side.inlet_temperature,
                                       base.shell_side, by_means.shell_outlet, nominal.shell_outlet);
  sample.tube_outlet = carried_outlet(sample.tube_outlet, problem.tube_side.inlet_temperature, base.tube_side,
                                      by_means.tube_outlet, nominal.tube_outlet);
  sample.shell_drop = sample.shell_drop.times(ratio(nominal.shell_drop.total(), by_means.shell_drop.total()));
  sample.tube_drop = sample.tube_drop.times(ratio(nominal.tube_drop.total(), by_means.tube_drop.total()));
  return sample;
}

/// The outcome of a question at deviates of its own sources.
std::optional<rating::Outcome> rated(const Asked& asked, std::span<const double> deviates) {
  rating::Problem problem = asked.question->problem;
  for (std::size_t i = 0; i < deviates.size(); ++i) apply(asked.question->sources[i], deviates[i], problem);
  const rating::Rating sample = rating::rate_mean(problem);
  if (!sample.outcome) return {};
  return carried(asked, problem, *sample.outcome);
}

/// Gives every source its place among the deviates; common sources of one key share it.
/// Those of the first question come first, so that others beside it do not change its samples.
std::size_t number_inputs(std::vector<std::optional<Asked>>& all) {
  std::map<std::string, std::size_t> common;
  std::size_t count = 0;
  for (std::optional<Asked>& asked : all) {
    if (!asked) continue;
    for (const Source& source : asked->question->sources) {
      const auto found = source.common ? common.find(source.key) : common.end();
      const std::size_t input = found == common.end() ? count++ : found->second;
      if (source.common) common[source.key] = input;
      asked->inputs.push_back(input);
    }
  }
  return count;
}

/// First-order sigmas and shares of a result.
void fill_first_order(const Asked& asked, Result& result) {
  const Model model = [&](std::span<const double> deviates) -> std::optional<std::vector<double>> {
    ++result.evaluations;
    const auto outcome = rated(asked, deviates);
    if (!outcome) return {};
    const Values values = values_of(*outcome);
    return std::vector<double>(values.begin(), values.end());
  };
  const std::vector<Source>& sources = asked.question->sources;
  const auto linear = first_order(model, sources.size());
  if (!linear) return;
  std::ranges::copy(linear->sigma, result.first_order_sigma.begin());
  for (std::size_t i = 0; i < sources.size(); ++i) {
    Share share{.name = sources[i].name, .key = sources[i].key};
    for (std::size_t k = 0; k < output_count; ++k) share.of[k] = linear->share(i, k);
    result.shares.push_back(std::move(share));
  }
  std::ranges::stable_sort(result.shares, std::ranges::greater{},
                           [](const Share& share) { return share[Output::duty]; });
}

/// All samples of one question.
struct Samples {
  std::vector<std::optional<Values>> values;
  std::vector<bool> meets;
};

Samples samples_of(const Asked& asked, const std::vector<std::vector<double>>& points) {
  Samples samples;
  std::vector<double> deviates(asked.inputs.size());
  for (const std::vector<double>& point : points) {
    std::ranges::transform(asked.inputs, deviates.begin(), [&](std::size_t input) { return point[input]; });
    const auto outcome = rated(asked, deviates);
    samples.values.push_back(outcome ? std::optional(values_of(*outcome)) : std::nullopt);
    samples.meets.push_back(outcome && asked.question->meets && asked.question->meets(*outcome));
  }
  return samples;
}

/// Spreads of the samples of a question, less those of another where one is given; empty
/// without any sample to tell them from.
std::optional<Spreads> spreads_of(const Samples& samples, const Samples* less) {
  Spreads spreads;
  for (std::size_t k = 0; k < output_count; ++k) {
    std::vector<double> values;
    for (std::size_t i = 0; i < samples.values.size(); ++i)
      if (samples.values[i] && (!less || less->values[i]))
        values.push_back((*samples.values[i])[k] - (less ? (*less->values[i])[k] : 0.0));
    if (values.empty()) return {};
    spreads[k] = spread_of(std::move(values));
  }
  return spreads;
}

double part(std::ptrdiff_t count, std::size_t of) {
  return static_cast<double>(count) / static_cast<double>(of);
}

std::optional<Result> result_of(const Asked& asked, const Samples& samples) {
  const auto spreads = spreads_of(samples, nullptr);
  if (!spreads) return {};
  Result result{.spreads = *spreads, .first_order_sigma = {}, .shares = {}, .probability = {}};
  result.samples = static_cast<int>(samples.values.size());
  result.failed = static_cast<int>(std::ranges::count_if(samples.values, [](const auto& of) { return !of; }));
  result.evaluations = result.samples + 1;  // and the nominal by means
  if (asked.question->meets)
    result.probability = part(std::ranges::count(samples.meets, true), samples.meets.size());
  fill_first_order(asked, result);
  return result;
}

/// The part of all samples in which every question is met; empty where one has no result or asks nothing.
std::optional<double> all_met(const std::vector<std::optional<Asked>>& all,
                              const std::vector<Samples>& samples) {
  for (const auto& asked : all)
    if (!asked || !asked->question->meets) return {};
  std::ptrdiff_t count = 0;
  for (std::size_t i = 0; i < samples.front().meets.size(); ++i)
    count += std::ranges::all_of(samples, [i](const Samples& of) { return of.meets[i]; });
  return part(count, samples.front().meets.size());
}

}  // namespace

Together propagate_together(std::span<const Question> questions, const Sampling& sampling) {
  if (questions.empty()) throw std::invalid_argument("uncertainty::propagate_together: nothing is asked");
  std::vector<std::optional<Asked>> all;
  for (const Question& question : questions) {
    const rating::Rating by_means = rating::rate_mean(question.problem);
    all.push_back(by_means.outcome ? std::optional(Asked{&question, *by_means.outcome, {}}) : std::nullopt);
  }
  const auto points = normal_points(number_inputs(all), sampling);
  Together together;
  std::vector<Samples> samples;
  for (const auto& asked : all) {
    samples.push_back(asked ? samples_of(*asked, points) : Samples{});
    together.each.push_back(asked ? result_of(*asked, samples.back()) : std::nullopt);
    const bool both = asked && all.front();
    together.less_first.push_back(both ? spreads_of(samples.back(), &samples.front()) : std::nullopt);
  }
  together.probability_all = all_met(all, samples);
  return together;
}

std::optional<Result> propagate(const Question& question, const Sampling& sampling) {
  return propagate_together({&question, 1}, sampling).each.front();
}

}  // namespace dutygauge::uncertainty
