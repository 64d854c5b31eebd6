#include "read.hpp"

#include <fmt/core.h>

#include <algorithm>
#include <cmath>
#include <stdexcept>

#include "kinds.hpp"

namespace dutygauge::units {
namespace {

constexpr auto npos = std::string_view::npos;

struct Part {
  double si = 0;
  Scale scale;
  std::string_view unit;  ///< as used: its own or the fallback
};

void check_possible(double& si, std::string_view text, Kind kind) {
  if (!std::isfinite(si))
    throw Refusal{{fmt::format("{} is too large to be computed with", quoted(text)), expectation(kind),
                   "check the exponent"}};
  if (kind == Kind::temperature && si < 0.0 && si > -1e-9) si = 0.0;  // rounding of -459.67 degF
  if (kind == Kind::temperature && si < 0.0)
    throw Refusal{{fmt::format("{} is below absolute zero", quoted(text)),
                   "a temperature from -273.15 degC (-459.67 degF) upwards was expected",
                   "check the sign and the unit"}};
  if (kind == Kind::pressure && si < 0.0)
    throw Refusal{{fmt::format("{} is below vacuum", quoted(text)),
                   "a pressure from 0 bara (-1.01325 barg) upwards was expected",
                   "check the sign and the unit"}};
  if (kind == Kind::count && si != std::floor(si))
    throw Refusal{
        {fmt::format("{} is not a whole number", quoted(text)), expectation(kind), example_remedy(kind)}};
}

Part read_part(std::string_view text, const Wanted& wanted) {
  const auto [amount, rest] = scan_number(text);
  Part part;
  part.unit = rest.empty() ? wanted.fallback_unit : rest;
  if (part.unit.empty() && !may_be_bare(wanted.kind))
    throw Refusal{
        {fmt::format("{} has no unit", quoted(text)), expectation(wanted.kind), example_remedy(wanted.kind)},
        true};
  part.scale = scale_of(part.unit, wanted.kind);
  if (part.scale.standard != nullptr && !wanted.standard_volumes)
    throw Refusal{{fmt::format("\"{}\" is not a volume at flowing conditions", part.scale.standard->name),
                   "a volume flow where it flows was expected", example_remedy(wanted.kind)}};
  part.si = part.scale.to_si(amount);
  check_possible(part.si, text, wanted.kind);
  return part;
}

Reading as_reading(const Part& part) {
  Reading result;
  result.value.si = part.si;
  result.value.bare_pressure = part.scale.open_pressure;
  for (const auto& note : part.scale.notes) add_note(result.value.taken_for_granted, note);
  result.standard = part.scale.standard;
  return result;
}

Reading read_range(std::string_view text, std::size_t dots, const Wanted& wanted) {
  const std::string_view left = trimmed(text.substr(0, dots)), right = trimmed(text.substr(dots + 2));
  if (right.find("..") != npos || right.substr(0, 1) == ".")
    throw Refusal{{fmt::format("{} has too many dots", quoted(text)), "a range with two dots was expected",
                   "write for example \"10..14 in\""}};
  const Part high = read_part(right, wanted);
  Wanted for_left = wanted;
  for_left.fallback_unit = high.unit;
  const Part low = read_part(left, for_left);
  if (high.unit.empty() != low.unit.empty())
    throw Refusal{{fmt::format("the unit stands in the middle of {}", quoted(text)),
                   "a range with its unit at the end was expected", "write for example \"10..14 %\""}};
  if (!(low.si < high.si && std::isfinite(low.si + high.si)))
    throw Refusal{{fmt::format("the range {} does not rise", quoted(text)),
                   "the smaller end was expected first", "write for example \"10..14 in\""}};
  const double middle = 0.5 * (low.si + high.si);
  if (wanted.kind == Kind::count && middle != std::floor(middle))
    throw Refusal{{fmt::format("the middle of {} is not a whole number", quoted(text)),
                   expectation(wanted.kind), "choose ends an even number apart"}};
  if (low.scale.standard != high.scale.standard)
    throw Refusal{{fmt::format("the ends of {} are measured at different places", quoted(text)),
                   "one unit was expected", "write both ends in the same unit"}};
  Reading result = as_reading(low);
  result.value.si = middle;
  result.value.low = low.si;
  result.value.high = high.si;
  result.value.bare_pressure |= high.scale.open_pressure;
  for (const auto& note : high.scale.notes) add_note(result.value.taken_for_granted, note);
  return result;
}

// The kind of a deviation from a value: it never has a zero point.
Kind difference_kind(Kind kind) {
  if (kind == Kind::temperature) return Kind::temperature_difference;
  return kind == Kind::pressure ? Kind::pressure_difference : kind;
}

double relative_deviation(const Part& part, double share, std::string_view text, Kind kind) {
  if (kind == Kind::temperature || part.scale.zero != 0.0)
    throw Refusal{{fmt::format("a share of {} depends on where its unit has its zero", quoted(text)),
                   "a deviation with a unit was expected", "write for example \"68 +- 1 degC\""}};
  return std::abs(part.si) * share / 100.0;
}

// A share behind "+-" is relative, except where the value is itself a per cent.
bool is_relative(std::string_view left_unit, std::string_view right_unit, Kind kind) {
  if (right_unit != "%") return false;
  const bool per_cent = kind == Kind::ratio || kind == Kind::mass_fraction;
  return !(per_cent && (left_unit.empty() || left_unit == "%"));
}

void check_points(const Scanned& left, std::string_view right_unit, std::string_view text, Kind kind) {
  if (right_unit != "%" || !left.rest.empty() || std::abs(left.amount) > 1.0 || left.amount == 0.0) return;
  throw Refusal{
      {fmt::format("{} may be a fraction with a relative deviation or a per cent with points", quoted(text)),
       expectation(kind), "give both numbers their unit, for example \"25 % +- 2 %\""}};
}

Reading read_deviation(std::string_view text, std::size_t sign, const Wanted& wanted) {
  const std::string_view left = trimmed(text.substr(0, sign)), right = trimmed(text.substr(sign + 2));
  const Scanned value = scan_number(left), deviation = scan_number(right);
  if (deviation.amount < 0.0)
    throw Refusal{{fmt::format("the deviation in {} is negative", quoted(text)),
                   "a positive deviation was expected", "write for example \"12 +- 1 in\""}};
  const bool relative = is_relative(value.rest, deviation.rest, wanted.kind);
  Wanted for_value = wanted;
  if (!relative && !deviation.rest.empty()) for_value.fallback_unit = deviation.rest;
  if (!relative) check_points(value, deviation.rest, text, wanted.kind);
  const Part part = read_part(left, for_value);
  if (!relative && deviation.rest.empty() && !value.rest.empty())
    throw Refusal{{fmt::format("the unit stands in the middle of {}", quoted(text)),
                   "a deviation with its unit at the end was expected", "write for example \"12 +- 1 in\""}};
  double standard_deviation = 0.0;
  if (relative)
    standard_deviation = relative_deviation(part, deviation.amount, text, wanted.kind);
  else if (deviation.rest.empty() || deviation.rest == part.unit)
    standard_deviation = part.scale.difference(deviation.amount);
  else
    standard_deviation = scale_of(deviation.rest, difference_kind(wanted.kind)).difference(deviation.amount);
  if (!std::isfinite(standard_deviation)) check_possible(standard_deviation, text, wanted.kind);
  Reading result = as_reading(part);
  result.value.standard_deviation = standard_deviation;
  return result;
}

void check_place(std::string_view text) {
  if (text.find("->") != npos)
    throw Refusal{{fmt::format("{} is a pair", quoted(text)), "one value was expected",
                   "write one value; pairs belong to two_point"}};
  if (text.find(" at ") != npos)
    throw Refusal{{fmt::format("{} says at what it holds", quoted(text)), "a value alone was expected",
                   "leave out what stands behind \"at\""}};
}

// The scale of a unit that stands in code, not in a file.
Scale fixed_scale(std::string_view unit, Kind kind) {
  try {
    const std::string plain = unit.empty() ? std::string() : folded(unit);
    Scale scale = scale_of(plain, kind);
    if (scale.standard == nullptr) return scale;
  } catch (const Refusal& refusal) {
    throw std::invalid_argument(refusal.misread.what + "; " + refusal.misread.expected);
  }
  throw std::invalid_argument("a standard volume is not a volume at flowing conditions");
}

}  // namespace

void add_note(std::vector<std::string>& notes, std::string note) {
  if (std::ranges::find(notes, note) == notes.end()) notes.push_back(std::move(note));
}

Reading read_folded(std::string_view text, const Wanted& wanted) {
  check_place(text);
  const auto dots = text.find(".."), sign = text.find("+-");
  if (dots != npos && sign != npos)
    throw Refusal{{fmt::format("{} is a range and has a deviation", quoted(text)),
                   "one of the two was expected", "write \"10..14 in\" or \"12 +- 1 in\""}};
  if (dots != npos) return read_range(text, dots, wanted);
  if (sign != npos) return read_deviation(text, sign, wanted);
  return as_reading(read_part(text, wanted));
}

double read_plain(std::string_view text, Kind kind) {
  check_place(text);
  if (text.find("..") != npos || text.find("+-") != npos)
    throw Refusal{{fmt::format("{} is a range or has a deviation", quoted(text)),
                   "a plain value was expected", example_remedy(kind)}};
  return read_part(text, {.kind = kind}).si;
}

std::string_view unit_at_end(std::string_view text) {
  const auto dots = text.rfind(".."), sign = text.rfind("+-");
  if (sign == npos) return scan_number(dots == npos ? text : trimmed(text.substr(dots + 2))).rest;
  const auto unit = scan_number(trimmed(text.substr(sign + 2))).rest;
  const auto before = scan_number(trimmed(text.substr(0, sign))).rest;
  return unit == "%" && !before.empty() ? before : unit;
}

Read<Value> read(std::string_view text, Kind kind) {
  return attempt<Value>([&] { return read_folded(folded(text), {.kind = kind}).value; });
}

double to_si(double amount, std::string_view unit, Kind kind) {
  return fixed_scale(unit, kind).to_si(amount);
}

double from_si(double si, std::string_view unit, Kind kind) {
  const Scale scale = fixed_scale(unit, kind);
  return (si - scale.zero) * scale.over / scale.times;
}

}  // namespace dutygauge::units
