#include <fmt/core.h>

#include <algorithm>

#include "sheet.hpp"

namespace dutygauge::bids {
namespace {

using units::Kind;

constexpr ClaimKey keys[] = {
    {"duty", &Claims::duty, Kind::power},
    {"shell_side_outlet", &Claims::shell_side_outlet, Kind::temperature},
    {"tube_side_outlet", &Claims::tube_side_outlet, Kind::temperature},
    {"area.effective", &Claims::area_effective, Kind::area},
    {"area.gross", &Claims::area_gross, Kind::area},
    {"u_service", &Claims::u_service, Kind::film_coefficient},
    {"u_dirty", &Claims::u_dirty, Kind::film_coefficient},
    {"u_clean", &Claims::u_clean, Kind::film_coefficient},
    {"lmtd", &Claims::lmtd, Kind::temperature_difference},
    {"f_correction", &Claims::f_correction, Kind::ratio},
    {"mtd", &Claims::mtd, Kind::temperature_difference},
    {"tube_side_velocity", &Claims::tube_side_velocity, Kind::velocity},
    {"shell_side_pressure_drop", &Claims::shell_side_pressure_drop, Kind::pressure_difference},
    {"tube_side_pressure_drop", &Claims::tube_side_pressure_drop, Kind::pressure_difference},
    {"tube_side_film_coefficient", &Claims::tube_side_film, Kind::film_coefficient},
    {"shell_side_film_coefficient", &Claims::shell_side_film, Kind::film_coefficient},
    {"tube_count", &Claims::tube_count, Kind::count},
    {"nozzle_rho_v2", &Claims::nozzle_rho_v2, Kind::momentum_flux},
    {"surface_margin", &Claims::surface_margin, Kind::ratio},
    {"weight", &Claims::weight, Kind::mass},
};

/// A verdict's place in the order of the keys.
std::ptrdiff_t place(const ClaimVerdict& verdict) {
  return std::ranges::find(keys, verdict.key, &ClaimKey::key) - std::begin(keys);
}

}  // namespace

std::span<const ClaimKey> claim_keys() {
  return keys;
}

std::vector<ClaimVerdict> audit(const Claims& claims, const service::Assessment& as_built) {
  Sheet sheet{.claims = claims, .ours = as_built};
  check_heat_balance(sheet);
  check_differences(sheet);
  check_areas(sheet);
  check_flow_areas(sheet);
  check_service_coefficient(sheet);
  check_fouling(sheet);
  check_margin(sheet);
  check_against_methods(sheet);
  leave_unchecked(sheet, "weight", claims.weight, "weights are not computed");
  std::ranges::stable_sort(sheet.verdicts, {}, place);
  return std::move(sheet.verdicts);
}

Findings findings_of(const std::vector<ClaimVerdict>& verdicts) {
  Findings findings;
  for (const ClaimVerdict& verdict : verdicts) {
    if (verdict.verdict != Agreement::contradicts) continue;
    const std::string computed =
        verdict.computed ? fmt::format("by {} it is {{limit}}", verdict.against) : "no value would be right";
    findings.push_back({.id = "claims.contradicts",
                        .severity = Severity::should,
                        .text = fmt::format("the sheet states {} of {{value}}, but {}: {}; ask whoever wrote "
                                            "the sheet which number holds",
                                            verdict.key, computed, verdict.likely),
                        .ground = verdict.ground,
                        .value = verdict.stated,
                        .limit = verdict.computed.value_or(verdict.stated),
                        .kind = verdict.kind});
  }
  return findings;
}

}  // namespace dutygauge::bids
