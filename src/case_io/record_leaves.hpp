#pragma once
#include <optional>

#include "reading.hpp"

/// Forms of what a case says of a record and of a plan: text to value.
namespace dutygauge::case_io {

/// A date, or a time in ISO 8601; the entry keeps its text.
std::optional<units::Misread> read_instant(const Entry& entry);

/// "48000 EUR", "28 EUR/MWh": an amount, three capital letters, and the energy it is for.
std::optional<units::Misread> read_money(Entry& entry, bool for_energy);

/// "3 %" of the reading, or an amount such as "0.5 K".
std::optional<units::Misread> read_uncertainty(Entry& entry);

}  // namespace dutygauge::case_io
