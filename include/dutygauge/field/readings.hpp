#pragma once
#include <array>
#include <cstdint>
#include <functional>
#include <memory>
#include <optional>
#include <stdexcept>
#include <string>
#include <vector>

#include "dutygauge/field/mapping.hpp"
#include "dutygauge/rating.hpp"

/// A plant's files to readings in SI, row by row: memory does not grow with the rows.
namespace dutygauge::field {

/// A file of readings that cannot be used: where, what is wrong, what was expected, what to do.
class FileError : public std::runtime_error {
 public:
  struct Text {
    std::string what, expected, remedy;
  };
  FileError(std::string file, std::int64_t line, int column, Text text);
  const std::string& file() const { return file_; }
  std::int64_t line() const { return line_; }  ///< from 1; 0: the file as a whole
  int column() const { return column_; }       ///< from 1, in bytes
  const Text& text() const { return text_; }

 private:
  std::string file_;
  std::int64_t line_;
  int column_;
  Text text_;
};

/// The call was stopped by its user.
struct Interrupted : std::runtime_error {
  Interrupted() : std::runtime_error("interrupted") {}
};

/// Called between blocks of a file with the bytes read so far; false stops the reading by
/// `Interrupted`.
using KeepOn = std::function<bool(std::uint64_t bytes)>;

/// Why a row does not count.
enum class Drop : std::uint8_t {
  none,
  // found by the reader
  malformed,        ///< no field where the time should be
  repeated_header,  ///< the header once more
  unreadable_time,
  absent_time,  ///< an hour the clocks leave out
  duplicate,    ///< the time of the row before
  backward,     ///< a time before that of the row before
  // found by the screen
  off_line,
  after_restart,
  filled,  ///< a straight line between two readings, not measured
  unphysical,
  spike,
  unsteady,  ///< within an hour of a step, too
  // found on evaluation
  incomplete,  ///< what is left does not determine the duty
  impossible,  ///< no resistance of this arrangement explains it
  noisy,       ///< so close to the limit that noise decides
};
inline constexpr std::size_t drop_count = 16;
std::string_view name(Drop drop);

/// What became of the rows and of single values.
struct Tally {
  std::uint64_t rows = 0;                           ///< below the header; each is used or dropped
  std::array<std::uint64_t, drop_count> rows_by{};  ///< by `Drop`; none: used
  std::uint64_t missing = 0, bad = 0, frozen = 0, drop_spikes = 0;  ///< values
  std::vector<std::string> first_bad;        ///< as typed, with their lines; at most three
  std::vector<std::string> first_bad_times;  ///< the same of times

  std::uint64_t& operator[](Drop drop) { return rows_by[static_cast<std::size_t>(drop)]; }
  std::uint64_t operator[](Drop drop) const { return rows_by[static_cast<std::size_t>(drop)]; }
};

/// One row, as typed and as understood.
struct ShownRow {
  std::int64_t line = 0;
  std::string typed;
  Reading reading;
};

/// How one column was understood.
struct UsedColumn {
  Channel channel{};
  std::string header, unit;
  std::string density;  ///< of a flow: what was multiplied with, in words; empty: nothing
};

/// How one file was understood.
struct Understood {
  std::string file;
  char separator = ',', decimal = '.';
  bool separator_found = false, decimal_found = false;  ///< else they were stated
  int header_rows = 1;
  std::string time_header;
  std::vector<UsedColumn> columns;
  std::vector<std::string> ignored;  ///< headers of unknown columns
  std::optional<ShownRow> first, last;
};

/// The two streams as their meters see them.
struct Streams {
  const rating::Stream *hot = nullptr, *cold = nullptr;
  bool hot_density_known = true, cold_density_known = true;
};
Streams streams_of(const rating::Problem& problem, const Mapping& mapping);

/// Reads files one behind the other, in order of their first times. Throws FileError,
/// on construction where no file has a header that can be used.
class Record {
 public:
  /// `files`: "-" and other pipes must stand alone. The mapping and the streams must outlive it.
  Record(const std::vector<std::string>& files, const Mapping& mapping, const Streams& streams,
         KeepOn keep_on = {});
  ~Record();
  Record(Record&&) noexcept;

  /// The next row whose time is sound and later than the one before; false at the end.
  bool next(Reading& reading);

  /// Whether the files can be read again.
  bool rereadable() const;

  /// The last digit of each channel as seen so far, SI; 0: none seen.
  const Channels& resolution() const;

  const Tally& tally() const;
  const std::vector<Understood>& understood() const;

 private:
  struct Parts;
  std::unique_ptr<Parts> parts_;
};

}  // namespace dutygauge::field
