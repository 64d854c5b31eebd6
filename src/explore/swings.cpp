#include <algorithm>
#include <cmath>
#include <stdexcept>

#include "dutygauge/explore.hpp"
#include "how_sure.hpp"

// What lies open in the inputs of a case, carried to its outcome by rating it at both ends.

namespace dutygauge::explore {
namespace {

using uncertainty::Distribution;
using uncertainty::Output;
using Values = std::array<double, uncertainty::output_count>;

constexpr double too_small = 1e-4;  // of every output: not worth an input of the sampling

/// In the scatter of the shell side's films and drops with gaps assumed.
bool is_in_a_method(const std::string& key) {
  return key.starts_with("exchanger.clearances.");
}

Distribution distribution_of(const Assumption& assumption) {
  switch (assumption.span) {
    case Span::plausible:
      return Distribution::triangular;
    case Span::range:
      return Distribution::uniform;
    case Span::deviation:
      return Distribution::normal;
  }
  throw std::invalid_argument("explore::swings_of: no such span");
}

std::optional<rating::Outcome> by_means(rating::Problem problem) {
  problem.methods.solution = rating::Solution::mean;
  return rating::rate(problem).outcome;
}

/// The outcome with the key at a value; empty where that is no case, or has no result.
std::optional<rating::Outcome> at(const case_io::Document& document, const Dial& dial, double value) {
  try {
    return by_means(case_io::build(turned(document, dial, value)).problem);
  } catch (const case_io::InputError&) {
    return {};
  }
}

Values change(const rating::Outcome& from, const rating::Outcome& to) {
  const auto relative = [](double a, double b) { return a == 0.0 ? 0.0 : b / a - 1.0; };
  return {relative(from.duty, to.duty), to.shell_outlet - from.shell_outlet,
          to.tube_outlet - from.tube_outlet, relative(from.shell_drop.total(), to.shell_drop.total()),
          relative(from.tube_drop.total(), to.tube_drop.total())};
}

bool is_worth_it(const uncertainty::Swing& swing) {
  const auto moves = [](double of) { return std::abs(of) > too_small; };
  return std::ranges::any_of(swing.at_low, moves) || std::ranges::any_of(swing.at_high, moves);
}

}  // namespace

std::vector<uncertainty::Swing> swings_of(const case_io::Document& document, const case_io::Case& a_case) {
  std::vector<uncertainty::Swing> swings;
  std::optional<rating::Outcome> here;
  for (const Assumption& one : a_case.assumed) {
    if (!one.low || !one.high || is_in_a_method(one.key)) continue;
    const auto found = dial(document, one.key);
    if (!found) continue;
    if (!here) here = by_means(a_case.problem);
    if (!here) return {};
    const auto low = at(document, *found, *one.low), high = at(document, *found, *one.high);
    if (!low && !high) continue;
    uncertainty::Swing swing{.name = one.key, .key = one.key, .distribution = distribution_of(one)};
    // One end without a result: as far the other way as the other end.
    const Values none{};
    swing.at_low = low ? change(*here, *low) : none;
    swing.at_high = high ? change(*here, *high) : none;
    for (std::size_t k = 0; k < none.size(); ++k) {
      if (!low) swing.at_low[k] = -swing.at_high[k];
      if (!high) swing.at_high[k] = -swing.at_low[k];
    }
    if (is_worth_it(swing)) swings.push_back(std::move(swing));
  }
  return swings;
}

}  // namespace dutygauge::explore
