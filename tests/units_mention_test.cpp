#include <doctest/doctest.h>

#include <cmath>
#include <limits>

#include "dutygauge/units/mention.hpp"

using namespace dutygauge::units;

TEST_CASE("units: a mention is shown in the reader's system") {
  const std::string text = "up to " + mention(341.15, Kind::temperature) + ", a change of " +
                           mention(5.0, Kind::temperature_difference) + " at " + mention(6e5, Kind::pressure);
  CHECK(spoken(text, System::metric) == "up to 68.0 degC, a change of 5.0 K at 6 bara");
  CHECK(spoken(text, System::us) == "up to 154.4 degF, a change of 9.0 degF at 87.02 psia");
  CHECK(spoken(text, System::si) == "up to 341.1 K, a change of 5.0 K at 600000 Pa");
  CHECK(spoken(mention(0.0254, Kind::length) + " of " + mention(3.048, Kind::length), System::us) ==
        "1 in of 10 ft");
}

TEST_CASE("units: every kind can be mentioned, and comes back with the value it had") {
  for (int i = 0; i <= static_cast<int>(Kind::angle); ++i) {
    const auto kind = static_cast<Kind>(i);
    const double value = kind == Kind::count ? 12.0 : 1.0 / 3.0;
    for (const auto system : {System::si, System::metric, System::us})
      CHECK(spoken(mention(value, kind), system) == shown(value, kind, system));
  }
  CHECK(spoken(mention(-40.0 + 273.15, Kind::temperature), System::us) == "-40.0 degF");
  CHECK(spoken(mention(1e-12, Kind::viscosity), System::si) == "1e-12 Pa.s");
  CHECK(mention(std::nan(""), Kind::power) == "nan");
  CHECK(mention(std::numeric_limits<double>::infinity(), Kind::power) == "inf");
}

TEST_CASE("units: braces that are no mention stay as they are") {
  for (const char* text :
       {"{value} above {limit}", "{oil: {iso_vg: 46}}", "{temperature:}", "{temperature:nan}",
        "{temperature:1e999}", "{colour:3}", "{length:1", "}{", "{", "{:1}", ""})
    CHECK(spoken(text, System::us) == text);
  CHECK(spoken("{{length:0.0254}}", System::us) == "{1 in}");
}

TEST_CASE("units: no temperature is shown as a negative zero") {
  CHECK(shown(273.12, Kind::temperature, System::metric) == "0.0 degC");
  CHECK(shown(273.12 - 0.1, Kind::temperature, System::metric) == "-0.1 degC");
  CHECK(shown(-0.01, Kind::temperature_difference, System::us) == "0.0 degF");
}
