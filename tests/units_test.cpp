#include "dutygauge/units.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <stdexcept>

#include "support.hpp"

namespace units = dutygauge::units;
using support::relative;
using units::Kind;

namespace {

template <class T>
T read_or_fail(const units::Read<T>& read) {
  if (const auto* misread = std::get_if<units::Misread>(&read)) {
    FAIL(misread->what << "; " << misread->expected << "; " << misread->remedy);
  }
  return std::get<T>(read);
}

units::Value value(std::string_view text, Kind kind) {
  CAPTURE(std::string(text));
  return read_or_fail(units::read(text, kind));
}

units::Flow flow(std::string_view text) {
  CAPTURE(std::string(text));
  return read_or_fail(units::read_flow(text));
}

bool mentions(const std::vector<std::string>& notes, std::string_view phrase) {
  for (const auto& note : notes)
    if (note.find(phrase) != std::string::npos) return true;
  return false;
}

// Exact definitions, written out independently of the table under test.
constexpr double in = 0.0254, ft = 12 * in, lb = 0.45359237, us_gal = 231 * in * in * in;

}  // namespace

TEST_CASE("units: a quantity is read in every way of writing its number") {
  CHECK(value("19.05 mm", Kind::length).si == 0.01905);
  CHECK(value("19.05mm", Kind::length).si == 0.01905);
  CHECK(value("  19.05   mm ", Kind::length).si == 0.01905);
  CHECK(value("0.75 in", Kind::length).si == 0.01905);
  CHECK(value("3/4 in", Kind::length).si == 0.01905);
  CHECK(value("1 1/4 in", Kind::length).si == 0.03175);
  CHECK(value("1-1/4 in", Kind::length).si == 0.03175);
  CHECK(value("-1 1/4 in", Kind::length).si == -0.03175);
  CHECK(value("+5 mm", Kind::length).si == 0.005);
  CHECK(value(".5 m", Kind::length).si == 0.5);
  CHECK(value("1e-4 m2.K/W", Kind::fouling_resistance).si == 1e-4);
  CHECK(value("25 %", Kind::ratio).si == 0.25);
  CHECK(value("25%", Kind::ratio).si == 0.25);
  CHECK(value("0.25", Kind::ratio).si == 0.25);
  CHECK(value("0.3", Kind::mass_fraction).si == 0.3);
  CHECK(value("208", Kind::count).si == 208);
  CHECK(value("45", Kind::angle).si == 45);
  CHECK(value("748 1/m", Kind::per_length).si == 748);
}

TEST_CASE("units: temperatures have their zero alone and lose it in differences and compounds") {
  CHECK(value("0 degC", Kind::temperature).si == 273.15);
  CHECK(relative(value("32 degF", Kind::temperature).si, 273.15) < 1e-15);
  CHECK(relative(value("212 degF", Kind::temperature).si, 373.15) < 1e-15);
  CHECK(value("491.67 degR", Kind::temperature).si == doctest::Approx(273.15));
  CHECK(value("-459.67 degF", Kind::temperature).si == 0.0);
  CHECK(value("0 K", Kind::temperature).si == 0.0);
  CHECK(relative(value("20 degF", Kind::temperature_difference).si, 100.0 / 9.0) < 1e-15);
  CHECK(value("5 degC", Kind::temperature_difference).si == 5.0);
  CHECK(units::to_si(5, "degC", Kind::temperature_difference) == 5.0);
  CHECK(units::to_si(5, "degC", Kind::temperature) == 278.15);
  CHECK(value("1 W/m.degC", Kind::conductivity).si == 1.0);
}

TEST_CASE("units: one compound unit has one meaning however its denominator is written") {
  for (const auto* text : {"0.3 W/m.K", "0.3 W/(m.K)", "0.3 W/m/K", "0.3 W/m K", "0.3 W / m . K",
                           "0.3 W/(m K)", "0.3 W/m*K", "0.3 W/m.°C", "0.3 W·m/(m²·K)"})
    CHECK(value(text, Kind::conductivity).si == 0.3);
  for (const auto* text : {"2e-4 m2.K/W", "2e-4 K.m2/W", "2e-4 m^2.K/W", "2e-4 K/(W/m2)", "2e-4 m² K/W"})
    CHECK(value(text, Kind::fouling_resistance).si == 2e-4);
  CHECK(value("1 h.ft2.degF/Btu", Kind::fouling_resistance).si ==
        value("1 h·ft²·°F/Btu", Kind::fouling_resistance).si);
  CHECK(relative(value("100 Btu/h/ft2/degF", Kind::film_coefficient).si,
                 value("100 Btu/h.ft2.degF", Kind::film_coefficient).si) < 1e-15);
}

TEST_CASE("units: typographic forms read as the plain ones") {
  CHECK(value("68 °C", Kind::temperature).si == value("68 degC", Kind::temperature).si);
  CHECK(value("68 º C", Kind::temperature).si == value("68 degC", Kind::temperature).si);
  CHECK(value("68 ℃", Kind::temperature).si == value("68 degC", Kind::temperature).si);
  CHECK(value("68 ℉", Kind::temperature).si == value("68 degF", Kind::temperature).si);
  CHECK(value("68 deg F", Kind::temperature).si == value("68 degF", Kind::temperature).si);
  CHECK(value("1.5 µm", Kind::length).si == 1.5e-6);
  CHECK(value("1.5 μm", Kind::length).si == 1.5e-6);
  CHECK(value("−5 °C", Kind::temperature).si == doctest::Approx(268.15));
  CHECK(value("60\u00A0m²", Kind::area).si == 60);
  CHECK(value("60\u2009m\u00B2", Kind::area).si == 60);
  CHECK(value("1½ in", Kind::length).si == 0.0381);
  CHECK(value("¾ in", Kind::length).si == 0.01905);
  CHECK(value("12 ± 1 in", Kind::length).standard_deviation ==
        value("12 +- 1 in", Kind::length).standard_deviation);
  CHECK(value("12 +/- 1 in", Kind::length).standard_deviation == in);
  CHECK(value("10…14 in", Kind::length).low == 0.254);
  CHECK(read_or_fail(units::read_pair("165 → 105 °F", Kind::temperature)).second.si ==
        value("105 degF", Kind::temperature).si);
}

TEST_CASE("units: pressures keep their datum, and one without says so") {
  CHECK(value("6 barg", Kind::pressure).si == 701325);
  CHECK(value("6 bara", Kind::pressure).si == 600000);
  CHECK(value("6 bar(g)", Kind::pressure).si == 701325);
  CHECK(value("6 bar g", Kind::pressure).si == 701325);
  CHECK(value("6 bar (a)", Kind::pressure).si == 600000);
  CHECK_FALSE(value("6 barg", Kind::pressure).bare_pressure);
  for (const auto* text :
       {"600 kPa", "0.6 MPa", "6000 mbar", "6000 hPa", "5.9 atm", "6.1 ata", "4500 mmHg", "177 inHg"}) {
    CHECK_FALSE(value(text, Kind::pressure).bare_pressure);
    CHECK(value(text, Kind::pressure).taken_for_granted.empty());
  }
  for (const auto* text : {"6 bar", "85 psi", "6 kgf/cm2", "85 lbf/in2"}) {
    const auto read = value(text, Kind::pressure);
    CHECK(read.bare_pressure);
    CHECK(mentions(read.taken_for_granted, "read as absolute"));
  }
  CHECK(value("6 bar", Kind::pressure).si == 600000);
  CHECK_FALSE(value("6 bar", Kind::pressure_difference).bare_pressure);
  CHECK(value("6..7 bar", Kind::pressure).bare_pressure);
}

TEST_CASE("units: a range is its middle with two rising ends") {
  const auto range = value("10..14 in", Kind::length);
  CHECK(relative(range.si, 12 * in) < 1e-15);
  CHECK(*range.low == 0.254);
  CHECK(*range.high == 0.3556);
  CHECK(value("10 in..14 in", Kind::length).low == range.low);
  CHECK(*value("10 in .. 400 mm", Kind::length).high == 0.4);
  CHECK(value("85..100 %", Kind::ratio).si == doctest::Approx(0.925));
  CHECK(value("1.5..2.5 m", Kind::length).si == 2.0);
  CHECK(value("20..40 degC", Kind::temperature).si == doctest::Approx(303.15));
  CHECK(value("10..14", Kind::count).si == 12);
}

TEST_CASE("units: a deviation is absolute, relative, or in points of a per cent") {
  CHECK(*value("12 +- 1 in", Kind::length).standard_deviation == in);
  CHECK(relative(*value("12 in +- 5 %", Kind::length).standard_deviation, 0.6 * in) < 1e-14);
  CHECK(*value("12 in +- 10 mm", Kind::length).standard_deviation == 0.01);
  CHECK(*value("25 +- 2 %", Kind::ratio).standard_deviation == 0.02);
  CHECK(*value("25 % +- 2 %", Kind::ratio).standard_deviation == 0.02);
  CHECK(*value("0.25 +- 0.02", Kind::ratio).standard_deviation == 0.02);
  CHECK(relative(*value("35 g/kg +- 2 %", Kind::mass_fraction).standard_deviation, 7e-4) < 1e-14);
  CHECK(*value("29 +- 1 degC", Kind::temperature).standard_deviation == 1.0);
  CHECK(relative(*value("80 +- 1 degF", Kind::temperature).standard_deviation, 5.0 / 9.0) < 1e-15);
  CHECK(*value("29 degC +- 0.5 K", Kind::temperature).standard_deviation == 0.5);
  CHECK(*value("6 +- 0.1 barg", Kind::pressure).standard_deviation == 1e4);
  CHECK(*value("6 barg +- 0.1 bar", Kind::pressure).standard_deviation == 1e4);
  CHECK(*value("208 +- 2", Kind::count).standard_deviation == 2);
}

TEST_CASE("units: a pair shares the unit at its end") {
  const auto pair = read_or_fail(units::read_pair("165 -> 105 degF", Kind::temperature));
  CHECK(pair.first.si == value("165 degF", Kind::temperature).si);
  CHECK(pair.second.si == value("105 degF", Kind::temperature).si);
  const auto mixed = read_or_fail(units::read_pair("165 degF -> 40 degC", Kind::temperature));
  CHECK(mixed.first.si == pair.first.si);
  CHECK(mixed.second.si == 313.15);
  CHECK(read_or_fail(units::read_pair("0 -> 30 %", Kind::ratio)).second.si == 0.3);
  const auto sure = read_or_fail(units::read_pair("60 +- 5 -> 130 +- 10 cP", Kind::viscosity));
  CHECK(relative(*sure.first.standard_deviation, 0.005) < 1e-14);
}

TEST_CASE("units: a property is read with the temperature it holds at") {
  const auto read = read_or_fail(units::read_value_at("0.55 Btu/lb.degF at 135 degF", Kind::heat_capacity));
  CHECK(relative(read.value.si, 0.55 * 4186.8) < 1e-14);
  CHECK(read.temperature == value("135 degF", Kind::temperature).si);
}

TEST_CASE("units: a flow is a mass, or a volume with the place it is measured at") {
  using units::FlowBasis;
  CHECK(flow("21.5 kg/s").basis == FlowBasis::mass);
  CHECK(flow("62 m3/h at inlet").basis == FlowBasis::inlet);
  CHECK(flow("62 m3/h at inlet").taken_for_granted.empty());
  const auto bare = flow("62 m3/h");
  CHECK(bare.basis == FlowBasis::inlet_assumed);
  CHECK(mentions(bare.taken_for_granted, "inlet"));
  const auto crude = flow("62 kbbl/d at 60 degF");
  CHECK(crude.basis == FlowBasis::temperature);
  CHECK(crude.basis_temperature == value("60 degF", Kind::temperature).si);
  CHECK(relative(crude.amount.si, 62e3 * 42 * us_gal / 86400) < 1e-14);
  const auto normal = flow("9000 Nm3/h"), standard = flow("9000 Sm3/h"),
             american = flow("500 scfm at 60 degF");
  CHECK(normal.amount.si == 2.5);
  CHECK(normal.basis_temperature == 273.15);
  CHECK(standard.basis_temperature == 288.15);
  for (const auto& gas : {normal, standard, american}) {
    CHECK(gas.basis == FlowBasis::temperature);
    CHECK(mentions(gas.taken_for_granted, "101325 Pa"));
  }
  CHECK(relative(american.amount.si, 500 * ft * ft * ft / 60) < 1e-14);
  CHECK(relative(flow("3600 scfh at 60 degF").amount.si, ft * ft * ft) < 1e-14);
  CHECK(relative(flow("86400 scfd at 60 degF").amount.si, ft * ft * ft) < 1e-14);
  CHECK(relative(flow("0.0864 MMscfd at 60 degF").amount.si, ft * ft * ft) < 1e-14);
  CHECK(relative(flow("60 scf/min at 60 degF").amount.si, ft * ft * ft) < 1e-14);
  CHECK(relative(*flow("95 +- 2 klb/h").amount.standard_deviation, 2e3 * lb / 3600) < 1e-14);
}

TEST_CASE("units: a gallon without a country is the US gallon and is said to be taken so") {
  CHECK(mentions(value("10 gal/min", Kind::volume_flow).taken_for_granted, "US gallon"));
  CHECK(mentions(flow("500 gpm at inlet").taken_for_granted, "US gallon"));
  for (const auto* text : {"10 USgal/min", "10 UKgal/min", "10 igpm", "10 USgpm", "10 bbl/d"})
    CHECK(value(text, Kind::volume_flow).taken_for_granted.empty());
}

TEST_CASE("units: a wall is a length or a gauge") {
  const auto wall = [](std::string_view text) { return read_or_fail(units::read_wall(text)); };
  CHECK(wall("2.11 mm").si == 0.00211);
  for (const auto* text : {"14 BWG", "14BWG", "BWG 14", "14 bwg avg"})
    CHECK(relative(wall(text).si, 0.083 * in) < 1e-14);
  CHECK(wall("14 BWG").taken_for_granted.empty());
  const auto minimum = wall("14 BWG min");
  CHECK(relative(minimum.si, 1.10 * 0.083 * in) < 1e-14);
  CHECK(relative(*minimum.low, 0.083 * in) < 1e-14);
  CHECK(relative(*minimum.high, 1.2 * 0.083 * in) < 1e-14);
  CHECK(mentions(minimum.taken_for_granted, "minimum wall, rated at 1.10 x the gauge, span 1.0 to 1.2"));
}

TEST_CASE("units: a bore is a length or a nominal pipe less two walls") {
  const auto bore = [](std::string_view text) { return read_or_fail(units::read_bore(text)); };
  CHECK(bore("154 mm").si == 0.154);
  for (const auto* text :
       {"NPS 8 sch 40", "NPS 8 std", "DN 200 sch 40", "DN200 sch40", "nps 8 schedule 40"}) {
    CHECK(relative(bore(text).si, (8.625 - 2 * 0.322) * in) < 1e-14);
    CHECK(bore(text).taken_for_granted.empty());
  }
  CHECK(relative(bore("DN 200 sch 80").si, (8.625 - 2 * 0.5) * in) < 1e-14);
  CHECK(relative(bore("NPS 10 xs").si, (10.75 - 2 * 0.5) * in) < 1e-14);
  for (const auto* text : {"NPS 1 1/2", "NPS 1-1/2", "NPS 1.5", "NPS 1½", "DN 40"}) {
    CHECK(relative(bore(text).si, (1.9 - 2 * 0.145) * in) < 1e-14);
    CHECK(mentions(bore(text).taken_for_granted, "standard wall"));
  }
  CHECK(relative(bore("NPS 3/4").si, (1.05 - 2 * 0.113) * in) < 1e-14);
}

TEST_CASE("units: a whole-field number is plain, finite and complete") {
  CHECK(units::number("1e-4") == 1e-4);
  CHECK(units::number("+3.5") == 3.5);
  CHECK(units::number("-2") == -2.0);
  for (const auto* text : {"", "1,5", "1 5", " 1", "nan", "inf", "1e999", "0x10", "+-1", "12 mm", "+"})
    CHECK_FALSE(units::number(text).has_value());
}

TEST_CASE("units: a caller's unknown or unfitting unit is a caller's bug") {
  CHECK_THROWS_AS(units::to_si(1, "foo", Kind::length), std::invalid_argument);
  CHECK_THROWS_AS(units::to_si(1, "mm", Kind::pressure), std::invalid_argument);
  CHECK_THROWS_AS(units::to_si(1, "barg", Kind::pressure_difference), std::invalid_argument);
  CHECK_THROWS_AS(units::to_si(1, "", Kind::length), std::invalid_argument);
  CHECK_THROWS_AS(units::to_si(1, "Nm3/h", Kind::volume_flow), std::invalid_argument);
  CHECK_THROWS_AS(units::from_si(1, "foo", Kind::length), std::invalid_argument);
}
