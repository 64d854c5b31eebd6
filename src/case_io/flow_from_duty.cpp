#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <utility>

#include "parts.hpp"

// Of flow, outlet and duty any two suffice: the flow of a sheet that states the other two.

namespace dutygauge::case_io {
namespace {

using units::Kind;

struct Duty {
  double value;
  std::optional<double> low, high;
  std::string where;  ///< what it rests on, in words
};

std::string key_of(const std::string& name, const char* end) {
  return "streams." + name + "." + end;
}

bool is_from_duty(const Reading& reading, const std::string& name) {
  const auto flow = reading.entries().find(key_of(name, "flow"));
  return flow != reading.entries().end() && flow->second.from_duty;
}

/// Enthalpy a stream gives off on its way to its stated outlet [J/kg]; empty without one.
std::optional<double> heat_given_off(const Reading& reading, const std::string& name,
                                     const rating::Stream& stream) {
  const auto outlet = si(reading.entries(), key_of(name, "outlet.temperature"));
  if (!outlet) return {};
  return fluids::enthalpy(stream.fluid, stream.inlet_temperature, stream.inlet_pressure) -
         fluids::enthalpy(stream.fluid, *outlet, stream.inlet_pressure);
}

std::optional<Duty> stated_duty(const Reading& reading) {
  const auto leaf = reading.document().leaves.find("claims.duty");
  if (leaf == reading.document().leaves.end()) return {};
  const auto read = units::read(leaf->second.text, Kind::power);
  const auto* value = std::get_if<units::Value>(&read);
  if (value == nullptr || !(value->si > 0.0)) return {};
  return Duty{value->si, value->low, value->high, "claims.duty"};
}

std::optional<Duty> duty_of_other(const Reading& reading, const std::string& other,
                                  const std::optional<MadeStream>& stream) {
  if (!stream || is_from_duty(reading, other)) return {};
  const auto heat = heat_given_off(reading, other, stream->stream);
  if (!heat) return {};
  // The outlet belongs to the flow of the sheet, not to what an overlay makes of it.
  const double flow = stream->stream.mass_flow / reading.entries().at(key_of(other, "flow")).factor;
  return Duty{std::abs(*heat) * flow, {}, {}, "the flow and the outlet of " + other};
}

/// Whether the outlet lies where this stream can go: towards the other's inlet, where its fluid is known.
bool is_reachable(Reading& reading, const std::string& name, const rating::Stream& stream,
                  const rating::Stream& other) {
  const std::string key = key_of(name, "outlet.temperature");
  const double outlet = *si(reading.entries(), key);
  const auto usable = fluids::usable_temperatures(stream.fluid, stream.inlet_pressure);
  const bool is_cooled = stream.inlet_temperature > other.inlet_temperature;
  const bool changes = is_cooled ? outlet < stream.inlet_temperature : outlet > stream.inlet_temperature;
  if (changes && outlet >= usable.low && outlet <= usable.high) return true;
  reading.note(key,
               changes ? fmt::format("lies outside what is known of the fluid: {}",
                                     fluids::why_it_ends(stream.fluid, stream.inlet_pressure, !is_cooled))
                       : fmt::format("a stream that enters at {} against {} cannot leave so",
                                     units::typed(stream.inlet_temperature, Kind::temperature),
                                     units::typed(other.inlet_temperature, Kind::temperature)),
               is_cooled ? "less than its inlet temperature" : "more than its inlet temperature",
               "check inlets and outlet against the sheet");
  return false;
}

/// What is found [kg/s] in the case the sheet speaks of, where that is another document with the
/// same outlet: what an operating case changes does not change the sheet's balance.
std::optional<Assumption> flow_of_sheet(const Reading& reading, const std::string& name) {
  const auto& sheet = reading.document().sheet;
  if (!sheet) return {};
  Reading there(*sheet, case_fields());
  const std::string key = key_of(name, "flow"), outlet = key_of(name, "outlet.temperature");
  if (!there.mistakes().empty() || !is_from_duty(there, name)) return {};
  if (si(there.entries(), outlet) != si(reading.entries(), outlet)) return {};
  auto shell_side = stream_of(there, "shell_side"), tube_side = stream_of(there, "tube_side");
  find_flows(there, shell_side, tube_side);
  const auto found = std::ranges::find(there.assumed(), key, &Assumption::key);
  if (!there.mistakes().empty() || found == there.assumed().end()) return {};
  Assumption flow = *found;
  const double factor = reading.entries().at(key).factor / there.entries().at(key).factor;
  flow.value *= factor;
  for (auto* end : {&flow.low, &flow.high})
    if (*end) **end *= factor;
  return flow;
}

void take_flow(Reading& reading, Assumption flow, rating::Stream& stream) {
  stream.mass_flow = flow.value;
  reading.settle(flow.key, flow.value);
  reading.assume(std::move(flow));
}

void find_flow(Reading& reading, const std::string& name, std::optional<MadeStream>& made,
               const std::string& other, const std::optional<MadeStream>& other_made) {
  if (!made || !other_made || !is_from_duty(reading, name)) return;
  const std::string key = key_of(name, "flow");
  if (auto flow = flow_of_sheet(reading, name)) return take_flow(reading, std::move(*flow), made->stream);
  if (!reading.has(key_of(name, "outlet.temperature")))
    return reading.note(key, "from_duty needs the outlet temperature of this stream",
                        "outlet: {temperature: ...} beside it", "add the outlet, or give the flow");
  if (!si(reading.entries(), key_of(name, "outlet.temperature"))) return;
  auto duty = stated_duty(reading);
  if (!duty) duty = duty_of_other(reading, other, other_made);
  if (!duty)
    return reading.note(key, "from_duty finds no duty",
                        "a duty under claims, or the other side's flow and outlet",
                        "add either, or give the flow");
  rating::Stream& stream = made->stream;
  if (!is_reachable(reading, name, stream, other_made->stream)) return;
  const double heat = std::abs(*heat_given_off(reading, name, stream));
  const double factor = reading.entries().at(key).factor;
  const auto flow_at = [&](const std::optional<double>& end) {
    return end ? std::optional(factor * *end / heat) : std::nullopt;
  };
  take_flow(reading,
            {.key = key,
             .value = factor * duty->value / heat,
             .kind = Kind::mass_flow,
             .why = fmt::format("derived: {} over the enthalpy between inlet and stated outlet", duty->where),
             .low = flow_at(duty->low),
             .high = flow_at(duty->high),
             .look_in = "datasheet"},
            stream);
}

/// An outlet that no flow is found from would be passed over in silence otherwise.
void remark_on_outlet(const Reading& reading, const std::string& name, const std::string& other,
                      std::optional<MadeStream>& made) {
  const auto outlet = si(reading.entries(), key_of(name, "outlet.temperature"));
  if (!made || !outlet || is_from_duty(reading, name) || is_from_duty(reading, other)) return;
  made->findings.push_back(
      {.id = "case.outlet_not_used",
       .text = "the stated outlet of the " + made->stream.name +
               ", {value}, is not used: the flow is given, so the outlet is computed. Compare "
               "both, or write flow: from_duty to trust the outlet instead",
       .ground = Ground::judgement,
       .value = *outlet,
       .limit = *outlet,
       .kind = Kind::temperature});
}

}  // namespace

void find_flows(Reading& reading, std::optional<MadeStream>& shell_side,
                std::optional<MadeStream>& tube_side) {
  find_flow(reading, "shell_side", shell_side, "tube_side", tube_side);
  find_flow(reading, "tube_side", tube_side, "shell_side", shell_side);
  remark_on_outlet(reading, "shell_side", "tube_side", shell_side);
  remark_on_outlet(reading, "tube_side", "shell_side", tube_side);
}

}  // namespace dutygauge::case_io
