#include <fmt/format.h>

#include <algorithm>

#include "sections.hpp"
#include "words.hpp"

namespace dutygauge::report {
namespace {

using uncertainty::Output;
using units::Kind;

constexpr std::size_t most_sources = 3;
constexpr double least_share = 0.02;  ///< of the variance; below it a source is not named

/// Half of what lies between the 5 and the 95 % quantile.
double half_width(const uncertainty::Result& spread, Output output) {
  return 0.5 * (spread[output].high - spread[output].low);
}

std::string outlet(const Result& result, Side side) {
  const auto output = side == Side::shell ? Output::shell_outlet : Output::tube_outlet;
  const auto kind = Kind::temperature_difference;
  return fmt::format("{} outlet +-{}", stream_name(result.assessment.problem, side),
                     Figures(result.display).with_unit(half_width(*result.spread, output), kind));
}

std::string drop(const Result& result, Side side, double nominal) {
  const auto output = side == Side::shell ? Output::shell_drop : Output::tube_drop;
  return fmt::format("{} pressure drop +-{:.0f} %", stream_name(result.assessment.problem, side),
                     100.0 * half_width(*result.spread, output) / nominal);
}

/// "It comes from the shell-side film (62 %), the tube-side fouling (20 %) and ..."
std::string where_it_comes_from(const uncertainty::Result& spread) {
  std::vector<std::string> parts;
  for (const auto& share : spread.shares)
    if (parts.size() < most_sources && share[Output::duty] >= least_share)
      parts.push_back(fmt::format("{} ({:.0f} %)",
                                  share.name == share.key ? "the " + plain_words(share.key) : share.name,
                                  100.0 * share[Output::duty]));
  if (parts.empty()) return "";
  return fmt::format("What is open about the duty comes from {}.", listed(parts));
}

std::string failures(const uncertainty::Result& spread) {
  if (spread.failed == 0) return "";
  return fmt::format(
      "{} of {} trials within these spreads have no result and count as not meeting the service.",
      spread.failed, spread.samples);
}

}  // namespace

std::vector<std::string> spread_in_words(const Result& result) {
  if (!result.spread || !result.assessment.rating.outcome) return {};
  const auto& spread = *result.spread;
  const auto& outcome = *result.assessment.rating.outcome;
  std::vector<std::string> parts{
      fmt::format("duty +-{:.1f} %", 100.0 * half_width(spread, Output::duty) / outcome.duty),
      outlet(result, Side::shell), outlet(result, Side::tube)};
  // Beside a reading the page keeps to what it speaks of.
  if (!result.anchored) {
    parts.push_back(drop(result, Side::shell, outcome.shell_drop.total()));
    parts.push_back(drop(result, Side::tube, outcome.tube_drop.total()));
  }
  std::vector<std::string> said{fmt::format(
      "{}n 9 cases of 10: {}.", result.anchored ? "At design fouling, i" : "I", fmt::join(parts, ", "))};
  for (std::string sentence : {where_it_comes_from(spread), failures(spread)})
    if (!sentence.empty()) said.push_back(std::move(sentence));
  return said;
}

}  // namespace dutygauge::report
