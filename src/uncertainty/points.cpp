#include <algorithm>
#include <bit>
#include <boost/math/distributions/normal.hpp>
#include <boost/random/sobol.hpp>
#include <cmath>
#include <stdexcept>

#include "dutygauge/uncertainty.hpp"

namespace dutygauge::uncertainty {
namespace {

/// The next of a well mixed sequence of 64-bit numbers (SplitMix64; Steele, Lea & Flood 2014).
std::uint64_t mixed(std::uint64_t& state) {
  std::uint64_t z = (state += 0x9e3779b97f4a7c15ULL);
  z = (z ^ (z >> 30)) * 0xbf58476d1ce4e5b9ULL;
  z = (z ^ (z >> 27)) * 0x94d049bb133111ebULL;
  return z ^ (z >> 31);
}

/// Strictly between 0 and 1: the middle of the interval of 2^-digits in which the point lies. The digits
/// beyond are the same for all points, and would move every mean by part of an interval.
double unit_interval(std::uint64_t bits, int digits) {
  return std::ldexp(static_cast<double>(bits >> (64 - digits)) + 0.5, -digits);
}

double quantile(const std::vector<double>& sorted, double p) {
  const double rank = p * static_cast<double>(sorted.size() - 1);
  const auto below = static_cast<std::size_t>(rank);
  const std::size_t above = std::min(below + 1, sorted.size() - 1);
  return sorted[below] + (rank - std::floor(rank)) * (sorted[above] - sorted[below]);
}

}  // namespace

std::vector<std::vector<double>> normal_points(std::size_t inputs, const Sampling& sampling) {
  if (sampling.samples < 1) throw std::invalid_argument("uncertainty::normal_points: no samples");
  std::vector<std::vector<double>> points(static_cast<std::size_t>(sampling.samples),
                                          std::vector<double>(inputs));
  if (inputs == 0) return points;
  std::uint64_t state = sampling.seed;
  std::vector<std::uint64_t> shifts(inputs);
  for (std::uint64_t& shift : shifts) shift = mixed(state);
  const int digits = std::max(1, static_cast<int>(std::bit_width(points.size() - 1)));
  boost::random::sobol sequence(inputs);
  const boost::math::normal standard;
  for (std::size_t sample = 0; sample < points.size(); ++sample)
    for (std::size_t input = 0; input < inputs; ++input) {
      // The engine leaves out the sequence's first point, zero; without it the rest is not balanced.
      const std::uint64_t bits = sample == 0 ? 0 : sequence();
      points[sample][input] = boost::math::quantile(standard, unit_interval(bits ^ shifts[input], digits));
    }
  return points;
}

Spread spread_of(std::vector<double> values) {
  if (values.empty()) throw std::invalid_argument("uncertainty::spread_of: no values");
  std::ranges::sort(values);
  const auto count = static_cast<double>(values.size());
  Spread spread;
  for (double value : values) spread.mean += value / count;
  double squares = 0;
  for (double value : values) squares += (value - spread.mean) * (value - spread.mean);
  spread.sigma = values.size() > 1 ? std::sqrt(squares / (count - 1.0)) : 0.0;
  spread.low = quantile(values, 0.05);
  spread.high = quantile(values, 0.95);
  return spread;
}

}  // namespace dutygauge::uncertainty
