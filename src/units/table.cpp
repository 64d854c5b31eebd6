#include "table.hpp"

#include <algorithm>
#include <array>

namespace dutygauge::units {
namespace {

// Exact definitions. Inch, foot, pound: international yard and pound agreement
// (1959). Standard gravity, atmosphere, calorie (IT) and Btu (IT): NIST SP 811.
constexpr double pound = 0.45359237;
constexpr double gravity = 9.80665;
constexpr double foot = 0.3048;
constexpr double pound_force = pound * gravity;
constexpr double btu = 1055.05585262;
constexpr double calorie = 4.1868;
constexpr double us_gallon = 3.785411784e-3;
constexpr double uk_gallon = 4.54609e-3;
constexpr double barrel = 42.0 * us_gallon;
constexpr double cubic_foot = foot * foot * foot;
constexpr double atmosphere = 101325.0;
constexpr double square_inch = 0.00064516;
constexpr double horsepower = 550.0 * foot * pound_force;
constexpr double degree = 0.017453292519943295;  // pi / 180

constexpr Dimension none{};
constexpr Dimension length{.length = 1}, area{.length = 2}, volume{.length = 3};
constexpr Dimension mass{.mass = 1}, duration{.time = 1}, kelvin{.temperature = 1};
constexpr Dimension force{1, 1, -2, 0}, pressure{1, -1, -2, 0}, energy{1, 2, -2, 0}, power{1, 2, -3, 0};
constexpr Dimension volume_flow{0, 3, -1, 0}, viscosity{1, -1, -1, 0}, diffusivity{0, 2, -1, 0};

constexpr std::string_view us_note = "gal is the US gallon, 3.785 L";
constexpr std::string_view us_flow_note = "gpm is the US gallon a minute, 3.785 L/min";

// Scaled as a fraction where that keeps a written "19.05 mm" at 0.01905 exactly.
constexpr Unit units[] = {
    {"m", 1, 1, length},
    {"mm", 1, 1e3, length},
    {"cm", 1, 1e2, length},
    {"km", 1e3, 1, length},
    {"um", 1, 1e6, length},
    {"micron", 1, 1e6, length},
    {"in", 254, 1e4, length},
    {"inch", 254, 1e4, length},
    {"ft", 3048, 1e4, length},
    {"mil", 254, 1e7, length},
    {"thou", 254, 1e7, length},
    {"L", 1, 1e3, volume},
    {"l", 1, 1e3, volume},
    {"mL", 1, 1e6, volume},
    {"gal", us_gallon, 1, volume, Use::anywhere, 0, us_note},
    {"USgal", us_gallon, 1, volume},
    {"UKgal", uk_gallon, 1, volume},
    {"igal", uk_gallon, 1, volume},
    {"bbl", barrel, 1, volume},
    {"kbbl", 1e3 * barrel, 1, volume},
    {"Nm3", 1, 1, volume, Use::standard_volume, 273.15, "Nm3 is a cubic metre at 0 degC and 101325 Pa"},
    {"Sm3", 1, 1, volume, Use::standard_volume, 288.15, "Sm3 is a cubic metre at 15 degC and 101325 Pa"},
    {"scf", cubic_foot, 1, volume, Use::standard_volume},
    {"scfm", cubic_foot, 60, volume_flow, Use::standard_volume},
    {"scfh", cubic_foot, 3600, volume_flow, Use::standard_volume},
    {"scfd", cubic_foot, 86400, volume_flow, Use::standard_volume},
    {"MMscfd", 1e6 * cubic_foot, 86400, volume_flow, Use::standard_volume},
    {"kg", 1, 1, mass},
    {"g", 1, 1e3, mass},
    {"mg", 1, 1e6, mass},
    {"t", 1e3, 1, mass},
    {"te", 1e3, 1, mass},
    {"tonne", 1e3, 1, mass},
    {"lb", pound, 1, mass},
    {"lbm", pound, 1, mass},
    {"klb", 1e3 * pound, 1, mass},
    {"s", 1, 1, duration},
    {"min", 60, 1, duration},
    {"h", 3600, 1, duration},
    {"hr", 3600, 1, duration},
    {"d", 86400, 1, duration},
    {"day", 86400, 1, duration},
    {"days", 86400, 1, duration},
    {"K", 1, 1, kelvin},
    {"degC", 1, 1, kelvin, Use::temperature, 273.15},
    {"degF", 5, 9, kelvin, Use::temperature, 273.15 - 160.0 / 9.0},
    {"degR", 5, 9, kelvin},
    {"Pa", 1, 1, pressure},
    {"hPa", 100, 1, pressure},
    {"kPa", 1e3, 1, pressure},
    {"MPa", 1e6, 1, pressure},
    {"mPa", 1, 1e3, pressure, Use::compound},
    {"uPa", 1, 1e6, pressure, Use::compound},
    {"mbar", 100, 1, pressure},
    {"atm", atmosphere, 1, pressure},
    {"mmHg", 133.322387415, 1, pressure},
    {"inHg", 25.4 * 133.322387415, 1, pressure},
    {"mmH2O", gravity, 1, pressure},
    {"inH2O", 249.08891, 1, pressure},
    {"bar", 1e5, 1, pressure, Use::open_pressure},
    {"psi", pound_force, square_inch, pressure, Use::open_pressure},
    {"kgf/cm2", gravity * 1e4, 1, pressure, Use::open_pressure},
    {"ata", gravity * 1e4, 1, pressure, Use::absolute},
    {"bara", 1e5, 1, pressure, Use::absolute},
    {"mbara", 100, 1, pressure, Use::absolute},
    {"psia", pound_force, square_inch, pressure, Use::absolute},
    {"kPaa", 1e3, 1, pressure, Use::absolute},
    {"MPaa", 1e6, 1, pressure, Use::absolute},
    {"kgf/cm2a", gravity * 1e4, 1, pressure, Use::absolute},
    {"barg", 1e5, 1, pressure, Use::gauge, atmosphere},
    {"mbarg", 100, 1, pressure, Use::gauge, atmosphere},
    {"psig", pound_force, square_inch, pressure, Use::gauge, atmosphere},
    {"kPag", 1e3, 1, pressure, Use::gauge, atmosphere},
    {"MPag", 1e6, 1, pressure, Use::gauge, atmosphere},
    {"kgf/cm2g", gravity * 1e4, 1, pressure, Use::gauge, atmosphere},
    {"N", 1, 1, force},
    {"kN", 1e3, 1, force},
    {"kgf", gravity, 1, force},
    {"lbf", pound_force, 1, force},
    {"J", 1, 1, energy},
    {"kJ", 1e3, 1, energy},
    {"MJ", 1e6, 1, energy},
    {"GJ", 1e9, 1, energy},
    {"kWh", 3.6e6, 1, energy},
    {"MWh", 3.6e9, 1, energy},
    {"Btu", btu, 1, energy},
    {"BTU", btu, 1, energy},
    {"kBtu", 1e3 * btu, 1, energy},
    {"MMBtu", 1e6 * btu, 1, energy},
    {"MMBTU", 1e6 * btu, 1, energy},
    {"cal", calorie, 1, energy},
    {"kcal", 1e3 * calorie, 1, energy},
    {"Mcal", 1e6 * calorie, 1, energy},
    {"Gcal", 1e9 * calorie, 1, energy},
    {"W", 1, 1, power},
    {"kW", 1e3, 1, power},
    {"MW", 1e6, 1, power},
    {"hp", horsepower, 1, power},
    {"TR", 12000.0 * btu, 3600, power},
    {"gpm", us_gallon, 60, volume_flow, Use::anywhere, 0, us_flow_note},
    {"USgpm", us_gallon, 60, volume_flow},
    {"igpm", uk_gallon, 60, volume_flow},
    {"bpd", barrel, 86400, volume_flow},
    {"cfm", cubic_foot, 60, volume_flow},
    {"P", 1, 10, viscosity},
    {"cP", 1, 1e3, viscosity},
    {"St", 1, 1e4, diffusivity},
    {"cSt", 1, 1e6, diffusivity},
    {"%", 1, 100, none, Use::share},
    {"ppm", 1, 1e6, none, Use::share},
    {"1", 1, 1, none, Use::compound},
    {"deg", 1, 1, none, Use::turn},
    {"rad", 1, degree, none, Use::turn},
    {"fins", 1, 1, none, Use::counted},
    {"fin", 1, 1, none, Use::counted},
};

constexpr std::size_t longest_name = 20;  // what is longer is no misspelt unit

bool same_letter(char a, char b) {
  const auto small = [](char c) { return c >= 'A' && c <= 'Z' ? static_cast<char>(c - 'A' + 'a') : c; };
  return small(a) == small(b);
}

// Optimal string alignment: insertions, deletions, substitutions and swapped
// neighbours, each of cost one. Neither text is longer than longest_name.
std::size_t alignment(std::string_view a, std::string_view b) {
  std::array<std::array<std::size_t, longest_name + 1>, longest_name + 1> cost{};
  for (std::size_t i = 0; i <= a.size(); ++i) cost[i][0] = i;
  for (std::size_t j = 0; j <= b.size(); ++j) cost[0][j] = j;
  for (std::size_t i = 1; i <= a.size(); ++i)
    for (std::size_t j = 1; j <= b.size(); ++j) {
      const std::size_t substituted = cost[i - 1][j - 1] + (a[i - 1] == b[j - 1] ? 0U : 1U);
      cost[i][j] = std::min({cost[i - 1][j] + 1, cost[i][j - 1] + 1, substituted});
      if (i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1])
        cost[i][j] = std::min(cost[i][j], cost[i - 2][j - 2] + 1);
    }
  return cost[a.size()][b.size()];
}

}  // namespace

void Dimension::multiply(const Dimension& other, int power) {
  mass += power * other.mass;
  length += power * other.length;
  time += power * other.time;
  temperature += power * other.temperature;
}

std::span<const Unit> all_units() {
  return units;
}

const Unit* find_unit(std::string_view name) {
  const auto* found = std::ranges::find(units, name, &Unit::name);
  return found == std::end(units) ? nullptr : found;
}

std::string_view nearest_unit(std::string_view name) {
  if (name.size() > longest_name) return {};
  for (const Unit& unit : units)
    if (std::ranges::equal(unit.name, name, same_letter)) return unit.name;
  const auto length_gap = [&](std::string_view other) {
    return std::max(name.size(), other.size()) - std::min(name.size(), other.size());
  };
  std::string_view best;
  std::size_t least = std::max<std::size_t>(1, name.size() / 3) + 1;
  for (const Unit& unit : units) {
    // One letter of a one-letter name is all of it.
    if (unit.name.size() < 2) continue;
    const std::size_t distance = alignment(name, unit.name);
    const bool closer = distance < least;
    // "psgi" is rather "psig" with swapped letters than "psi" with one too many.
    const bool as_close = !best.empty() && distance == least && length_gap(unit.name) < length_gap(best);
    if (closer || as_close) best = unit.name, least = distance;
  }
  return best;
}

}  // namespace dutygauge::units
