#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "dutygauge/units/mention.hpp"
#include "sheet.hpp"

// Duty and outlets: three ways to say what heat is exchanged.

namespace dutygauge::bids {
namespace {

/// Up to here a difference may lie in the heat capacity. This project's own tolerance.
constexpr double balance_question = 0.05;

constexpr const char* wrong_side = "the outlet lies on the wrong side of the inlet: columns exchanged";

struct Vote {
  std::string_view key;  ///< empty: U x area x mtd, a witness only
  const std::optional<Stated>* stated = nullptr;
  Number heat{};  ///< [W]
};

const rating::Stream& stream_of(const Sheet& sheet, bool shell) {
  return shell ? sheet.problem().shell_side : sheet.problem().tube_side;
}

bool is_hot(const Sheet& sheet, bool shell) {
  return shell == rating::shell_side_is_hot(sheet.problem());
}

bool is_usable(const rating::Stream& stream, double temperature) {
  const auto range = fluids::usable_temperatures(stream.fluid, stream.inlet_pressure);
  return temperature >= range.low && temperature <= range.high;
}

/// Heat [W] that brings a stream to an outlet; not finite where nothing is known of the fluid there.
Number heat_of(const Sheet& sheet, bool shell, const Stated& outlet) {
  const rating::Stream& stream = stream_of(sheet, shell);
  if (!is_usable(stream, outlet.value)) return {std::nan(""), 0.0};
  const auto heat = [&](double at) { return rating::duty_to_reach(stream, at, is_hot(sheet, shell)); };
  const double value = heat(outlet.value);
  return {value, std::abs(heat(outlet.value + outlet.rounding) - value)};
}

/// The outlets a stream has for the given heats; heats it cannot take are left out.
Numbers outlets_for(const Sheet& sheet, bool shell, const Numbers& heats) {
  const rating::Stream& stream = stream_of(sheet, shell);
  const double sign = is_hot(sheet, shell) ? -1.0 : 1.0;
  const double inlet = fluids::enthalpy(stream.fluid, stream.inlet_temperature, stream.inlet_pressure);
  return derived({&heats}, [&](std::span<const double> heat) {
    const double enthalpy = inlet + sign * heat[0] / stream.mass_flow;
    const double outlet = fluids::temperature_at(stream.fluid, enthalpy, stream.inlet_pressure);
    const double back = fluids::enthalpy(stream.fluid, outlet, stream.inlet_pressure);
    const bool reached = std::abs(back - enthalpy) <= 1e-3 * std::abs(enthalpy - inlet);
    return reached ? outlet : std::nan("");
  });
}

/// Duty by the sheet's own U, area and corrected difference, all stated.
std::optional<Number> witness(const Claims& claims, const geometry::Exchanger& exchanger) {
  if (!claims.u_service || !claims.mtd) return {};
  const Number area = claims.area_effective && claims.area_per == Per::unit
                          ? Number{claims.area_effective->value, claims.area_effective->rounding}
                          : Number{exchanger.area, 0.0};
  const auto heat = [&](double u, double m, double a) { return u * m * a; };
  const double u = claims.u_service->value, m = claims.mtd->value;
  const double value = heat(u, m, area.value);
  return Number{value, heat(claims.u_service->rounding, m, area.value) +
                           heat(u, claims.mtd->rounding, area.value) + heat(u, m, area.slack)};
}

std::vector<Vote> votes_of(const Sheet& sheet) {
  const Claims& claims = sheet.claims;
  std::vector<Vote> votes;
  if (claims.shell_side_outlet)
    votes.push_back(
        {"shell_side_outlet", &claims.shell_side_outlet, heat_of(sheet, true, *claims.shell_side_outlet)});
  if (claims.tube_side_outlet)
    votes.push_back(
        {"tube_side_outlet", &claims.tube_side_outlet, heat_of(sheet, false, *claims.tube_side_outlet)});
  if (claims.duty) votes.push_back({"duty", &claims.duty, {claims.duty->value, claims.duty->rounding}});
  return votes;
}

double difference(const Number& a, const Number& b) {
  const double apart = std::abs(a.value - b.value) - a.slack - b.slack;
  // A heat that is not known is far from every other; max would take it for equal.
  return std::isfinite(apart) ? std::max(0.0, apart) / std::abs(b.value) : 1.0;
}

/// The heat most votes agree with; between equals the outlets come before the duty.
const Vote* most_trusted(const std::vector<Vote>& votes, const std::optional<Number>& by_coefficient) {
  const Vote* best = nullptr;
  std::size_t most = 0;
  for (const Vote& vote : votes) {
    if (!std::isfinite(vote.heat.value) || vote.heat.value <= 0.0) continue;
    const auto agrees = [&](const Number& other) {
      return difference(other, vote.heat) <= arithmetic_tolerance;
    };
    std::size_t count = by_coefficient && agrees(*by_coefficient) ? 1 : 0;
    for (const Vote& other : votes) count += agrees(other.heat) ? 1 : 0;
    if (best && count <= most) continue;
    best = &vote;
    most = count;
  }
  return best;
}

std::string cause_of_duty(const Sheet& sheet, double ratio) {
  const auto is = [ratio](double slip) { return std::abs(ratio / slip - 1.0) <= arithmetic_tolerance; };
  const auto& exchanger = sheet.problem().exchanger;
  for (const int n : {exchanger.shells_in_parallel, exchanger.shells_in_series})
    if (n > 1 && is(1.0 / n)) return "duty is that of one shell of several";
  constexpr std::pair<double, const char*> slips[] = {{1.163, "a unit slip: a kilowatt is not 1000 kcal/h"},
                                                      {1.0 / 1.163, "a unit slip: kcal/h taken for W"},
                                                      {3.6, "a unit slip: MJ/h taken for kW"},
                                                      {1.0 / 3.6, "a unit slip: kW taken for MJ/h"},
                                                      {3.412, "a unit slip: Btu/h taken for W"},
                                                      {1.0 / 3.412, "a unit slip: W taken for Btu/h"},
                                                      {1.055, "a unit slip: Btu taken for kJ"},
                                                      {1.0 / 1.055, "a unit slip: kJ taken for Btu"}};
  for (const auto& [slip, text] : slips)
    if (is(slip)) return text;
  return "duty of another operating case, or of other flows";
}

std::string cause_of_outlet(const Sheet& sheet, const Vote& vote, std::optional<double> computed) {
  const double stated = (*vote.stated)->value;
  if (vote.heat.value <= 0.0) return wrong_side;
  const bool shell = vote.key == "shell_side_outlet";
  const auto& other = shell ? sheet.claims.tube_side_outlet : sheet.claims.shell_side_outlet;
  if (computed && other && std::abs(other->value - *computed) < 0.1)
    return "the outlet of the other side stands here";
  if (computed && std::abs(std::abs(stated - *computed) - 10.0) <= 0.1 + (*vote.stated)->rounding)
    return fmt::format("a digit is off: the outlet is {} from where it belongs",
                       units::mention(10.0, units::Kind::temperature_difference));
  return "outlet of another operating case, or of another flow or heat capacity";
}

void judge_vote(Sheet& sheet, const Vote& vote, const Vote& reference, Numbers& standing) {
  const bool is_duty = vote.key == "duty";
  const bool shell = vote.key == "shell_side_outlet";
  const double off = difference(vote.heat, reference.heat);
  const Numbers computed = is_duty ? Numbers{reference.heat} : outlets_for(sheet, shell, {reference.heat});
  ClaimVerdict verdict{.key = std::string(vote.key),
                       .stated = (*vote.stated)->value,
                       .computed = {},
                       .kind = kind_of(vote.key),
                       .ratio = vote.heat.value / reference.heat.value,
                       .verdict = off <= arithmetic_tolerance ? Agreement::agrees
                                  : off <= balance_question   ? Agreement::ask
                                                              : Agreement::contradicts,
                       .against = reference.key == "duty" ? "the duty stated"
                                  : reference.key == "shell_side_outlet"
                                      ? "the shell stream between its inlet and outlet"
                                      : "the tube stream between its inlet and outlet"};
  if (!computed.empty()) verdict.computed = computed.front().value;
  if (verdict.verdict == Agreement::ask)
    verdict.likely = "a heat capacity at another temperature, or heat lost";
  else if (verdict.verdict == Agreement::contradicts)
    verdict.likely =
        is_duty ? cause_of_duty(sheet, *verdict.ratio) : cause_of_outlet(sheet, vote, verdict.computed);
  if (verdict.verdict != Agreement::agrees) standing.insert(standing.end(), computed.begin(), computed.end());
  sheet.verdicts.push_back(std::move(verdict));
}

Numbers& standing_of(Sheet& sheet, std::string_view key) {
  if (key == "duty") return sheet.duty;
  return key == "shell_side_outlet" ? sheet.shell_outlet : sheet.tube_outlet;
}

/// What else agrees with the most trusted heat; null where nothing does.
const Vote* support_of(const Vote& reference, const std::vector<Vote>& votes) {
  const auto found = std::ranges::find_if(votes, [&](const Vote& other) {
    return &other != &reference && difference(other.heat, reference.heat) <= arithmetic_tolerance;
  });
  return found == votes.end() ? nullptr : &*found;
}

void judge_votes(Sheet& sheet, const std::vector<Vote>& votes, const Vote* reference) {
  for (const Vote& vote : votes) {
    Numbers& standing = standing_of(sheet, vote.key);
    standing = {{(*vote.stated)->value, (*vote.stated)->rounding}};
    const Vote* other = reference == &vote ? support_of(vote, votes) : reference;
    if (!std::isfinite(vote.heat.value)) {
      leave_unchecked(sheet, vote.key, *vote.stated, "it lies outside what is known of the fluid");
      standing.clear();
    } else if (vote.heat.value <= 0.0 && !reference) {
      judge(sheet, *vote.stated,
            {.key = vote.key, .computed = {}, .otherwise = wrong_side, .nothing_fits = true});
      standing.clear();
    } else if (votes.size() == 1) {
      leave_unchecked(sheet, vote.key, *vote.stated, "nothing else stated says what heat is exchanged");
    } else if (!other) {
      leave_unchecked(sheet, vote.key, *vote.stated, "nothing else stated agrees with it");
    } else {
      judge_vote(sheet, vote, *other, standing);
    }
  }
}

}  // namespace

void check_heat_balance(Sheet& sheet) {
  const auto votes = votes_of(sheet);
  const Vote* reference = most_trusted(votes, witness(sheet.claims, sheet.problem().exchanger));
  judge_votes(sheet, votes, reference);
  if (!reference) return;
  if (sheet.duty.empty()) sheet.duty = {reference->heat};
  if (sheet.shell_outlet.empty()) sheet.shell_outlet = outlets_for(sheet, true, {reference->heat});
  if (sheet.tube_outlet.empty()) sheet.tube_outlet = outlets_for(sheet, false, {reference->heat});
}

}  // namespace dutygauge::bids
