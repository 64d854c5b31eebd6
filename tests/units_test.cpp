#include "dutygauge/units.hpp"

#include <doctest/doctest.h>

#include "support.hpp"

namespace units = dutygauge::units;
using units::Kind;

TEST_CASE("units: a quantity is read with or without the blank before its unit") {
  const auto read = units::read("19.05 mm", Kind::length);
  REQUIRE(std::holds_alternative<units::Value>(read));
  CHECK(std::get<units::Value>(read).si == 0.01905);
}
