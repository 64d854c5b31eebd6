#include <doctest/doctest.h>
#include <fmt/format.h>

#include <algorithm>
#include <nlohmann/json.hpp>

#include "case_io_good.hpp"
#include "case_io_refused.hpp"
#include "dutygauge/explore.hpp"
#include "support.hpp"

namespace fluids = dutygauge::fluids;
namespace units = dutygauge::units;
using dutygauge::case_io::Case;
using good::with;
using refused::build;
using refused::check;
using refused::read_document;
using support::relative;

namespace {

Case built(const std::string& text) {
  return build(read_document(text, "x"));
}

/// The cooler of the tests with another oil.
std::string with_shell_fluid(const std::string& fluid) {
  return with(
      "{constant: {density: 865 kg/m3, heat_capacity: 2050 J/kg.K, conductivity: 0.13 W/m.K, viscosity: 22 "
      "mPa.s, phase: liquid}}",
      fluid);
}

/// The cooler with another cooling medium.
std::string with_tube_fluid(const std::string& fluid) {
  return with("fluid: water", "fluid: " + fluid);
}

bool assumes(const Case& a_case, std::string_view key) {
  return std::ranges::any_of(a_case.assumed, [&](const auto& line) { return line.key == key; });
}

bool says(const dutygauge::Findings& findings, std::string_view id) {
  return std::ranges::any_of(findings, [&](const auto& finding) { return finding.id == id; });
}

}  // namespace

TEST_CASE("case_io: every family of fluids reaches the case") {
  const auto fluid = [](const std::string& spec) {
    return built(with_tube_fluid(spec)).problem.tube_side.fluid;
  };
  const auto same = [](const fluids::Fluid& one, const fluids::Fluid& other) {
    const auto a = fluids::state(one, 310.0, 4e5), b = fluids::state(other, 310.0, 4e5);
    return a.density == b.density && a.heat_capacity == b.heat_capacity && a.conductivity == b.conductivity &&
           a.viscosity == b.viscosity;
  };
  const double salinity = 33.7e-3;
  CHECK(relative(std::get<fluids::SeawaterModel>(fluid("{seawater: {salinity: 33.7 g/kg}}").model).salinity,
                 salinity) < 1e-14);
  CHECK(same(fluid("seawater"), fluids::make_seawater(0.035).fluid));
  CHECK(same(fluid("toluene"), fluids::make_liquid("toluene").fluid));
  CHECK(same(fluid("{ethylene_glycol_water: {mass_fraction: 30 %}}"),
             fluids::make_solution("ethylene_glycol_water", 0.3).fluid));
  CHECK(same(fluid("{propylene_glycol_water: {mass_fraction: 0.3}}"),
             fluids::make_solution("propylene_glycol_water", 0.3).fluid));
  CHECK(same(fluid("{sodium_chloride_brine: {mass_fraction: 20 %}}"),
             fluids::make_solution("sodium_chloride_brine", 0.2).fluid));
  CHECK(same(fluid("{calcium_chloride_brine: {mass_fraction: 20 %}}"),
             fluids::make_solution("calcium_chloride_brine", 0.2).fluid));
  CHECK(same(
      fluid("{petroleum: {specific_gravity: 0.85, watson_k: 11.8, kind: crude}}"),
      fluids::make_petroleum(
          {.specific_gravity = 0.85, .watson_k = 11.8, .viscosity = {}, .kind = fluids::PetroleumKind::crude})
          .fluid));
}

TEST_CASE("case_io: gases and their mixtures reach the case") {
  const auto fluid = [](const std::string& spec) {
    const auto text = with("62 m3/h at inlet", "2 kg/s", with_tube_fluid(spec));
    return built(text).problem.tube_side.fluid;
  };
  CHECK(std::holds_alternative<fluids::AirModel>(fluid("air").model));
  CHECK(fluid("nitrogen").phase == fluids::Phase::gas);
  const auto mixture =
      fluid("{gas_mixture: {mole_fractions: {nitrogen: 0.72, CO2: 12 %, water: 0.005, oxygen: 0.155}}}");
  CHECK(std::get<fluids::GasModel>(mixture.model).count == 4);
}

TEST_CASE("case_io: viscosities stand under their temperatures, in any order and kind") {
  const auto one =
      built(with_shell_fluid("{petroleum: {api: 35, viscosity: {210 degF: 1.4 cSt, 100 degF: 3.8 cSt}}}"));
  const auto other = built(with_shell_fluid(
      "{petroleum: {api: 35, viscosity: {37.777777777777779 degC: 3.8 mm2/s, 98.888888888888886 degC: 1.4 "
      "mm2/s}}}"));
  for (const double t : {320.0, 340.0, 360.0})
    CHECK(relative(fluids::state(one.problem.shell_side.fluid, t, 6e5).viscosity,
                   fluids::state(other.problem.shell_side.fluid, t, 6e5).viscosity) < 1e-12);
  CHECK(assumes(one, "streams.shell_side.fluid.petroleum.kind"));
  const auto oil = built(with_shell_fluid(
      "{oil: {density_15c: 872 kg/m3, viscosity: {40 degC: 40 mPa.s, 100 degC: 5.4 mPa.s}}}"));
  CHECK(fluids::state(oil.problem.shell_side.fluid, 313.15, 6e5).viscosity ==
        doctest::Approx(0.040).epsilon(1e-9));
}

TEST_CASE("case_io: what a grade or a name leaves open is listed with its full key") {
  const auto oil = built(with_shell_fluid("{oil: {iso_vg: 46}}"));
  CHECK(assumes(oil, "streams.shell_side.fluid.oil.viscosity_index"));
  CHECK(assumes(oil, "streams.shell_side.fluid.oil.density_15c"));
  CHECK(assumes(built(with_tube_fluid("seawater")), "streams.tube_side.fluid.seawater.salinity"));
  CHECK(says(built(with_tube_fluid("{ethylene_glycol_water: {mass_fraction: 30 %}}")).findings,
             "fluids.inhibited_glycol"));
}

TEST_CASE("case_io: a known property is met at its temperature") {
  const auto a_case =
      built(with_shell_fluid("{oil: {iso_vg: 46, given: {heat_capacity: 0.5 Btu/lb.degF at 135 degF, "
                             "viscosity: 20 cP at 60 degC}}}"));
  const auto& fluid = a_case.problem.shell_side.fluid;
  const double at = units::to_si(135.0, "degF", units::Kind::temperature);
  CHECK(relative(fluids::state(fluid, at, 6e5).heat_capacity, 0.5 * 4186.8) < 1e-9);
  CHECK(relative(fluids::state(fluid, 333.15, 6e5).viscosity, 0.020) < 1e-12);
}

TEST_CASE("case_io: volume flows become mass by the fluid's own density where they are measured") {
  const auto flow = [](const std::string& fluid, const std::string& written) {
    return built(with("62 m3/h at inlet", written, with_tube_fluid(fluid))).problem.tube_side.mass_flow;
  };
  // Definition of degrees API; water of 60 degF has 999.016 kg/m3 (API MPMS 11.1). The model takes
  // the gravity at 60 degF for that at 15 degC, which moves the density by up to 0.05 %.
  const double barrel = 0.158987294928;
  CHECK(relative(flow("{petroleum: {api: 35, watson_k: 11.8}}", "62 kbbl/d at 60 degF"),
                 62e3 * barrel / 86400.0 * 999.016 * 141.5 / 166.5) < 5e-4);
  // The ideal gas law: nitrogen and air part from it by less than 0.1 % there.
  const auto ideal = [](double molar_mass, double temperature) {
    return 101325.0 * molar_mass / (8.314462618 * temperature);
  };
  CHECK(relative(flow("nitrogen", "9000 Nm3/h"), 2.5 * ideal(28.0134e-3, 273.15)) < 1e-3);
  CHECK(relative(flow("air", "3600 Sm3/h"), ideal(28.9647e-3, 288.15)) < 1e-3);
  CHECK(relative(flow("air", "3600 m3/h at 15 degC"), flow("air", "3600 Sm3/h")) < 1e-12);
  const double cubic_foot = 0.028316846592;
  CHECK(relative(flow("air", "6000 scfm at 60 degF"), 100.0 * cubic_foot * ideal(28.9647e-3, 288.7056)) <
        1e-3);
  // Wet gas is counted as if nothing condensed, although it could not be rated there.
  CHECK(relative(flow("{gas_mixture: {mole_fractions: {nitrogen: 0.993, water: 0.007}}}", "3600 Nm3/h"),
                 ideal(0.993 * 28.0134e-3 + 0.007 * 18.01528e-3, 273.15)) < 3e-3);
  const auto steam = built(with("temperature: 29 degC", "temperature: 160 degC",
                                with("62 m3/h at inlet", "3600 Nm3/h", with_tube_fluid("steam"))));
  CHECK(relative(steam.problem.tube_side.mass_flow, ideal(18.01528e-3, 273.15)) < 3e-3);
  const auto standard = built(with("62 m3/h at inlet", "9000 Nm3/h", with_tube_fluid("air")));
  CHECK(assumes(standard, "streams.tube_side.flow"));
}

TEST_CASE("case_io: a volume of a liquid is measured under the inlet's pressure") {
  const auto made = fluids::make_water(302.15, 4e5);
  const auto hot = built(with("62 m3/h at inlet", "62 m3/h at 120 degC"));
  CHECK(relative(hot.problem.tube_side.mass_flow,
                 fluids::state(made.fluid, 393.15, 4e5).density * 62.0 / 3600.0) < 1e-12);
}

TEST_CASE("case_io: mistakes in fluids are met where they stand") {
  const auto tube = [](const std::string& fluid) { return with_tube_fluid(fluid); };
  check({
      {"an unknown name", tube("toluen"), {"x:38:12: error: streams.tube_side.fluid:", "write toluene"}},
      {"an unknown family", tube("{oyl: {iso_vg: 46}}"), {"streams.tube_side.fluid.oyl:", "write oil"}},
      {"a name with a block", tube("{water: {phase: liquid}}"), {"write fluid: water"}},
      {"a family without data", tube("oil"), {"x:38:12:", "oil needs its data"}},
      {"a refused liquid", tube("glycerol"), {"no verified property set"}},
      {"fractions that do not add up",
       tube("{gas_mixture: {mole_fractions: {nitrogen: 0.72, oxygen: 0.12}}}"),
       {"streams.tube_side.fluid.gas_mixture.mole_fractions:", "add up to 0.84"}},
      {"an unknown gas",
       tube("{gas_mixture: {mole_fractions: {nitrogen: 0.9, unobtainium: 0.1}}}"),
       {"mole_fractions.unobtainium:", "not a gas known here"}},
      {"a gas twice",
       tube("{gas_mixture: {mole_fractions: {nitrogen: 0.5, N2: 0.5}}}"),
       {"the gas is given twice"}},
      {"exchanged viscosities",
       tube("{oil: {viscosity: {40 degC: 6 cSt, 100.5 degC: 46 cSt}}}"),
       {"streams.tube_side.fluid.oil.viscosity:", "does not fall from 40.0 degC to 100.5 degC"}},
      {"one temperature in two units",
       tube("{oil: {viscosity: {40 degC: 46 cSt, 104 degF: 6 cSt}}}"),
       {"fluid.oil.viscosity:", "0 K apart"}},
      {"a doubled temperature",
       tube("{oil: {viscosity: {40 degC: 46 cSt, 40 degC: 6 cSt}}}"),
       {"viscosity.40 degC: the key is given twice"}},
      {"one point", tube("{oil: {viscosity: {40 degC: 46 cSt}}}"), {"fluid.oil.viscosity:", "two points"}},
      {"a temperature without unit",
       tube("{oil: {viscosity: {40.5: 46 cSt, 100 degC: 6 cSt}}}"),
       {"fluid.oil.viscosity.40.5:", "has no unit"}},
      {"a temperature of dots",
       tube("{oil: {viscosity: {40. degC: 46 cSt, 100 degC: 6 cSt}}}"),
       {"a key with dots"}},
      {"no viscosity",
       tube("{oil: {viscosity: {40 degC: 46 kg, 100 degC: 6 cSt}}}"),
       {"viscosity.40 degC:", "a kinematic or dynamic viscosity"}},
      {"API of 200",
       tube("{petroleum: {api: 200, watson_k: 11.8}}"),
       {"fluid.petroleum.api:", "no petroleum"}},
      {"API in per cent", tube("{petroleum: {api: 35 %, watson_k: 11.8}}"), {"'35 %' is not a plain number"}},
      {"a grade there is not",
       tube("{oil: {iso_vg: 47}}"),
       {"fluid.oil.iso_vg:", "not an ISO viscosity grade"}},
      {"much salt", tube("{seawater: {salinity: 900 g/kg}}"), {"fluid.seawater.salinity:", "900 g/kg"}},
      {"salt as a plain number", tube("{seawater: {salinity: 35}}"), {"fluid.seawater.salinity:"}},
      {"much glycol",
       tube("{ethylene_glycol_water: {mass_fraction: 95 %}}"),
       {"ethylene_glycol_water.mass_fraction:", "outside the data"}},
      {"a property without its temperature",
       tube("{oil: {iso_vg: 46, given: {heat_capacity: 2 kJ/kg.K}}}"),
       {"fluid.oil.given.heat_capacity:", "at what temperature"}},
      {"a property in a wrong unit",
       tube("{oil: {iso_vg: 46, given: {heat_capacity: 2 J/kg.K at 40 degC}}}"),
       {"fluid.oil.given.heat_capacity:", "cannot be meant"}},
      {"freezing at the inlet",
       with("temperature: 29 degC", "temperature: -5 degC", tube("seawater")),
       {"streams.tube_side.fluid:", "it freezes at -1.9"}},
      {"boiling at the inlet",
       with("temperature: 29 degC\n      pressure: 4 bara", "temperature: 115 degC\n      pressure: 1 bara",
            tube("toluene")),
       {"streams.tube_side.fluid:", "it boils at"}},
      {"outside a table",
       tube("{two_point: {at: 80 -> 99 degC, density: 990 -> 980 kg/m3, heat_capacity: 4.18 -> 4.19 kJ/kg.K, "
            "conductivity: 0.63 -> 0.65 W/m.K, viscosity: 0.65 -> 0.47 cP}}"),
       {"streams.tube_side.fluid:", "cannot be used at 29.0 degC"}},
      {"a gas without a datum",
       with("4 bara", "4 bar", with("62 m3/h at inlet", "2 kg/s", tube("air"))),
       {"streams.tube_side.inlet.pressure:", "absolute or gauge"}},
      {"a gas volume without a place",
       with("62 m3/h at inlet", "62 m3/h", tube("air")),
       {"streams.tube_side.flow:", "where the gas has that volume"}},
  });
}

TEST_CASE("case_io: the schema knows every fluid that needs its name alone") {
  const auto schema = nlohmann::json::parse(dutygauge::case_io::schema());
  const auto& fluid = schema["properties"]["streams"]["properties"]["tube_side"]["properties"]["fluid"];
  const auto& names = fluid["anyOf"][0]["enum"];
  for (const char* name : {"water", "steam", "seawater", "air", "nitrogen", "toluene"})
    CHECK(std::ranges::find(names, name) != names.end());
  CHECK(std::ranges::find(names, "oil") == names.end());
  CHECK(fluid["anyOf"][1]["properties"].contains("petroleum"));
}

TEST_CASE("case_io: a stream that would change its phase gives no result but says where") {
  struct Row {
    std::string what, text, part;
  };
  const std::string cold_oil = with("68 degC", "-30 degC");
  const Row rows[] = {
      {"steam condenses",
       with("68 degC, pressure: 6 bara", "130 degC, pressure: 2 bara",
            with("21.5 kg/s", "0.5 kg/s", with_shell_fluid("steam"))),
       "it condenses at 120.2 degC"},
      {"water boils",
       with("68 degC", "190 degC",
            with("62 m3/h at inlet", "0.5 m3/h at inlet", with("pressure: 4 bara", "pressure: 1 bara"))),
       "it boils at 99.6 degC"},
      {"brine freezes",
       with("temperature: 29 degC", "temperature: 5 degC",
            with("62 m3/h at inlet", "1 m3/h at inlet",
                 with("fluid: water", "fluid: {calcium_chloride_brine: {mass_fraction: 10 %}}", cold_oil))),
       "it freezes at"},
  };
  for (const Row& row : rows)
    for (const char* solution : {"mean", "march"}) {
      CAPTURE(row.what);
      CAPTURE(solution);
      const auto a_case = built(with("solution: mean", fmt::format("solution: {}", solution), row.text));
      const auto rating = dutygauge::explore::rate(a_case).assessment.rating;
      CHECK(!rating.outcome);
      CHECK_MESSAGE(rating.no_result.find(row.part) != std::string::npos, rating.no_result);
    }
}

TEST_CASE("rating: a wall that would freeze a cooled stream is found at its coldest end") {
  const auto text =
      with("temperature: 29 degC", "temperature: 4 degC",
           with("68 degC", "-40 degC",
                with("viscosity: 22 mPa.s", "viscosity: 2 mPa.s",
                     with("62 m3/h at inlet", "200 m3/h at inlet", with_tube_fluid("seawater")))));
  for (const char* solution : {"mean", "march"}) {
    const auto result =
        dutygauge::explore::rate(built(with("solution: mean", fmt::format("solution: {}", solution), text)));
    REQUIRE(result.assessment.rating.outcome);
    CHECK(says(result.findings, "fluids.wall_changes_phase"));
  }
}
