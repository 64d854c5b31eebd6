#include <algorithm>
#include <cmath>
#include <stdexcept>

#include "sheet.hpp"

namespace dutygauge::bids {
namespace {

double excess(const Stated& stated, const Number& computed) {
  return std::abs(stated.value - computed.value) - computed.slack;
}

/// One combination: the value, and the sum of what each input's rounding does to it.
std::optional<Number> evaluated(std::vector<double>& values, std::span<const double> slacks,
                                const Formula& formula) {
  Number result{formula(values), 0.0};
  if (!std::isfinite(result.value)) return {};
  for (std::size_t i = 0; i < values.size(); ++i) {
    const double kept = values[i];
    double most = 0.0;
    for (const double sign : {-1.0, 1.0}) {
      values[i] = kept + sign * slacks[i];
      const double moved = std::abs(formula(values) - result.value);
      if (std::isfinite(moved)) most = std::max(most, moved);
    }
    values[i] = kept;
    result.slack += most;
  }
  return result;
}

}  // namespace

Numbers derived(std::initializer_list<const Numbers*> inputs, const Formula& formula) {
  std::vector<Numbers> combinations = {{}};
  for (const Numbers* input : inputs) {
    std::vector<Numbers> longer;
    for (const Numbers& begun : combinations)
      for (const Number& next : *input) {
        longer.push_back(begun);
        longer.back().push_back(next);
      }
    combinations = std::move(longer);
  }
  Numbers results;
  for (const Numbers& combination : combinations) {
    std::vector<double> values, slacks;
    for (const Number& number : combination) {
      values.push_back(number.value);
      slacks.push_back(number.slack);
    }
    if (const auto result = evaluated(values, slacks, formula)) results.push_back(*result);
  }
  return results;
}

bool fits(const Stated& stated, const Number& computed, double scale_offset) {
  const double allowed =
      stated.rounding + computed.slack + arithmetic_tolerance * std::abs(computed.value + scale_offset);
  return std::abs(stated.value - computed.value) <= allowed;
}

std::optional<Number> nearest(const Stated& stated, const Numbers& computed) {
  const auto found =
      std::ranges::min_element(computed, {}, [&](const Number& number) { return excess(stated, number); });
  return found == computed.end() ? std::nullopt : std::optional(*found);
}

std::string likely_cause(const Stated& stated, const std::vector<Cause>& causes, std::string otherwise) {
  const Cause* best = nullptr;
  for (const Cause& cause : causes) {
    if (!std::isfinite(cause.value) || !fits(stated, {cause.value, 0.0})) continue;
    if (!best || std::abs(stated.value - cause.value) < std::abs(stated.value - best->value)) best = &cause;
  }
  return best ? best->text : std::move(otherwise);
}

units::Kind kind_of(std::string_view key) {
  const auto keys = claim_keys();
  const auto found = std::ranges::find(keys, key, &ClaimKey::key);
  if (found == keys.end()) throw std::invalid_argument("bids: no such claim: " + std::string(key));
  return found->kind;
}

void leave_unchecked(Sheet& sheet, std::string_view key, const std::optional<Stated>& stated,
                     std::string why) {
  if (!stated) return;
  sheet.verdicts.push_back({.key = std::string(key),
                            .stated = stated->value,
                            .computed = {},
                            .kind = kind_of(key),
                            .ratio = {},
                            .verdict = Agreement::not_checked,
                            .against = "",
                            .likely = std::move(why)});
}

Numbers judge(Sheet& sheet, const std::optional<Stated>& stated, const Check& check) {
  if (!stated) return check.computed;
  Numbers standing = {{stated->value, stated->rounding}};
  const auto computed = nearest(*stated, check.computed);
  if (!computed && !check.nothing_fits) {
    leave_unchecked(sheet, check.key, stated, check.if_empty);
    return standing;
  }
  ClaimVerdict verdict{.key = std::string(check.key),
                       .stated = stated->value,
                       .computed = {},
                       .kind = kind_of(check.key),
                       .ratio = {},
                       .ground = check.ground,
                       .verdict = Agreement::contradicts,
                       .against = check.against};
  if (computed) {
    verdict.computed = computed->value;
    const double whole = computed->value + check.scale_offset;
    if (whole != 0.0) verdict.ratio = (stated->value + check.scale_offset) / whole;
  }
  if (computed && fits(*stated, *computed, check.scale_offset))
    verdict.verdict = Agreement::agrees;
  else
    verdict.likely = likely_cause(*stated, check.causes, check.otherwise);
  if (verdict.verdict != Agreement::agrees)
    standing.insert(standing.end(), check.computed.begin(), check.computed.end());
  sheet.verdicts.push_back(std::move(verdict));
  return standing;
}

}  // namespace dutygauge::bids
