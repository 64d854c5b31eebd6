#pragma once
#include <string_view>

#include "reading.hpp"

/// Required keys that a sheet with holes may leave out.
namespace dutygauge::case_io {

/// What a case must hold so that a required key is not needed.
enum class Excuse {
  none,
  area,    ///< the exchanger is known by its area
  scaled,  ///< that, or the shell side is scaled from a sheet
};

Excuse excuse_of(std::string_view key);

/// Whether this case does without the required key.
bool is_excused(const Reading& reading, std::string_view key);

}  // namespace dutygauge::case_io
