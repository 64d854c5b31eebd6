#include "record.hpp"

#include <fmt/format.h>

#include <cmath>

#include "dutygauge/field/times.hpp"
#include "table_parts.hpp"
#include "words.hpp"

namespace dutygauge::report {
namespace {

using Json = nlohmann::ordered_json;
using field::Channel;

units::Kind kind_of(Channel channel) {
  if (field::is_flow(channel)) return units::Kind::mass_flow;
  if (field::is_temperature(channel)) return units::Kind::temperature;
  return field::is_drop(channel) ? units::Kind::pressure_difference : units::Kind::ratio;
}

std::string key_of(Channel channel) {
  const char* unit = field::is_flow(channel)          ? "_kg_s"
                     : field::is_temperature(channel) ? "_degC"
                     : field::is_drop(channel)        ? "_Pa"
                                                      : "";
  return std::string(field::name(channel)) + unit;
}

Json row_json(const std::optional<field::ShownRow>& row) {
  if (!row) return nullptr;
  Json json = {{"line", row->line}, {"as_typed", row->typed}, {"time", field::written(row->reading.time)}};
  for (std::size_t c = 0; c < field::channel_count; ++c) {
    const auto channel = static_cast<Channel>(c);
    const double value = row->reading.value[c];
    if (std::isfinite(value)) json[key_of(channel)] = in_json(value, kind_of(channel));
  }
  return json;
}

std::string separator_word(char separator) {
  return separator == '\t' ? "tab" : std::string(1, separator);
}

Json file_json(const field::Understood& file) {
  Json columns = Json::array();
  for (const field::UsedColumn& column : file.columns)
    columns.push_back({{"channel", field::name(column.channel)},
                       {"header", column.header},
                       {"unit", column.unit},
                       {"density", column.density.empty() ? Json(nullptr) : Json(column.density)}});
  return {{"file", file.file.substr(file.file.rfind('/') + 1)},
          {"separator", separator_word(file.separator)},
          {"decimal", std::string(1, file.decimal)},
          {"header_rows", file.header_rows},
          {"time", file.time_header},
          {"columns", columns},
          {"ignored", file.ignored},
          {"first", row_json(file.first)},
          {"last", row_json(file.last)}};
}

std::string survey_word(const field::Survey& survey) {
  return survey.whole ? "the whole record" : fmt::format("the first {} rows", survey.rows);
}

std::string file_line(const field::Understood& file) {
  std::string text = fmt::format(
      "{}: separator {}{}, decimal '{}'{}, {} header row{};", file.file.substr(file.file.rfind('/') + 1),
      file.separator == '\t' ? "tab" : fmt::format("'{}'", file.separator),
      file.separator_found ? " (found)" : "", file.decimal, file.decimal_found ? " (found)" : "",
      file.header_rows, file.header_rows == 1 ? "" : "s");
  for (const field::UsedColumn& column : file.columns) {
    text += fmt::format(" {} = {}", field::name(column.channel), column.header);
    if (column.header.find('[') == std::string::npos) text += fmt::format(" [{}]", column.unit);
    if (!column.density.empty()) text += fmt::format(" ({})", column.density);
    text += ',';
  }
  text.back() = '.';
  if (!file.ignored.empty()) text += fmt::format(" Not used: {}.", listed(file.ignored));
  return text;
}

std::string in_si(const field::Reading& reading) {
  std::string text = field::written(reading.time);
  for (std::size_t c = 0; c < field::channel_count; ++c) {
    const auto kind = kind_of(static_cast<Channel>(c));
    if (std::isfinite(reading.value[c]))
      text +=
          ", " + (kind == units::Kind::ratio ? units::shown_number(reading.value[c], kind, units::System::si)
                                             : units::typed(reading.value[c], kind, units::System::si));
  }
  return text;
}

std::string level_line(const field::History& record) {
  if (record.basis == field::Basis::films)
    return "The level rests on the films as computed or given: nothing says when the unit was clean.";
  return fmt::format(
      "The films are calibrated on {} readings from {} to {}: 1/U clean times {:.4f} +- {:.4f}, so "
      "that the fouling is zero at the beginning of {}.",
      record.calibrated_on, field::written(record.calibrated_over->from),
      field::written(record.calibrated_over->to), record.calibration.factor,
      record.calibration.standard_uncertainty,
      record.basis == field::Basis::clean_period ? "that period" : "that time, the week after a cleaning");
}

}  // namespace

Json record_json(const field::History& record) {
  Json files = Json::array();
  for (const field::Understood& file : record.understood) files.push_back(file_json(file));
  const field::Tally& tally = record.tally;
  const field::Steady steady = field::steady_limits(record.survey);
  Json assumed = Json::array();
  for (const Assumption& one : record.assumed)
    assumed.push_back(
        {{"key", one.key}, {"value", as_typed(one, units::System::metric, 3)}, {"why", one.why}});
  return {{"files", files},
          {"interval_s", record.survey.interval},
          {"medians_of", survey_word(record.survey)},
          {"step_beyond",
           {{"hot_flow", steady.hot_flow},
            {"cold_flow", steady.cold_flow},
            {"hot_in_K", steady.hot_in},
            {"cold_in_K", steady.cold_in}}},
          {"values",
           {{"missing", tally.missing},
            {"bad", tally.bad},
            {"frozen", tally.frozen},
            {"pressure_drop_spikes", tally.drop_spikes},
            {"first_bad", tally.first_bad},
            {"first_bad_times", tally.first_bad_times}}},
          {"level",
           {{"basis", field::name(record.basis)},
            {"factor", record.calibration.factor},
            {"factor_u", record.calibration.standard_uncertainty},
            {"readings", record.calibrated_on},
            {"films_u_m2K_W", record.film_uncertainty}}},
          {"noise_amplified", record.amplified},
          {"assumed", assumed}};
}

std::vector<std::string> record_lines(const field::History& record) {
  std::vector<std::string> lines;
  for (const field::Understood& file : record.understood) lines.push_back(file_line(file));
  const field::Understood& file = record.understood.front();
  if (file.first) lines.push_back(fmt::format("Line {} as typed: {}", file.first->line, file.first->typed));
  if (file.first) lines.push_back("In SI: " + in_si(file.first->reading));
  if (const auto& last = record.understood.back().last)
    lines.push_back(fmt::format("Line {} as typed: {}", last->line, last->typed));
  const field::Tally& tally = record.tally;
  std::string values =
      fmt::format("Values missing {}, of bad quality {}, frozen {}", tally.missing, tally.bad, tally.frozen);
  for (std::size_t i = 0; i < tally.first_bad.size(); ++i)
    values += (i == 0 ? "; first: " : "; ") + tally.first_bad[i];
  lines.push_back(values + fmt::format(". Medians from {}.", survey_word(record.survey)));
  const field::Steady steady = field::steady_limits(record.survey);
  lines.push_back(
      fmt::format("A step is a change from one reading to the next of more than {:.1f} % in hot_flow, "
                  "{:.1f} % in cold_flow, {:.1f} K in hot_in, {:.1f} K in cold_in.",
                  100.0 * steady.hot_flow, 100.0 * steady.cold_flow, steady.hot_in, steady.cold_in));
  lines.push_back(level_line(record));
  std::vector<std::string> assumed;
  for (const Assumption& one : record.assumed)
    assumed.push_back(fmt::format("{} {}", one.key.substr(std::string_view("readings.columns.").size()),
                                  as_typed(one, units::System::metric, 3)));
  if (!assumed.empty()) lines.push_back("Assumed, as usual in practice: " + listed(assumed) + ".");
  return lines;
}

}  // namespace dutygauge::report
