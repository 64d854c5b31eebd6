#include "dutygauge/field/times.hpp"

#include <algorithm>
#include <array>

namespace dutygauge::field {
namespace {

constexpr std::int64_t day = 86400, hour = 3600;
constexpr std::int64_t longest_fraction = 9;

struct Civil {
  int year = 0, month = 0, day = 0, hour = 0, minute = 0, second = 0;
};

constexpr bool is_digit(char c) {
  return c >= '0' && c <= '9';
}

constexpr bool is_leap(int year) {
  return year % 4 == 0 && (year % 100 != 0 || year % 400 == 0);
}

constexpr int days_of(int year, int month) {
  constexpr int days[] = {31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31};
  return month == 2 && is_leap(year) ? 29 : days[month - 1];
}

/// Days since 1970-01-01 of a date of the Gregorian calendar: years begin in March, so that
/// the day of a leap year is the last of its year; 400 years have 146 097 days.
constexpr std::int64_t days_since_epoch(int year, int month, int day_of_month) {
  const int shifted = month <= 2 ? year - 1 : year;
  const std::int64_t era = shifted / 400;
  const int of_era = shifted % 400;
  const int of_year = (153 * (month + (month > 2 ? -3 : 9)) + 2) / 5 + day_of_month - 1;
  return era * 146097 + of_era * 365 + of_era / 4 - of_era / 100 + of_year - 719468;
}
static_assert(days_since_epoch(1970, 1, 1) == 0);
static_assert(days_since_epoch(2000, 3, 1) == 11017);

constexpr bool is_possible(const Civil& c) {
  return c.year >= 1900 && c.year <= 2200 && c.month >= 1 && c.month <= 12 && c.day >= 1 &&
         c.day <= days_of(c.year, c.month) && c.hour <= 24 && c.minute <= 59 && c.second <= 60 &&
         (c.hour < 24 || (c.minute == 0 && c.second == 0));
}

constexpr std::int64_t seconds_of(const Civil& c) {
  return days_since_epoch(c.year, c.month, c.day) * day + c.hour * hour + c.minute * 60 + c.second;
}

/// The day of the n-th Sunday of a month; n = 0: the last.
constexpr std::int64_t sunday(int year, int month, int n) {
  const auto weekday = [](std::int64_t days) { return (days % 7 + 11) % 7; };  // 0: Sunday
  if (n == 0) {
    const std::int64_t last = days_since_epoch(year, month, days_of(year, month));
    return last - weekday(last);
  }
  const std::int64_t first = days_since_epoch(year, month, 1);
  return first + (7 - weekday(first)) % 7 + 7 * (n - 1);
}
static_assert(sunday(2021, 3, 0) == days_since_epoch(2021, 3, 28));
static_assert(sunday(2021, 11, 1) == days_since_epoch(2021, 11, 7));
static_assert(sunday(2021, 3, 2) == days_since_epoch(2021, 3, 14));

int year_of(std::int64_t time) {
  int year = static_cast<int>(1970 + time / 31556952);
  while (days_since_epoch(year, 1, 1) * day > time) --year;
  while (days_since_epoch(year + 1, 1, 1) * day <= time) ++year;
  return year;
}

/// When the clocks are forward in the year of a local standard time, in UTC.
Period summer_of(int year, SummerTime rule, int offset) {
  if (rule == SummerTime::eu) return {sunday(year, 3, 0) * day + hour, sunday(year, 10, 0) * day + hour};
  return {sunday(year, 3, 2) * day + 2 * hour - offset, sunday(year, 11, 1) * day + hour - offset};
}

/// Text read from the left.
struct Scan {
  std::string_view text;
  bool ok = true;

  int number(int least_digits, int most_digits) {
    int value = 0, digits = 0;
    while (digits < most_digits && !text.empty() && is_digit(text.front())) {
      value = 10 * value + (text.front() - '0');
      text.remove_prefix(1);
      ++digits;
    }
    if (digits < least_digits) ok = false;
    return value;
  }
  bool take(char c) {
    if (text.empty() || text.front() != c) return false;
    text.remove_prefix(1);
    return true;
  }
  void need(char c) {
    if (!take(c)) ok = false;
  }
  void fraction() {
    std::int64_t digits = 0;
    for (; digits < longest_fraction && !text.empty() && is_digit(text.front()); ++digits)
      text.remove_prefix(1);
    if (digits == 0) ok = false;
  }
};

bool is_offset_begin(char c) {
  return c == 'Z' || c == 'z' || c == '+' || c == '-';
}

/// An offset that ends the text.
std::optional<int> offset_of(Scan& scan) {
  if (scan.take('Z') || scan.take('z')) return 0;
  const int sign = scan.take('-') ? -1 : 1;
  if (sign > 0) scan.need('+');
  const int hours = scan.number(2, 2);
  int minutes = 0;
  const bool colon = scan.take(':');
  if (colon || !scan.text.empty()) minutes = scan.number(2, 2);
  if (!scan.ok || hours > 18 || minutes > 59) return {};
  return sign * (hours * 3600 + minutes * 60);
}

constexpr std::string_view months[] = {"jan", "feb", "mar", "apr", "may", "jun",
                                       "jul", "aug", "sep", "oct", "nov", "dec"};

int month_named(Scan& scan) {
  if (scan.text.size() < 3) return 0;
  std::array<char, 3> low{};
  for (std::size_t i = 0; i < 3; ++i) low[i] = static_cast<char>(scan.text[i] | 0x20);
  for (int i = 0; i < 12; ++i)
    if (months[i] == std::string_view(low.data(), 3)) {
      scan.text.remove_prefix(3);
      return i + 1;
    }
  return 0;
}

constexpr std::string_view known_fields = "YmdHMSyfbzIp%";

/// What a format has read so far.
struct ByFormat {
  Civil civil{};
  std::optional<int> offset{};
  bool twelve = false, afternoon = false;
};

void read_field(char field, Scan& scan, ByFormat& read) {
  Civil& c = read.civil;
  if (field == 'Y') c.year = scan.number(4, 4);
  if (field == 'y') c.year = 2000 + scan.number(2, 2);
  if (field == 'm') c.month = scan.number(1, 2);
  if (field == 'b') c.month = month_named(scan);
  if (field == 'd') c.day = scan.number(1, 2);
  if (field == 'H') c.hour = scan.number(1, 2);
  if (field == 'I') c.hour = scan.number(1, 2), read.twelve = true;
  if (field == 'M') c.minute = scan.number(2, 2);
  if (field == 'S') c.second = scan.number(2, 2);
  if (field == 'f') scan.fraction();
  if (field == '%') scan.need('%');
  if (field == 'z') {
    read.offset = offset_of(scan);
    if (!read.offset) scan.ok = false;
  }
  if (field == 'p') {
    read.afternoon = scan.take('P') || scan.take('p');
    if (!read.afternoon && !scan.take('A') && !scan.take('a')) scan.ok = false;
    if (!scan.take('M') && !scan.take('m')) scan.ok = false;
  }
}

bool looks_like_slashes(std::string_view text) {
  Scan scan{text};
  scan.number(1, 2);
  if (!scan.ok || scan.text.empty()) return false;
  const char mark = scan.text.front();
  if (mark != '/' && mark != '.' && mark != '-') return false;
  scan.text.remove_prefix(1);
  scan.number(1, 2);
  return scan.ok && scan.take(mark) && !scan.text.empty() && is_digit(scan.text.front());
}

/// Year, month, day, and the time of day where one follows.
Civil scan_iso(Scan& scan, bool& has_time) {
  Civil c;
  c.year = scan.number(4, 4);
  scan.need('-');
  c.month = scan.number(2, 2);
  scan.need('-');
  c.day = scan.number(2, 2);
  has_time = scan.take('T') || scan.take(' ') || scan.take('t');
  if (!has_time) return c;
  c.hour = scan.number(2, 2);
  scan.need(':');
  c.minute = scan.number(2, 2);
  if (scan.take(':')) {
    c.second = scan.number(2, 2);
    if (scan.take('.') || scan.take(',')) scan.fraction();
  }
  return c;
}

}  // namespace

TimeReader::TimeReader(const Clock& clock) : clock_(clock) {}

ReadTime TimeReader::read(std::string_view text, std::int64_t last) const {
  return clock_.format.empty() ? read_iso(text, last) : read_format(text, last);
}

ReadTime TimeReader::read_iso(std::string_view text, std::int64_t last) const {
  Scan scan{text};
  bool has_time = false;
  const Civil civil = scan_iso(scan, has_time);
  if (!scan.ok || !is_possible(civil))
    return {0, looks_like_slashes(text) ? TimeFault::slashes : TimeFault::unreadable};
  if (!has_time) return {0, TimeFault::unreadable};
  const std::int64_t local = seconds_of(civil);
  if (scan.text.empty()) return to_utc(local, last);
  scan.take(' ');
  if (scan.text.empty() || !is_offset_begin(scan.text.front())) return {0, TimeFault::unreadable};
  const auto offset = offset_of(scan);
  if (!offset || !scan.text.empty()) return {0, TimeFault::unreadable};
  return {local - *offset, TimeFault::none};
}

ReadTime TimeReader::read_format(std::string_view text, std::int64_t last) const {
  Scan scan{text};
  ByFormat read;
  const std::string_view format = clock_.format;
  for (std::size_t i = 0; i < format.size() && scan.ok; ++i) {
    if (format[i] == '%')
      read_field(format[++i], scan, read);
    else
      scan.need(format[i]);
  }
  if (!scan.ok || !scan.text.empty()) return {0, TimeFault::unreadable};
  if (read.twelve && (read.civil.hour < 1 || read.civil.hour > 12)) return {0, TimeFault::unreadable};
  if (read.twelve) read.civil.hour = read.civil.hour % 12 + (read.afternoon ? 12 : 0);
  if (!is_possible(read.civil)) return {0, TimeFault::unreadable};
  const std::int64_t local = seconds_of(read.civil);
  if (read.offset) return {local - *read.offset, TimeFault::none};
  return to_utc(local, last);
}

ReadTime TimeReader::to_utc(std::int64_t local, std::int64_t last) const {
  if (!clock_.offset) return {0, TimeFault::no_offset};
  const std::int64_t standard = local - *clock_.offset, forward = standard - hour;
  if (clock_.summer_time == SummerTime::none) return {standard, TimeFault::none};
  const Period summer = summer_of(year_of(local), clock_.summer_time, *clock_.offset);
  const auto is_summer = [&](std::int64_t time) { return time >= summer.from && time < summer.to; };
  if (is_summer(forward)) {
    // In the repeated hour both would do: the first pass until time would run backwards.
    const bool repeated = !is_summer(standard);
    return {repeated && forward <= last && standard > last ? standard : forward, TimeFault::none};
  }
  if (is_summer(standard)) return {standard, TimeFault::absent};
  return {standard, TimeFault::none};
}

std::string objection_to_format(std::string_view format) {
  std::string seen;
  for (std::size_t i = 0; i < format.size(); ++i) {
    if (format[i] != '%') continue;
    if (++i == format.size()) return "ends with a lone %";
    if (known_fields.find(format[i]) == std::string_view::npos)
      return std::string("has %") + format[i] + ", which is not known here";
    seen += format[i];
  }
  const auto has = [&](char field) { return seen.find(field) != std::string::npos; };
  if (!has('Y') && !has('y')) return "has no year (%Y)";
  if (!has('m') && !has('b')) return "has no month (%m)";
  if (!has('d')) return "has no day (%d)";
  if (!has('H') && !has('I')) return "has no hour (%H)";
  if (has('I') != has('p')) return "has only one of %I and %p";
  return {};
}

std::optional<int> read_offset(std::string_view text) {
  if (text.empty() || !is_offset_begin(text.front())) return {};
  Scan scan{text};
  const auto offset = offset_of(scan);
  return scan.text.empty() ? offset : std::nullopt;
}

bool is_date(std::string_view text) {
  Scan scan{text};
  bool has_time = false;
  const Civil civil = scan_iso(scan, has_time);
  return scan.ok && !has_time && scan.text.empty() && is_possible(civil);
}

std::optional<std::int64_t> read_moment(std::string_view text, std::optional<int> offset) {
  const std::string whole = is_date(text) ? std::string(text) + "T00:00" : std::string(text);
  const auto read = TimeReader({.column = {}, .format = {}, .offset = offset.value_or(0)}).read(whole, 0);
  return read.fault == TimeFault::none ? std::optional(read.time) : std::nullopt;
}

void write_time(std::int64_t time, char* buffer) {
  const int year = year_of(time);
  std::int64_t days = time / day - days_since_epoch(year, 1, 1) - (time % day < 0 ? 1 : 0);
  const std::int64_t of_day = ((time % day) + day) % day;
  int month = 1;
  while (days >= days_of(year, month)) days -= days_of(year, month++);
  const auto put = [&](int at, std::int64_t value, int digits) {
    for (int i = digits - 1; i >= 0; --i, value /= 10) buffer[at + i] = static_cast<char>('0' + value % 10);
  };
  std::copy_n("0000-00-00T00:00:00Z", 20, buffer);
  put(0, year, 4), put(5, month, 2), put(8, days + 1, 2);
  put(11, of_day / hour, 2), put(14, of_day / 60 % 60, 2), put(17, of_day % 60, 2);
}

std::string written(std::int64_t time) {
  std::string text(20, ' ');
  write_time(time, text.data());
  return text;
}

}  // namespace dutygauge::field
