#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <nlohmann/json.hpp>
#include <sstream>
#include <string>
#include <vector>

#include "dutygauge/cli.hpp"
#include "dutygauge/fluids.hpp"

namespace {

using dutygauge::cli::Status;
using Json = nlohmann::json;

struct Ran {
  int status;
  std::string out, err;
};

Ran fluid(std::vector<std::string> words) {
  words.insert(words.begin(), "fluid");
  std::ostringstream out, err;
  const int status = dutygauge::cli::run(words, out, err);
  return {status, out.str(), err.str()};
}

bool contains(const std::string& text, const std::string& part) {
  return text.find(part) != std::string::npos;
}

std::vector<std::string> lines_of(const std::string& text) {
  std::vector<std::string> lines;
  std::istringstream stream(text);
  for (std::string line; std::getline(stream, line);) lines.push_back(line);
  return lines;
}

}  // namespace

TEST_CASE("cli: fluid shows one state as JSON with six properties") {
  const Ran ran = fluid({"water", "--at", "temperature=300 K, pressure=3 MPa", "--json"});
  REQUIRE(ran.status == Status::done);
  const Json json = Json::parse(ran.out);
  CHECK(json.size() == 6);
  // IAPWS R7-97(2012), table 5: v, h and cp at 300 K and 3 MPa, nine digits.
  CHECK(std::abs(json["density_kg_m3"].get<double>() * 0.100215168e-2 - 1.0) < 1e-8);
  CHECK(std::abs(json["enthalpy_J_kg"].get<double>() / 0.115331273e6 - 1.0) < 1e-8);
  CHECK(std::abs(json["heat_capacity_J_kgK"].get<double>() / 0.417301218e4 - 1.0) < 1e-8);
  const double prandtl = json["viscosity_Pa_s"].get<double>() * json["heat_capacity_J_kgK"].get<double>() /
                         json["conductivity_W_mK"].get<double>();
  CHECK(json["prandtl"].get<double>() == doctest::Approx(prandtl).epsilon(1e-12));
}

TEST_CASE("cli: fluid takes any spec of a case file") {
  for (const char* spec :
       {"seawater", "{seawater: {salinity: 33.7 g/kg}}", "air", "nitrogen", "toluene",
        "{gas_mixture: {mole_fractions: {nitrogen: 0.97, water: 3 %}}}",
        "{ethylene_glycol_water: {mass_fraction: 30 %}}",
        "{calcium_chloride_brine: {mass_fraction: 200 g/kg}}",
        "{petroleum: {api: 35, viscosity: {100 degF: 3.8 cSt, 210 degF: 1.4 cSt}}}", "{oil: {iso_vg: 46}}",
        "{oil: {viscosity: {37.8 degC: 40 mPa.s, 98.9 degC: 5.5 cSt}, density_15c: 872 kg/m3}}",
        "{constant: {density: 865 kg/m3, heat_capacity: 2050 J/kg.K, conductivity: 0.13 W/m.K, viscosity: 22 "
        "cP}}"}) {
    CAPTURE(spec);
    const Ran ran = fluid({spec, "--at", "temperature=35 degC, pressure=1.5 bara"});
    CHECK_MESSAGE(ran.status == Status::done, ran.err);
    CHECK(contains(ran.out, "Prandtl"));
    CHECK(contains(ran.out, "uncertainty"));
    for (const auto& line : lines_of(ran.out)) CHECK_MESSAGE(line.size() <= 100, line);
  }
}

TEST_CASE("cli: fluid shows a range as table, JSON rows and CSV of the same states") {
  const std::string at = "temperature=20..80 degC, pressure=4 bara";
  const Ran page = fluid({"{oil: {iso_vg: 46}}", "--at", at, "--steps", "4"});
  CHECK(page.status == Status::done);
  CHECK(contains(page.out, "assumed  fluid.oil.viscosity_index: 95"));
  for (const auto& line : lines_of(page.out)) CHECK_MESSAGE(line.size() <= 100, line);
  const Ran json = fluid({"{oil: {iso_vg: 46}}", "--at", at, "--steps", "4", "--json"});
  const Json rows = Json::parse(json.out)["rows"];
  REQUIRE(rows.size() == 4);
  CHECK(contains(json.err, "fluid.oil.density_15c: 875 kg/m3"));
  CHECK(rows[1]["temperature_degC"].get<double>() == doctest::Approx(40.0).epsilon(1e-12));
  CHECK(rows[3]["temperature_degC"].get<double>() == doctest::Approx(80.0).epsilon(1e-12));
  // ISO 3448: a grade is the kinematic viscosity at 40 degC [mm2/s].
  const double kinematic =
      rows[1]["viscosity_Pa_s"].get<double>() / rows[1]["density_kg_m3"].get<double>() * 1e6;
  CHECK(kinematic == doctest::Approx(46.0).epsilon(1e-3));
  const Ran csv = fluid({"{oil: {iso_vg: 46}}", "--at", at, "--steps", "4", "--csv", "-"});
  const auto lines = lines_of(csv.out);
  REQUIRE(lines.size() == 5);
  CHECK(lines[0] ==
        "temperature_degC,pressure_Pa,density_kg_m3,heat_capacity_J_kgK,conductivity_W_mK,viscosity_Pa_s,"
        "enthalpy_J_kg,prandtl");
  CHECK(lines[2].starts_with("40,400000,"));
  CHECK(Json::parse(fluid({"air", "--at", "temperature=20 degC, pressure=1..9 bara", "--json"}).out)["rows"]
            .size() == 7);
}

TEST_CASE("cli: fluid answers past the data with a finding and beyond that not at all") {
  const Ran near = fluid({"seawater", "--at", "temperature=125 degC, pressure=4 bara", "--json"});
  CHECK(near.status == Status::done);
  CHECK(Json::parse(near.out)["findings"][0]["id"] == "fluids.extrapolated");
  CHECK(contains(near.err, "extrapolated"));
  const Ran page = fluid({"seawater", "--at", "temperature=125 degC, pressure=4 bara"});
  CHECK(contains(page.out, "extrapolated"));
  for (const char* at : {"temperature=160 degC, pressure=9 bara", "temperature=20..160 degC, pressure=9 bara",
                         "temperature=-5 degC, pressure=4 bara"}) {
    CAPTURE(at);
    const Ran far = fluid({"seawater", "--at", at, "--json"});
    CHECK(far.status == Status::input_at_fault);
    CHECK(far.out.empty());
    CHECK(contains(far.err, "seawater cannot be used at"));
  }
  const Ran boils = fluid({"water", "--at", "temperature=80..120 degC, pressure=1 bara"});
  CHECK(boils.status == Status::input_at_fault);
  CHECK(contains(boils.err, "boils at 99.6"));
}

TEST_CASE("cli: fluid refuses a call it cannot follow") {
  struct Row {
    std::vector<std::string> words;
    const char* part;
  };
  const std::string good = "temperature=300 K, pressure=1 bara";
  const Row rows[] = {
      {{}, "takes one SPEC"},
      {{"water"}, "needs --at"},
      {{"water", "air", "--at", good}, "takes one SPEC"},
      {{"water", "--at", "temperature=300 K"}, "needs a temperature and a pressure"},
      {{"water", "--at", ""}, "needs a temperature and a pressure"},
      {{"water", "--at", "temperature=300, pressure=1 bara"}, "has no unit"},
      {{"water", "--at", "temperature=20,5 degC, pressure=1 bara"}, "--at: "},
      {{"water", "--at", "temperature=300 K, temperature=301 K"}, "given twice"},
      {{"water", "--at", "heat=300 K"}, "neither temperature="},
      {{"water", "--at", "temperature=20..30 degC, pressure=1..2 bara"}, "two ranges"},
      {{"water", "--at", "temperature=300 K, pressure=-2 barg"}, "below vacuum"},
      {{"water", "--at", "temperature=20 +- 1 degC, pressure=1 bara"}, "deviation"},
      {{"water", "--at", good, "--steps", "5"}, "holds no range"},
      {{"water", "--at", "temperature=20..30 degC, pressure=1 bara", "--steps", "1"}, "--steps: '1'"},
      {{"water", "--at", "temperature=20..30 degC, pressure=1 bara", "--steps", "2.5"}, "--steps: '2.5'"},
      {{"water", "--at", good, "--json", "--csv", "-"}, "exclude each other"},
      {{"air", "--at", "temperature=300 K, pressure=6 bar"}, "absolute or gauge"},
      {{"watr", "--at", good}, "write water"},
      {{"{water", "--at", good}, "fluid:1:"},
      {{"--list", "--csv", "-"}, "exclude each other"},
      {{"--list", "water"}, "takes no fluid"},
      {{"water", "--at", good, "--units", "cgs"}, "--units"}};
  for (const Row& row : rows) {
    CAPTURE(row.part);
    const Ran ran = fluid(row.words);
    CHECK(ran.status == Status::input_at_fault);
    CHECK(ran.out.empty());
    CHECK_MESSAGE(contains(ran.err, row.part), ran.err);
  }
}

TEST_CASE("cli: fluid lists every built-in fluid with its range and sources") {
  const Ran page = fluid({"--list"});
  const Json json = Json::parse(fluid({"--list", "--json"}).out);
  CHECK(page.status == Status::done);
  CHECK(json["fluids"].size() == dutygauge::fluids::catalogue().size());
  for (const auto& entry : dutygauge::fluids::catalogue()) {
    const std::string name(entry.name);
    CAPTURE(name);
    CHECK(contains(page.out, name));
    const auto& listed = json["fluids"];
    CHECK(std::any_of(listed.begin(), listed.end(), [&](const Json& one) { return one["name"] == name; }));
  }
  for (const auto& line : lines_of(page.out)) CHECK_MESSAGE(line.size() <= 100, line);
  CHECK(contains(fluid({"--list", "--units", "us"}).out, "degF"));
}
