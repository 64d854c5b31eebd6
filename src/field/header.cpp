#include "header.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "cells.hpp"

namespace dutygauge::field {
namespace {

constexpr std::size_t most_columns = 2000;
constexpr std::size_t headers_shown = 12;

using Cells = std::vector<std::string>;

/// A header, its unit in square brackets taken off.
struct Label {
  std::string name, unit;
  bool has_unit = false;
};

Label label_of(std::string_view text) {
  const auto open = text.find('[');
  if (open == std::string_view::npos || !text.ends_with(']')) return {std::string(text), {}, false};
  const auto unit = without_blanks(text.substr(open + 1, text.size() - open - 2));
  return {std::string(without_blanks(text.substr(0, open))), std::string(unit), !unit.empty()};
}

/// Where the header stands and what is in it, line by line.
struct Header {
  const std::vector<KeptLine>& lines;
  std::string file;
  std::vector<Cells> rows;                       ///< of all kept lines
  std::vector<std::vector<std::size_t>> starts;  ///< of each cell in its line [B]

  [[noreturn]] void fail(std::size_t row, std::size_t column, std::string what, std::string expected,
                         std::string remedy) const {
    std::int64_t line = row < lines.size() ? lines[row].number : 0;
    const bool is_cell = row < starts.size() && column < starts[row].size();
    throw FileError(file, line, is_cell ? static_cast<int>(starts[row][column]) + 1 : 1,
                    {std::move(what), std::move(expected), std::move(remedy)});
  }
};

std::size_t count(std::string_view line, char separator) {
  std::vector<std::string_view> cells;
  split(line, separator, most_columns + 1, cells);
  return cells.size();
}

/// The separator that cuts most lines into the same number of fields, more than one.
char separator_of(const std::vector<KeptLine>& lines) {
  char best = 0;
  std::size_t most = 0;
  for (const char separator : {';', '\t', ','}) {
    std::vector<std::size_t> counts;
    for (const KeptLine& line : lines) counts.push_back(count(line.text, separator));
    std::size_t alike = 0;
    for (const std::size_t fields : counts)
      if (fields > 1) alike = std::max(alike, static_cast<std::size_t>(std::ranges::count(counts, fields)));
    if (alike > most) best = separator, most = alike;
  }
  return best;
}

std::string in_words(char separator) {
  return separator == '\t' ? "a tab" : fmt::format("'{}'", separator);
}

/// The row that names the columns: the first that holds the time's header.
std::size_t name_row(const Header& header, const Mapping& mapping) {
  const std::string& wanted = mapping.clock.column;
  const std::size_t last = mapping.header_rows > 0
                               ? std::min(header.rows.size(), static_cast<std::size_t>(mapping.header_rows))
                               : header.rows.size();
  for (std::size_t row = 0; row < last; ++row)
    for (const std::string& cell : header.rows[row])
      if (cell == (wanted.empty() ? "time" : wanted)) return row;
  std::string found;
  for (std::size_t i = 0; i < header.rows[0].size() && i < headers_shown; ++i)
    found += (i == 0 ? "" : ", ") + shown(header.rows[0][i], 24);
  header.fail(
      0, 0,
      fmt::format("no column '{}'; the file begins with {}", shown(wanted.empty() ? "time" : wanted), found),
      "a header with the column of the times",
      "name it in the case, under readings.time.column, or write it into the header");
}

bool begins_with_digit(std::string_view text) {
  return !text.empty() && text.front() >= '0' && text.front() <= '9';
}

/// Rows up to the first with a time in it.
std::size_t rows_of_header(const Header& header, std::size_t names, std::size_t time_at,
                           const Mapping& mapping, const TimeReader& times) {
  if (mapping.header_rows > 0) return static_cast<std::size_t>(mapping.header_rows);
  std::size_t row = names + 1;
  for (; row < header.rows.size(); ++row) {
    const Cells& cells = header.rows[row];
    const std::string_view cell = time_at < cells.size() ? std::string_view(cells[time_at]) : "";
    if (begins_with_digit(cell) || times.read(cell, 0).fault == TimeFault::none) break;
    // A header once more is no further row of it.
    if (cells == header.rows[names]) break;
  }
  return row;
}

/// What one cell of the header is to us.
struct Found {
  Channel channel{};
  std::string unit;
};

std::optional<Found> channel_of(std::string_view cell, const Mapping& mapping) {
  if (cell.empty()) return {};
  const Label label = label_of(cell);
  for (std::size_t i = 0; i < channel_count; ++i) {
    const std::string& tag = mapping.columns[i].tag;
    if (tag.empty()) continue;
    if (tag == cell) return Found{static_cast<Channel>(i), {}};
    if (label.has_unit && tag == label.name) return Found{static_cast<Channel>(i), label.unit};
  }
  const auto channel = channel_named(label.name);
  if (!channel || !mapping.columns[index_of(*channel)].tag.empty()) return {};
  return Found{*channel, label.unit};
}

/// "hot_in (degC)" is meant for a channel, and would pass for an unknown column.
std::optional<Channel> nearly_channel(std::string_view cell, const Mapping& mapping) {
  std::size_t end = 0;
  while (end < cell.size() && ((cell[end] >= 'a' && cell[end] <= 'z') || cell[end] == '_')) ++end;
  const auto channel = end < cell.size() ? channel_named(cell.substr(0, end)) : std::nullopt;
  const bool is_meant = channel && mapping.columns[index_of(*channel)].tag.empty();
  return is_meant ? channel : std::nullopt;
}

Conversion conversion_of(const Header& header, std::size_t row, std::size_t column, const Found& found,
                         const Mapping& mapping, const Streams& streams) {
  const Column& stated = mapping.columns[index_of(found.channel)];
  const std::string& cell = header.rows[row][column];
  const std::string& unit = stated.unit.empty() ? found.unit : stated.unit;
  if (unit.empty())
    header.fail(row, column, fmt::format("the column '{}' has no unit", shown(cell)),
                fmt::format("such as {}[{}]", name(found.channel),
                            is_flow(found.channel)          ? "kg/s"
                            : is_temperature(found.channel) ? "degC"
                            : is_drop(found.channel)        ? "kPa"
                                                            : "%"),
                fmt::format("write it into the header, or into the case: readings.columns.{}.unit",
                            name(found.channel)));
  Resolved resolved = resolve(found.channel, unit, stated, streams);
  if (!resolved.objection.what.empty())
    header.fail(row, column, fmt::format("the column '{}': {}", shown(cell), resolved.objection.what),
                resolved.objection.expected, resolved.objection.remedy);
  if (!stated.unit.empty() && !found.unit.empty() && found.unit != stated.unit) {
    const Resolved other = resolve(found.channel, found.unit, stated, streams);
    if (!other.objection.what.empty() || other.conversion.factor != resolved.conversion.factor ||
        other.conversion.offset != resolved.conversion.offset)
      header.fail(row, column,
                  fmt::format("the header says {}, the case {}", shown(found.unit), shown(stated.unit)),
                  "one unit", "correct one of them");
  }
  return std::move(resolved.conversion);
}

void use(const Header& header, std::size_t row, std::size_t column, const Found& found,
         const Mapping& mapping, const Streams& streams, Layout& layout, Understood& understood) {
  const auto twice = std::ranges::find(layout.used, found.channel, &UsedCell::channel);
  const std::string& cell = header.rows[row][column];
  if (twice != layout.used.end())
    header.fail(row, column, fmt::format("two columns for {}", name(found.channel)), "one",
                "remove one, or name the right one in the case by its tag");
  Conversion conversion = conversion_of(header, row, column, found, mapping, streams);
  const std::string& stated = mapping.columns[index_of(found.channel)].unit;
  understood.columns.push_back({.channel = found.channel,
                                .header = cell,
                                .unit = stated.empty() ? found.unit : stated,
                                .density = conversion.density_in_words});
  layout.used.push_back({column, found.channel, std::move(conversion)});
}

void find_columns(const Header& header, std::size_t names, const Mapping& mapping, const Streams& streams,
                  Layout& layout, Understood& understood) {
  std::size_t width = 0;
  for (std::size_t row = 0; row < layout.header_lines && row < header.rows.size(); ++row)
    width = std::max(width, header.rows[row].size());
  for (std::size_t column = 0; column < width; ++column) {
    if (column == layout.time_at) continue;
    bool known = false;
    for (std::size_t row = 0; row < layout.header_lines && row < header.rows.size() && !known; ++row) {
      if (column >= header.rows[row].size()) continue;
      const std::string& cell = header.rows[row][column];
      if (const auto found = channel_of(cell, mapping)) {
        use(header, row, column, *found, mapping, streams, layout, understood);
        known = true;
      } else if (const auto meant = nearly_channel(cell, mapping)) {
        header.fail(row, column, fmt::format("the column '{}' has no unit in square brackets", shown(cell)),
                    fmt::format("{}[unit]", name(*meant)), "write its unit in square brackets");
      }
    }
    const Cells& row = header.rows[names];
    if (!known && column < row.size() && !row[column].empty())
      understood.ignored.push_back(shown(row[column]));
  }
}

/// Every tag of the case must be there; a heat balance needs all but one of the six.
void check_found(const Header& header, std::size_t names, const Mapping& mapping, const Layout& layout) {
  const auto has = [&](Channel channel) {
    return std::ranges::find(layout.used, channel, &UsedCell::channel) != layout.used.end();
  };
  std::string missing;
  int absent = 0;
  for (std::size_t i = 0; i < channel_count; ++i) {
    const auto channel = static_cast<Channel>(i);
    if (has(channel)) continue;
    if (!mapping.columns[i].tag.empty())
      header.fail(names, 0,
                  fmt::format("no column '{}', which the case names for {}", shown(mapping.columns[i].tag),
                              name(channel)),
                  "the header as it stands in the file", "correct readings.columns in the case");
    if (!is_flow(channel) && !is_temperature(channel)) continue;
    ++absent;
    missing += (missing.empty() ? "" : ", ") + std::string(name(channel));
  }
  if (absent <= 1) return;
  header.fail(
      names, 0, fmt::format("no columns for {}", missing),
      "two flows and four temperatures, of which one may be missing: it follows from the heat balance",
      "write headers such as hot_in[degC], or name the columns in the case under readings.columns");
}

/// '.' or ',': with which more of the values can be read.
char decimal_of(const Header& header, const Layout& layout) {
  if (layout.separator == ',') return '.';
  int points = 0, commas = 0;
  for (std::size_t row = layout.header_lines; row < header.rows.size(); ++row)
    for (const UsedCell& cell : layout.used) {
      if (cell.at >= header.rows[row].size()) continue;
      double value = 0;
      const std::string& text = header.rows[row][cell.at];
      points += read_cell(text, '.', value) == CellKind::number;
      commas += read_cell(text, ',', value) == CellKind::number;
    }
  return commas > points ? ',' : '.';
}

/// A decimal comma in a file cut at commas makes fields more than headers.
void check_width(const Header& header, std::size_t names, const Layout& layout) {
  if (layout.header_lines >= header.rows.size()) return;
  const std::size_t titles = header.rows[names].size(), fields = header.rows[layout.header_lines].size();
  if (fields <= titles) return;
  const bool is_empty = std::all_of(
      header.rows[layout.header_lines].begin() + static_cast<std::ptrdiff_t>(titles),
      header.rows[layout.header_lines].end(), [](const std::string& cell) { return cell.empty(); });
  if (is_empty) return;
  header.fail(layout.header_lines, 0, fmt::format("{} values under {} headers", fields, titles),
              "as many values as headers",
              layout.separator == ',' ? "with decimal commas another separator is needed: ';' or a tab"
                                      : "check the header");
}

Header cut(const std::vector<KeptLine>& lines, const std::string& file, char separator) {
  Header header{lines, file, {}, {}};
  std::vector<std::string_view> cells;
  for (const KeptLine& line : lines) {
    split(line.text, separator, most_columns + 1, cells);
    header.rows.emplace_back(cells.begin(), cells.end());
    header.starts.emplace_back();
    for (const std::string_view cell : cells)
      header.starts.back().push_back(static_cast<std::size_t>(cell.data() - line.text.data()));
  }
  return header;
}

}  // namespace

Layout layout_of(const std::vector<KeptLine>& lines, const Mapping& mapping, const Streams& streams,
                 const TimeReader& times, Understood& understood) {
  const auto refuse = [&](std::string what, std::string remedy) {
    throw FileError(understood.file, lines.empty() ? 0 : lines.front().number, 1,
                    {std::move(what), "a header line and a reading a line", std::move(remedy)});
  };
  if (lines.empty()) refuse("the file is empty", "check the export");
  Layout layout;
  understood.separator_found = mapping.separator == 0;
  layout.separator = understood.separator_found ? separator_of(lines) : mapping.separator;
  if (layout.separator == 0)
    refuse("one column only: no comma, semicolon or tab separates values",
           "check the export, or name the separator in the case: readings.separator");
  const Header header = cut(lines, understood.file, layout.separator);
  const std::size_t names = name_row(header, mapping);
  if (header.rows[names].size() == 1)
    refuse(fmt::format("one column only when cut at {}", in_words(layout.separator)),
           "check readings.separator in the case");
  if (header.rows[names].size() > most_columns)
    header.fail(names, 0, fmt::format("more than {} columns", most_columns), "the columns of one unit",
                "export the channels of this exchanger alone");
  const std::string wanted = mapping.clock.column.empty() ? "time" : mapping.clock.column;
  layout.time_header = wanted;
  layout.time_at =
      static_cast<std::size_t>(std::ranges::find(header.rows[names], wanted) - header.rows[names].begin());
  layout.header_lines = rows_of_header(header, names, layout.time_at, mapping, times);
  find_columns(header, names, mapping, streams, layout, understood);
  check_found(header, names, mapping, layout);
  check_width(header, names, layout);
  understood.decimal_found = mapping.decimal == 0;
  layout.decimal = understood.decimal_found ? decimal_of(header, layout) : mapping.decimal;
  layout.cells_needed = layout.time_at + 1;
  for (const UsedCell& cell : layout.used) layout.cells_needed = std::max(layout.cells_needed, cell.at + 1);
  understood.separator = layout.separator;
  understood.decimal = layout.decimal;
  understood.header_rows = static_cast<int>(layout.header_lines);
  understood.time_header = wanted;
  return layout;
}

}  // namespace dutygauge::field
