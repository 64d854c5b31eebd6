#include "expression.hpp"

#include <fmt/core.h>

#include <algorithm>
#include <cmath>
#include <optional>

#include "kinds.hpp"
#include "parse.hpp"

namespace dutygauge::units {
namespace {

bool is_pressure(Kind kind) {
  return kind == Kind::pressure || kind == Kind::pressure_difference || kind == Kind::momentum_flux;
}

// What a unit without dimension stands for.
std::string_view described_plain(const Expression& expression) {
  const Use use = expression.terms.front().unit->use;
  if (use == Use::share) return "a ratio";
  if (use == Use::turn) return "an angle";
  if (use == Use::counted) return "a count";
  return expression.is_mass_ratio() ? "a mass fraction" : "a plain number";
}

[[noreturn]] void refuse_wrong(const Expression& expression, Kind kind) {
  std::string_view is = described(expression.dimension(false));
  if (is.empty() && expression.has_line()) is = described(expression.dimension(true));
  if (is.empty() && expression.dimension(false) == Dimension{}) is = described_plain(expression);
  std::string remedy = example_remedy(kind);
  if (is_pressure(kind) && expression.dimension(false) == Dimension{.mass = 1, .length = -2})
    remedy = "write \"kgf/cm2\" or \"psi\"";
  if (kind == Kind::count) remedy = "write the number alone";
  const std::string what = is.empty() ? fmt::format("{} is not {}", quoted(expression.text), facts(kind).name)
                                      : fmt::format("{} is {}", quoted(expression.text), is);
  throw Refusal{{what, expectation(kind), remedy}, true};
}

// A pressure with a datum where there is none to have, or inside a compound.
[[noreturn]] void refuse_datum(const Expression& expression, const Unit& unit, Kind kind) {
  if (!expression.alone())
    throw Refusal{{fmt::format("\"{}\" has a zero point and is no part of a compound unit", unit.name),
                   expectation(kind), example_remedy(kind)}};
  const bool suffixed = unit.name != "ata";
  throw Refusal{
      {fmt::format("\"{}\" is {} pressure", unit.name, unit.use == Use::gauge ? "a gauge" : "an absolute"),
       fmt::format("{} without a datum was expected", facts(kind).name),
       suffixed ? fmt::format("write \"{}\"", unit.name.substr(0, unit.name.size() - 1))
                : example_remedy(kind)}};
}

void check_use(const Expression& expression, const Unit& unit, Kind kind) {
  switch (unit.use) {
    case Use::anywhere:
    case Use::standard_volume:
      return;
    case Use::temperature:
      if (kind == Kind::temperature && !expression.alone()) refuse_wrong(expression, kind);
      return;
    case Use::open_pressure:
      return;
    case Use::absolute:
    case Use::gauge:
      if (kind != Kind::pressure || !expression.alone()) refuse_datum(expression, unit, kind);
      return;
    case Use::compound:
      if (unit.name != "1" && expression.alone())
        throw Refusal{{fmt::format("\"{}\" alone is easily taken for \"MPa\"", unit.name), expectation(kind),
                       "write Pa, kPa or MPa"}};
      return;
    case Use::share:
      if (!expression.alone() || (kind != Kind::ratio && kind != Kind::mass_fraction))
        refuse_wrong(expression, kind);
      return;
    case Use::turn:
      if (!expression.alone() || kind != Kind::angle) refuse_wrong(expression, kind);
      return;
    case Use::counted:
      if (kind != Kind::per_length) refuse_wrong(expression, kind);
      return;
  }
}

bool fits(const Expression& expression, Kind kind) {
  if (!may_be_bare(kind)) return true;
  const Use use = expression.terms.front().unit->use;
  const bool share = use == Use::share, turn = use == Use::turn;
  if (kind == Kind::mass_fraction) return share || expression.is_mass_ratio();
  return (kind == Kind::ratio && share) || (kind == Kind::angle && turn);
}

Scale scale(const Expression& expression, bool below_line, Kind kind) {
  Scale result;
  for (const Term& term : expression.terms) {
    const int power = below_line ? term.power_below_line() : term.power;
    for (int i = 0; i < std::abs(power); ++i) {
      result.times *= power > 0 ? term.unit->times : term.unit->over;
      result.over *= power > 0 ? term.unit->over : term.unit->times;
    }
    if (!term.unit->note.empty()) result.notes.emplace_back(term.unit->note);
    if (term.unit->use == Use::standard_volume) result.standard = term.unit;
  }
  const Unit& first = *expression.terms.front().unit;
  const bool has_zero =
      (kind == Kind::temperature && first.use == Use::temperature) || first.use == Use::gauge;
  if (has_zero) result.zero = first.zero;
  // A product of forces and areas says no more about its datum than psi does.
  result.open_pressure = kind == Kind::pressure && (first.use == Use::open_pressure || !expression.alone());
  if (result.open_pressure) result.notes.push_back(fmt::format("{} read as absolute", expression.text));
  return result;
}

}  // namespace

Scale scale_of(std::string_view text, Kind kind) {
  if (text.empty() && may_be_bare(kind)) return {};
  if (text.empty()) throw Refusal{{"the number has no unit", expectation(kind), example_remedy(kind)}, true};
  const Expression expression = parse_expression(text, kind);
  const Dimension wanted = facts(kind).dimension;
  const bool strict = expression.dimension(false) == wanted;
  const bool below = !strict && expression.has_line() && expression.dimension(true) == wanted;
  if (!strict && !below) refuse_wrong(expression, kind);
  for (const Term& term : expression.terms) check_use(expression, *term.unit, kind);
  if (!fits(expression, kind)) refuse_wrong(expression, kind);
  return scale(expression, below, kind);
}

}  // namespace dutygauge::units
