#include <fmt/core.h>

#include <cmath>

#include "table_parts.hpp"
#include "words.hpp"

namespace dutygauge::report {
namespace {

using Json = nlohmann::ordered_json;
using units::Kind;

struct Line {
  std::string label, json_key;
  Kind kind;
  std::optional<double> before, after;
  std::optional<uncertainty::Spread> spread = {};  ///< of after less before
};

/// Half of what lies between the 5 and the 95 % quantile of the difference.
double half_width(const Line& line) {
  return 0.5 * (line.spread->high - line.spread->low);
}

/// Whether the difference is larger than what it may be wrong by in 9 cases of 10.
bool is_significant(const Line& line) {
  return std::abs(*line.after - *line.before) > half_width(line);
}

std::vector<Line> lines(const Comparison& comparison) {
  const auto& names = comparison.before.about;
  const auto of = [&comparison](auto&& take) {
    const auto one = [&take](const std::optional<Running>& running) -> std::optional<double> {
      return running ? std::optional<double>(take(*running)) : std::nullopt;
    };
    return std::pair(one(comparison.before.running), one(comparison.after.running));
  };
  std::vector<Line> all;
  const auto add = [&](std::string label, const char* key, Kind kind, auto&& take) {
    const auto [before, after] = of(take);
    all.push_back({std::move(label), key, kind, before, after});
  };
  add("duty", "duty_W", Kind::power, [](const Running& r) { return r.duty; });
  add(names.shell_side + " outlet", "shell_side_outlet_degC", Kind::temperature,
      [](const Running& r) { return r.shell_outlet; });
  add(names.tube_side + " outlet", "tube_side_outlet_degC", Kind::temperature,
      [](const Running& r) { return r.tube_outlet; });
  add(names.shell_side + " pressure drop", "shell_side_pressure_drop_Pa", Kind::pressure_difference,
      [](const Running& r) { return r.shell_drop; });
  add(names.tube_side + " pressure drop", "tube_side_pressure_drop_Pa", Kind::pressure_difference,
      [](const Running& r) { return r.tube_drop; });
  if (comparison.spread)
    for (std::size_t i = 0; i < uncertainty::output_count; ++i) all[i].spread = (*comparison.spread)[i];
  add("U in service", "u_dirty_W_m2K", Kind::film_coefficient, [](const Running& r) { return r.u_dirty; });
  const auto margin = [&](const char* label, const char* key, Kind kind, auto member) {
    const auto one = [member](const std::optional<Running>& r) -> std::optional<double> {
      return r ? (*r).*member : std::nullopt;
    };
    all.push_back({label, key, kind, one(comparison.before.running), one(comparison.after.running)});
  };
  margin("duty margin", "margin_duty", Kind::ratio, &Running::duty_margin);
  margin("outlet margin", "margin_temperature_K", Kind::temperature_difference, &Running::temperature_margin);
  return all;
}

std::string shown(const std::optional<double>& value, Kind kind, const Figures& figures) {
  if (!value) return "none";
  if (kind == Kind::ratio) return fmt::format("{:+.1f}", 100.0 * *value);
  return figures.number(*value, kind);
}

std::string difference(const Line& line, const Figures& figures) {
  if (!line.before || !line.after) return "";
  const double change = *line.after - *line.before;
  if (line.kind == Kind::ratio) return fmt::format("{:+.1f} points", 100.0 * change);
  if (line.kind == Kind::temperature || line.kind == Kind::temperature_difference)
    return figures.difference(change);
  return fmt::format("{:+.1f} %", 100.0 * change / *line.before);
}

/// "+-0.3 K  beyond it": what the difference may be wrong by, and whether that matters.
std::string how_sure(const Line& line, const Figures& figures) {
  if (!line.spread || !line.before || !line.after) return "";
  if (*line.after == *line.before) return "";
  const double width = half_width(line);
  const bool degrees = line.kind == Kind::temperature;
  const std::string shown = degrees ? figures.with_unit(width, Kind::temperature_difference)
                                    : fmt::format("{:.1f} %", 100.0 * width / *line.before);
  return fmt::format("+-{}, {}", shown, is_significant(line) ? "significant" : "within the spread");
}

void going_in(Page& page, const Comparison& comparison) {
  if (comparison.inputs.empty()) {
    page.section("GOING IN", "Nothing differs.");
    return;
  }
  std::vector<std::vector<std::string>> rows = {{"GOING IN", "A", "B"}};
  for (const auto& change : comparison.inputs) {
    const auto side = [](const std::string& typed) {
      return typed.empty() ? "-" : clipped(ascii(typed), 28);
    };
    rows.push_back({"  " + clipped(change.key, 44), side(change.before), side(change.after)});
  }
  page.table(rows, {Align::left, Align::left, Align::left}, 0);
}

void coming_out(Page& page, const Comparison& comparison) {
  const Figures figures(comparison.before.about.display);
  std::vector<std::vector<std::string>> rows = {
      {"COMING OUT", "A", "B", "", "B less A", comparison.spread ? "in 9 cases of 10" : ""}};
  for (const Line& line : lines(comparison))
    if (line.before || line.after)
      rows.push_back({"  " + line.label, shown(line.before, line.kind, figures),
                      shown(line.after, line.kind, figures),
                      line.kind == Kind::ratio ? "%" : figures.unit(line.kind), difference(line, figures),
                      how_sure(line, figures)});
  page.table(rows, {Align::left, Align::right, Align::right, Align::left, Align::left, Align::left}, 0);
}

std::string said(const std::string& verdict, const std::string& no_result) {
  return verdict.empty() ? "No result: " + no_result + "." : verdict;
}

}  // namespace

std::string text(const Comparison& comparison) {
  Page page;
  page.line(fmt::format("A  {}  {}  input {}", comparison.before.about.file, comparison.before.about.title,
                        comparison.before.about.input_sha256.substr(0, 8)));
  page.line(fmt::format("B  {}  {}  input {}", comparison.after.about.file, comparison.after.about.title,
                        comparison.after.about.input_sha256.substr(0, 8)));
  page.line(std::string(page_width, '-'));
  page.section("ANSWER", "A: " + said(comparison.before.verdict, comparison.before.no_result));
  page.section("", "B: " + said(comparison.after.verdict, comparison.after.no_result));
  page.blank();
  going_in(page, comparison);
  page.blank();
  coming_out(page, comparison);
  page.blank();
  table_closing(page);
  return page.text();
}

std::string json(const Comparison& comparison) {
  const auto name = [](const CaseName& about) {
    return Json{{"file", about.file},
                {"title", about.title},
                {"tag", about.tag},
                {"input_sha256", about.input_sha256}};
  };
  const auto result = [](const std::optional<Running>& running) {
    return running ? running_json(*running) : Json(nullptr);
  };
  const auto word = [](const std::string& typed) { return typed.empty() ? Json(nullptr) : Json(typed); };
  Json inputs = Json::array(), outputs = Json::array();
  for (const auto& change : comparison.inputs)
    inputs.push_back({{"key", change.key}, {"a", word(change.before)}, {"b", word(change.after)}});
  for (const Line& line : lines(comparison)) {
    const auto value = [&line](const std::optional<double>& si) {
      return si ? Json(in_json(*si, line.kind)) : Json(nullptr);
    };
    const bool both = line.before && line.after;
    outputs.push_back({{"name", line.json_key},
                       {"a", value(line.before)},
                       {"b", value(line.after)},
                       {"difference", both ? Json(*line.after - *line.before) : Json(nullptr)},
                       {"difference_90", both && line.spread ? Json(half_width(line)) : Json(nullptr)},
                       {"significant", both && line.spread ? Json(is_significant(line)) : Json(nullptr)}});
  }
  return one_line({{"dutygauge", DUTYGAUGE_VERSION},
                   {"schema_version", 1},
                   {"a", name(comparison.before.about)},
                   {"b", name(comparison.after.about)},
                   {"inputs", inputs},
                   {"outputs", outputs},
                   {"result_a", result(comparison.before.running)},
                   {"result_b", result(comparison.after.running)},
                   {"no_result_a", word(comparison.before.no_result)},
                   {"no_result_b", word(comparison.after.no_result)}});
}

}  // namespace dutygauge::report
