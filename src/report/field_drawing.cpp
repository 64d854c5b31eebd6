#include "field_drawing.hpp"

#include <fmt/core.h>

#include <algorithm>
#include <chrono>
#include <cmath>
#include <nlohmann/json.hpp>

#include "field_words.hpp"

namespace dutygauge::report {
namespace {

using field::FieldResult;
using Json = nlohmann::ordered_json;

constexpr double width = 960, height = 360, left = 64, right = 20, above = 28, below = 34;
constexpr double ahead = 0.25;  // of the record: how far the law is drawn on
constexpr int law_points = 120;

double shown(double si, units::System display) {
  return units::from_si(si, resistance_unit(display), units::Kind::fouling_resistance);
}

/// One day as it is drawn, in the reader's units.
struct Mark {
  double day, low, middle, high;
};

std::vector<Mark> marks_of(const CaseName& about, const FieldResult& result) {
  std::vector<Mark> marks;
  for (const field::Day& day : result.days) {
    const auto& a = day.apparent;
    if (!std::isfinite(a.fouling)) continue;
    const double reach = std::isfinite(a.fouling_random) ? 2.0 * a.fouling_random : 0.0;
    Mark mark{day.day, a.fouling - reach, a.fouling, a.fouling + reach};
    for (const field::DayRange& range : result.ranges)
      if (range.day == day.day) mark.low = range.low, mark.high = range.high;
    marks.push_back({mark.day, shown(mark.low, about.display), shown(mark.middle, about.display),
                     shown(mark.high, about.display)});
  }
  return marks;
}

struct Point {
  double day, value;
};

std::vector<Point> law_of(const CaseName& about, const FieldResult& result) {
  std::vector<Point> points;
  if (!result.used().fouling || result.days.empty()) return points;
  const auto& fouling = *result.used().fouling;
  const double begin = fouling.since, last = result.days.back().day;
  const double end = last + ahead * (last - result.days.front().day);
  for (int i = 0; i <= law_points; ++i) {
    const double day = begin + (end - begin) * i / law_points;
    points.push_back({day, shown(fouling.choice.best().law.at(day), about.display)});
  }
  return points;
}

/// Where days and values lie on the paper.
struct Frame {
  double from = 0, to = 1, low = 0, high = 1;

  double x(double day) const { return left + (day - from) / (to - from) * (width - left - right); }
  double y(double value) const {
    return height - below - (value - low) / (high - low) * (height - above - below);
  }
};

Frame frame_of(const std::vector<Mark>& marks, const std::vector<Point>& law, double allowed) {
  Frame frame{marks.front().day, marks.back().day, std::min(0.0, marks.front().low), std::max(allowed, 0.0)};
  for (const Mark& mark : marks) {
    frame.low = std::min(frame.low, mark.low);
    frame.high = std::max(frame.high, mark.high);
  }
  for (const Point& point : law) {
    frame.to = std::max(frame.to, point.day);
    frame.high = std::max(frame.high, point.value);
  }
  if (!(frame.to > frame.from)) frame.to = frame.from + 1.0;
  if (!(frame.high > frame.low)) frame.high = frame.low + 1e-6;
  frame.high += 0.04 * (frame.high - frame.low);
  return frame;
}

/// A round step that makes about five parts of a span.
double round_step(double span) {
  const double power = std::pow(10.0, std::floor(std::log10(span / 5.0)));
  const double part = span / 5.0 / power;
  return power * (part < 1.5 ? 1.0 : part < 3.5 ? 2.0 : part < 7.5 ? 5.0 : 10.0);
}

std::string value_axis(const Frame& frame, const std::string& unit) {
  std::string svg;
  const double step = round_step(frame.high - frame.low);
  for (double value = std::ceil(frame.low / step) * step; value <= frame.high; value += step) {
    const double y = frame.y(value);
    svg += fmt::format("<path class=\"grid\" d=\"M{:.1f} {:.1f}H{:.1f}\"/>", left, y, width - right);
    svg += fmt::format("<text x=\"{:.1f}\" y=\"{:.1f}\" text-anchor=\"end\">{:.3g}</text>", left - 6, y + 4,
                       std::abs(value) < 1e-9 * step ? 0.0 : value * 1e6);
  }
  return svg + fmt::format("<text x=\"4\" y=\"14\">fouling, 1e-6 {}</text>", escaped(unit));
}

/// The first of each month, or of each third where there are many.
std::string time_axis(const Frame& frame, std::int64_t start) {
  using namespace std::chrono;
  std::string svg;
  const auto begin = sys_seconds(seconds(start + static_cast<std::int64_t>(frame.from * 86400.0)));
  const auto end = sys_seconds(seconds(start + static_cast<std::int64_t>(frame.to * 86400.0)));
  const int every = static_cast<int>((frame.to - frame.from) / 500.0) + 1;
  const year_month_day first = floor<days>(begin);
  int count = 0;
  for (auto month = first.year() / first.month(); sys_days(month / 1) <= end; month += months(1)) {
    const double day =
        static_cast<double>((sys_seconds(sys_days(month / 1)) - sys_seconds(seconds(start))).count()) /
        86400.0;
    if (day < frame.from || count++ % every != 0) continue;
    svg += fmt::format(
        "<path class=\"grid\" d=\"M{0:.1f} {1:.1f}v5\"/><text x=\"{0:.1f}\" y=\"{2:.1f}\" "
        "text-anchor=\"middle\">{3}</text>",
        frame.x(day), height - below, height - 12, iso_date(start, day + 0.01).substr(0, 7));
  }
  return svg;
}

std::string days_drawn(const Frame& frame, const std::vector<Mark>& marks) {
  std::string ranges, middles;
  bool open = false;
  for (std::size_t i = 0; i < marks.size(); ++i) {
    const Mark& mark = marks[i];
    ranges += fmt::format("M{:.1f} {:.1f}V{:.1f}", frame.x(mark.day), frame.y(mark.low), frame.y(mark.high));
    open = open && mark.day - marks[i - 1].day < 1.5;  // a gap stays a gap
    middles += fmt::format("{}{:.1f} {:.1f}", open ? "L" : "M", frame.x(mark.day), frame.y(mark.middle));
    open = true;
  }
  return fmt::format("<path class=\"range\" d=\"{}\"/><path class=\"days\" d=\"{}\"/>", ranges, middles);
}

std::string law_drawn(const Frame& frame, const std::vector<Point>& law) {
  std::string line;
  for (const Point& point : law)
    line +=
        fmt::format("{}{:.1f} {:.1f}", line.empty() ? "M" : "L", frame.x(point.day), frame.y(point.value));
  return line.empty() ? "" : fmt::format("<path class=\"law\" d=\"{}\"/>", line);
}

std::string allowed_drawn(const Frame& frame, double allowed) {
  if (!(allowed > 0.0)) return "";
  const double y = frame.y(allowed);
  return fmt::format(
      "<path class=\"allowed\" d=\"M{:.1f} {:.1f}H{:.1f}\"/><text x=\"{:.1f}\" y=\"{:.1f}\">allowed</text>",
      left, y, width - right, left + 6, y - 5);
}

std::string events_drawn(const Frame& frame, const field::Events& events) {
  std::string svg;
  int number = 0;
  for (const field::Event& event : events) {
    ++number;
    if (event.at < frame.from || event.at > frame.to) continue;
    svg += fmt::format(
        "<path class=\"event\" d=\"M{0:.1f} {1:.1f}V{2:.1f}\"/><text x=\"{0:.1f}\" y=\"{3:.1f}\" "
        "text-anchor=\"middle\">{4}</text>",
        frame.x(event.at), above, height - below, above - 4, number);
  }
  return svg;
}

double allowed_of(const CaseName& about, const FieldResult& result) {
  return result.allowed ? shown(result.allowed->fouling, about.display) : 0.0;
}

}  // namespace

std::string escaped(std::string_view text) {
  std::string html;
  for (const char c : text) switch (c) {
      case '&':
        html += "&amp;";
        break;
      case '<':
        html += "&lt;";
        break;
      case '>':
        html += "&gt;";
        break;
      case '"':
        html += "&quot;";
        break;
      case '\'':
        html += "&#39;";
        break;
      default:
        html += c;
    }
  return html;
}

std::string trend_svg(const CaseName& about, const FieldResult& result) {
  const auto marks = marks_of(about, result);
  if (marks.empty()) return "";
  const auto law = law_of(about, result);
  const double allowed = allowed_of(about, result);
  const Frame frame = frame_of(marks, law, allowed);
  return fmt::format("<svg viewBox=\"0 0 {} {}\" role=\"img\" aria-labelledby=\"trend-title trend-desc\">",
                     width, height) +
         fmt::format("<title id=\"trend-title\">Apparent fouling from {} to {}</title>",
                     iso_date(result.start, marks.front().day), iso_date(result.start, marks.back().day)) +
         "<desc id=\"trend-desc\">Upright bars: range of the readings of a day. Solid line: their median. "
         "Dashed: the law "
         "fitted since the last cleaning. Dotted: what the service allows. Numbers: events. The table below "
         "holds the same "
         "days.</desc>" +
         value_axis(frame, resistance_unit(about.display)) + time_axis(frame, result.start) +
         days_drawn(frame, marks) + law_drawn(frame, law) + allowed_drawn(frame, allowed) +
         events_drawn(frame, result.events) + "</svg>";
}

std::string trend_data(const CaseName& about, const FieldResult& result) {
  const auto rounded = [](double value) { return std::round(value * 1e9) / 1e3; };  // in 1e-6, three decimals
  Json data = {
      {"start", result.start}, {"unit", "1e-6 " + resistance_unit(about.display)}, {"allowed", nullptr}};
  if (result.allowed) data["allowed"] = rounded(allowed_of(about, result));
  data["days"] = data["law"] = data["events"] = Json::array();
  for (const Mark& mark : marks_of(about, result))
    data["days"].push_back(
        Json::array({mark.day, rounded(mark.low), rounded(mark.middle), rounded(mark.high)}));
  for (const Point& point : law_of(about, result))
    data["law"].push_back(Json::array({std::round(point.day * 100.0) / 100.0, rounded(point.value)}));
  for (const field::Event& event : result.events) data["events"].push_back(event.at);
  std::string text = data.dump(-1, ' ', true, Json::error_handler_t::replace);
  // "</script>" inside a string would end the element.
  for (std::size_t at = text.find('<'); at != std::string::npos; at = text.find('<', at))
    text.replace(at, 1, "\\u003c");
  return text;
}

}  // namespace dutygauge::report
