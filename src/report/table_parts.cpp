#include "table_parts.hpp"

#include <fmt/core.h>

#include <cmath>
#include <stdexcept>

namespace dutygauge::report {
namespace {

using Json = nlohmann::ordered_json;

Json or_null(const std::optional<double>& value) {
  return value ? Json(*value) : Json(nullptr);
}

void require_finite(const Json& json) {
  if (json.is_number_float() && !std::isfinite(json.get<double>()))
    throw std::logic_error("the result holds a number that is not finite");
  if (json.is_structured())
    for (const auto& value : json) require_finite(value);
}

}  // namespace

void heading(Page& page, const CaseName& about) {
  const std::string right = "input " + about.input_sha256.substr(0, 8);
  std::string left = about.tag;
  if (!about.title.empty()) left += (left.empty() ? "" : "  ") + about.title;
  if (left.empty()) left = about.file;
  const std::size_t width = page_width - right.size() - 2;
  page.line(fmt::format("{:<{}}  {}", clipped(ascii(left), width), width, right));
  page.line(std::string(page_width, '-'));
}

void table_closing(Page& page) {
  page.line(
      "Engineering aid, not a code calculation; defer to local codes and licensed practice. "
      "dutygauge " DUTYGAUGE_VERSION);
}

Json start_of(const CaseName& about) {
  return {{"dutygauge", DUTYGAUGE_VERSION},
          {"schema_version", 1},
          {"input_sha256", about.input_sha256},
          {"case", {{"file", about.file}, {"title", about.title}, {"tag", about.tag}}}};
}

Json running_json(const Running& running) {
  const auto celsius = [](double kelvin) { return in_json(kelvin, units::Kind::temperature); };
  return {{"duty_W", running.duty},
          {"shell_side_outlet_degC", celsius(running.shell_outlet)},
          {"tube_side_outlet_degC", celsius(running.tube_outlet)},
          {"shell_side_pressure_drop_Pa", running.shell_drop},
          {"tube_side_pressure_drop_Pa", running.tube_drop},
          {"u_dirty_W_m2K", running.u_dirty},
          {"margins",
           {{"duty", or_null(running.duty_margin)}, {"temperature_K", or_null(running.temperature_margin)}}},
          {"service_met", running.met ? Json(*running.met) : Json(nullptr)},
          {"limited_by", running.limited_by}};
}

double in_json(double si, units::Kind kind) {
  return kind == units::Kind::temperature ? units::from_si(si, "degC", kind) : si;
}

std::string one_line(const Json& json) {
  require_finite(json);
  return json.dump(-1, ' ', false, Json::error_handler_t::replace);
}

}  // namespace dutygauge::report
