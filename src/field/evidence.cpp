#include "dutygauge/field/evidence.hpp"

namespace dutygauge::field {
namespace {

What what_of(Doing doing) {
  switch (doing) {
    case Doing::cleaning:
      return What::cleaning;
    case Doing::outage:
      return What::outage;
    case Doing::plugging:
      return What::plugging;
    case Doing::recalibration:
      return What::sensor_shift;
    case Doing::other:
      return What::unexplained;
  }
  return What::unexplained;
}

double days_since(std::int64_t start, std::int64_t time) {
  return static_cast<double>(time - start) / 86400.0;
}

DropLaws drop_laws_of(const rating::Problem& problem) {
  DropLaws laws{.hot_in_tubes = !rating::shell_side_is_hot(problem)};
  if (problem.tube_side.drop_law) laws.tube_exponent = problem.tube_side.drop_law->flow_exponent;
  if (problem.shell_side.drop_law) laws.shell_exponent = problem.shell_side.drop_law->flow_exponent;
  return laws;
}

}  // namespace

Evidence evidence_of(const rating::Problem& problem, const Mapping& mapping, const History& history) {
  Evidence evidence{.start = history.survey.start,
                    .offset = mapping.clock.offset.value_or(0),
                    .rows = {.read = history.tally.rows, .used = history.tally[Drop::none]},
                    .hypotheses = {{"every instrument is right", history.days}},
                    .drop_laws = drop_laws_of(problem),
                    .film_uncertainty = history.film_uncertainty,
                    .calibrated = history.basis != Basis::films};
  for (std::size_t i = 1; i < drop_count; ++i)
    if (const auto count = history.tally.rows_by[i]; count > 0)
      evidence.rows.dropped.emplace_back(name(static_cast<Drop>(i)), count);
  // What was done before the first reading leaves no step in it, nor what is still to come.
  const double end = history.days.empty() ? 0.0 : history.days.back().day + 1.0;
  for (const Done& event : mapping.events)
    if (event.when.to >= evidence.start && days_since(evidence.start, event.when.from) <= end)
      evidence.logged.push_back({days_since(evidence.start, event.when.from),
                                 days_since(evidence.start, event.when.to), what_of(event.kind)});
  return evidence;
}

}  // namespace dutygauge::field
