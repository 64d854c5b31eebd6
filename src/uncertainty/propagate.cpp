#include <algorithm>
#include <map>
#include <stdexcept>

#include <tbb/parallel_for.h>

#include "sample.hpp"

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
  Sample by_means;
  std::vector<std::size_t> inputs;  ///< by source, then by swing: which of all deviates is its own
};

std::optional<rating::Outcome> rated(const Asked& asked, std::span<const double> deviates) {
  return shown_sample(*asked.question, asked.by_means, deviates);
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
    for (const Swing& swing : asked->question->swings) {
      const auto [place, is_new] = common.try_emplace(swing.key, count);
      if (is_new) ++count;
      asked->inputs.push_back(place->second);
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
  const auto linear = first_order(model, asked.inputs.size());
  if (!linear) return;
  std::ranges::copy(linear->sigma, result.first_order_sigma.begin());
  const auto add_share = [&](const std::string& name, const std::string& key) {
    Share share{.name = name, .key = key};
    for (std::size_t k = 0; k < output_count; ++k) share.of[k] = linear->share(result.shares.size(), k);
    result.shares.push_back(std::move(share));
  };
  for (const Source& source : asked.question->sources) add_share(source.name, source.key);
  for (const Swing& swing : asked.question->swings) add_share(swing.name, swing.key);
  std::ranges::stable_sort(result.shares, std::ranges::greater{},
                           [](const Share& share) { return share[Output::duty]; });
}

/// All samples of one question.
struct Samples {
  std::vector<std::optional<Values>> values;
  std::vector<char> meets;  ///< not bool: samples are written at the same time
};

Samples samples_of(const Asked& asked, const std::vector<std::vector<double>>& points) {
  Samples samples{.values = std::vector<std::optional<Values>>(points.size()),
                  .meets = std::vector<char>(points.size())};
  tbb::parallel_for(std::size_t{0}, points.size(), [&](std::size_t i) {
    std::vector<double> deviates(asked.inputs.size());
    std::ranges::transform(asked.inputs, deviates.begin(),
                           [&](std::size_t input) { return points[i][input]; });
    const auto outcome = rated(asked, deviates);
    if (outcome) samples.values[i] = values_of(*outcome);
    samples.meets[i] = outcome && asked.question->meets && asked.question->meets(*outcome);
  });
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
    result.probability = part(std::ranges::count(samples.meets, 1), samples.meets.size());
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
    auto by_means = nominal_by_means(question);
    all.push_back(by_means ? std::optional(Asked{&question, std::move(*by_means), {}}) : std::nullopt);
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
