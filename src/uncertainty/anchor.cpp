#include "dutygauge/uncertainty/anchor.hpp"

#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "anchoring.hpp"
#include "dutygauge/numerics.hpp"

namespace dutygauge::uncertainty {
namespace {

constexpr double largest_film_factor = 20.0;

double heat_capacity_sigma(const std::vector<Source>& sources, Side side) {
  const auto found = std::ranges::find_if(sources, [side](const Source& source) {
    return source.varied == Varied::heat_capacity && source.side == side;
  });
  return found == sources.end() ? 0.0 : found->sigma;
}

/// Relative standard deviation of one side's duty.
double duty_sigma(const SteadyReading& reading, const ReadStream& stream, double heat_capacity) {
  const double temperatures = std::sqrt(2.0) * reading.temperature_sigma / (stream.inlet - stream.outlet);
  return std::hypot(reading.flow_sigma, heat_capacity, temperatures);
}

Closing closing_of(double closure, double sigma) {
  const double deviations = std::abs(closure) / sigma;
  if (deviations <= 1.0) return Closing::closes;
  if (deviations <= 2.0) return Closing::within_uncertainty;
  return deviations <= 3.0 ? Closing::doubtful : Closing::does_not_close;
}

/// Fills duties, their weights and how they agree.
void weigh_duties(const std::vector<Source>& sources, Anchor& anchor) {
  const SteadyReading& reading = anchor.reading;
  const double shell_sigma =
      duty_sigma(reading, reading.shell_side, heat_capacity_sigma(sources, Side::shell));
  const double tube_sigma = duty_sigma(reading, reading.tube_side, heat_capacity_sigma(sources, Side::tube));
  ReadDuties duties = duties_of(anchor.at_reading, reading, 0.5);
  if (duties.shell && duties.tube) {
    const double shell_variance = std::pow(shell_sigma * *duties.shell, 2);
    const double tube_variance = std::pow(tube_sigma * *duties.tube, 2);
    anchor.shell_weight = tube_variance / (shell_variance + tube_variance);
    const bool shell_is_hot = reading.shell_side.inlet > reading.tube_side.inlet;
    anchor.closure = (shell_is_hot ? *duties.shell / *duties.tube : *duties.tube / *duties.shell) - 1.0;
    anchor.closure_sigma = std::hypot(shell_sigma, tube_sigma);
    anchor.closing = closing_of(anchor.closure, anchor.closure_sigma);
  }
  duties = duties_of(anchor.at_reading, reading, anchor.shell_weight);
  anchor.shell_duty = duties.shell;
  anchor.tube_duty = duties.tube;
  anchor.duty = duties.weighted;
}

Finding balance_fault(const Anchor& anchor) {
  const bool broken = anchor.closing == Closing::does_not_close;
  return {
      .id = "anchor.heat_balance",
      .severity = broken ? Severity::must : Severity::should,
      .text = fmt::format(
          "heat balance fault in the anchor: the shell side's duty {{value}} and the tube side's {{limit}} "
          "as read differ by {:.1f} %, {} the {:.1f} % that the instruments and heat capacities explain; a "
          "meter or a thermometer is wrong, {}",
          100.0 * std::abs(anchor.closure), broken ? "more than three times" : "more than twice",
          100.0 * anchor.closure_sigma,
          broken ? "so nothing is said of today; find it before judging the exchanger by this reading"
                 : "or the moment was not steady; take another reading before relying on it"),
      .ground = Ground::arithmetic,
      .value = anchor.shell_duty.value_or(0.0),
      .limit = anchor.tube_duty.value_or(0.0),
      .kind = units::Kind::power};
}

Finding unexplained(const Anchor& anchor) {
  return {
      .id = "anchor.unexplained",
      .severity = Severity::must,
      .text =
          "the duty read for the anchor, {value}, is more than this unit could exchange between these two "
          "streams with any film: a flow, a temperature or the drawing is wrong; check the reading and "
          "which stream is in the tubes",
      .ground = Ground::arithmetic,
      .value = anchor.duty,
      .limit = rating::duty_limit(anchor.at_reading).duty,
      .kind = units::Kind::power};
}

Finding better_than_clean(const Anchor& anchor) {
  const bool shell = anchor.film_side == Side::shell;
  return {.id = "anchor.better_than_clean",
          .severity = Severity::note,
          .text = fmt::format(
              "the unit exchanges more than these methods give it without any deposit: its {} film, "
              "the one known less well, is taken {{value}} times as high; what is on the tubes "
              "cannot be told from this reading",
              shell ? "shell-side" : "tube-side"),
          .ground = Ground::method,
          .value = anchor.film_factor,
          .limit = 1.0};
}

/// The side whose film leaves more open about U.
Side less_known(const std::vector<Source>& sources, const rating::Outcome& outcome) {
  const auto doubt = [&](Side side) {
    const auto found = std::ranges::find_if(
        sources, [side](const Source& s) { return s.varied == Varied::film && s.side == side; });
    const auto& resistances = outcome.local.resistances;
    return found->sigma * (side == Side::shell ? resistances.shell_film : resistances.tube_film);
  };
  return doubt(Side::shell) >= doubt(Side::tube) ? Side::shell : Side::tube;
}

double& factor_of(rating::Problem& problem, Side side) {
  return side == Side::shell ? problem.factors.shell_film : problem.factors.tube_film;
}

/// The factor on a film that gives the duty; empty where none does.
std::optional<double> film_factor(const Anchor& anchor) {
  const auto excess = [&](double factor) {
    rating::Problem problem = anchor.at_reading;
    factor_of(problem, anchor.film_side) *= factor;
    const auto rated = rating::rate(problem);
    return (rated.outcome ? rated.outcome->duty : std::nan("")) - anchor.duty;
  };
  return numerics::find_root(excess, {1.0, largest_film_factor}, 1e-9);
}

/// Finds what explains the duty; false where nothing does.
bool explain(const std::vector<Source>& sources, const rating::Outcome& clean, Anchor& anchor) {
  if (clean.duty >= anchor.duty) {
    const auto needed = rating::needed_for(anchor.at_reading, anchor.duty).value;
    if (!needed) return false;
    anchor.resistance = std::max(0.0, needed->fouling_spare);
    return true;
  }
  anchor.film_side = less_known(sources, clean);
  auto factor = film_factor(anchor);
  if (!factor) {
    anchor.film_side = anchor.film_side == Side::shell ? Side::tube : Side::shell;
    factor = film_factor(anchor);
  }
  if (!factor) return false;
  anchor.film_factor = *factor;
  factor_of(anchor.at_reading, anchor.film_side) *= *factor;
  return true;
}

}  // namespace

ReadDuties duties_of(const rating::Problem& problem, const SteadyReading& reading, double shell_weight) {
  const bool shell_is_hot = reading.shell_side.inlet > reading.tube_side.inlet;
  const auto heat = [](rating::Stream stream, const ReadStream& read, bool hot) -> std::optional<double> {
    if (!read.mass_flow) return {};
    stream.mass_flow = *read.mass_flow;
    stream.inlet_temperature = read.inlet;
    return rating::duty_to_reach(stream, read.outlet, hot);
  };
  ReadDuties duties{.shell = heat(problem.shell_side, reading.shell_side, shell_is_hot),
                    .tube = heat(problem.tube_side, reading.tube_side, !shell_is_hot)};
  if (duties.shell && duties.tube)
    duties.weighted = shell_weight * *duties.shell + (1.0 - shell_weight) * *duties.tube;
  else
    duties.weighted = duties.shell ? *duties.shell : duties.tube.value_or(0.0);
  return duties;
}

rating::Problem at_reading(rating::Problem problem, const SteadyReading& reading, const ReadDuties& duties) {
  const auto put = [&](rating::Stream& stream, const ReadStream& read) {
    stream.inlet_temperature = read.inlet;
    stream.mass_flow = read.mass_flow.value_or(1.0);
    if (read.mass_flow) return;
    const double of_one_kilogram =
        std::abs(rating::duty_to_reach(stream, read.outlet, read.inlet > read.outlet));
    stream.mass_flow = duties.weighted / of_one_kilogram;
  };
  put(problem.shell_side, reading.shell_side);
  put(problem.tube_side, reading.tube_side);
  return problem;
}

rating::Problem with_resistance(rating::Problem problem, const rating::Problem& like, double resistance) {
  const double per_inside = problem.exchanger.outside_per_inside;
  const double shell = like.shell_side.fouling_resistance;
  const double tube = like.tube_side.fouling_resistance * per_inside;
  const double share = shell + tube > 0.0 ? shell / (shell + tube) : 1.0;
  problem.shell_side.fouling_resistance = share * resistance;
  problem.tube_side.fouling_resistance = (1.0 - share) * resistance / per_inside;
  return problem;
}

Checked<std::optional<Anchor>> anchor_to(const rating::Problem& unit, const SteadyReading& reading) {
  Anchor anchor{
      .reading = reading, .unit = at_reading(unit, reading, duties_of(unit, reading, 0.5)), .at_reading = {}};
  anchor.at_reading = with_resistance(anchor.unit, unit, 0.0);
  const auto clean = rating::rate(anchor.at_reading);
  if (!clean.outcome) return {{}, {unexplained(anchor)}, {}};
  const auto sources = sources_of(anchor.at_reading, *clean.outcome);
  weigh_duties(sources, anchor);
  if (anchor.closing == Closing::does_not_close) return {{}, {balance_fault(anchor)}, {}};
  Findings findings;
  if (anchor.closing == Closing::doubtful) findings.push_back(balance_fault(anchor));
  if (!explain(sources, *clean.outcome, anchor)) return {{}, {unexplained(anchor)}, {}};
  if (anchor.film_factor > 1.0) findings.push_back(better_than_clean(anchor));
  return {anchor, std::move(findings), {}};
}

Checked<std::optional<Anchor>> anchor_to_fouling(const rating::Problem& unit, double fouling, double sigma) {
  const auto rated = rating::rate(with_resistance(unit, unit, fouling));
  if (!rated.outcome)
    return {{},
            {{.id = "anchor.no_result",
              .severity = Severity::must,
              .text = "with the fouling given for today, {value}, the unit has no result: " +
                      rated.no_result + "; check the fouling, and the flows and inlets of the case",
              .ground = Ground::arithmetic,
              .value = fouling,
              .kind = units::Kind::fouling_resistance}},
            {}};
  const auto& outcome = *rated.outcome;
  Anchor anchor{.reading = {.shell_side = {unit.shell_side.mass_flow, unit.shell_side.inlet_temperature,
                                           outcome.shell_outlet},
                            .tube_side = {unit.tube_side.mass_flow, unit.tube_side.inlet_temperature,
                                          outcome.tube_outlet},
                            .temperature_sigma = 0.0,
                            .flow_sigma = 0.0},
                .unit = unit,
                .at_reading = with_resistance(unit, unit, 0.0),
                .duty = outcome.duty,
                .resistance = fouling,
                .resistance_sigma = sigma};
  return {anchor, {}, {}};
}

rating::Problem today(const Anchor& anchor, rating::Problem problem) {
  const rating::Problem like = problem;
  factor_of(problem, anchor.film_side) *= anchor.film_factor;
  return with_resistance(std::move(problem), like, anchor.resistance);
}

}  // namespace dutygauge::uncertainty
