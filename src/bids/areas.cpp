#include <cmath>
#include <numbers>

#include "sheet.hpp"

// Surfaces of the drawing: what is claimed, and what slip would explain it.

namespace dutygauge::bids {
namespace {

using geometry::Exchanger;

/// The drawing's surfaces [m2] of the whole unit, with all holes open.
struct Surfaces {
  double effective, gross, gross_with_bends;
  int shells, banks;
  bool u_tubes;
  double open_fraction;  ///< tubes not plugged
  double sheet_slack;    ///< of the effective one, where the tubesheet's thickness is assumed
  double inside;         ///< inside over outside diameter
};

Surfaces surfaces_of(const Exchanger& exchanger) {
  const auto& d = exchanger.as_described;
  if (!exchanger.tubes_drawn)
    return {.effective = exchanger.area,
            .gross = exchanger.area,
            .gross_with_bends = exchanger.area,
            .shells = exchanger.shells_in_series * exchanger.shells_in_parallel,
            .banks = exchanger.shells_in_parallel,
            .u_tubes = false,
            .open_fraction = 1.0,
            .sheet_slack = 0.0,
            .inside = 1.0};
  const int shells = exchanger.shells_in_series * exchanger.shells_in_parallel;
  // The outside surface of one metre of tube, fins and all.
  const double outside = exchanger.tubes_open > 0
                             ? exchanger.area_per_shell / (exchanger.effective_length * exchanger.tubes_open)
                             : std::numbers::pi * d.tube_outside_diameter;
  const double per_length = outside * d.tube_count * shells;
  const double bends = exchanger.tube_side.friction_length / d.tube_passes;
  const double uncertain = d.tubesheet_thickness ? 0.0 : std::abs(d.tube_length - exchanger.effective_length);
  return {.effective = per_length * exchanger.effective_length,
          .gross = per_length * d.tube_length,
          .gross_with_bends = per_length * bends,
          .shells = shells,
          .banks = exchanger.shells_in_parallel,
          .u_tubes = exchanger.tube_side.u_tubes,
          .open_fraction = exchanger.tubes_open / d.tube_count,
          .sheet_slack = per_length * uncertain,
          .inside = exchanger.tube_side.inside_diameter / d.tube_outside_diameter};
}

/// What an area may have been taken for; `whole` is the right one of the unit.
std::vector<Cause> causes_of(const Surfaces& s, double whole, Per per) {
  const double divisor = per == Per::shell ? s.shells : 1.0;
  std::vector<Cause> causes = {{whole * s.inside / divisor, "area is that of the inside surface"}};
  if (s.shells > 1 && per == Per::unit) causes.push_back({whole / s.shells, "area is per shell"});
  if (s.shells > 1 && per == Per::shell)
    causes.push_back({whole, "area is of the whole unit, not per shell"});
  if (s.banks > 1 && s.banks < s.shells) causes.push_back({whole / s.banks, "area is that of one bank"});
  if (s.u_tubes) causes.push_back({0.5 * whole / divisor, "U-tubes counted once: half the surface"});
  causes.push_back({2.0 * whole / divisor, "tubes counted as U-tubes: twice the surface"});
  return causes;
}

/// The value and the same with only the open tubes: a sheet may count either.
Numbers with_and_without_plugs(const Surfaces& s, double whole, double slack, double divisor) {
  Numbers numbers = {{whole / divisor, slack / divisor}};
  if (s.open_fraction < 1.0)
    numbers.push_back({s.open_fraction * whole / divisor, s.open_fraction * slack / divisor});
  return numbers;
}

}  // namespace

void check_areas(Sheet& sheet) {
  const Surfaces s = surfaces_of(sheet.problem().exchanger);
  const Per per = sheet.claims.area_per;
  const double divisor = per == Per::shell ? s.shells : 1.0;
  Check effective{.key = "area.effective",
                  .computed = with_and_without_plugs(s, s.effective, s.sheet_slack, divisor),
                  .ground = Ground::geometry,
                  .against = "count x pi x outside diameter x length between the tubesheets",
                  .causes = causes_of(s, s.effective, per),
                  .otherwise = "area of another count, length or diameter",
                  .if_empty = ""};
  effective.causes.push_back({s.gross / divisor, "area is gross, not effective"});
  const Numbers per_claim = judge(sheet, sheet.claims.area_effective, effective);
  sheet.area = derived({&per_claim}, [&](std::span<const double> area) { return area[0] * divisor; });
  if (!sheet.claims.area_effective) {
    sheet.area = with_and_without_plugs(s, s.effective, s.sheet_slack, 1.0);
    if (sheet.claims.area_gross)
      sheet.area.push_back(
          {sheet.claims.area_gross->value * divisor, sheet.claims.area_gross->rounding * divisor});
  }
  if (!sheet.problem().exchanger.tubes_drawn)
    return leave_unchecked(sheet, "area.gross", sheet.claims.area_gross, no_drawing);
  Check gross{.key = "area.gross",
              .computed = with_and_without_plugs(s, s.gross, 0.0, divisor),
              .ground = Ground::geometry,
              .against = "count x pi x outside diameter x full length",
              .causes = causes_of(s, s.gross, per),
              .otherwise = "area of another count, length or diameter",
              .if_empty = ""};
  // U-tubes: some count the bends, some do not; neither is wrong.
  if (sheet.problem().exchanger.tube_side.u_tubes)
    gross.computed.push_back({s.gross_with_bends / divisor, 0.0});
  gross.causes.push_back({s.effective / divisor, "area is effective, not gross"});
  judge(sheet, sheet.claims.area_gross, gross);
}

}  // namespace dutygauge::bids
