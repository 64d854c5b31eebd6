#pragma once
#include <string>
#include <string_view>
#include <vector>

#include "conversion.hpp"
#include "dutygauge/field/times.hpp"
#include "lines.hpp"

/// The first lines of a file: how it is written and which column is what.
namespace dutygauge::field {

/// A line kept while the header is looked for.
struct KeptLine {
  std::int64_t number = 0;
  std::string text;
};

struct UsedCell {
  std::size_t at = 0;  ///< column, from 0
  Channel channel{};
  Conversion conversion;
};

/// What the header says.
struct Layout {
  char separator = ',', decimal = '.';
  std::size_t header_lines = 0;  ///< of the kept ones
  std::size_t time_at = 0;
  std::string time_header;
  std::vector<UsedCell> used;  ///< by column
  std::size_t cells_needed = 0;
};

/// Lines that tell how a file is written, at most.
inline constexpr std::size_t lines_looked_at = 24;

/// Understands the first lines; fills in `understood`. Throws FileError.
Layout layout_of(const std::vector<KeptLine>& lines, const Mapping& mapping, const Streams& streams,
                 const TimeReader& times, Understood& understood);

}  // namespace dutygauge::field
