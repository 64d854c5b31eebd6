#include "words.hpp"

#include <fmt/core.h>

#include <algorithm>
#include <stdexcept>

#include "dutygauge/units/mention.hpp"

namespace dutygauge::report {
namespace {

constexpr std::size_t longest_name = 24;
constexpr double close_to_a_limit = 0.1;
constexpr double rounding = 1e-9;

void replace_all(std::string& text, std::string_view mark, const std::string& by) {
  for (auto at = text.find(mark); at != std::string::npos; at = text.find(mark, at + by.size()))
    text.replace(at, mark.size(), by);
}

std::string own_name(const rating::Stream& stream) {
  return ascii(stream.name.empty() ? stream.fluid.name : stream.name);
}

}  // namespace

std::string_view side_word(Side side) {
  return side == Side::shell ? "shell-side" : "tube-side";
}

std::string stream_name(const rating::Problem& problem, Side side) {
  const auto& stream = side == Side::shell ? problem.shell_side : problem.tube_side;
  const auto& other = side == Side::shell ? problem.tube_side : problem.shell_side;
  const std::string name = clipped(own_name(stream), longest_name);
  if (name.empty()) return std::string(side_word(side)) + " stream";
  return name == clipped(own_name(other), longest_name) ? std::string(side_word(side)) + " " + name : name;
}

std::string_view word(Severity severity) {
  switch (severity) {
    case Severity::must:
      return "must";
    case Severity::should:
      return "should";
    case Severity::note:
      return "note";
  }
  throw std::invalid_argument("report::word: no such severity");
}

std::string_view word(Ground ground) {
  switch (ground) {
    case Ground::arithmetic:
      return "arithmetic";
    case Ground::geometry:
      return "geometry";
    case Ground::standard:
      return "standard";
    case Ground::judgement:
      return "judgement";
    case Ground::method:
      return "method";
  }
  throw std::invalid_argument("report::word: no such ground");
}

std::string_view word(bids::Agreement agreement) {
  switch (agreement) {
    case bids::Agreement::agrees:
      return "agrees";
    case bids::Agreement::ask:
      return "ask";
    case bids::Agreement::contradicts:
      return "contradicts";
    case bids::Agreement::not_checked:
      break;
  }
  return "not_checked";
}

std::string_view word(tubeside::Regime regime) {
  switch (regime) {
    case tubeside::Regime::laminar:
      return "laminar";
    case tubeside::Regime::transition:
      return "transition";
    case tubeside::Regime::turbulent:
      return "turbulent";
  }
  throw std::invalid_argument("report::word: no such regime");
}

std::string sentence(const Finding& finding, units::System system) {
  const Figures figures(system);
  std::string text = finding.text;
  replace_all(text, "{value}", figures.with_unit(finding.value, finding.kind));
  replace_all(text, "{limit}", figures.with_unit(finding.limit, finding.kind));
  return units::spoken(text, system);
}

std::string reason(const Assumption& assumption, units::System system) {
  return units::spoken(assumption.why, system);
}

std::string as_typed(const Assumption& assumption, units::System system, int significant) {
  if (!assumption.word.empty()) return assumption.word;
  return units::typed(assumption.value, assumption.kind, system, significant);
}

std::string plain_words(std::string_view key) {
  for (const std::string_view block : {"exchanger.", "streams."})
    if (key.starts_with(block)) key.remove_prefix(block.size());
  std::string words(key);
  for (const std::string_view block : {"tube", "baffle", "clearance"}) {
    if (!key.starts_with(std::string(block) + "s.")) continue;
    const std::string leaf(key.substr(block.size() + 2));
    words = leaf.starts_with(block) ? leaf : std::string(block) + " " + leaf;
  }
  std::ranges::replace_if(
      words, [](char c) { return c == '.' || c == '_'; }, ' ');
  return words;
}

std::string_view limit_word(double fraction_left, std::string_view broken) {
  if (fraction_left < -rounding) return broken;
  return fraction_left < close_to_a_limit ? "close" : "ok";
}

std::string times(double ratio) {
  return fmt::format("{:.{}f} x", ratio, ratio < 10.0 ? 1 : 0);
}

std::string listed(const std::vector<std::string>& words) {
  std::string text;
  for (std::size_t i = 0; i < words.size(); ++i) {
    if (i > 0) text += i + 1 == words.size() ? " and " : ", ";
    text += words[i];
  }
  return text;
}

std::vector<Share> shares(const rating::Problem& problem, const overall::Resistances& resistances) {
  const double sum = resistances.sum();
  std::vector<Share> all = {
      {"the " + stream_name(problem, Side::tube) + " film", resistances.tube_film / sum},
      {"the deposit in the tubes", resistances.tube_fouling / sum},
      {"the tube wall", resistances.wall / sum},
      {"the deposit on the tubes", resistances.shell_fouling / sum},
      {"the " + stream_name(problem, Side::shell) + " film", resistances.shell_film / sum}};
  std::ranges::stable_sort(all, std::ranges::greater{}, &Share::fraction);
  return all;
}

}  // namespace dutygauge::report
