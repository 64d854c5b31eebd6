#include <fmt/format.h>

#include <algorithm>

#include "dutygauge/units/mention.hpp"
#include "parts.hpp"
#include "wording.hpp"

// The block `anchor`: one steady reading of the running unit.

namespace dutygauge::case_io {
namespace {

using uncertainty::ReadStream;
using units::Kind;

constexpr double usual_record = 0.2;   // of a fouling found from a year's readings, without a word on it
constexpr double least_spread = 1e-5;  // [m2.K/W]

std::string in_words(double temperature) {
  return units::typed(temperature, Kind::temperature);
}

/// A flow as read, as a mass flow at the reading's own inlet; empty where none was read.
std::optional<double> flow_read(Reading& reading, const std::string& side, const rating::Stream& stream,
                                double inlet) {
  const auto found = reading.entries().find(side + ".flow");
  if (found == reading.entries().end()) return {};
  if (found->second.from_duty) {
    reading.note(side + ".flow", "from_duty is no reading", "a flow as read",
                 "leave the key out: one missing flow is found from the heat balance");
    return {};
  }
  if (found->second.basis == units::FlowBasis::mass) return found->second.value.si;
  const auto density = flow_density(reading, side, stream.fluid, {inlet, stream.inlet_pressure});
  return density ? std::optional(*density * found->second.value.si) : std::nullopt;
}

void check_range(Reading& reading, const std::string& key, const rating::Stream& stream, double temperature) {
  const auto usable = fluids::usable_temperatures(stream.fluid, stream.inlet_pressure);
  if (temperature >= usable.low && temperature <= usable.high) return;
  const bool above = temperature > usable.high;
  reading.note(key,
               fmt::format("{} cannot be: {}", in_words(temperature),
                           fluids::why_it_ends(stream.fluid, stream.inlet_pressure, above)),
               "a temperature of the fluid as it is described", "check the reading, or the fluid");
}

std::optional<ReadStream> stream_read(Reading& reading, const std::string& name,
                                      const rating::Stream& stream) {
  const std::string side = "anchor." + name;
  const auto inlet = si(reading.entries(), side + ".inlet"), outlet = si(reading.entries(), side + ".outlet");
  if (!inlet || !outlet) return {};
  check_range(reading, side + ".inlet", stream, *inlet);
  check_range(reading, side + ".outlet", stream, *outlet);
  if (reading.is_at_fault(side + ".inlet") || reading.is_at_fault(side + ".outlet")) return {};
  return ReadStream{flow_read(reading, side, stream, *inlet), *inlet, *outlet};
}

/// What the four temperatures cannot be: a stream that goes the wrong way, or past the other.
void check_temperatures(Reading& reading, const ReadStream& shell, const ReadStream& tube,
                        bool shell_is_hot_in_case) {
  const auto note = [&](const char* key, std::string what, const char* expected) {
    reading.note(key, std::move(what), expected, "check the reading, and which stream is in the tubes");
  };
  if ((shell.inlet > tube.inlet) != shell_is_hot_in_case || shell.inlet == tube.inlet)
    return note("anchor.tube_side.inlet",
                fmt::format("the shell side was read to enter at {} and the tube side at {}",
                            in_words(shell.inlet), in_words(tube.inlet)),
                "the same stream the hotter as in streams");
  const auto check = [&](const char* key, const ReadStream& stream, const ReadStream& other) {
    const bool hot = stream.inlet > other.inlet;
    if (hot ? stream.outlet >= stream.inlet : stream.outlet <= stream.inlet)
      return note(key,
                  fmt::format("the {} stream was read to go from {} to {}", hot ? "hot" : "cold",
                              in_words(stream.inlet), in_words(stream.outlet)),
                  hot ? "an outlet colder than its inlet" : "an outlet warmer than its inlet");
    if (hot ? stream.outlet < other.inlet : stream.outlet > other.inlet)
      note(key,
           fmt::format("{} lies beyond the other stream's inlet of {}", in_words(stream.outlet),
                       in_words(other.inlet)),
           "an outlet between the two inlets");
  };
  check("anchor.shell_side.outlet", shell, tube);
  check("anchor.tube_side.outlet", tube, shell);
}

double instrument(Reading& reading, const char* key, double usual, Kind kind, const char* why) {
  if (const auto typed = si(reading.entries(), key)) return *typed;
  reading.assume({.key = key, .value = usual, .kind = kind, .why = why, .look_in = "instrument list"});
  return usual;
}

std::optional<uncertainty::SteadyReading> steady_reading(Reading& reading, const rating::Stream& shell_side,
                                                         const rating::Stream& tube_side) {
  const auto shell = stream_read(reading, "shell_side", shell_side);
  const auto tube = stream_read(reading, "tube_side", tube_side);
  if (!shell || !tube) return {};
  if (!reading.has("anchor.shell_side.flow") && !reading.has("anchor.tube_side.flow"))
    reading.note("anchor", "neither flow was read", "the flow of at least one stream",
                 "read one: temperatures alone say nothing of the duty");
  check_temperatures(reading, *shell, *tube, shell_side.inlet_temperature > tube_side.inlet_temperature);
  uncertainty::SteadyReading result{.shell_side = *shell, .tube_side = *tube};
  result.temperature_sigma =
      instrument(reading, "anchor.instruments.temperature", 0.5, Kind::temperature_difference,
                 "a plant thermometer in a well, one standard deviation");
  result.flow_sigma = instrument(reading, "anchor.instruments.flow", 0.03, Kind::ratio,
                                 "a plant flow meter, one standard deviation");
  return result;
}

/// A fouling that a record has shown, instead of one reading.
FoundFouling found_fouling(Reading& reading, const Entry& entry) {
  const std::string key = "anchor.fouling";
  for (const char* other : {"anchor.shell_side", "anchor.tube_side", "anchor.instruments"})
    if (reading.has(other))
      reading.note(other, "stands beside anchor.fouling, which says the same", "one of the two",
                   "keep the reading, or the fouling that a record has shown");
  FoundFouling found{.value = entry.value.si};
  if (const auto deviation = entry.value.standard_deviation) {
    found.sigma = *deviation;
    return found;
  }
  found.sigma = std::max(usual_record * entry.value.si, least_spread);
  reading.assume(
      {.key = key,
       .value = entry.value.si,
       .kind = Kind::fouling_resistance,
       .why = fmt::format("given without a spread: one standard deviation of {} is taken; write it "
                          "as 0.0003 +- 0.00003 m2.K/W",
                          units::mention(found.sigma, Kind::fouling_resistance)),
       .look_in = "result of the readings"});
  return found;
}

}  // namespace

std::optional<AnchorReading> anchor_of(Reading& reading, const rating::Stream& shell_side,
                                       const rating::Stream& tube_side) {
  if (!reading.has("anchor")) return {};
  const std::string taken(word(reading.entries(), "anchor.taken").value_or(""));
  if (const auto entry = reading.entries().find("anchor.fouling"); entry != reading.entries().end()) {
    FoundFouling found = found_fouling(reading, entry->second);
    found.taken = taken;
    return AnchorReading{std::move(found), {}};
  }
  if (reading.has("anchor.fouling")) return {};  // at fault, and said so
  for (const char* side : {"anchor.shell_side", "anchor.tube_side"})
    if (!reading.has(side)) {
      reading.note("anchor", fmt::format("{} is missing", side),
                   "what was read of both streams, or fouling alone",
                   "write {inlet: ..., outlet: ..., flow: ...}, or the fouling that a record has shown");
      return {};
    }
  auto read = steady_reading(reading, shell_side, tube_side);
  if (!read) return {};
  read->taken = taken;
  return AnchorReading{std::move(*read), {}};
}

}  // namespace dutygauge::case_io
