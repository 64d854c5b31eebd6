#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "dutygauge/field/times.hpp"
#include "parts.hpp"
#include "wording.hpp"

// The blocks `readings` and `plan`.

namespace dutygauge::case_io {
namespace {

using field::Channel;

std::string text_of(const Reading& reading, const std::string& key) {
  return std::string(word(reading.entries(), key).value_or(""));
}

char separator_of(Reading& reading) {
  const std::string key = "readings.separator";
  const auto text = word(reading.entries(), key);
  if (!text) return 0;
  if (*text == ";" || *text == ",") return text->front();
  if (*text == "tab" || *text == "\t") return '\t';
  reading.note(key, fmt::format("'{}' is no separator known here", shown(*text)), "';', ',' or tab",
               "write one of them in quotes, or leave the key out");
  return 0;
}

char decimal_of(Reading& reading, char separator) {
  const std::string key = "readings.decimal";
  const auto text = word(reading.entries(), key);
  if (!text) return 0;
  if (*text != "." && *text != ",") {
    reading.note(key, fmt::format("'{}' is no decimal mark", shown(*text)), "'.' or ','",
                 "write one of them in quotes, or leave the key out");
    return 0;
  }
  if (*text == "," && separator == ',')
    reading.note(key, "commas would both separate values and mark decimals", "two different marks",
                 "export with ';' or tabs between the values");
  return text->front();
}

std::optional<int> offset_of(Reading& reading) {
  const std::string key = "readings.time.offset";
  const auto text = word(reading.entries(), key);
  if (!text) return {};
  const auto offset = field::read_offset(*text);
  if (!offset)
    reading.note(key, fmt::format("'{}' is no offset from UTC", shown(*text)), "such as \"+01:00\", or Z",
                 "write sign, hours and minutes");
  return offset;
}

field::Clock clock_of(Reading& reading) {
  field::Clock clock;
  clock.column = text_of(reading, "readings.time.column");
  clock.format = text_of(reading, "readings.time.format");
  if (reading.has("readings.time.format"))
    if (const auto objection = field::objection_to_format(clock.format); !objection.empty())
      reading.note("readings.time.format", fmt::format("the format {}", objection),
                   "such as \"%d.%m.%Y %H:%M\"", "correct it");
  clock.offset = offset_of(reading);
  const auto summer = word(reading.entries(), "readings.time.summer_time");
  clock.summer_time = summer == "eu"   ? field::SummerTime::eu
                      : summer == "us" ? field::SummerTime::us
                                       : field::SummerTime::none;
  if (clock.summer_time != field::SummerTime::none && !reading.has("readings.time.offset"))
    reading.note("readings.time.summer_time", "stands without the offset of standard time",
                 "offset: \"+01:00\"", "add it beside");
  return clock;
}

field::Meter meter_of(Reading& reading, const std::string& block) {
  using field::Principle;
  field::Meter meter;
  const auto kind = word(reading.entries(), joined(block, "kind"));
  if (kind == "orifice" || kind == "venturi")
    meter.principle = Principle::differential_pressure;
  else if (kind == "coriolis")
    meter.principle = Principle::mass;
  else if (kind)
    meter.principle = Principle::velocity;
  meter.density = si(reading.entries(), joined(block, "density")).value_or(0.0);
  meter.compensated = word(reading.entries(), joined(block, "compensated")) != "no";
  if (!meter.compensated && !reading.has(joined(block, "density")))
    reading.note(joined(block, "compensated"), "the density the meter is set for is needed to correct it",
                 "density: 741 kg/m3", "add it beside, or leave compensated out");
  return meter;
}

/// What the case says of an instrument, else what is usual, as an assumption.
field::Instrument instrument_of(Reading& reading, Channel channel, const field::Meter& meter,
                                double temperature, Assumptions& assumed) {
  const std::string block = fmt::format("readings.columns.{}", field::name(channel));
  const std::string key = joined(block, "uncertainty");
  field::Instrument instrument = usual_instrument(channel, meter.principle, temperature);
  const Entries& entries = reading.entries();
  const auto systematic = entries.find(joined(key, "systematic")),
             random = entries.find(joined(key, "random"));
  if (systematic != entries.end() && random != entries.end()) {
    instrument = {systematic->second.value.si, random->second.value.si, systematic->second.relative};
    const bool mixed = systematic->second.relative != random->second.relative;
    // Nothing at all is the same share as amount.
    if (mixed && instrument.systematic > 0.0 && instrument.random > 0.0)
      reading.note(key, "one is a share of the reading, the other an amount", "both in the same way",
                   "write both in %, or both with a unit");
    if (mixed && instrument.systematic == 0.0) instrument.relative = random->second.relative;
  } else if (channel != Channel::valve && !reading.has(key)) {
    const auto kind =
        field::is_temperature(channel) ? units::Kind::temperature_difference : units::Kind::ratio;
    for (const auto& [part, value] :
         {std::pair{"systematic", instrument.systematic}, std::pair{"random", instrument.random}})
      assumed.push_back({.key = joined(key, part),
                         .value = value,
                         .kind = kind,
                         .why = "usual for an installed instrument of this kind",
                         .look_in = "calibration sheet"});
  }
  instrument.doubtful = word(entries, joined(block, "trust")) == "doubtful";
  return instrument;
}

void read_columns(Reading& reading, field::Mapping& mapping) {
  const auto shell = si(reading.entries(), "streams.shell_side.inlet.temperature");
  const auto tube = si(reading.entries(), "streams.tube_side.inlet.temperature");
  const double room = 293.15;  // where an inlet is missing the case is refused anyway
  const double hot = std::max(shell.value_or(room), tube.value_or(room));
  const double cold = std::min(shell.value_or(room), tube.value_or(room));
  for (std::size_t i = 0; i < field::channel_count; ++i) {
    const auto channel = static_cast<Channel>(i);
    const std::string block = fmt::format("readings.columns.{}", field::name(channel));
    field::Column& column = mapping.columns[i];
    column.tag = text_of(reading, joined(block, "tag"));
    column.unit = text_of(reading, joined(block, "unit"));
    column.at = text_of(reading, joined(block, "at"));
    if (reading.has(joined(block, "meter"))) column.meter = meter_of(reading, joined(block, "meter"));
    const bool is_hot = channel == Channel::hot_in || channel == Channel::hot_out;
    mapping.instruments[i] =
        instrument_of(reading, channel, column.meter, is_hot ? hot : cold, mapping.assumed);
    for (std::size_t j = 0; j < i && !column.tag.empty(); ++j)
      if (mapping.columns[j].tag == column.tag)
        reading.note(
            joined(block, "tag"),
            fmt::format("'{}' is the tag of {} too", shown(column.tag), field::name(static_cast<Channel>(j))),
            "one column for each channel", "correct one of them");
  }
}

/// The moment under a key; `at_end`: of a date its last second.
std::optional<std::int64_t> moment(const Reading& reading, const std::string& key, std::optional<int> offset,
                                   bool at_end) {
  const auto text = word(reading.entries(), key);
  if (!text) return {};
  const auto time = field::read_moment(*text, offset);
  return time && at_end && field::is_date(*text) ? std::optional(*time + 86399) : time;
}

std::optional<field::Period> period_of(Reading& reading, const std::string& block,
                                       std::optional<int> offset) {
  const auto from = moment(reading, joined(block, "from"), offset, false);
  const auto to = moment(reading, joined(block, "to"), offset, true);
  if (!from || !to) return {};
  if (*to < *from)
    reading.note(joined(block, "to"), "lies before from", "the later time", "correct one of them");
  return field::Period{*from, *to};
}

field::Doing event_kind(const Reading& reading, const std::string& key) {
  using field::Doing;
  const auto what = word(reading.entries(), key);
  if (what == "cleaning") return Doing::cleaning;
  if (what == "outage") return Doing::outage;
  if (what == "plugging") return Doing::plugging;
  return what == "recalibration" ? Doing::recalibration : Doing::other;
}

std::vector<field::Done> events_of(Reading& reading, std::optional<int> offset) {
  std::vector<field::Done> events;
  for (int i = 0;; ++i) {
    const std::string block = fmt::format("readings.events.{}", i);
    if (!reading.has(block)) break;
    const auto at = moment(reading, joined(block, "at"), offset, false);
    const auto period = period_of(reading, block, offset);
    const bool has_at = reading.has(joined(block, "at"));
    const bool has_from = reading.has(joined(block, "from")), has_to = reading.has(joined(block, "to"));
    if (has_at ? has_from || has_to : !(has_from && has_to))
      reading.note(block, "when it was is said neither by at alone nor by from and to",
                   "{at: 2026-03-08, ...} or {from: ..., to: ...}", "give one or the other");
    else if (at || period)
      events.push_back({at ? field::Period{*at, *at} : *period, event_kind(reading, joined(block, "what"))});
  }
  std::ranges::stable_sort(events, {}, [](const field::Done& event) { return event.when.from; });
  return events;
}

}  // namespace

field::Mapping mapping_of(Reading& reading) {
  field::Mapping mapping;
  mapping.separator = separator_of(reading);
  mapping.decimal = decimal_of(reading, mapping.separator);
  mapping.header_rows = whole(reading.entries(), "readings.header_rows").value_or(0);
  mapping.clock = clock_of(reading);
  for (int i = 0; reading.has(fmt::format("readings.bad_words.{}", i)); ++i)
    mapping.bad_words.push_back(text_of(reading, fmt::format("readings.bad_words.{}", i)));
  read_columns(reading, mapping);
  mapping.shell_density_known = knows_density(reading, "streams.shell_side");
  mapping.tube_density_known = knows_density(reading, "streams.tube_side");
  mapping.clean_period = period_of(reading, "readings.clean_period", mapping.clock.offset);
  mapping.events = events_of(reading, mapping.clock.offset);
  return mapping;
}

field::Planned plan_of(Reading& reading, std::optional<int> offset) {
  field::Planned plan;
  const Entries& entries = reading.entries();
  plan.next_stop = moment(reading, "plan.next_stop", offset, false);
  plan.cleaning_cost = si(entries, "plan.cleaning.cost");
  if (const auto days = si(entries, "plan.cleaning.days")) plan.cleaning_time = *days * 86400.0;
  if (const auto found = entries.find("plan.cleaning.recovery"); found != entries.end()) {
    const units::Value& recovery = found->second.value;
    plan.recovery_low = recovery.low.value_or(recovery.si);
    plan.recovery_high = recovery.high.value_or(recovery.si);
  }
  plan.lost_duty_value = si(entries, "plan.lost_duty_value");
  for (const char* key : {"plan.cleaning.cost", "plan.lost_duty_value"}) {
    const auto found = entries.find(key);
    if (found == entries.end()) continue;
    const std::string& currency = found->second.currency;
    if (!plan.currency.empty() && plan.currency != currency)
      reading.note(key, fmt::format("is in {}, the cost of a cleaning in {}", currency, plan.currency),
                   "one currency", "convert one of them");
    plan.currency = currency;
  }
  return plan;
}

}  // namespace dutygauge::case_io
