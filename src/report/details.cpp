#include <fmt/core.h>

#include <set>

#include "dutygauge/sources.hpp"
#include "sections.hpp"
#include "words.hpp"

namespace dutygauge::report {
namespace {

using units::Kind;

void tube_side(Page& page, const service::Assessment& assessment, const Figures& figures) {
  const auto& outcome = *assessment.rating.outcome;
  const auto& film = outcome.local.tube_film;
  const auto& drop = outcome.tube_drop;
  const auto part = [&figures](double pressure) {
    return figures.number(pressure, Kind::pressure_difference, 3);
  };
  page.section(
      "TUBE SIDE",
      fmt::format("{}: film {} on the bore; Re {} ({}), Pr {}, Nu {}; {}; wetted wall {}.",
                  stream_name(assessment.problem, Side::tube),
                  figures.with_unit(film.coefficient, Kind::film_coefficient),
                  figures.number(film.reynolds, Kind::ratio), word(film.regime),
                  figures.number(film.prandtl, Kind::ratio), figures.number(film.nusselt, Kind::ratio),
                  figures.with_unit(film.velocity, Kind::velocity, 3),
                  figures.with_unit(outcome.local.walls.tube_wetted, Kind::temperature)));
  page.section("", fmt::format("Pressure drop {}: friction {}, turns {}, nozzles {}.",
                               figures.with_unit(drop.total(), Kind::pressure_difference, 3),
                               part(drop.friction), part(drop.turns), part(drop.nozzles)));
}

void shell_side(Page& page, const service::Assessment& assessment, const Figures& figures) {
  const auto& outcome = *assessment.rating.outcome;
  const auto& film = outcome.local.shell_film;
  const auto& drop = outcome.shell_drop;
  const auto part = [&figures](double pressure) {
    return figures.number(pressure, Kind::pressure_difference, 3);
  };
  page.section(
      "SHELL SIDE",
      fmt::format("{}: film {} on the outside; Re {}, Pr {}; {} across the bundle; wetted wall {}.",
                  stream_name(assessment.problem, Side::shell),
                  figures.with_unit(film.coefficient, Kind::film_coefficient),
                  figures.number(film.reynolds, Kind::ratio), figures.number(film.prandtl, Kind::ratio),
                  figures.with_unit(film.velocity, Kind::velocity, 3),
                  figures.with_unit(outcome.local.walls.shell_wetted, Kind::temperature)));
  if (assessment.problem.methods.shell_side == shellside::Method::bell_delaware)
    page.section("", fmt::format("Factors on the ideal bank's {}: baffle cut {:.3f}, leakage {:.3f}, bypass "
                                 "{:.3f}, end spacing {:.3f}, laminar {:.3f}.",
                                 figures.with_unit(film.ideal, Kind::film_coefficient), film.j_cut,
                                 film.j_leakage, film.j_bypass, film.j_spacing, film.j_laminar));
  page.section("", fmt::format("Pressure drop {}: crossflow {}, windows {}, ends {}, nozzles {}.",
                               figures.with_unit(drop.total(), Kind::pressure_difference, 3),
                               part(drop.crossflow), part(drop.window), part(drop.ends), part(drop.nozzles)));
}

void in_between(Page& page, const service::Assessment& assessment, const Figures& figures) {
  const auto& outcome = *assessment.rating.outcome;
  const auto& local = outcome.local;
  const auto& r = local.resistances;
  const auto resistance = [&figures](double value) {
    return figures.number(value, Kind::fouling_resistance, 3);
  };
  page.section(
      "IN BETWEEN",
      fmt::format("{} of tube surface at a mean difference of {}: log mean {}, correction F {:.4f}.",
                  figures.with_unit(assessment.problem.exchanger.area, Kind::area),
                  figures.with_unit(outcome.mean_difference, Kind::temperature_difference),
                  figures.with_unit(outcome.log_mean, Kind::temperature_difference), outcome.f_correction));
  page.section("", fmt::format("Effectiveness {:.4f} of the smaller capacity rate at NTU {:.4f} and capacity "
                               "ratio {:.4f}.",
                               outcome.effectiveness, outcome.ntu, outcome.capacity_ratio));
  page.section("", fmt::format("Overall coefficient {} in service; {} with the same films and no deposit.",
                               figures.with_unit(local.u_dirty, Kind::film_coefficient),
                               figures.with_unit(local.u_clean, Kind::film_coefficient)));
  page.section("", fmt::format("Resistances on the outside surface in {}: film in the tubes {}, deposit in "
                               "the tubes {}, wall {}, deposit on the tubes {}, film on the tubes {}.",
                               figures.unit(Kind::fouling_resistance), resistance(r.tube_film),
                               resistance(r.tube_fouling), resistance(r.wall), resistance(r.shell_fouling),
                               resistance(r.shell_film)));
  page.section("", fmt::format("No surface could exchange more than {} between these streams.",
                               figures.with_unit(assessment.rating.largest_duty, Kind::power)));
}

void words_used(Page& page) {
  page.section("WORDS",
               "Margin: what is left to the limit, in parts of the limit; for outlets the distance. "
               "Duty required: the largest that a line of the service asks for. Duty margin: duty running "
               "free over the duty required, less one. Surface margin: "
               "installed surface over the surface that the required duty needs, less one. Fouling "
               "margin left: further resistance it can carry, on the outside surface. Close: less "
               "than a tenth left (for outlets: of the stream's own change).");
}

void inputs(Page& page, const Result& result) {
  if (result.inputs.empty()) return;
  std::vector<std::vector<std::string>> rows = {{"INPUTS", "line", "as typed"}};
  for (const auto& input : result.inputs)
    rows.push_back({"  " + input.key, input.line > 0 ? std::to_string(input.line) : "",
                    input.origin == "typed" ? input.as_typed : input.as_typed + " (" + input.origin + ")"});
  page.blank();
  page.table(rows, {Align::left, Align::right, Align::left}, 0);
}

void sources_used(Page& page, const Result& result) {
  std::set<std::string> keys;
  for (const auto& finding : result.findings) keys.insert(finding.source);
  for (const auto& claim : result.claims) keys.insert(claim.source);
  for (const auto* stream : {&result.assessment.problem.shell_side, &result.assessment.problem.tube_side})
    keys.insert(stream->fluid.source);
  std::string name = "SOURCES";
  for (const auto& key : keys) {
    const auto citation = sources::citation(key);
    if (citation.empty()) continue;
    if (!name.empty()) page.blank();
    page.section(name, citation);
    name.clear();
  }
}

}  // namespace

void details(Page& page, const Result& result) {
  const Figures figures(result.display);
  const auto& assessment = result.assessment;
  if (assessment.rating.outcome) {
    page.blank();
    tube_side(page, assessment, figures);
    shell_side(page, assessment, figures);
    in_between(page, assessment, figures);
    page.blank();
    words_used(page);
  }
  inputs(page, result);
  sources_used(page, result);
}

}  // namespace dutygauge::report
