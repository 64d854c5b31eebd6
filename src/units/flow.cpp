#include <fmt/core.h>

#include <optional>
#include <utility>

#include "kinds.hpp"
#include "read.hpp"

namespace dutygauge::units {
namespace {

constexpr auto npos = std::string_view::npos;
constexpr std::string_view flow_expected = "a mass flow or a volume flow was expected";
constexpr std::string_view flow_example = "write for example \"21.5 kg/s\" or \"62 m3/h at inlet\"";

// "value at place", cut at the word.
struct Placed {
  std::string_view value;
  std::optional<std::string_view> place;
};

Placed placed(std::string_view text) {
  const auto at = text.find(" at ");
  if (at == npos) return {text, {}};
  return {trimmed(text.substr(0, at)), trimmed(text.substr(at + 4))};
}

struct Amount {
  Reading reading;
  bool is_mass = false;
};

// Messages name both kinds of flow, whichever of them was tried.
[[noreturn]] void refuse_flow(Refusal refusal) {
  for (const Kind kind : {Kind::mass_flow, Kind::volume_flow}) {
    if (refusal.misread.expected != expectation(kind)) continue;
    refusal.misread.expected = flow_expected;
    if (refusal.misread.remedy == example_remedy(kind)) refusal.misread.remedy = flow_example;
  }
  throw std::move(refusal);
}

Amount read_amount(std::string_view text) {
  try {
    return {read_folded(text, {.kind = Kind::mass_flow}), true};
  } catch (Refusal& refusal) {
    if (!refusal.wrong_kind) refuse_flow(std::move(refusal));
  }
  try {
    return {read_folded(text, {.kind = Kind::volume_flow, .standard_volumes = true}), false};
  } catch (Refusal& refusal) {
    refuse_flow(std::move(refusal));
  }
}

void place_unsaid(Flow& flow, const Unit* standard) {
  if (standard == nullptr) {
    flow.basis = FlowBasis::inlet_assumed;
    add_note(flow.taken_for_granted, "volume flow taken at inlet conditions");
    return;
  }
  if (standard->zero == 0.0)
    throw Refusal{{fmt::format("\"{}\" does not say at what temperature", standard->name),
                   "a standard temperature was expected",
                   fmt::format("write for example \"9000 {} at 60 degF\"", standard->name)}};
  flow.basis = FlowBasis::temperature;
  flow.basis_temperature = standard->zero;
}

void place_said(Flow& flow, const Unit* standard, std::string_view place) {
  const bool fixed = standard != nullptr && standard->zero != 0.0;
  if (fixed || (standard != nullptr && place == "inlet"))
    throw Refusal{{fmt::format("\"{}\" has a temperature of its own, but the text says \"at {}\"",
                               standard->name, place),
                   "one place of measurement was expected",
                   fixed ? "leave out \"at\", or write m3" : "write a temperature, or m3 or ft3 at inlet"}};
  if (place == "inlet") {
    flow.basis = FlowBasis::inlet;
    return;
  }
  if (place.find_first_of("0123456789") == npos)
    throw Refusal{{fmt::format("{} is neither \"inlet\" nor a temperature", quoted(place)),
                   "the place where the volume flow is measured was expected",
                   "write \"at inlet\" or for example \"at 60 degF\""}};
  flow.basis = FlowBasis::temperature;
  flow.basis_temperature = read_plain(place, Kind::temperature);
  if (standard != nullptr)
    add_note(flow.taken_for_granted, fmt::format("{} taken at 101325 Pa", standard->name));
}

Flow read_flow_folded(std::string_view text) {
  const auto [written, place] = placed(text);
  Amount amount = read_amount(written);
  Flow flow;
  flow.taken_for_granted = std::exchange(amount.reading.value.taken_for_granted, {});
  flow.amount = std::move(amount.reading.value);
  if (amount.is_mass && place)
    throw Refusal{{fmt::format("{} is a mass flow, the same everywhere", quoted(written)),
                   "\"at\" was expected behind a volume flow only", "leave out what stands behind \"at\""}};
  if (amount.is_mass) return flow;
  if (place)
    place_said(flow, amount.reading.standard, *place);
  else
    place_unsaid(flow, amount.reading.standard);
  return flow;
}

Pair read_pair_folded(std::string_view text, Kind kind) {
  const auto arrow = text.find("->");
  if (arrow == npos || text.find("->", arrow + 2) != npos)
    throw Refusal{{fmt::format("{} is not a pair", quoted(text)),
                   "an inlet and an outlet value were expected", "write for example \"165 -> 105 degF\""}};
  const std::string_view left = trimmed(text.substr(0, arrow)), right = trimmed(text.substr(arrow + 2));
  const std::string_view unit = unit_at_end(right);
  if (unit.empty() && !unit_at_end(left).empty())
    throw Refusal{{fmt::format("the unit stands in the middle of {}", quoted(text)),
                   "a pair with its unit at the end was expected", "write for example \"165 -> 105 degF\""}};
  Pair pair;
  pair.second = read_folded(right, {.kind = kind}).value;
  pair.first = read_folded(left, {.kind = kind, .fallback_unit = unit}).value;
  return pair;
}

ValueAt read_value_at_folded(std::string_view text, Kind kind) {
  const auto [written, place] = placed(text);
  if (!place)
    throw Refusal{{fmt::format("{} does not say at what temperature", quoted(text)),
                   "a property at a temperature was expected",
                   fmt::format("write for example \"{} at 40 degC\"", facts(kind).example)}};
  return {read_folded(written, {.kind = kind}).value, read_plain(*place, Kind::temperature)};
}

}  // namespace

Read<Flow> read_flow(std::string_view text) {
  return attempt<Flow>([&] { return read_flow_folded(folded(text)); });
}

Read<Pair> read_pair(std::string_view text, Kind kind) {
  return attempt<Pair>([&] { return read_pair_folded(folded(text), kind); });
}

Read<ValueAt> read_value_at(std::string_view text, Kind kind) {
  return attempt<ValueAt>([&] { return read_value_at_folded(folded(text), kind); });
}

}  // namespace dutygauge::units
