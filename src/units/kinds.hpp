#pragma once
#include <string>
#include <string_view>

#include "dutygauge/units.hpp"
#include "table.hpp"

namespace dutygauge::units {

/// What there is to know of a kind.
struct KindFacts {
  Kind kind;
  std::string_view name;     ///< "a length"
  std::string_view example;  ///< "19.05 mm"
  Dimension dimension;
  std::string_view json, si, metric, us;  ///< units it is shown in
};

const KindFacts& facts(Kind kind);

/// Whether a bare number is a value of this kind.
bool may_be_bare(Kind kind);

/// What a dimension is called ("a length"); empty for one without a name.
std::string_view described(const Dimension& dimension);

/// "a length was expected"
std::string expectation(Kind kind);

/// "write for example "19.05 mm""
std::string example_remedy(Kind kind);

}  // namespace dutygauge::units
