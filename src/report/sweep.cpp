#include <fmt/core.h>

#include "table_parts.hpp"
#include "words.hpp"

namespace dutygauge::report {
namespace {

using Json = nlohmann::ordered_json;
using units::Kind;

struct Column {
  std::string name;
  Kind kind;
  double (*value)(const Running&);
};

const std::vector<Column>& columns() {
  static const std::vector<Column> all = {
      {"duty", Kind::power, [](const Running& r) { return r.duty; }},
      {"shell out", Kind::temperature, [](const Running& r) { return r.shell_outlet; }},
      {"tube out", Kind::temperature, [](const Running& r) { return r.tube_outlet; }},
      {"shell drop", Kind::pressure_difference, [](const Running& r) { return r.shell_drop; }},
      {"tube drop", Kind::pressure_difference, [](const Running& r) { return r.tube_drop; }}};
  return all;
}

std::string service_word(const Running& running) {
  if (!running.met) return "not stated";
  return *running.met ? "met" : "missed: " + plain_words(running.limited_by);
}

using Rows = std::vector<std::vector<std::string>>;

Rows head(const Sweep& sweep, const Figures& figures) {
  std::vector<std::string> names, units;
  for (std::size_t i = 0; i < sweep.axes.size(); ++i) {
    names.push_back(fmt::format("({})", i + 1));
    units.push_back(figures.unit(sweep.axes[i].kind));
  }
  for (const Column& column : columns()) {
    names.push_back(column.name);
    units.push_back(figures.unit(column.kind));
  }
  names.insert(names.end(), {"duty", "outlet", "service"});
  units.insert(units.end(), {"margin %", "margin " + figures.unit(Kind::temperature_difference), ""});
  return {names, units};
}

std::vector<std::string> row_of(const Sweep& sweep, const SweepRow& row, const Figures& figures) {
  std::vector<std::string> cells;
  for (std::size_t i = 0; i < sweep.axes.size(); ++i)
    cells.push_back(units::shown_number(row.at[i], sweep.axes[i].kind, sweep.about.display, 5));
  if (!row.running) {
    cells.resize(cells.size() + columns().size() + 2);
    cells.push_back("no result");
    return cells;
  }
  const Running& running = *row.running;
  for (const Column& column : columns())
    cells.push_back(figures.number(column.value(running), column.kind, 4));
  cells.push_back(running.duty_margin ? fmt::format("{:+.1f}", 100.0 * *running.duty_margin) : "");
  const auto kelvin = units::shown_unit(Kind::temperature_difference, sweep.about.display);
  cells.push_back(running.temperature_margin
                      ? fmt::format("{:+.1f}", units::from_si(*running.temperature_margin, kelvin,
                                                              Kind::temperature_difference))
                      : "");
  cells.push_back(service_word(running));
  return cells;
}

std::string csv_cell(std::string text) {
  if (text.find_first_of(",\"\n\r") == std::string::npos) return text;
  for (auto at = text.find('"'); at != std::string::npos; at = text.find('"', at + 2))
    text.insert(at, 1, '"');
  return '"' + text + '"';
}

std::string csv_number(const std::optional<double>& value) {
  return value ? fmt::format("{}", *value) : "";
}

void csv_row(std::string& text, const Sweep& sweep, const SweepRow& row) {
  for (std::size_t i = 0; i < row.at.size(); ++i)
    text += csv_number(in_json(row.at[i], sweep.axes[i].kind)) + ",";
  if (!row.running) {
    text += fmt::format(",,,,,,,,,{}\n", csv_cell(row.no_result));
    return;
  }
  const Running& r = *row.running;
  for (const Column& column : columns()) text += csv_number(in_json(column.value(r), column.kind)) + ",";
  text += fmt::format("{},{},{},{},\n", csv_number(r.duty_margin), csv_number(r.temperature_margin),
                      r.met ? (*r.met ? "true" : "false") : "", csv_cell(r.limited_by));
}

}  // namespace

std::string text(const Sweep& sweep) {
  Page page;
  heading(page, sweep.about);
  const Figures figures(sweep.about.display);
  for (std::size_t i = 0; i < sweep.axes.size(); ++i) {
    const Axis& axis = sweep.axes[i];
    page.section(i == 0 ? "VARIED" : "",
                 fmt::format("({}) {}{}", i + 1, axis.key,
                             axis.own ? "; the case itself: " +
                                            units::typed(*axis.own, axis.kind, sweep.about.display, 5)
                                      : ""));
  }
  page.section("", fmt::format("shell: {}; tubes: {}", sweep.about.shell_side, sweep.about.tube_side));
  page.blank();
  Rows rows = head(sweep, figures);
  for (const SweepRow& row : sweep.rows) rows.push_back(row_of(sweep, row, figures));
  std::vector<Align> aligned(rows.front().size(), Align::right);
  aligned.back() = Align::left;
  page.table(rows, aligned, 0);
  std::string last;
  for (const SweepRow& row : sweep.rows)
    if (!row.running && row.no_result != last) {
      if (last.empty()) page.blank();
      page.section(last.empty() ? "NO RESULT" : "", row.no_result);
      last = row.no_result;
    }
  page.blank();
  table_closing(page);
  return page.text();
}

std::string json(const Sweep& sweep) {
  Json result = start_of(sweep.about);
  Json varied = Json::array(), rows = Json::array();
  for (const Axis& axis : sweep.axes)
    varied.push_back({{"key", axis.key},
                      {"own", axis.own ? Json(in_json(*axis.own, axis.kind)) : Json(nullptr)},
                      {"unit", units::json_unit(axis.kind)}});
  for (const SweepRow& row : sweep.rows) {
    Json one = Json::object();
    for (std::size_t i = 0; i < row.at.size(); ++i)
      one["at"][sweep.axes[i].key] = in_json(row.at[i], sweep.axes[i].kind);
    if (row.running) one.update(running_json(*row.running));
    one["no_result"] = row.running ? Json(nullptr) : Json(row.no_result);
    rows.push_back(std::move(one));
  }
  result["varied"] = varied;
  result["rows"] = rows;
  return one_line(result);
}

std::string csv(const Sweep& sweep) {
  std::string text;
  for (const Axis& axis : sweep.axes) {
    const auto unit = units::json_unit(axis.kind);
    text += csv_cell(unit.empty() ? axis.key : fmt::format("{}[{}]", axis.key, unit)) + ",";
  }
  text +=
      "duty[W],shell_side_outlet[degC],tube_side_outlet[degC],shell_side_pressure_drop[Pa],"
      "tube_side_pressure_drop[Pa],duty_margin,temperature_margin[K],service_met,limited_by,no_result\n";
  for (const SweepRow& row : sweep.rows) csv_row(text, sweep, row);
  return text;
}

}  // namespace dutygauge::report
