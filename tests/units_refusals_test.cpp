#include <doctest/doctest.h>

#include <random>
#include <string>

#include "dutygauge/units.hpp"

namespace units = dutygauge::units;
using units::Kind;

namespace {

template <class T>
std::string message(const units::Read<T>& read) {
  const auto* misread = std::get_if<units::Misread>(&read);
  if (misread == nullptr) return {};
  CHECK_FALSE(misread->what.empty());
  CHECK_FALSE(misread->expected.empty());
  CHECK_FALSE(misread->remedy.empty());
  return misread->what + "; " + misread->expected + "; " + misread->remedy;
}

struct Refused {
  std::string text;
  Kind kind;
  const char* phrase;
};

bool is_clean_utf8(std::string_view text) {
  for (std::size_t i = 0; i < text.size();) {
    const auto byte = static_cast<unsigned char>(text[i]);
    const std::size_t length = byte < 0x80 ? 1 : byte < 0xE0 ? 2 : byte < 0xF0 ? 3 : 4;
    if (byte < 0x20 || byte == 0x7F || (byte & 0xC0U) == 0x80U || i + length > text.size()) return false;
    for (std::size_t k = 1; k < length; ++k)
      if ((static_cast<unsigned char>(text[i + k]) & 0xC0U) != 0x80U) return false;
    i += length;
  }
  return true;
}

// Goes through every reader; whatever is refused is refused in clean words.
void read_everywhere(std::string_view text) {
  for (int i = 0; i <= static_cast<int>(Kind::angle); ++i) {
    const auto kind = static_cast<Kind>(i);
    CHECK(is_clean_utf8(message(units::read(text, kind))));
    CHECK(is_clean_utf8(message(units::read_pair(text, kind))));
    CHECK(is_clean_utf8(message(units::read_value_at(text, kind))));
  }
  CHECK(is_clean_utf8(message(units::read_flow(text))));
  CHECK(is_clean_utf8(message(units::read_wall(text))));
  CHECK(is_clean_utf8(message(units::read_bore(text))));
}

}  // namespace

TEST_CASE("units: a value with no single meaning is refused with the choice spelled out") {
  const Refused rows[] = {
      // Words of more than one meaning.
      {"4 ton", Kind::mass, "write t for 1000 kg, lb, or TR"},
      {"4 tons/h", Kind::mass_flow, "write t for 1000 kg, lb, or TR"},
      {"4 ton", Kind::power, "TR for refrigeration"},
      {"20 C", Kind::temperature, "degC for a temperature, K for a difference"},
      {"20 F", Kind::temperature, "write degF"},
      {"520 R", Kind::temperature, "write degR"},
      {"300 degK", Kind::temperature, "write K"},
      {"4 M", Kind::mass, "a thousand in one trade and a million in another"},
      {"4 MBtu/h", Kind::power, "write kBtu for thousands, MMBtu for millions"},
      {"4 Mlb/h", Kind::mass_flow, "write klb or lb"},
      {"0.3 W/m.C", Kind::conductivity, "write degC"},
      {"6 mPa", Kind::pressure, "MPa"},
      {"3/4\"", Kind::length, "write in"},
      {"16'", Kind::length, "write ft"},
      {"9000 Nm3/h", Kind::volume_flow, "not a volume at flowing conditions"},
      // Decimal commas and digit groups.
      {"0,75 in", Kind::length, "write \"0.75\""},
      {"1,000 mm", Kind::length, "write \"1000\" or \"1.000\""},
      {"1 000 mm", Kind::length, "write \"1000\""},
      {"1\u00A0000 mm", Kind::length, "write \"1000\""},
      {"1\u202F000\u202F000 mm", Kind::length, "write \"1000000\""},
      {"1.000,5 mm", Kind::length, "write \"1000.5\""},
      {"1,000.5 mm", Kind::length, "write \"1000.5\""},
      {"1,234,567 mm", Kind::length, "write \"1234567\""},
      {"1.234.567 mm", Kind::length, "write \"1234567\""},
      {"1'000 mm", Kind::length, "write \"1000\""},
      {"1.5.5 mm", Kind::length, "more than one decimal mark"},
      {"0,75", Kind::ratio, "write \"0.75\""},
      // Units written with dashes and negative exponents.
      {"100 Btu/hr-ft2-F", Kind::film_coefficient, "write \"Btu/h.ft2.degF\""},
      {"100 Btu/hr-ft²-°F", Kind::film_coefficient, "write \"Btu/h.ft2.degF\""},
      {"0.3 W/m-K", Kind::conductivity, "write \"W/m.K\""},
      {"0.3 W m⁻¹ K⁻¹", Kind::conductivity, "write a slash instead"},
      // A datum where there is none to have.
      {"5 barg", Kind::pressure_difference, "\"barg\" is a gauge pressure"},
      {"5 psig", Kind::pressure_difference, "write \"psi\""},
      {"5 bara", Kind::pressure_difference, "write \"bar\""},
      {"5 ata", Kind::pressure_difference, "an absolute pressure"},
      {"5 barg.s", Kind::viscosity, "no part of a compound unit"},
      {"6 barg +- 2 %", Kind::pressure, "where its unit has its zero"},
      {"29 degC +- 5 %", Kind::temperature, "where its unit has its zero"},
      // Not numbers.
      {"nan", Kind::ratio, "not a finite number"},
      {"inf m", Kind::length, "not a finite number"},
      {"-inf", Kind::ratio, "not a finite number"},
      {"0x10 mm", Kind::length, "hexadecimal"},
      {"1e999 m", Kind::length, "too large or too small"},
      {"1e-999 m", Kind::length, "too large or too small"},
      {"1e308 km", Kind::length, "too large"},
      {"3/0 in", Kind::length, "divides by zero"},
      {"1 5/4 in", Kind::length, "a fraction below one"},
      {"", Kind::length, "empty"},
      {"   ", Kind::length, "empty"},
      {"mm", Kind::length, "does not begin with a number"},
      {"unknown", Kind::length, "does not begin with a number"},
      {"x1.15", Kind::mass_flow, "does not begin with a number"},
      {"12 34 mm", Kind::length, "side by side"},
      {"10-14 in", Kind::length, "10..14 in"},
      {"10 to 14 in", Kind::length, "10..14 in"},
      // Wrong dimension, no unit, unknown unit.
      {"10 mm", Kind::pressure,
       "\"mm\" is a length; a pressure was expected; write for example \"2.5 bara\""},
      {"62 m3/h", Kind::mass_flow, "\"m3/h\" is a volume flow; a mass flow was expected"},
      {"4 MW", Kind::mass_flow, "is a power"},
      {"3 kJ", Kind::power, "is an energy"},
      {"25 %", Kind::length, "\"%\" is a ratio"},
      {"35 g/kg", Kind::ratio, "is a mass fraction"},
      {"30 deg", Kind::ratio, "is an angle"},
      {"208 fins", Kind::count, "write the number alone"},
      {"6 kg/cm2", Kind::pressure, "write \"kgf/cm2\" or \"psi\""},
      {"100 lb/in2", Kind::pressure, "write \"kgf/cm2\" or \"psi\""},
      {"12", Kind::length, "\"12\" has no unit; a length was expected; write for example"},
      {"0", Kind::fouling_resistance, "has no unit"},
      {"12 MM", Kind::length, "write \"mm\" if that is meant"},
      {"4 Kg/h", Kind::mass_flow, "write \"kg\" if that is meant"},
      {"4 lbs/h", Kind::mass_flow, "write \"lb\" if that is meant"},
      {"4 barr", Kind::pressure, "write \"bar"},
      {"4 psgi", Kind::pressure, "write \"psig\" if that is meant"},
      {"0.3 W/mK", Kind::conductivity, "write \"m.K\" if that is meant"},
      {"5 kgh", Kind::mass_flow, "write \"kg/h\" if that is meant"},
      {"4 frobs", Kind::length, "\"frobs\" is not a known unit"},
      {"12 in.", Kind::length, "leave out the full stop"},
      {"12 m/", Kind::velocity, "not complete"},
      {"12 (m", Kind::length, "not complete"},
      {"12 m)", Kind::length, "not complete"},
      {"12 m//s", Kind::velocity, "not complete"},
      {"12 m.m.m.m.m.m.m.m.m", Kind::length, "too many parts"},
      // Impossible values.
      {"-274 degC", Kind::temperature, "below absolute zero"},
      {"-500 degF", Kind::temperature, "below absolute zero"},
      {"-1 K", Kind::temperature, "below absolute zero"},
      {"-1.02 barg", Kind::pressure, "below vacuum"},
      {"208.5", Kind::count, "not a whole number"},
      {"10..13", Kind::count, "not a whole number"},
      // Ranges, deviations, places.
      {"14..10 in", Kind::length, "does not rise"},
      {"10..10 in", Kind::length, "does not rise"},
      {"10...14 in", Kind::length, "too many dots"},
      {"10..12..14 in", Kind::length, "too many dots"},
      {"10..14", Kind::length, "has no unit"},
      {"10 %..0.2", Kind::ratio, "in the middle"},
      {"10..14 +- 1 in", Kind::length, "one of the two"},
      {"12 in +- 1", Kind::length, "in the middle"},
      {"12 +- -1 in", Kind::length, "negative"},
      {"12 +- in", Kind::length, "does not begin with a number"},
      {"12 +- 5 %", Kind::length, "has no unit"},
      {"0.25 +- 5 %", Kind::ratio, "give both numbers their unit"},
      {"165 -> 105 degF", Kind::temperature, "is a pair"},
      {"0.55 Btu/lb.degF at 135 degF", Kind::heat_capacity, "says at what it holds"},
      {"14 BWG", Kind::length, "only read for a tube wall"},
      {"12 \xFF", Kind::length, "not a known unit"},
  };
  for (const auto& [text, kind, phrase] : rows) {
    CAPTURE(text);
    const std::string said = message(units::read(text, kind));
    CAPTURE(said);
    CHECK(said.find(phrase) != std::string::npos);
  }
}

TEST_CASE("units: a flow, pair, property, wall or bore that cannot be read says why") {
  struct Row {
    std::string said;
    const char* phrase;
  };
  const Row rows[] = {
      {message(units::read_flow("500 scfm")), "write for example \"9000 scfm at 60 degF\""},
      {message(units::read_flow("500 scfm at inlet")), "temperature of its own"},
      {message(units::read_flow("9000 Nm3/h at 20 degC")), "temperature of its own"},
      {message(units::read_flow("21 kg/s at inlet")), "the same everywhere"},
      {message(units::read_flow("21")), "a mass flow or a volume flow was expected"},
      {message(units::read_flow("21 mm")), "\"mm\" is a length; a mass flow or a volume flow was expected"},
      {message(units::read_flow("21 m3/h at")), "nothing stands behind"},
      {message(units::read_flow("21 m3/h at noon")), "neither \"inlet\" nor a temperature"},
      {message(units::read_flow("21 m3/h at 60..70 degF")), "a plain value was expected"},
      {message(units::read_flow("21 m3/h at 60")), "a temperature was expected"},
      {message(units::read_flow("21 m3/h @ 60 degF")), "\"at\" was expected"},
      {message(units::read_flow("9000 Nm3/h..9500 Sm3/h")), "different places"},
      {message(units::read_flow("62,5 m3/h")), "62.5"},
      {message(units::read_pair("165 degF", Kind::temperature)), "is not a pair"},
      {message(units::read_pair("1 -> 2 -> 3 m", Kind::length)), "is not a pair"},
      {message(units::read_pair("165 degF -> 105", Kind::temperature)), "in the middle"},
      {message(units::read_pair("165 -> 105", Kind::temperature)), "has no unit"},
      {message(units::read_pair("165 -> degF", Kind::temperature)), "does not begin with a number"},
      {message(units::read_value_at("0.55 Btu/lb.degF", Kind::heat_capacity)), "at what temperature"},
      {message(units::read_value_at("0.55 Btu/lb.degF at 5 bar", Kind::heat_capacity)), "is a pressure"},
      {message(units::read_wall("99 BWG")), "a gauge from 0000 to 36 BWG"},
      {message(units::read_wall("14 BWG max")), "is not a gauge"},
      {message(units::read_wall("14 SWG")), "not known here"},
      {message(units::read_wall("2.11 mm min")), "stands behind a length"},
      {message(units::read_wall("2.11")), "has no unit"},
      {message(units::read_bore("NPS 7")), "one of NPS 1/2, 3/4, 1,"},
      {message(units::read_bore("DN 210")), "one of DN 15, 20,"},
      {message(units::read_bore("NPS 8 sch 10")), "sch 40, sch 80, std or xs"},
      {message(units::read_bore("NPS 8 sch")), "sch 40, sch 80, std or xs"},
      {message(units::read_bore("8 in sch 40")), "write for example \"NPS 8 sch 40\""},
      {message(units::read_bore("NPS")), "not known"},
  };
  for (const auto& [said, phrase] : rows) {
    CAPTURE(said);
    CAPTURE(phrase);
    CHECK(said.find(phrase) != std::string::npos);
  }
}

TEST_CASE("units: hostile texts are refused in clean words and never throw") {
  using namespace std::string_literals;
  const std::string texts[] = {
      std::string(1000000, '1'),
      std::string(199, '9') + 'm',
      "1 " + std::string(190, '('),
      "1 m" + std::string(95, '/') + "m",
      "12\0mm"s,
      "\0"s,
      "12 mm\x1b[31m",
      "12 \u202Emm",
      "\xEF\xBB\xBF" + "12 mm"s,
      "\xC0\x80\xF8\x88\x80\x80\x80",
      "12 \xED\xA0\x80",
      std::string(60, '\xC3') + std::string(60, '\xA9'),
      "1 " + std::string(180, '\xB2'),
      "..",
      "+-",
      "->",
      " at ",
      "->..+- at ",
      "%",
      "1 % % %",
      "-",
      "+",
      ".",
      "1..",
      "..1",
      "1->",
      "1 at 1",
      "NPS",
      "BWG",
      "BWG BWG",
      "DN DN",
      "sch",
      "1/",
      "1/1/1/1",
      "1-1/1",
      "e5",
      "1e",
      "1e+",
      "1 1/",
      "@@",
      "\"\"",
      "''",
  };
  for (const auto& text : texts) read_everywhere(text);
}

TEST_CASE("units: random bytes and random pieces of values never throw") {
  std::mt19937 random(20240601);
  const std::string pieces[] = {"1",    "12.5",  "3/4", " ",   "..", "+-", "->",     " at ", "mm",
                                "degF", "/",     ".",   "(",   ")",  "%",  "bar",    "g",    "W",
                                "m2",   "K",     "-",   ",",   "°",  "±",  "in",     "BWG",  "NPS",
                                "sch",  "inlet", "1e",  "Nm3", "h",  "²",  "kgf/cm2"};
  for (int i = 0; i < 400; ++i) {
    std::string bytes(random() % 40, '\0'), joined;
    for (char& byte : bytes) byte = static_cast<char>(random() % 256);
    for (std::size_t k = random() % 12; k > 0; --k) joined += pieces[random() % std::size(pieces)];
    read_everywhere(bytes);
    read_everywhere(joined);
  }
}
