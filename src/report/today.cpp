#include <fmt/core.h>

#include <algorithm>
#include <cmath>
#include <stdexcept>

#include "sections.hpp"
#include "words.hpp"

// The unit as a reading shows it: what explains the reading, and what changes from there.

namespace dutygauge::report {
namespace {

using uncertainty::Closing;
using uncertainty::Output;

using units::Kind;

std::string_view in_words(Closing closing) {
  switch (closing) {
    case Closing::untested:
      return "its heat balance cannot be tested: one flow is missing";
    case Closing::closes:
      return "its heat balance closes";
    case Closing::within_uncertainty:
      return "its heat balance closes within uncertainty";
    case Closing::doubtful:
      return "its heat balance is doubtful";
    case Closing::does_not_close:
      return "its heat balance does not close";
  }
  throw std::invalid_argument("report: no such closing");
}

std::string explained(const Anchored& anchored, const Figures& figures) {
  const auto& anchor = anchored.anchor;
  if (anchor.film_factor > 1.0)
    return fmt::format("the {} film {:.2f} times as high as computed, and no deposit, explain it",
                       anchor.film_side == uncertainty::Side::shell ? "shell-side" : "tube-side",
                       anchor.film_factor);
  return fmt::format("deposits of {} together explain it",
                     figures.with_unit(anchor.resistance, Kind::fouling_resistance));
}

/// The output whose line governs, or the shell side's outlet.
Side followed(const Result& result) {
  return result.assessment.verdict.limited_by == "service.tube_side_outlet" ? Side::tube : Side::shell;
}

std::string change_of(const RatedCase& one, const Result& result, Side side, const Figures& figures) {
  const auto& then = *one.today->assessment.rating.outcome;
  const auto& now = result.anchored->outcome;
  const bool shell = side == Side::shell;
  const double change = shell ? then.shell_outlet - now.shell_outlet : then.tube_outlet - now.tube_outlet;
  const auto output = static_cast<std::size_t>(shell ? Output::shell_outlet : Output::tube_outlet);
  std::string text = figures.difference(change);
  if (one.today->change) {
    const auto& spread = (*one.today->change)[output];
    text += fmt::format(" (+-{})",
                        figures.number(0.5 * (spread.high - spread.low), Kind::temperature_difference, 2));
  }
  std::string name = one.name;
  std::ranges::replace(name, '_', ' ');
  return result.cases.size() == 1 ? text : fmt::format("{} {}", ascii(name), text);
}

}  // namespace

std::vector<std::string> today_in_words(const Result& result) {
  if (!result.anchored) return {};
  const auto& anchored = *result.anchored;
  const Figures figures(result.display);
  const std::string taken = anchored.anchor.reading.taken;
  const std::string when = taken.empty() ? "" : " of " + ascii(taken);
  std::vector<std::string> said{
      anchored.anchor.resistance_sigma > 0.0
          ? fmt::format("Today is the unit with the fouling that its record{} has shown, {} +- {}.", when,
                        figures.number(anchored.anchor.resistance, Kind::fouling_resistance, 3),
                        figures.with_unit(anchored.anchor.resistance_sigma, Kind::fouling_resistance))
          : fmt::format("Today is the unit of the reading{}: {}; {}.", when,
                        in_words(anchored.anchor.closing), explained(anchored, figures))};
  const Side side = followed(result);
  const bool shell = side == Side::shell;
  std::vector<std::string> changes;
  for (const RatedCase& one : result.cases)
    if (one.today && one.today->assessment.rating.outcome)
      changes.push_back(change_of(one, result, side, figures));
  if (!changes.empty())
    said.push_back(fmt::format(
        "From there to then, {} outlet, which was {}: {}.", stream_name(result.assessment.problem, side),
        figures.with_unit(shell ? anchored.outcome.shell_outlet : anchored.outcome.tube_outlet,
                          Kind::temperature),
        listed(changes)));
  return said;
}

}  // namespace dutygauge::report
