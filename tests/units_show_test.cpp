#include <doctest/doctest.h>

#include <cmath>
#include <limits>
#include <random>
#include <stdexcept>

#include "dutygauge/units.hpp"
#include "support.hpp"

namespace units = dutygauge::units;
using units::Kind;
using units::System;

namespace {

constexpr System systems[] = {System::si, System::metric, System::us};

std::vector<Kind> all_kinds() {
  std::vector<Kind> kinds;
  for (int i = 0; i <= static_cast<int>(Kind::angle); ++i) kinds.push_back(static_cast<Kind>(i));
  return kinds;
}

// A value of ordinary size for the kind, over six decades where it may be small.
double ordinary(Kind kind, std::mt19937& random) {
  const double even = std::uniform_real_distribution<double>(0.0, 1.0)(random);
  if (kind == Kind::temperature) return 150.0 + 1000.0 * even;
  if (kind == Kind::count) return std::floor(5000.0 * even);
  if (kind == Kind::pressure) return std::pow(10.0, 3.0 + 4.0 * even);
  const double sign = random() % 4 == 0 ? -1.0 : 1.0;
  return sign * std::pow(10.0, -6.0 + 12.0 * even);
}

}  // namespace

TEST_CASE("units: what is typed reads back as the same number in every kind and system") {
  std::mt19937 random(7);
  for (const Kind kind : all_kinds())
    for (const System system : systems)
      for (int i = 0; i < 200; ++i) {
        const double si = ordinary(kind, random);
        const std::string text = units::typed(si, kind, system, 5);
        CAPTURE(text);
        const auto read = units::read(text, kind);
        REQUIRE(std::holds_alternative<units::Value>(read));
        const double back = std::get<units::Value>(read).si;
        CHECK(units::typed(back, kind, system, 5) == text);
        // Half a unit of the fifth digit; 0.005 degC or 0.01 degF of a temperature.
        const double allowed = kind == Kind::temperature ? 0.0051 : 0.51e-4 * std::abs(si);
        CHECK(std::abs(back - si) <= allowed);
      }
}

TEST_CASE("units: seventeen digits lose nothing but rounding") {
  std::mt19937 random(11);
  for (const Kind kind : all_kinds())
    for (const System system : systems)
      for (int i = 0; i < 50; ++i) {
        const double si = ordinary(kind, random);
        const auto read = units::read(units::typed(si, kind, system, 17), kind);
        REQUIRE(std::holds_alternative<units::Value>(read));
        CHECK(support::relative(std::get<units::Value>(read).si, si) < 1e-14);
      }
}

TEST_CASE("units: to_si and from_si are inverse in every shown unit") {
  std::mt19937 random(13);
  for (const Kind kind : all_kinds())
    for (const System system : systems) {
      const auto unit = units::shown_unit(kind, system);
      for (int i = 0; i < 50; ++i) {
        const double si = ordinary(kind, random);
        CHECK(support::relative(units::to_si(units::from_si(si, unit, kind), unit, kind), si) < 1e-14);
      }
    }
}

TEST_CASE("units: the same case in two systems agrees to rounding") {
  struct Row {
    Kind kind;
    const char* first;
    const char* second;
  };
  const Row rows[] = {
      {Kind::length, "19.05 mm", "0.75 in"},
      {Kind::temperature, "20 degC", "68 degF"},
      {Kind::temperature_difference, "10 K", "18 degF"},
      {Kind::mass_flow, "0.45359237 kg/s", "3600 lb/h"},
      {Kind::volume_flow, "3.785411784 L/min", "1 gpm"},
      {Kind::heat_capacity, "4.1868 kJ/kg.K", "1 Btu/lb.degF"},
      {Kind::enthalpy, "2.326 kJ/kg", "1 Btu/lb"},
      {Kind::viscosity, "0.7 mPa.s", "0.7 cP"},
      {Kind::pressure, "1.01325 bara", "0 psig"},
      {Kind::density, "0.45359237 kg/L", "453.59237 kg/m3"},
  };
  for (const auto& [kind, first, second] : rows) {
    CAPTURE(first);
    const auto a = units::read(first, kind), b = units::read(second, kind);
    CHECK(support::relative(std::get<units::Value>(a).si, std::get<units::Value>(b).si) < 1e-14);
  }
}

TEST_CASE("units: numbers are shown in plain digits without trailing garbage") {
  const auto metric = [](double si, Kind kind, int digits = 4) {
    return units::shown_number(si, kind, System::metric, digits);
  };
  CHECK(metric(0.01905, Kind::length) == "19.05");
  CHECK(metric(0.0254, Kind::length) == "25.4");
  CHECK(metric(4.88, Kind::length) == "4880");
  CHECK(metric(0.00018, Kind::fouling_resistance) == "0.00018");
  CHECK(metric(580000, Kind::power) == "580");
  CHECK(metric(302.15, Kind::temperature) == "29");
  CHECK(metric(302.27, Kind::temperature) == "29.1");
  CHECK(metric(302.27, Kind::temperature, 5) == "29.12");
  CHECK(metric(273.149, Kind::temperature) == "0");
  CHECK(metric(0.0, Kind::power) == "0");
  CHECK(metric(-0.0, Kind::power) == "0");
  CHECK(metric(-1234.5678, Kind::momentum_flux) == "-1235");
  CHECK(metric(99999, Kind::momentum_flux) == "100000");
  CHECK(metric(0.099999, Kind::ratio) == "0.1");
  CHECK(metric(123456, Kind::count) == "123456");
  CHECK(metric(9.5e-6, Kind::per_temperature) == "9.5e-6");
  CHECK(metric(1.25e9, Kind::momentum_flux) == "1.25e9");
  CHECK(units::shown_number(5.2e6, Kind::power, System::us, 4) == "17740000");
  CHECK(units::shown_number(5.2e6, Kind::power, System::si, 4) == "5200000");
  CHECK(units::typed(0.01905, Kind::length) == "19.05 mm");
  CHECK(units::typed(0.25, Kind::ratio) == "0.25");
  CHECK(units::typed(302.15, Kind::temperature, System::us) == "84.2 degF");
  CHECK(units::typed(600000, Kind::pressure) == "6 bara");
  CHECK_THROWS_AS(metric(std::numeric_limits<double>::quiet_NaN(), Kind::length), std::invalid_argument);
  CHECK_THROWS_AS(metric(std::numeric_limits<double>::infinity(), Kind::length), std::invalid_argument);
}

TEST_CASE("units: every kind has a name and a unit that reads as that kind") {
  for (const Kind kind : all_kinds()) {
    CHECK(units::name(kind).find(' ') != std::string_view::npos);
    CHECK_NOTHROW(units::to_si(1.0, units::json_unit(kind), kind));
    for (const System system : systems)
      CHECK_NOTHROW(units::to_si(1.0, units::shown_unit(kind, system), kind));
    // The JSON result is SI, but for temperatures.
    const double one = units::to_si(1.0, units::json_unit(kind), kind);
    CHECK(one == (kind == Kind::temperature ? 274.15 : 1.0));
  }
  CHECK(units::json_unit(Kind::temperature) == "degC");
  CHECK(units::json_unit(Kind::temperature_difference) == "K");
  CHECK(units::name(Kind::length) == "a length");
}
