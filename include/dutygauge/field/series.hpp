#pragma once
#include <array>
#include <cstddef>
#include <cstdint>
#include <vector>

/// Readings of a unit in service and what they say, hour by hour and day by day.
namespace dutygauge::field {

/// What is measured. Hot and cold by inlet temperature level, drops by side.
enum class Channel : std::uint8_t {
  hot_flow,
  cold_flow,
  hot_in,
  hot_out,
  cold_in,
  cold_out,
  tube_dp,
  shell_dp,
  valve,
};
inline constexpr std::size_t channel_count = 9;

/// The value of each channel: flows [kg/s], temperatures [K], drops [Pa], valve [-].
/// A quiet NaN is a missing value; it never leaves this module.
using Channels = std::array<double, channel_count>;

constexpr std::size_t index_of(Channel channel) {
  return static_cast<std::size_t>(channel);
}

/// One row of a plant's record.
struct Reading {
  std::int64_t time = 0;  ///< [s] since 1970-01-01T00:00:00Z
  Channels value{};
};

/// Standard uncertainties of a channel: of what it always shows wrong and of what
/// scatters from reading to reading. Absolute, or relative to the reading.
struct Instrument {
  double systematic = 0, random = 0;
  bool relative = false;
  bool doubtful = false;  ///< the user does not trust it
};
using Instruments = std::array<Instrument, channel_count>;

/// What one reading says of the exchanger.
struct Apparent {
  double hot_duty = 0, cold_duty = 0;  ///< [W]; NaN where a channel of that side is missing
  double duty = 0;                     ///< weighted by their uncertainties [W]
  double closure = 0;                  ///< hot/cold - 1 [-]; NaN where a channel is missing
  double closure_uncertainty = 0;      ///< standard, of both kinds together [-]
  double u = 0, u_clean = 0;           ///< from the readings; of the films at their flows [W/m2.K]
  double fouling = 0;                  ///< 1/u - 1/u_clean, outside area [m2.K/W]
  double fouling_random = 0;           ///< standard, scatter of the readings [m2.K/W]
  double fouling_systematic = 0;       ///< standard, what the instruments always show wrong [m2.K/W]
  double noise_amplification = 0;      ///< d ln NTU / d ln effectiveness [-]
};

/// The used readings of one day, by medians.
struct Day {
  double day = 0;  ///< middle of the day, days since the first reading of the record
  int count = 0;   ///< readings used
  Channels value{};
  Apparent apparent{};
};
using Days = std::vector<Day>;

}  // namespace dutygauge::field
