#include "excuses.hpp"

#include "parts.hpp"
#include "wording.hpp"

namespace dutygauge::case_io {
Excuse excuse_of(std::string_view key) {
  const auto last = last_segment(key);
  if (key == "exchanger.baffles" || key == "exchanger.baffles.cut") return Excuse::scaled;
  if (key.starts_with("exchanger.shell") || key.starts_with("exchanger.tubes.")) {
    const bool is_own_block = key.find(".fins.") != std::string_view::npos ||
                              key.find(".layers.") != std::string_view::npos ||
                              key.starts_with("exchanger.shells");
    return last == "passes" || is_own_block ? Excuse::none : Excuse::area;
  }
  if (!key.starts_with("streams.")) return Excuse::none;
  const bool is_property = (key.find(".fluid.constant.") != std::string_view::npos ||
                            key.find(".fluid.two_point.") != std::string_view::npos) &&
                           last != "heat_capacity" && last != "at";
  return is_property || key.ends_with(".inlet.pressure") ? Excuse::area : Excuse::none;
}

bool is_excused(const Reading& reading, std::string_view key) {
  const Excuse excuse = excuse_of(key);
  const bool by_area = excuse != Excuse::none && reading.has("exchanger.area");
  return by_area || (excuse == Excuse::scaled && is_scaled(reading.entries()));
}

}  // namespace dutygauge::case_io
