#include <fmt/core.h>

#include <utility>

#include <algorithm>

#include "field_words.hpp"
#include "page.hpp"
#include "record.hpp"
#include "table_parts.hpp"

namespace dutygauge::report {
namespace {

using field::FieldResult;

constexpr std::size_t most_events = 8;

void top(Page& page, const CaseName& about, const FieldResult& result) {
  std::string left = about.tag.empty() ? about.file : about.tag;
  if (!result.days.empty())
    left += fmt::format("  readings {} to {}", iso_date(result.start, result.days.front().day),
                        iso_date(result.start, result.days.back().day));
  const std::string right = fmt::format("{} rows, {} used   input {}", result.rows.read, result.rows.used,
                                        about.input_sha256.substr(0, 8));
  const std::size_t width = page_width - right.size() - 2;
  page.line(fmt::format("{:<{}}  {}", clipped(ascii(left), width), width, right));
  page.line(std::string(page_width, '-'));
}

void fact(Page& page, const Fact& said) {
  std::vector<std::string> lines = said.lines;
  if (said.name == "EVENTS" && lines.size() > most_events) {
    const std::size_t more = lines.size() - most_events;
    lines.erase(lines.begin(), lines.begin() + static_cast<std::ptrdiff_t>(more));
    lines.insert(lines.begin(), fmt::format("{} earlier: --json", more));
  }
  if (said.name.size() >= 13) {
    page.paragraph(said.name + "   ", lines.front());
    lines.erase(lines.begin());
  }
  for (std::size_t i = 0; i < lines.size(); ++i)
    page.section(i == 0 && said.name.size() < 13 ? said.name : "", lines[i]);
}

void hypotheses(Page& page, const CaseName& about, const FieldResult& result) {
  const Rows rows = hypotheses_table(about, result);
  if (rows.empty()) return;
  page.blank();
  page.line("SAME EITHER WAY?");
  page.table(rows, std::vector<Align>(rows.front().size(), Align::left), 2);
  page.blank();
}

void options(Page& page, const FieldResult& result) {
  const Rows rows = options_table(result);
  if (rows.empty()) return;
  page.blank();
  const double end = result.days.empty() ? 0.0 : result.days.back().day + result.plan.horizon;
  const bool money = rows.front().size() > 2;
  page.line(fmt::format("{} to {}", money ? "COST" : "WAYS", spoken_date(result.start, end)));
  std::vector<Align> columns(rows.front().size(), Align::right);
  columns.front() = columns.back() = Align::left;
  page.table(rows, columns, 2);
  const auto& list = result.used().decision.options;
  if (money && std::ranges::none_of(list, &field::Option::recommended))
    page.line("  No way stays the cheapest over the band of rates: the difference does not count.");
  page.blank();
}

}  // namespace

std::string text(const CaseName& about, const FieldResult& result, const field::History* record) {
  Page page;
  top(page, about, result);
  bool with_options = false;
  for (const Fact& said : facts_of(about, result)) {
    if (said.name == "WHAT IT IS" || said.name == "EVENTS") hypotheses(page, about, result);
    if (said.name == "DATA" && !std::exchange(with_options, true)) options(page, result);
    fact(page, said);
    if (said.name == "ANSWER") page.blank();
  }
  if (!with_options) options(page, result);
  if (record != nullptr) {
    page.blank();
    const auto lines = record_lines(*record);
    for (std::size_t i = 0; i < lines.size(); ++i) page.section(i == 0 ? "READ" : "", lines[i]);
    page.blank();
  }
  const auto tasks = next_of(result);
  std::string line;
  for (std::size_t i = 0; i < tasks.size(); ++i) line += fmt::format("{} {}   ", i + 1, tasks[i]);
  if (!line.empty()) page.section("NEXT", line);
  page.line("Never open or isolate on this result alone.");
  table_closing(page);
  return page.text();
}

}  // namespace dutygauge::report
