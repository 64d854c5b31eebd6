#include <fmt/core.h>

#include "dutygauge/report.hpp"
#include "page.hpp"
#include "sections.hpp"
#include "table_parts.hpp"
#include "words.hpp"

namespace dutygauge::report {
namespace {

std::string held_stream(const rating::Problem& problem, Side side, const Figures& figures) {
  const auto& stream = side == Side::shell ? problem.shell_side : problem.tube_side;
  return fmt::format("{} in the {}, {} from {}", stream_name(problem, side),
                     side == Side::shell ? "shell" : "tubes",
                     figures.with_unit(stream.mass_flow, units::Kind::mass_flow),
                     figures.with_unit(stream.inlet_temperature, units::Kind::temperature));
}

void closing(Page& page, const Result& result) {
  const auto& problem = result.assessment.problem;
  const Figures figures(result.display);
  if (!result.present_since.empty())
    page.line(fmt::format("The unit is rated as it is since {}; claims are checked as built.",
                          result.present_since));
  const std::string of_case =
      result.cases.size() > 1 ? fmt::format(" ({})", ascii(result.cases[result.governing].name)) : "";
  page.paragraph(
      fmt::format("Held constant{}: ", of_case),
      held_stream(problem, Side::shell, figures) + "; " + held_stream(problem, Side::tube, figures) + ".");
  page.line(
      "Engineering aid, not a code calculation; defer to local codes and licensed practice. "
      "dutygauge " DUTYGAUGE_VERSION);
}

}  // namespace

void heading(Page& page, const Result& result) {
  heading(page, CaseName{.file = result.file,
                         .title = result.title,
                         .tag = result.tag,
                         .input_sha256 = result.input_sha256});
}

void answer(Page& page, const Result& result) {
  if (result.cases.size() > 1 || result.anchored) return answer_of_cases(page, result);
  const auto& rating = result.assessment.rating;
  page.section("ANSWER",
               rating.outcome ? result.assessment.verdict.text : "No result: " + rating.no_result + ".");
}

std::string text(const Result& result, const TextOptions& options) {
  Page page;
  heading(page, result);
  sheet_contradicts(page, result);
  answer(page, result);
  if (result.assessment.rating.outcome) {
    page.blank();
    how_much(page, result);
    how_sure(page, result);
    page.blank();
    what_limits(page, result);
    levers(page, result);
    control(page, result);
  }
  claims(page, result, options);
  assumed(page, result, options);
  page.blank();
  rules(page, result, options);
  page.blank();
  next_steps(page, result);
  if (options.all) details(page, result);
  page.blank();
  closing(page, result);
  return page.text();
}

}  // namespace dutygauge::report
