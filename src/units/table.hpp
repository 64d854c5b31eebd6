#pragma once
#include <span>
#include <string_view>

/// The named units. No prefix machinery: what is not listed is not a unit.
namespace dutygauge::units {

/// Exponents of kg, m, s, K.
struct Dimension {
  int mass = 0, length = 0, time = 0, temperature = 0;
  bool operator==(const Dimension&) const = default;
  /// Adds `power` times another: the dimension of a product.
  void multiply(const Dimension& other, int power);
};

/// Where a unit may stand.
enum class Use {
  anywhere,
  temperature,      ///< alone for a temperature, with its zero point; elsewhere a difference
  absolute,         ///< a pressure above vacuum, alone, not for a difference
  gauge,            ///< a pressure above the atmosphere, alone, not for a difference
  open_pressure,    ///< a pressure that does not say which of the two
  compound,         ///< not alone: too easily taken for another
  share,            ///< alone, for ratios
  turn,             ///< alone, for angles
  counted,          ///< a counted thing, only per length
  standard_volume,  ///< a gas volume at a fixed state, only in a flow
};

struct Unit {
  std::string_view name;
  double times, over;  ///< SI = amount * times / over + zero
  Dimension dimension{};
  Use use = Use::anywhere;
  double zero = 0;          ///< [K] or [Pa] of the unit's zero; of a standard volume: its temperature [K]
  std::string_view note{};  ///< what reading it takes for granted
};

std::span<const Unit> all_units();

/// The unit of that name; null if there is none.
const Unit* find_unit(std::string_view name);

/// The known name nearest to a misspelt one; empty if none is near.
std::string_view nearest_unit(std::string_view name);

}  // namespace dutygauge::units
