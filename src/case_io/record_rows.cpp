#include "field_rows.hpp"

// What a case says of a plant's record, and of what is planned.

namespace dutygauge::case_io {
namespace {

using enum Form;
using enum Need;
using units::Kind;

constexpr Bounds any{};
constexpr Bounds from_zero(double most) {
  return {.least = 0.0, .most = most};
}
constexpr Bounds positive(double most) {
  return {.least = 0.0, .most = most, .least_excluded = true};
}

constexpr Row rows[] = {
    {"readings", block, optional, Kind::ratio, any, "", "how the plant's files are written"},
    {"readings.separator", text, optional, Kind::ratio, any, "\";\"",
     "between the values: ';', ',' or tab; left out: found"},
    {"readings.decimal", text, optional, Kind::ratio, any, "\",\"",
     "the decimal mark, '.' or ','; left out: found"},
    {"readings.header_rows",
     whole,
     optional,
     Kind::count,
     {.least = 1, .most = 20},
     "3",
     "lines before the first reading; left out: found"},
    {"readings.time", block, optional, Kind::ratio, any, "", "how times are written"},
    {"readings.time.column", text, optional, Kind::ratio, any, "Zeit", "its header; left out: time"},
    {"readings.time.format", text, optional, Kind::ratio, any, "\"%d.%m.%Y %H:%M\"",
     "of %Y %y %m %b %d %H %I %p %M %S %f %z; left out: ISO 8601"},
    {"readings.time.offset", text, optional, Kind::ratio, any, "\"+01:00\"",
     "of standard time from UTC, where the times have none"},
    {"readings.time.summer_time", word, optional, Kind::ratio, any, "eu",
     "when the clocks go forward; left out: never", "none|eu|us"},
    {"readings.bad_words", texts, optional, Kind::ratio, any, "[bad, no data]",
     "that stand for a value of bad quality"},
    {"readings.bad_words.#", text, optional, Kind::ratio, any, "no data", "one of them"},
    {"readings.columns", block, optional, Kind::ratio, any, "",
     "where each channel stands; headers such as hot_in[degC] need no tag and unit"},
    {"readings.columns.@", block, optional, Kind::ratio, any, "", "of this channel"},
    {"readings.columns.@.tag", text, optional, Kind::ratio, any, "21FI1043.PV", "header of its column"},
    {"readings.columns.@.unit", text, optional, Kind::ratio, any, "", "of its values"},
    {"readings.columns.@.at", text, optional, Kind::ratio, any, "inlet",
     "of a volume flow, where it counts: inlet, or a temperature"},
    {"readings.columns.@.uncertainty", block, optional, Kind::ratio, any, "", "one standard deviation"},
    {"readings.columns.@.uncertainty.systematic", uncertainty, required, Kind::ratio, from_zero(1e7), "",
     "what it always shows wrong"},
    {"readings.columns.@.uncertainty.random", uncertainty, required, Kind::ratio, from_zero(1e7), "",
     "what scatters from reading to reading"},
    {"readings.columns.@.trust", word, optional, Kind::ratio, any, "doubtful",
     "whether the plant trusts it; left out: good", "good|doubtful"},
    {"readings.columns.@.meter", block, optional, Kind::ratio, any, "", "of a flow"},
    {"readings.columns.@.meter.kind", word, required, Kind::ratio, any, "orifice", "what it is",
     "orifice|venturi|turbine|vortex|magnetic|ultrasonic|coriolis"},
    {"readings.columns.@.meter.density", quantity, optional, Kind::density, positive(3e4), "741 kg/m3",
     "it is set for"},
    {"readings.columns.@.meter.compensated", word, optional, Kind::ratio, any, "no",
     "whether it corrects for the density it meets; left out: yes", "yes|no"},
    {"readings.clean_period", block, optional, Kind::ratio, any, "", "when the unit was clean"},
    {"readings.clean_period.from", instant, required, Kind::ratio, any, "2026-03-10", "its beginning"},
    {"readings.clean_period.to", instant, required, Kind::ratio, any, "2026-03-17",
     "its end; a date: the end of that day"},
    {"readings.events", list, optional, Kind::ratio, any, "[{at: 2026-03-08, what: cleaning}]",
     "what was done to the unit"},
    {"readings.events.#", block, optional, Kind::ratio, any, "", "one event"},
    {"readings.events.#.at", instant, optional, Kind::ratio, any, "2026-03-08", "when; or from and to"},
    {"readings.events.#.from", instant, optional, Kind::ratio, any, "2026-08-11", "its beginning"},
    {"readings.events.#.to", instant, optional, Kind::ratio, any, "2026-08-16", "its end"},
    {"readings.events.#.what", word, required, Kind::ratio, any, "cleaning", "what it was",
     "cleaning|outage|plugging|recalibration|other"},

    {"plan", block, optional, Kind::ratio, any, "", "the next stop and what cleaning costs"},
    {"plan.next_stop", instant, optional, Kind::ratio, any, "2027-03-15", "when the plant stops anyway"},
    {"plan.cleaning", block, optional, Kind::ratio, any, "", "one cleaning"},
    {"plan.cleaning.cost", money, optional, Kind::ratio, any, "48000 EUR", "without the lost duty"},
    {"plan.cleaning.days", number, optional, Kind::ratio, from_zero(365.0), "3",
     "the unit is out of service"},
    {"plan.cleaning.recovery", quantity, optional, Kind::ratio, positive(1.0), "85..100 %",
     "share of the deposit it removes"},
    {"plan.lost_duty_value", energy_price, optional, Kind::ratio, any, "28 EUR/MWh",
     "what heat not moved costs elsewhere"},
};

}  // namespace

std::span<const Row> record_rows() {
  return rows;
}

}  // namespace dutygauge::case_io
