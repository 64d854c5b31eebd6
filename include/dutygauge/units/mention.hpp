#pragma once
#include <string>
#include <string_view>

#include "dutygauge/units.hpp"

/// Quantities inside sentences: written where a sentence is made, shown in the reader's units later.
namespace dutygauge::units {

/// The mark that stands for a quantity in a sentence: "{temperature:341.15}", the kind's name without its
/// article and the SI value. What is not finite has no unit: "nan".
std::string mention(double si, Kind kind);

/// A sentence with its mentions shown in a system of units. Whatever else stands in braces is left alone.
std::string spoken(std::string_view sentence, System system);

/// A quantity as sentences and pages show it: temperatures and their differences with one decimal, lengths
/// from one metre up in m or ft, everything else with `significant` digits in the unit of its kind.
std::string shown(double si, Kind kind, System system, int significant = 4);

/// The number of the same, in the unit of its kind whatever its size; no zero has a minus.
std::string shown_figure(double si, Kind kind, System system, int significant = 4);

}  // namespace dutygauge::units
