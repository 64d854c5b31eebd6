#include <fmt/format.h>
#include <sys/stat.h>

#include <algorithm>
#include <cmath>
#include <limits>

#include "cells.hpp"
#include "header.hpp"

namespace dutygauge::field {
namespace {

constexpr double missing = std::numeric_limits<double>::quiet_NaN();
constexpr std::int64_t before_all = std::numeric_limits<std::int64_t>::min();
constexpr std::size_t examples = 3;
constexpr int rows_for_resolution = 1000;

/// Words and numbers that stand for a value of bad quality.
struct BadWords {
  explicit BadWords(const std::vector<std::string>& words) {
    for (const std::string& word : words)
      if (const auto number = units::number(word)) numbers.push_back(*number);
  }
  bool holds(double value) const {
    return !numbers.empty() && std::ranges::find(numbers, value) != numbers.end();
  }
  std::vector<double> numbers;
};

/// What rows of all files share.
struct Shared {
  const Mapping& mapping;
  const Streams streams;
  const TimeReader times;
  const BadWords bad_words;
  KeepOn keep_on;
};

/// One file on its way through.
class File {
 public:
  File(const std::string& path, const Shared& shared, Tally& tally, Channels& resolution)
      : shared_(shared), tally_(tally), resolution_(resolution), lines_(path, shared.keep_on) {
    understood_.file = path;
    std::string_view line;
    while (kept_.size() < lines_looked_at && next_line(line))
      kept_.push_back({lines_.number(), std::string(line)});
    layout_ = layout_of(kept_, shared.mapping, shared.streams, shared.times, understood_);
    at_ = layout_.header_lines;
    cells_.reserve(layout_.cells_needed);
  }

  /// The next row later than `last`; false at the end.
  bool next(Reading& reading, std::int64_t last) {
    std::string_view line;
    std::int64_t number = 0;
    while (next_row(line, number)) {
      ++tally_.rows;
      const Drop drop = read_row(line, number, last, reading);
      if (drop == Drop::none) {
        show(line, number, reading);
        return true;
      }
      ++tally_[drop];
    }
    if (first_time_line_ == 0)
      throw FileError(understood_.file, 0, 0,
                      {"no reading below the header", "a reading a line", "check the export"});
    return false;
  }

  const Understood& understood() const { return understood_; }

 private:
  /// Neither blank nor a comment.
  bool next_line(std::string_view& line) {
    while (lines_.next(line)) {
      const auto text = without_blanks(line);
      if (!text.empty() && text.front() != '#') return true;
    }
    return false;
  }

  bool next_row(std::string_view& line, std::int64_t& number) {
    if (at_ < kept_.size()) {
      line = kept_[at_].text;
      number = kept_[at_++].number;
      return true;
    }
    const bool found = next_line(line);
    number = lines_.number();
    return found;
  }

  Drop read_row(std::string_view line, std::int64_t number, std::int64_t last, Reading& reading) {
    split(line, layout_.separator, layout_.cells_needed, cells_);
    if (cells_.size() <= layout_.time_at || cells_.size() < 2) return Drop::malformed;
    const std::string_view when = cells_[layout_.time_at];
    const ReadTime read = shared_.times.read(when, last);
    if (read.fault != TimeFault::none) return time_fault(when, read, number);
    if (first_time_line_ == 0) first_time_line_ = number, first_time_ = shown(when);
    if (read.time <= last && last != before_all) return read.time == last ? Drop::duplicate : Drop::backward;
    reading.time = read.time;
    read_values(number, reading);
    return Drop::none;
  }

  void read_values(std::int64_t number, Reading& reading) {
    reading.value.fill(missing);
    for (const UsedCell& used : layout_.used) {
      double& value = reading.value[index_of(used.channel)];
      if (used.at >= cells_.size()) {
        ++tally_.missing;
        continue;
      }
      const std::string_view cell = cells_[used.at];
      double amount = 0;
      CellKind kind = read_cell(cell, layout_.decimal, amount);
      if (kind == CellKind::number) {
        value = used.conversion(amount);
        const bool impossible = !std::isfinite(value) || (is_temperature(used.channel) && value <= 0.0);
        if (impossible || shared_.bad_words.holds(amount)) kind = CellKind::bad;
        if (rows_ < rows_for_resolution) note_resolution(used, cell);
      }
      if (kind == CellKind::number) continue;
      value = missing;
      ++(kind == CellKind::missing ? tally_.missing : tally_.bad);
      if (kind == CellKind::bad && tally_.first_bad.size() < examples)
        tally_.first_bad.push_back(
            fmt::format("{}:{}: {}: '{}'", understood_.file, number, name(used.channel), shown(cell)));
    }
    ++rows_;
    for (const UsedCell& used : layout_.used) {
      if (used.conversion.density_factor.empty()) continue;
      const Channel inlet = used.channel == Channel::hot_flow ? Channel::hot_in : Channel::cold_in;
      reading.value[index_of(used.channel)] *= used.conversion.density_factor(reading.value[index_of(inlet)]);
    }
  }

  void note_resolution(const UsedCell& used, std::string_view cell) {
    double last = used.conversion.factor * std::pow(10.0, -decimals_of(cell, layout_.decimal));
    if (!used.conversion.density_factor.empty()) last *= used.conversion.density_factor(missing);
    double& known = resolution_[index_of(used.channel)];
    if (known == 0.0 || last < known) known = last;
  }

  Drop time_fault(std::string_view when, const ReadTime& read, std::int64_t number) {
    if (when == layout_.time_header) return Drop::repeated_header;
    if (read.fault == TimeFault::absent) return Drop::absent_time;
    const auto refuse = [&](std::string what, std::string expected, std::string remedy) {
      throw FileError(understood_.file, number, 1, {std::move(what), std::move(expected), std::move(remedy)});
    };
    const std::string text = shown(when);
    if (first_time_line_ > 0 && is_other_format(when, read.fault))
      refuse(fmt::format("two date formats in one file: '{}' here, '{}' in line {}", text, first_time_,
                         understood_.first->line),
             "one format for all times", "export it again with one format");
    if (read.fault == TimeFault::slashes)
      refuse(fmt::format("the date '{}' may have its day or its month first", text),
             "2021-02-01T13:00:00Z, or the format in the case",
             "state it in the case: readings.time.format, such as \"%d/%m/%Y %H:%M\"");
    if (read.fault == TimeFault::no_offset)
      refuse(fmt::format("the time '{}' has no offset from UTC", text), "Z or +01:00 behind it",
             "state it in the case: readings.time.offset");
    if (first_time_line_ == 0 && shared_.mapping.clock.format.empty())
      refuse(fmt::format("'{}' is no time", text), "2021-02-01T13:00:00Z, or the format in the case",
             "state it in the case: readings.time.format");
    if (first_time_line_ == 0)
      refuse(fmt::format("the time '{}' is not written as {}", text, shared_.mapping.clock.format),
             "the format of readings.time.format in the case", "correct the format");
    if (tally_.first_bad_times.size() < examples)
      tally_.first_bad_times.push_back(fmt::format("{}:{}: '{}'", understood_.file, number, text));
    return Drop::unreadable_time;
  }

  /// Whether a time that cannot be read would be one in another format.
  bool is_other_format(std::string_view when, TimeFault fault) const {
    if (fault == TimeFault::slashes) return true;
    if (shared_.mapping.clock.format.empty()) return false;
    const TimeFault as_iso = TimeReader({.column = {}, .format = {}, .offset = 0}).read(when, 0).fault;
    return as_iso == TimeFault::none || as_iso == TimeFault::slashes;
  }

  void show(std::string_view line, std::int64_t number, const Reading& reading) {
    if (!understood_.first) {
      understood_.first = ShownRow{number, std::string(line), reading};
      understood_.last = understood_.first;
      return;
    }
    understood_.last->line = number;
    understood_.last->typed.assign(line);
    understood_.last->reading = reading;
  }

  const Shared& shared_;
  Tally& tally_;
  Channels& resolution_;
  Lines lines_;
  std::vector<KeptLine> kept_;
  std::size_t at_ = 0;
  Layout layout_;
  std::vector<std::string_view> cells_;
  Understood understood_;
  std::string first_time_;
  std::int64_t first_time_line_ = 0;
  int rows_ = 0;
};

bool is_regular(const std::string& file) {
  struct stat status {};
  return file != "-" && ::stat(file.c_str(), &status) == 0 && S_ISREG(status.st_mode);
}

}  // namespace

struct Record::Parts {
  Parts(std::vector<std::string> paths, Shared with) : shared(std::move(with)), files(std::move(paths)) {}

  Shared shared;
  std::vector<std::string> files;  ///< in order of time
  Tally tally;
  Channels resolution{};
  std::vector<Understood> understood;
  std::unique_ptr<File> current;
  std::size_t next_file = 0;
  std::int64_t last = before_all;

  /// Several files in the order of their first times.
  void sort_files() {
    if (files.size() < 2) return;
    std::vector<std::pair<std::int64_t, std::string>> by_time;
    for (const std::string& path : files) {
      if (!is_regular(path) && path != "-")
        File(path, shared, tally, resolution);  // says why it cannot be read
      if (!is_regular(path))
        throw FileError(
            path, 0, 0,
            {"a pipe beside other files", "files only, or one pipe alone", "write it to a file first"});
      Tally ignored;
      Channels unused{};
      File file(path, shared, ignored, unused);
      Reading first;
      file.next(first, before_all);
      by_time.emplace_back(first.time, path);
    }
    std::ranges::stable_sort(by_time, {}, &std::pair<std::int64_t, std::string>::first);
    files.clear();
    for (auto& [time, path] : by_time) files.push_back(std::move(path));
  }

  bool open_next() {
    if (current) understood.back() = current->understood();
    current.reset();
    if (next_file == files.size()) return false;
    current = std::make_unique<File>(files[next_file++], shared, tally, resolution);
    understood.push_back(current->understood());
    return true;
  }
};

Record::Record(const std::vector<std::string>& files, const Mapping& mapping, const Streams& streams,
               KeepOn keep_on)
    : parts_(std::make_unique<Parts>(files, Shared{mapping, streams, TimeReader(mapping.clock),
                                                   BadWords(mapping.bad_words), std::move(keep_on)})) {
  parts_->sort_files();
  parts_->open_next();
}

Record::~Record() = default;
Record::Record(Record&&) noexcept = default;

bool Record::next(Reading& reading) {
  Parts& parts = *parts_;
  while (parts.current) {
    if (parts.current->next(reading, parts.last)) {
      parts.last = reading.time;
      return true;
    }
    parts.open_next();
  }
  return false;
}

bool Record::rereadable() const {
  return std::ranges::all_of(parts_->files, is_regular);
}

const Channels& Record::resolution() const {
  return parts_->resolution;
}

const Tally& Record::tally() const {
  return parts_->tally;
}

const std::vector<Understood>& Record::understood() const {
  return parts_->understood;
}

std::string_view name(Drop drop) {
  constexpr std::string_view names[drop_count] = {
      "none",          "malformed",  "repeated_header", "unreadable_time",
      "absent_time",   "duplicate",  "backward",        "off_line",
      "after_restart", "filled",     "unphysical",      "spike",
      "unsteady",      "incomplete", "impossible",      "noisy"};
  return names[static_cast<std::size_t>(drop)];
}

}  // namespace dutygauge::field
