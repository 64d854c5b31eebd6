#pragma once
#include <string>
#include <string_view>
#include <vector>

#include "table.hpp"
#include "text.hpp"

/// Compound units: "h.ft2.degF/Btu".
namespace dutygauge::units {

/// How an amount of a written unit becomes SI.
struct Scale {
  double times = 1, over = 1;
  double zero = 0;                 ///< added; [K] or [Pa]
  bool open_pressure = false;      ///< a pressure that does not say absolute or gauge
  const Unit* standard = nullptr;  ///< the standard volume in it
  std::vector<std::string> notes;  ///< what reading it takes for granted

  double to_si(double amount) const { return amount * times / over + zero; }
  double difference(double amount) const { return amount * times / over; }
};

/// The scale of a folded unit text for a kind; an empty text is a bare number.
/// Strictly from left to right where that fits the kind; else everything behind
/// the single slash stands below the line: "W/m.K", "W/(m.K)" and "W/m/K" are one.
Scale scale_of(std::string_view text, Kind kind);

}  // namespace dutygauge::units
