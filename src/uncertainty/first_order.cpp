#include <cmath>

#include "dutygauge/uncertainty.hpp"

namespace dutygauge::uncertainty {
namespace {

/// Deviates of the step: far above the noise of an iterated model, and small enough that a
/// source of 50 % still gives its slope to 1e-3.
constexpr double step = 0.1;

std::optional<std::vector<double>> slope(const Model& model, std::vector<double>& at, std::size_t input,
                                         const std::vector<double>& nominal) {
  at[input] = step;
  auto above = model(at);
  at[input] = -step;
  auto below = model(at);
  at[input] = 0.0;
  if (!above && !below) return {};
  const double width = above && below ? 2.0 * step : step;
  const std::vector<double>& high = above ? *above : nominal;
  const std::vector<double>& low = below ? *below : nominal;
  std::vector<double> result(nominal.size());
  for (std::size_t k = 0; k < result.size(); ++k) result[k] = (high[k] - low[k]) / width;
  return result;
}

}  // namespace

double FirstOrder::share(std::size_t input, std::size_t output) const {
  if (sigma[output] == 0.0) return 0.0;
  const double part = effects[input][output] / sigma[output];
  return part * part;
}

std::optional<FirstOrder> first_order(const Model& model, std::size_t inputs) {
  std::vector<double> at(inputs, 0.0);
  const auto nominal = model(at);
  if (!nominal) return {};
  FirstOrder result{.nominal = *nominal, .sigma = std::vector<double>(nominal->size()), .effects = {}};
  for (std::size_t input = 0; input < inputs; ++input) {
    const auto effect = slope(model, at, input, *nominal);
    if (!effect) return {};
    for (std::size_t k = 0; k < effect->size(); ++k)
      result.sigma[k] = std::hypot(result.sigma[k], (*effect)[k]);
    result.effects.push_back(*effect);
  }
  return result;
}

}  // namespace dutygauge::uncertainty
