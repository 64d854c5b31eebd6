#include "dutygauge/units/mention.hpp"

#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "kinds.hpp"

namespace dutygauge::units {
namespace {

/// "a heat transfer coefficient" is marked as heat_transfer_coefficient.
std::string mark_of(const KindFacts& known) {
  std::string mark(known.name.substr(known.name.find(' ') + 1));
  std::ranges::replace(mark, ' ', '_');
  return mark;
}

std::optional<Kind> kind_marked(std::string_view mark) {
  for (int i = 0; i <= static_cast<int>(Kind::angle); ++i)
    if (mark_of(facts(static_cast<Kind>(i))) == mark) return static_cast<Kind>(i);
  return {};
}

/// What a mark between braces stands for; empty where it is none.
std::string resolved(std::string_view inside, System system) {
  const auto colon = inside.find(':');
  if (colon == std::string_view::npos) return {};
  const auto kind = kind_marked(inside.substr(0, colon));
  const auto si = number(inside.substr(colon + 1));
  return kind && si ? shown(*si, *kind, system) : std::string();
}

}  // namespace

std::string mention(double si, Kind kind) {
  if (!std::isfinite(si)) return fmt::format("{}", si);
  return fmt::format("{{{}:{}}}", mark_of(facts(kind)), si);
}

std::string spoken(std::string_view sentence, System system) {
  std::string text;
  while (!sentence.empty()) {
    const auto open = sentence.find('{');
    text += sentence.substr(0, open);
    if (open == std::string_view::npos) break;
    sentence.remove_prefix(open);
    const auto close = sentence.find('}');
    const std::string shown =
        close == std::string_view::npos ? std::string() : resolved(sentence.substr(1, close - 1), system);
    text += shown.empty() ? sentence.substr(0, 1) : std::string_view(shown);
    sentence.remove_prefix(shown.empty() ? 1 : close + 1);
  }
  return text;
}

std::string shown_figure(double si, Kind kind, System system, int significant) {
  if (kind != Kind::temperature && kind != Kind::temperature_difference)
    return shown_number(si, kind, system, significant);
  const std::string number = fmt::format("{:.1f}", from_si(si, shown_unit(kind, system), kind));
  return number == "-0.0" ? "0.0" : number;
}

std::string shown(double si, Kind kind, System system, int significant) {
  if (kind == Kind::length && std::abs(si) >= 1.0) {
    const char* large = system == System::us ? "ft" : "m";
    return fmt::format("{:.{}g} {}", from_si(si, large, kind), significant, large);
  }
  const auto unit = shown_unit(kind, system);
  const std::string number = shown_figure(si, kind, system, significant);
  return unit.empty() ? number : fmt::format("{} {}", number, unit);
}

}  // namespace dutygauge::units
