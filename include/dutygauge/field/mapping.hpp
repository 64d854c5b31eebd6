#pragma once
#include <array>
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/field/series.hpp"
#include "dutygauge/findings.hpp"

/// What a case says of a plant's record: how its files are written, what was done to the
/// unit, and what is planned.
namespace dutygauge::field {

/// The channel as it is written in a header and in a case ("hot_flow").
std::string_view name(Channel channel);
std::optional<Channel> channel_named(std::string_view name);

constexpr bool is_flow(Channel channel) {
  return channel == Channel::hot_flow || channel == Channel::cold_flow;
}
constexpr bool is_temperature(Channel channel) {
  return channel >= Channel::hot_in && channel <= Channel::cold_out;
}
constexpr bool is_drop(Channel channel) {
  return channel == Channel::tube_dp || channel == Channel::shell_dp;
}

/// When the clocks of a plant go forward in summer.
enum class SummerTime {
  none,
  eu,  ///< last Sunday of March to last Sunday of October, at 01:00 UTC
  us,  ///< second Sunday of March to first Sunday of November, at 02:00 of the wall clock
};

/// How the time of a reading is written.
struct Clock {
  std::string column;         ///< header of its column; empty: "time"
  std::string format;         ///< "%d.%m.%Y %H:%M"; empty: ISO 8601
  std::optional<int> offset;  ///< of standard time from UTC [s], where the text has none
  SummerTime summer_time = SummerTime::none;
};

/// What a flow meter senses.
enum class Principle {
  unstated,
  differential_pressure,  ///< rho v2: orifice, venturi
  velocity,               ///< v: turbine, vortex, magnetic, ultrasonic
  mass,                   ///< coriolis
};

struct Meter {
  Principle principle = Principle::unstated;
  double density = 0;       ///< it was set for [kg/m3]; 0: not stated
  bool compensated = true;  ///< it corrects for the density it meets
};

/// Where the values of one channel come from.
struct Column {
  std::string tag;   ///< header of its column; empty: the channel's name
  std::string unit;  ///< empty: the one in the header
  std::string at;    ///< of a volume flow: "inlet", "60 degF"; empty: not said
  Meter meter;
};

/// A stretch of time, both ends included [s] since 1970-01-01T00:00:00Z.
struct Period {
  std::int64_t from = 0, to = 0;
  bool holds(std::int64_t time) const { return time >= from && time <= to; }
};

enum class Doing { cleaning, outage, plugging, recalibration, other };

/// What the plant knows to have happened; `when` of a moment has two equal ends.
struct Done {
  Period when;
  Doing kind = Doing::other;
};

/// How a record is to be read.
struct Mapping {
  char separator = 0;   ///< 0: found from the first lines
  char decimal = 0;     ///< '.' or ','; 0: found
  int header_rows = 0;  ///< 0: found
  Clock clock;
  std::vector<std::string> bad_words;  ///< that stand for a value of bad quality
  std::array<Column, channel_count> columns;
  Instruments instruments{};
  Assumptions assumed;                                         ///< of the instruments
  bool shell_density_known = true, tube_density_known = true;  ///< a volume flow needs it
  std::optional<Period> clean_period;
  std::vector<Done> events;  ///< in order of their beginning
};

/// What is planned, and what it costs.
struct Planned {
  std::optional<std::int64_t> next_stop;
  std::optional<double> cleaning_cost;                ///< [currency]
  std::optional<double> cleaning_time;                ///< [s]
  std::optional<double> recovery_low, recovery_high;  ///< share of the deposit a cleaning removes [-]
  std::optional<double> lost_duty_value;              ///< [currency/J]
  std::string currency;                               ///< "EUR"; empty where nothing has a price
};

/// What uncertainty.md calls usual for an installed instrument, where the case says nothing.
Instrument usual_instrument(Channel channel, Principle principle, double temperature);

}  // namespace dutygauge::field
