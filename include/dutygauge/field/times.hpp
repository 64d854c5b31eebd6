#pragma once
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/field/mapping.hpp"

/// Written times to seconds since 1970-01-01T00:00:00Z, and back.
namespace dutygauge::field {

enum class TimeFault {
  none,
  unreadable,
  slashes,    ///< such as 01/02/2021: day or month first, nobody knows
  no_offset,  ///< neither in the text nor in the case
  absent,     ///< an hour that the clocks leave out
};

struct ReadTime {
  std::int64_t time = 0;
  TimeFault fault = TimeFault::none;
};

/// Reads the times of one record.
class TimeReader {
 public:
  /// Needs: a format without objection.
  explicit TimeReader(const Clock& clock);

  /// `last`: the time read before, which tells the two passes of a repeated hour apart.
  ReadTime read(std::string_view text, std::int64_t last) const;

 private:
  ReadTime read_iso(std::string_view text, std::int64_t last) const;
  ReadTime read_format(std::string_view text, std::int64_t last) const;
  ReadTime to_utc(std::int64_t local, std::int64_t last) const;

  Clock clock_;
};

/// What is wrong with a format; empty: nothing. It needs year, month, day and hour.
std::string objection_to_format(std::string_view format);

/// "+01:00", "-05:30", "Z" to seconds east of Greenwich.
std::optional<int> read_offset(std::string_view text);

/// A date ("2026-03-10": its first second) or a time of a case file; dates and times
/// without offset are those of `offset`, without one of UTC.
std::optional<std::int64_t> read_moment(std::string_view text, std::optional<int> offset);

/// Whether a text is a date without a time of day.
bool is_date(std::string_view text);

/// "2026-03-10T14:00:00Z".
std::string written(std::int64_t time);
/// The same into a buffer of 20 characters, without allocation.
void write_time(std::int64_t time, char* buffer);

}  // namespace dutygauge::field
