#pragma once
#include <string>
#include <string_view>

/// Names of built-in fluids as people write them.
namespace dutygauge::fluids {

/// Equal but for capitals, and for `_`, `-` and blanks standing for one another.
bool same_name(std::string_view one, std::string_view other);

/// A name for a sentence: "carbon_dioxide" is "carbon dioxide".
std::string spoken(std::string_view name);

}  // namespace dutygauge::fluids
