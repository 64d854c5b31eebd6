#include <cstddef>
#include <cstdint>
#include <string_view>

#include "dutygauge/units.hpp"

/// Any text goes through every reader: none throws, hangs or reads out of bounds.
extern "C" int LLVMFuzzerTestOneInput(const std::uint8_t* data, std::size_t size) {
  namespace units = dutygauge::units;
  const std::string_view text(reinterpret_cast<const char*>(data), size);
  for (int i = 0; i <= static_cast<int>(units::Kind::angle); ++i)
    static_cast<void>(units::read(text, static_cast<units::Kind>(i)));
  for (const auto kind : {units::Kind::temperature, units::Kind::viscosity, units::Kind::ratio}) {
    static_cast<void>(units::read_pair(text, kind));
    static_cast<void>(units::read_value_at(text, kind));
  }
  static_cast<void>(units::read_flow(text));
  static_cast<void>(units::read_wall(text));
  static_cast<void>(units::read_bore(text));
  static_cast<void>(units::number(text));
  return 0;
}
