#include "catalogue.hpp"

#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "equations.hpp"
#include "gas_data.hpp"
#include "liquid_data.hpp"
#include "solution_data.hpp"

namespace dutygauge::fluids {
namespace {

constexpr double ocean_salinity = 0.035;  // [kg/kg]

/// A name without the differences that do not matter.
std::string plain(std::string_view name) {
  std::string result;
  for (char c : name) {
    if (c == '-' || c == ' ') c = '_';
    result += c >= 'A' && c <= 'Z' ? static_cast<char>(c - 'A' + 'a') : c;
  }
  return result;
}

/// Optimal string alignment: insertions, deletions, changes and swaps of neighbours.
std::size_t distance(const std::string& a, const std::string& b) {
  std::vector<std::vector<std::size_t>> d(a.size() + 1, std::vector<std::size_t>(b.size() + 1));
  for (std::size_t i = 0; i <= a.size(); ++i) d[i][0] = i;
  for (std::size_t j = 0; j <= b.size(); ++j) d[0][j] = j;
  for (std::size_t i = 1; i <= a.size(); ++i)
    for (std::size_t j = 1; j <= b.size(); ++j) {
      const std::size_t change = a[i - 1] == b[j - 1] ? 0 : 1;
      d[i][j] = std::min({d[i - 1][j] + 1, d[i][j - 1] + 1, d[i - 1][j - 1] + change});
      if (i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1])
        d[i][j] = std::min(d[i][j], d[i - 2][j - 2] + 1);
    }
  return d[a.size()][b.size()];
}

/// The range of a liquid under so much pressure that it does not boil, of a gas at one bar.
TemperatureRange range_of(const Made& made) {
  return valid_temperatures(made.fluid, made.fluid.phase == Phase::liquid ? 1e8 : 1e5);
}

std::vector<CatalogueEntry> list() {
  std::vector<CatalogueEntry> entries = {
      {"water", "", {273.15, 623.15}, "iapws_if97 iapws_r12 iapws_r15"},
      {"steam", "", {273.15, 1073.15}, "iapws_if97 iapws_r12 iapws_r15"},
      {"seawater", "{salinity: 35 g/kg}", {273.15, 393.15}, "sharqawy_2010 nayar_2016"},
      {"air", "", range_of(make_air()), "lemmon_jacobsen_2004 nasa_tm4513 smith_van_ness_abbott"},
      {"gas_mixture",
       "{mole_fractions: {nitrogen: 0.8, carbon_dioxide: 0.2}}",
       {200.0, 1200.0},
       "nasa_tm4513 smith_van_ness_abbott perry_2008 wilke_1950 mason_saxena_1958"},
      {"petroleum",
       "{api: 35, watson_k: 11.8, viscosity: {40 degC: 6 mm2/s, 100 degC: 2 mm2/s}}",
       {223.15, 423.15},
       "api_mpms_11_1 kesler_lee_1976 cragoe_1929 astm_d341 twu_1985"},
      {"oil",
       "{iso_vg: 46, density_15c: 872 kg/m3}",
       {223.15, 423.15},
       "api_mpms_11_1 cragoe_1929 astm_d341 astm_d2270 iso_3448"}};
  for (const SolutionRow& row : solution_rows())
    entries.push_back(
        {row.key, "{mass_fraction: 20 %}", range_of(make_solution(row.key, 0.2)), "melinder_2010"});
  for (const GasRow& row : gas_rows())
    if (row.formula != "H2O" && liquid_row(row.name) == nullptr)
      entries.push_back(
          {row.name, "", range_of(make_gas(row.name)), "nasa_tm4513 smith_van_ness_abbott perry_2008"});
  for (const LiquidRow& row : liquid_rows())
    entries.push_back({row.key, "", range_of(make_liquid(row.key)), "perry_2008"});
  std::ranges::sort(entries, {}, &CatalogueEntry::name);
  return entries;
}

/// A substance known as a liquid and as a gas takes the phase it has at the inlet.
Made make_in_phase(const LiquidRow& row, Inlet inlet) {
  const double excess = std::log(inlet.pressure / vapour_pressure(row, inlet.temperature));
  if (!(std::abs(excess) > 0.005))
    return refused("",
                   fmt::format("{} at {} and {} is at its boiling point", row.name, said(inlet.temperature),
                               said_pressure(inlet.pressure)),
                   "a state away from boiling", "correct the inlet; a boiling stream cannot be rated here");
  return excess > 0.0 ? make_liquid(row.key) : make_gas(row.key);
}

bool is_gas(std::string_view name) {
  return std::ranges::any_of(gas_rows(), [&](const GasRow& row) { return same_name(row.name, name); });
}

Made make_steam(Inlet inlet) {
  Made made = make_water(inlet.temperature, inlet.pressure);
  if (made.objections.empty() && made.fluid.phase == Phase::liquid)
    return refused("",
                   fmt::format("steam at {} and {} is liquid water", said(inlet.temperature),
                               said_pressure(inlet.pressure)),
                   "a temperature above boiling", "correct the inlet, or write `water`");
  return made;
}

Made make_ocean_water() {
  Made made = make_seawater(ocean_salinity);
  made.assumed.push_back({.key = "seawater.salinity",
                          .value = ocean_salinity,
                          .kind = units::Kind::mass_fraction,
                          .word = "",
                          .why = "open ocean",
                          .low = 0.033,
                          .high = 0.040,
                          .look_in = "water analysis"});
  return made;
}

Made make_without_phase(std::string_view name, Inlet inlet) {
  if (same_name(name, "seawater")) return make_ocean_water();
  if (same_name(name, "air")) return make_air();
  for (const CatalogueEntry& entry : catalogue())
    if (!entry.written.empty() && same_name(entry.name, name))
      return refused("", fmt::format("{} needs its data", name),
                     fmt::format("{}: {}", entry.name, entry.written), "give the data of the fluid");
  const LiquidRow* liquid = liquid_row(name);
  if (liquid != nullptr && is_gas(name)) return make_in_phase(*liquid, inlet);
  return is_gas(name) ? make_gas(name) : make_liquid(name);
}

}  // namespace

bool same_name(std::string_view one, std::string_view other) {
  return plain(one) == plain(other);
}

std::string spoken(std::string_view name) {
  std::string result(name);
  std::ranges::replace(result, '_', ' ');
  return result;
}

std::span<const CatalogueEntry> catalogue() {
  static const std::vector<CatalogueEntry> entries = list();
  return entries;
}

std::string nearest_name(std::string_view name) {
  const std::string sought = plain(name);
  std::string nearest;
  std::size_t least = std::max<std::size_t>(1, sought.size() / 3) + 1;
  for (const CatalogueEntry& entry : catalogue()) {
    const std::size_t d = distance(sought, plain(entry.name));
    if (d >= least) continue;
    least = d;
    nearest = entry.name;
  }
  return nearest;
}

Made make_named(std::string_view name, Inlet inlet) {
  if (same_name(name, "water")) return make_water(inlet.temperature, inlet.pressure);
  if (same_name(name, "steam")) return make_steam(inlet);
  if (!(inlet.pressure > 0.0) || !(inlet.temperature > 0.0))
    return refused("", "the inlet's temperature or pressure is impossible", "values above absolute zero",
                   "correct the inlet");
  Made made = make_without_phase(name, inlet);
  if (made.objections.empty()) made.objections = object_to_inlet(made.fluid, inlet);
  return made;
}

}  // namespace dutygauge::fluids
