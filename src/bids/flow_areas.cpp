#include <fmt/core.h>

#include <algorithm>
#include <cmath>
#include <numbers>

#include "sheet.hpp"

// Tubes, what runs in them, and nozzles.

namespace dutygauge::bids {
namespace {

using geometry::Exchanger;
using std::numbers::pi;

double density(const rating::Stream& stream, double temperature) {
  return fluids::state(stream.fluid, temperature, stream.inlet_pressure).density;
}

void check_count(Sheet& sheet) {
  const Exchanger& exchanger = sheet.problem().exchanger;
  const double holes = exchanger.as_described.tube_count;
  const int shells = exchanger.shells_in_series * exchanger.shells_in_parallel;
  const auto& claim = sheet.claims.tube_count;
  Check check{.key = "tube_count",
              .computed = {{holes, 0.0}},
              .ground = Ground::geometry,
              .against = "the holes of the drawing",
              .causes =
                  {
                      {0.5 * holes, "U-tubes are counted, not holes"},
                      {2.0 * holes, "holes of both legs counted twice: U-tubes given as tubes"},
                  },
              .otherwise = "another count than the drawing's",
              .if_empty = ""};
  if (exchanger.tubes_drawn && exchanger.tubes_open < holes)
    check.causes.push_back({exchanger.tubes_open, "plugged tubes are left out"});
  if (shells > 1) check.causes.push_back({shells * holes, "tubes of all shells, not of one"});
  // A count is exact: 1 % of it would be several tubes.
  if (claim && claim->value != holes && fits(*claim, {holes, 0.0})) {
    check.computed = {};
    check.nothing_fits = true;
  }
  judge(sheet, claim, check);
  for (ClaimVerdict& verdict : sheet.verdicts)
    if (verdict.key == "tube_count" && !verdict.computed) {
      verdict.computed = holes;
      verdict.ratio = verdict.stated / holes;
    }
}

/// Velocity [m/s] for a wall, passes and tubes; the rest as drawn.
struct Channel {
  double mass_flow, density, outside_diameter;
  double velocity(double wall, double tubes_in_a_pass) const {
    const double bore = outside_diameter - 2.0 * wall;
    return bore > 0.0 ? mass_flow / (density * tubes_in_a_pass * 0.25 * pi * bore * bore) : std::nan("");
  }
};

void add_walls(const Channel& channel, double wall, double tubes, std::vector<Cause>& causes) {
  // A minimum wall averages 10 % more (recalled from the tolerances of ASTM A450).
  causes.push_back(
      {channel.velocity(1.1 * wall, tubes), "velocity is that of a thicker wall (minimum wall)"});
  causes.push_back(
      {channel.velocity(wall / 1.1, tubes), "velocity is that of a thinner wall (average for minimum)"});
  for (int gauge = 8; gauge <= 22; ++gauge) {
    const auto read = units::read_wall(fmt::format("{} BWG", gauge));
    const auto* other = std::get_if<units::Value>(&read);
    if (!other || std::abs(other->si / wall - 1.0) < 0.02) continue;
    causes.push_back(
        {channel.velocity(other->si, tubes), fmt::format("velocity is that of a {} wall, {} BWG",
                                                         other->si > wall ? "thicker" : "thinner", gauge)});
  }
}

void check_velocity(Sheet& sheet) {
  const Exchanger& exchanger = sheet.problem().exchanger;
  const auto& d = exchanger.as_described;
  const rating::Stream& stream = sheet.problem().tube_side;
  const double outlet =
      sheet.tube_outlet.empty() ? stream.inlet_temperature : sheet.tube_outlet.front().value;
  const double mean = 0.5 * (stream.inlet_temperature + outlet);
  const Channel channel{stream.mass_flow / exchanger.tube_banks(), density(stream, mean),
                        exchanger.tube_side.inside_diameter + 2.0 * d.tube_wall};
  const double all = static_cast<double>(d.tube_count) / d.tube_passes;
  const double open = exchanger.tubes_open / d.tube_passes;
  const double value = channel.velocity(d.tube_wall, all);
  const double ends = std::max(std::abs(channel.density / density(stream, stream.inlet_temperature) - 1.0),
                               std::abs(channel.density / density(stream, outlet) - 1.0));
  Check check{.key = "tube_side_velocity",
              .computed = {{value, value * ends}},
              .ground = Ground::geometry,
              .against = "flow, passes, count and bore",
              .otherwise = "velocity of another flow, bore or count",
              .if_empty = ""};
  if (open < all) check.computed.push_back({channel.velocity(d.tube_wall, open), value * ends});
  for (int passes = 1; passes <= 16; ++passes)
    if (passes != d.tube_passes)
      check.causes.push_back({value * passes / d.tube_passes,
                              fmt::format("velocity is that of {} pass{}", passes, passes > 1 ? "es" : "")});
  add_walls(channel, d.tube_wall, all, check.causes);
  if (exchanger.tube_banks() > 1)
    check.causes.push_back({value * exchanger.tube_banks(), "the whole flow through one bank"});
  judge(sheet, sheet.claims.tube_side_velocity, check);
}

struct Nozzle {
  const char* name;
  double rho_v2;  ///< [kg/m.s2]
};

/// Those with a bore, the shell inlet first.
std::vector<Nozzle> nozzles_of(const Sheet& sheet) {
  const auto& problem = sheet.problem();
  const auto& d = problem.exchanger.as_described;
  std::vector<Nozzle> nozzles;
  const auto add = [&](const char* name, const std::optional<double>& bore, const rating::Stream& stream,
                       double temperature) {
    if (!bore) return;
    const bool is_tube_side = &stream == &problem.tube_side;
    const int banks = is_tube_side ? problem.exchanger.tube_banks() : problem.exchanger.shells_in_parallel;
    const double flux = stream.mass_flow / banks / (0.25 * pi * *bore * *bore);
    nozzles.push_back({name, flux * flux / density(stream, temperature)});
  };
  const auto outlet = [](const Numbers& of, const rating::Stream& stream) {
    return of.empty() ? stream.inlet_temperature : of.front().value;
  };
  const auto &shell = problem.shell_side, &tube = problem.tube_side;
  add("shell inlet", d.shell_nozzle_in, shell, shell.inlet_temperature);
  add("tube-side inlet", d.tube_nozzle_in, tube, tube.inlet_temperature);
  add("shell outlet", d.shell_nozzle_out, shell, outlet(sheet.shell_outlet, shell));
  add("tube-side outlet", d.tube_nozzle_out, tube, outlet(sheet.tube_outlet, tube));
  return nozzles;
}

void check_nozzles(Sheet& sheet) {
  const auto& claim = sheet.claims.nozzle_rho_v2;
  const int banks = sheet.problem().exchanger.shells_in_parallel;
  Check check{.key = "nozzle_rho_v2",
              .computed = {},
              .ground = Ground::geometry,
              .against = "flow and bore of a nozzle",
              .otherwise = "rho v2 of another flow or bore than any nozzle drawn has",
              .if_empty = "no nozzle bore is given"};
  std::optional<Number> meant;  // of the nozzle whose slip the claim is
  for (const Nozzle& nozzle : nozzles_of(sheet)) {
    check.computed.push_back({nozzle.rho_v2, 0.0});
    const Cause slips[] = {
        {0.5 * nozzle.rho_v2, fmt::format("velocity head (half of rho v2) of the {} nozzle", nozzle.name)},
        {banks > 1 ? nozzle.rho_v2 * banks * banks : std::nan(""), "the whole flow through one nozzle"}};
    for (const Cause& slip : slips) {
      check.causes.push_back(slip);
      if (claim && !meant && fits(*claim, {slip.value, 0.0})) meant = Number{nozzle.rho_v2, 0.0};
    }
  }
  const bool is_right = claim && !check.computed.empty() && fits(*claim, *nearest(*claim, check.computed));
  if (meant && !is_right) check.computed = {*meant};
  judge(sheet, claim, check);
}

}  // namespace

void check_flow_areas(Sheet& sheet) {
  if (!sheet.problem().exchanger.tubes_drawn) {
    leave_unchecked(sheet, "tube_count", sheet.claims.tube_count, no_drawing);
    leave_unchecked(sheet, "tube_side_velocity", sheet.claims.tube_side_velocity, no_drawing);
    return check_nozzles(sheet);
  }
  check_count(sheet);
  check_velocity(sheet);
  check_nozzles(sheet);
}

}  // namespace dutygauge::bids
