#include <fmt/core.h>
#include <fmt/ranges.h>

#include <algorithm>
#include <charconv>
#include <span>

#include "dutygauge/units/mention.hpp"
#include "kinds.hpp"
#include "read.hpp"

namespace dutygauge::units {
namespace {

constexpr double inch = 0.0254;  // [m]

struct Gauge {
  std::string_view name;
  double wall;  // [in]
};

// Birmingham wire gauge, nominal tube walls in inches. Source: BWG chart of
// projectmaterials.com; 8 to 16 also the tube dimension chart of Curtiss-Wright.
constexpr Gauge gauges[] = {
    {"0000", 0.454}, {"000", 0.425}, {"00", 0.380}, {"0", 0.340},  {"1", 0.300},  {"2", 0.284},
    {"3", 0.259},    {"4", 0.238},   {"5", 0.220},  {"6", 0.203},  {"7", 0.180},  {"8", 0.165},
    {"9", 0.148},    {"10", 0.134},  {"11", 0.120}, {"12", 0.109}, {"13", 0.095}, {"14", 0.083},
    {"15", 0.072},   {"16", 0.065},  {"17", 0.058}, {"18", 0.049}, {"19", 0.042}, {"20", 0.035},
    {"21", 0.032},   {"22", 0.028},  {"23", 0.025}, {"24", 0.022}, {"25", 0.020}, {"26", 0.018},
    {"27", 0.016},   {"28", 0.014},  {"29", 0.013}, {"30", 0.012}, {"31", 0.010}, {"32", 0.009},
    {"33", 0.008},   {"34", 0.007},  {"35", 0.005}, {"36", 0.004},
};

// A minimum wall is made with a plus tolerance only; common practice, no source:
// rated in the middle of nought to twenty per cent above.
constexpr double minimum_wall_low = 1.0, minimum_wall_rated = 1.10, minimum_wall_high = 1.2;

struct Pipe {
  std::string_view nominal;                                          // [in]
  std::string_view metric;                                           // DN [mm]
  double outside, standard, extra_strong, schedule_40, schedule_80;  // [in]
};

// Wrought steel pipe, ASME B36.10M: outside diameter and walls in inches. Read in
// pipe charts (Misumi, Follin Craft, studylib): all diameters, standard walls and
// schedule 40; schedule 80 and extra strong up to NPS 12. Recalled: those of NPS 14
// to 24. Charts of older editions print 0.593, 0.687 for 0.594, 0.688.
constexpr Pipe pipes[] = {
    {"1/2", "15", 0.840, 0.109, 0.147, 0.109, 0.147},   {"3/4", "20", 1.050, 0.113, 0.154, 0.113, 0.154},
    {"1", "25", 1.315, 0.133, 0.179, 0.133, 0.179},     {"1 1/4", "32", 1.660, 0.140, 0.191, 0.140, 0.191},
    {"1 1/2", "40", 1.900, 0.145, 0.200, 0.145, 0.200}, {"2", "50", 2.375, 0.154, 0.218, 0.154, 0.218},
    {"2 1/2", "65", 2.875, 0.203, 0.276, 0.203, 0.276}, {"3", "80", 3.500, 0.216, 0.300, 0.216, 0.300},
    {"3 1/2", "90", 4.000, 0.226, 0.318, 0.226, 0.318}, {"4", "100", 4.500, 0.237, 0.337, 0.237, 0.337},
    {"5", "125", 5.563, 0.258, 0.375, 0.258, 0.375},    {"6", "150", 6.625, 0.280, 0.432, 0.280, 0.432},
    {"8", "200", 8.625, 0.322, 0.500, 0.322, 0.500},    {"10", "250", 10.750, 0.365, 0.500, 0.365, 0.594},
    {"12", "300", 12.750, 0.375, 0.500, 0.406, 0.688},  {"14", "350", 14.0, 0.375, 0.500, 0.438, 0.750},
    {"16", "400", 16.0, 0.375, 0.500, 0.500, 0.844},    {"18", "450", 18.0, 0.375, 0.500, 0.562, 0.938},
    {"20", "500", 20.0, 0.375, 0.500, 0.594, 1.031},    {"24", "600", 24.0, 0.375, 0.500, 0.688, 1.219},
};

// "14bwg" as "14 bwg": a blank wherever letters and digits meet.
std::string spaced(std::string_view text) {
  std::string result;
  for (const char c : lower(text)) {
    const bool letter = c >= 'a' && c <= 'z';
    const char last = result.empty() ? ' ' : result.back();
    const bool after_letter = last >= 'a' && last <= 'z';
    if ((letter && is_digit(last)) || (is_digit(c) && after_letter)) result += ' ';
    result += c == '-' && is_digit(last) ? ' ' : c;
  }
  return result;
}

[[noreturn]] void refuse_gauge(std::string_view text) {
  throw Refusal{{fmt::format("{} is not a gauge", quoted(text)), "a gauge from 0000 to 36 BWG was expected",
                 "write for example \"14 BWG\", \"14 BWG min\" or \"2.11 mm\""}};
}

Value gauge_wall(std::string_view text, std::vector<std::string_view> parts) {
  const bool minimum = parts.size() == 3 && parts.back() == "min";
  const bool average = parts.size() == 3 && (parts.back() == "avg" || parts.back() == "average");
  if (minimum || average) parts.pop_back();
  if (parts.size() != 2) refuse_gauge(text);
  const std::string_view number = parts[0] == "bwg" ? parts[1] : parts[0];
  const auto* gauge = std::ranges::find(gauges, number, &Gauge::name);
  if (gauge == std::end(gauges)) refuse_gauge(text);
  const double wall = gauge->wall * inch;
  Value value;
  value.si = wall;
  if (!minimum) return value;
  value.si = minimum_wall_rated * wall;
  value.low = minimum_wall_low * wall;
  value.high = minimum_wall_high * wall;
  value.taken_for_granted.emplace_back("minimum wall, rated at 1.10 x the gauge, span 1.0 to 1.2");
  return value;
}

Value read_wall_folded(const std::string& text) {
  const std::string plain = spaced(text);
  const auto parts = words(plain);
  if (std::ranges::find(parts, "bwg") != parts.end()) return gauge_wall(text, parts);
  const std::string_view last = parts.back();
  if (last == "swg" || last == "awg" || last == "ga" || last == "gauge")
    throw Refusal{{fmt::format("the gauge in {} is not known here", quoted(text)),
                   "a length or a Birmingham gauge was expected",
                   "write for example \"2.11 mm\" or \"14 BWG\""}};
  if (last == "min" || last == "avg")
    throw Refusal{{fmt::format("\"{}\" stands behind a length in {}", last, quoted(text)),
                   "a length or a gauge was expected", "write the wall to be rated as a length alone"}};
  return read_folded(text, {.kind = Kind::length}).value;
}

[[noreturn]] void refuse_size(std::string_view text, std::string_view what) {
  std::vector<std::string_view> sizes;
  for (const Pipe& pipe : pipes) sizes.push_back(what == "nps" ? pipe.nominal : pipe.metric);
  throw Refusal{
      {fmt::format("the pipe size in {} is not known", quoted(text)),
       fmt::format("one of {} {} was expected", what == "nps" ? "NPS" : "DN", fmt::join(sizes, ", ")),
       "write such a size, or the bore as a length"}};
}

[[noreturn]] void refuse_schedule(std::string_view text) {
  throw Refusal{{fmt::format("the schedule in {} is not known", quoted(text)),
                 "sch 40, sch 80, std or xs was expected", "write such a schedule, or the bore as a length"}};
}

double pipe_wall(const Pipe& pipe, std::string_view schedule, std::string_view text) {
  if (schedule == "std") return pipe.standard;
  if (schedule == "xs") return pipe.extra_strong;
  if (schedule == "40") return pipe.schedule_40;
  if (schedule == "80") return pipe.schedule_80;
  refuse_schedule(text);
}

// What stands behind the size; empty where nothing does.
std::string_view schedule_of(std::span<const std::string_view> parts, std::string_view text) {
  if (parts.empty()) return {};
  const bool announced = parts[0] == "sch" || parts[0] == "sch." || parts[0] == "schedule";
  if (announced) parts = parts.subspan(1);
  if (parts.size() != 1) refuse_schedule(text);
  return parts[0];
}

const Pipe& pipe_of(std::string_view size, std::string_view system, std::string_view text) {
  const auto* found = std::ranges::find(pipes, size, system == "nps" ? &Pipe::nominal : &Pipe::metric);
  // "NPS 1.5" is "NPS 1 1/2".
  double decimal = 0;
  const auto [end, error] = std::from_chars(size.data(), size.data() + size.size(), decimal);
  if (found == std::end(pipes) && error == std::errc{} && end == size.data() + size.size() && system == "nps")
    found = std::ranges::find_if(
        pipes, [&](const Pipe& pipe) { return scan_number(pipe.nominal).amount == decimal; });
  if (found == std::end(pipes)) refuse_size(text, system);
  return *found;
}

Value pipe_bore(std::string_view text, std::span<const std::string_view> parts) {
  const std::string_view system = parts[0];
  parts = parts.subspan(1);
  const auto size_end =
      std::ranges::find_if_not(parts, [](std::string_view word) { return is_digit(word[0]); });
  const std::string size = fmt::format("{}", fmt::join(parts.begin(), size_end, " "));
  const Pipe& pipe = pipe_of(size, system, text);
  const std::string_view schedule = schedule_of({size_end, parts.end()}, text);
  const double wall = pipe_wall(pipe, schedule.empty() ? "std" : schedule, text);
  Value value;
  value.si = (pipe.outside - 2.0 * wall) * inch;
  if (schedule.empty())
    value.taken_for_granted.push_back(fmt::format("{} {} taken with standard wall, {} (ASME B36.10M)",
                                                  system == "nps" ? "NPS" : "DN", size,
                                                  mention(wall * inch, Kind::length)));
  return value;
}

Value read_bore_folded(const std::string& text) {
  const std::string plain = spaced(text);
  const auto parts = words(plain);
  if (parts.front() == "nps" || parts.front() == "dn") return pipe_bore(text, parts);
  if (text.find("sch") != std::string::npos)
    throw Refusal{{fmt::format("{} has a schedule but no nominal size", quoted(text)),
                   "a length or a nominal pipe was expected", "write for example \"NPS 8 sch 40\""}};
  return read_folded(text, {.kind = Kind::length}).value;
}

}  // namespace

Read<Value> read_wall(std::string_view text) {
  return attempt<Value>([&] { return read_wall_folded(folded(text)); });
}

Read<Value> read_bore(std::string_view text) {
  return attempt<Value>([&] { return read_bore_folded(folded(text)); });
}

}  // namespace dutygauge::units
