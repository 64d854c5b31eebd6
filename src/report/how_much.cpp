#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "sections.hpp"
#include "words.hpp"

namespace dutygauge::report {
namespace {

using service::Quantity;
using units::Kind;

// One row: what, number, unit, its limit, what is left to it, and the word for that.
using Row = std::vector<std::string>;

constexpr const char* no_limit = "none stated";

const rating::Stream& stream_of(const rating::Problem& problem, Side side) {
  return side == Side::shell ? problem.shell_side : problem.tube_side;
}

std::string at_least_or_most(bool at_least, const std::string& limit) {
  return (at_least ? ">= " : "<= ") + limit;
}

// Fills the last two cells from the fraction of a limit that is left; beyond these a per cent says little.
void put_margin(Row& row, double fraction_left, std::string_view broken, bool limit_is_most) {
  constexpr double far_over = -1.0, far_above = 10.0;
  const std::string word(limit_word(fraction_left, broken));
  std::string margin = signed_percent(fraction_left);
  if (limit_is_most && fraction_left < far_over) margin = times(1.0 - fraction_left) + " limit";
  if (!limit_is_most && fraction_left > far_above) margin = times(1.0 + fraction_left) + " need";
  row.insert(row.end(), {margin, word});
}

void duty_rows(const Result& result, const rating::Outcome& outcome, std::vector<Row>& rows) {
  const Figures figures(result.display);
  const auto& margins = result.assessment.margins;
  const Row duty = {"  duty", figures.number(outcome.duty, Kind::power), figures.unit(Kind::power)};
  const auto add = [&](Row row, bool at_least, double limit, double fraction_left) {
    row.push_back(at_least_or_most(at_least, figures.number(limit, Kind::power)));
    put_margin(row, fraction_left, at_least ? "short" : "over", !at_least);
    rows.push_back(std::move(row));
  };
  if (margins.required_duty && margins.duty) add(duty, true, *margins.required_duty, *margins.duty);
  if (margins.required_duty && result.cases.size() == 1 && result.cases[0].clean.rating.outcome) {
    const double clean = result.cases[0].clean.rating.outcome->duty;
    add({"  duty, if clean", figures.number(clean, Kind::power), figures.unit(Kind::power)}, true,
        *margins.required_duty, clean / *margins.required_duty - 1.0);
  }
  for (const auto& demand : result.assessment.service.demands)
    if (demand.quantity == Quantity::duty && !demand.at_least)
      add(duty, false, demand.limit, 1.0 - outcome.duty / demand.limit);
  if (!rows.back().front().starts_with(duty.front())) {
    rows.push_back(duty);
    rows.back().insert(rows.back().end(), {no_limit, "", ""});
  }
}

// "close" for an outlet is within a tenth of its own change of temperature.
std::string outlet_word(const service::Demand& demand, const rating::Outcome& outcome, double to_limit,
                        double change) {
  if (!service::holds(demand, outcome)) return demand.at_least ? "short" : "over";
  return std::string(limit_word(std::max(0.0, to_limit) / std::max(change, 1e-9), ""));
}

void outlet_rows(const Result& result, const rating::Outcome& outcome, Side side, std::vector<Row>& rows) {
  const Figures figures(result.display);
  const auto& problem = result.assessment.problem;
  const double outlet = side == Side::shell ? outcome.shell_outlet : outcome.tube_outlet;
  const double change = std::abs(outlet - stream_of(problem, side).inlet_temperature);
  const Row start = {"  " + stream_name(problem, side) + " outlet", figures.number(outlet, Kind::temperature),
                     figures.unit(Kind::temperature)};
  const auto quantity = side == Side::shell ? Quantity::shell_side_outlet : Quantity::tube_side_outlet;
  bool limited = false;
  for (const auto& demand : result.assessment.service.demands) {
    if (demand.quantity != quantity) continue;
    limited = true;
    const double to_limit = demand.at_least ? outlet - demand.limit : demand.limit - outlet;
    rows.push_back(start);
    rows.back().insert(rows.back().end(),
                       {at_least_or_most(demand.at_least, figures.number(demand.limit, Kind::temperature)),
                        figures.difference(to_limit), outlet_word(demand, outcome, to_limit, change)});
  }
  if (limited) return;
  rows.push_back(start);
  rows.back().insert(rows.back().end(), {no_limit, "", ""});
}

void surface_rows(const Result& result, std::vector<Row>& rows) {
  const Figures figures(result.display);
  const auto& margins = result.assessment.margins;
  if (!margins.required_duty) return;
  if (!margins.surface) {
    rows.push_back({"  surface margin", "none", "", ">= 0", "", "see RULES"});
    return;
  }
  const auto surface = [&rows](const char* label, double fraction) {
    const std::string per_cent = signed_percent(fraction);
    rows.push_back({label, per_cent.substr(0, per_cent.find(' ')), "%", ">= 0", "",
                    std::string(limit_word(fraction, "short"))});
  };
  surface("  surface margin", *margins.surface);
  if (margins.surface_clean) surface("  surface margin, if clean", *margins.surface_clean);
  if (margins.fouling_spare)
    rows.push_back({"  fouling margin left",
                    figures.number(*margins.fouling_spare, Kind::fouling_resistance, 3),
                    figures.unit(Kind::fouling_resistance), ">= 0", "",
                    std::string(limit_word(*margins.surface, "short"))});
}

bool is_drop_known(const rating::Problem& problem, Side side) {
  return stream_of(problem, side).drop_law.has_value() ||
         (side == Side::shell ? problem.exchanger.shell_drawn : problem.exchanger.tubes_drawn);
}

void drop_row(const Result& result, Side side, double drop, std::vector<Row>& rows) {
  const Figures figures(result.display);
  const auto& service = result.assessment.service;
  const auto& allowable =
      side == Side::shell ? service.shell_side_allowable_drop : service.tube_side_allowable_drop;
  const auto kind = Kind::pressure_difference;
  Row row = {"  " + stream_name(result.assessment.problem, side) + " pressure drop",
             figures.number(drop, kind, 3), figures.unit(kind)};
  const bool is_known = is_drop_known(result.assessment.problem, side);
  if (!is_known) {
    row = {row[0], "not known", ""};
  }
  if (allowable && is_known) {
    row.push_back(at_least_or_most(false, figures.number(*allowable, kind, 3)));
    put_margin(row, 1.0 - drop / *allowable, "over", true);
  } else {
    row.insert(row.end(), {no_limit, "", ""});
  }
  rows.push_back(std::move(row));
}

void velocity_rows(const Result& result, const rating::Outcome& outcome, std::vector<Row>& rows) {
  const Figures figures(result.display);
  const auto& problem = result.assessment.problem;
  const auto add = [&](Side side, const char* where, double velocity) {
    rows.push_back({"  " + stream_name(problem, side) + where, figures.number(velocity, Kind::velocity, 3),
                    figures.unit(Kind::velocity), no_limit, "", ""});
  };
  if (problem.exchanger.shell_drawn) add(Side::shell, " velocity, bundle", outcome.local.shell_film.velocity);
  if (problem.exchanger.tubes_drawn) add(Side::tube, " velocity, tubes", outcome.local.tube_film.velocity);
}

}  // namespace

void how_much(Page& page, const Result& result) {
  if (result.cases.size() > 1 || result.anchored) return how_much_of_cases(page, result);
  const auto& outcome = *result.assessment.rating.outcome;
  std::vector<Row> rows = {{"HOW MUCH     running free, design fouling", "", "", "limit", "margin", ""}};
  duty_rows(result, outcome, rows);
  outlet_rows(result, outcome, Side::shell, rows);
  outlet_rows(result, outcome, Side::tube, rows);
  surface_rows(result, rows);
  drop_row(result, Side::shell, outcome.shell_drop.total(), rows);
  drop_row(result, Side::tube, outcome.tube_drop.total(), rows);
  velocity_rows(result, outcome, rows);
  page.table(rows, {Align::left, Align::right, Align::left, Align::left, Align::right, Align::left}, 0);
}

}  // namespace dutygauge::report
