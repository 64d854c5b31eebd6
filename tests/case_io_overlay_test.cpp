#include <doctest/doctest.h>

#include <algorithm>
#include <string>

#include "dutygauge/case_io.hpp"

using namespace dutygauge;
using case_io::Document;

namespace {

// A small oil cooler, invented; lines are counted from 1.
const std::string base = R"(dutygauge: 1
title: Oil cooler
exchanger:
  tema: AES
  shell: {inside_diameter: 489 mm, nozzle_in: 154 mm, nozzle_out: 154 mm, impingement_plate: false}
  tubes:
    count: 208
    plugged: 0
    passes: 2
    outside_diameter: 19.05 mm
    wall: 2.11 mm
    length: 4.88 m
    tubesheet_thickness: 45 mm
    pitch: 25.4 mm
    layout: 30
    material: admiralty brass
    nozzle_in: 128 mm
    nozzle_out: 128 mm
  baffles: {cut: 25 %, spacing: 150 mm, inlet_spacing: 295 mm, outlet_spacing: 295 mm, thickness: 6 mm}
streams:
  shell_side:
    name: lube oil
    fluid: {constant: {density: 865 kg/m3, heat_capacity: 2.05 kJ/kg.K, conductivity: 0.13 W/m.K, viscosity: 22 cP, phase: liquid}}
    flow: 21.5 kg/s
    inlet: {temperature: 68 degC, pressure: 6 bara}
    fouling: 0.00018 m2.K/W
  tube_side:
    name: cooling water
    fluid: water
    flow: 62 m3/h at inlet
    inlet: {temperature: 29 degC, pressure: 4 bara}
    fouling: 0.00035 m2.K/W
service:
  shell_side_outlet: {at_most: 60 degC}
)";
constexpr int first_line = 35;  // of what is appended to the base

Document with(const std::string& more) {
  return case_io::read_document(base + more, "oil.yaml");
}

std::vector<case_io::Mistake> mistakes_of(const std::string& more) {
  try {
    case_io::build_all(with(more));
  } catch (const case_io::InputError& error) {
    return error.mistakes();
  }
  return {};
}

bool says(const std::vector<case_io::Mistake>& mistakes, int line, const std::string& key,
          const std::string& part) {
  return std::ranges::any_of(mistakes, [&](const case_io::Mistake& m) {
    return m.at.line == line && m.key == key &&
           (m.what + ";" + m.expected + ";" + m.remedy).find(part) != std::string::npos;
  });
}

}  // namespace

TEST_CASE("overlay: a file without operating cases has one, named base") {
  const auto document = with("");
  CHECK(case_io::operating_cases(document) == std::vector<std::string>{"base"});
  const auto cases = case_io::build_all(document);
  REQUIRE(cases.size() == 1);
  CHECK(cases[0].operating_case == "base");
  CHECK(case_io::overlaid(document, "base").leaves.size() == document.leaves.size());
}

TEST_CASE("overlay: operating cases stand in file order, new values replace and factors multiply") {
  const auto document = with(
      "operating_cases:\n"
      "  winter: {}\n"
      "  more_oil: {streams.shell_side.flow: x1.15}\n"
      "  autumn: {streams.tube_side.inlet.temperature: 33 degC, service.duty.at_least: 300 kW}\n"
      "  air_cooled:\n");
  CHECK(case_io::operating_cases(document) ==
        std::vector<std::string>{"winter", "more_oil", "autumn", "air_cooled"});
  const auto cases = case_io::build_all(document);
  REQUIRE(cases.size() == 4);
  CHECK(cases[0].problem.shell_side.mass_flow == 21.5);
  CHECK(cases[1].problem.shell_side.mass_flow == doctest::Approx(1.15 * 21.5).epsilon(1e-14));
  CHECK(cases[2].problem.tube_side.inlet_temperature == doctest::Approx(306.15).epsilon(1e-14));
  CHECK(cases[2].service.demands.size() == 2);
  CHECK(cases[1].service.demands.size() == 1);
  CHECK(cases[3].problem.shell_side.mass_flow == 21.5);
}

TEST_CASE("overlay: the unit as it is lies under every operating case, the case's own values on top") {
  const auto document = with(
      "present: {since: 2024-03-18, exchanger.tubes.plugged: [8, 4], streams.shell_side.flow: x0.9}\n"
      "operating_cases:\n"
      "  design: {}\n"
      "  more_oil: {streams.shell_side.flow: x1.1}\n"
      "  fixed: {streams.shell_side.flow: 20 kg/s, exchanger.tubes.plugged: 2}\n");
  const auto cases = case_io::build_all(document);
  REQUIRE(cases.size() == 3);
  CHECK(cases[0].present_since == "2024-03-18");
  CHECK(cases[0].problem.shell_side.mass_flow == doctest::Approx(0.9 * 21.5).epsilon(1e-14));
  CHECK(cases[1].problem.shell_side.mass_flow == doctest::Approx(1.1 * 0.9 * 21.5).epsilon(1e-14));
  CHECK(cases[2].problem.shell_side.mass_flow == 20.0);
  const auto leaves = case_io::overlaid(document, "design").leaves;
  CHECK(leaves.contains("exchanger.tubes.plugged.0"));
  CHECK_FALSE(leaves.contains("exchanger.tubes.plugged"));
  CHECK(case_io::overlaid(document, "fixed").leaves.contains("exchanger.tubes.plugged"));
  const auto new_unit = case_io::as_built(document, "design");
  CHECK(new_unit.leaves.at("exchanger.tubes.plugged").text == "0");
  CHECK(case_io::build(new_unit).problem.shell_side.mass_flow == 21.5);
}

TEST_CASE("overlay: one dotted key is enough for the unit as it is, and as built it still knows its cases") {
  const auto document = with(
      "present: {exchanger.tubes.plugged: 12}\n"
      "operating_cases: {more_oil: {streams.shell_side.flow: x1.1}, design: {}}\n"
      "claims: {for: design, tube_count: 208}\n");
  CHECK(case_io::build_all(document).back().problem.exchanger.tubes_open == 208 - 12);
  for (const char* name : {"more_oil", "design"})
    CHECK(case_io::build(case_io::as_built(document, name)).claims.operating_case == "design");
}

TEST_CASE("overlay: a fluid is replaced as a whole, or one property of it by its key") {
  const auto cases = case_io::build_all(
      with("operating_cases:\n"
           "  thick: {streams.shell_side.fluid.constant.viscosity: x2}\n"
           "  wet: {streams.shell_side.fluid: water}\n"
           "  other: {streams.tube_side.fluid: {constant: {density: 1 g/cm3, heat_capacity: 4 kJ/kg.K, "
           "conductivity: 0.6 W/m.K, viscosity: 1 cP, phase: liquid}}}\n"));
  REQUIRE(cases.size() == 3);
  const auto viscosity = [](const rating::Stream& stream) {
    return fluids::state(stream.fluid, 320.0, stream.inlet_pressure).viscosity;
  };
  CHECK(viscosity(cases[0].problem.shell_side) == doctest::Approx(0.044).epsilon(1e-12));
  CHECK(viscosity(cases[1].problem.shell_side) < 0.001);
  CHECK(viscosity(cases[2].problem.tube_side) == doctest::Approx(0.001).epsilon(1e-12));
}

TEST_CASE("overlay: mistakes of all operating cases come in one go, each at its line") {
  const auto mistakes = mistakes_of(
      "present: {since: 2024-02-30}\n"
      "operating_cases:\n"
      "  a: {streams.shel_side.flow: x1.15}\n"
      "  b: {streams.shell_side.flow: 20 degC}\n"
      "  c: {streams.shell_side.name: oil, exchanger.tubes.material: x1.2, exchanger.tema: x2}\n"
      "  d: {streams.shell_side.allowable_pressure_drop: x1.1}\n"
      "  e: {streams.shell_side.inlet.temperature: x1.1}\n"
      "  f: {streams: {shell_side: {flow: 20 kg/s}}}\n"
      "  g: {title: another}\n"
      "  h: {streams.shell_side.flow: x-1, streams.tube_side.flow: xx}\n"
      "  i: 5\n"
      "  j: {exchanger.tubes.plugged: x2}\n"
      "  k: {streams.tube_side.fluid.constant.density: 990 kg/m3}\n"
      "  l: {streams.tube_side.inlet.temperature: 68 degC}\n");
  const int line = first_line;
  CHECK(says(mistakes, line, "present.since", "'2024-02-30' is not a date"));
  CHECK(says(mistakes, line + 2, "streams.shel_side.flow", "write streams.shell_side.flow"));
  CHECK(says(mistakes, line + 3, "streams.shell_side.flow", "(operating case b)"));
  CHECK(says(mistakes, line + 4, "exchanger.tema", "a factor on a word"));
  CHECK(says(mistakes, line + 5, "streams.shell_side.allowable_pressure_drop", "no value to multiply"));
  CHECK(says(mistakes, line + 6, "streams.shell_side.inlet.temperature", "counted from a datum"));
  CHECK(says(mistakes, line + 7, "streams", "dots before the colon"));
  CHECK(says(mistakes, line + 8, "title", "the same in every operating case"));
  CHECK(says(mistakes, line + 9, "streams.shell_side.flow", "'x-1' is not a factor"));
  CHECK(says(mistakes, line + 9, "streams.tube_side.flow", "(operating case h)"));
  CHECK(says(mistakes, line + 10, "operating_cases.i", "a single value stands here"));
  CHECK(says(mistakes, line + 11, "exchanger.tubes.plugged", "a factor on a plain number"));
  CHECK(says(mistakes, line + 12, "streams.tube_side.fluid.constant.density", "as a whole"));
  CHECK(says(mistakes, line + 13, "streams.tube_side.inlet.temperature", "nothing can be exchanged"));
}

TEST_CASE("overlay: a mistake of the case itself is told once, without the name of an operating case") {
  const auto mistakes = mistakes_of(
      "operating_cases:\n  a: {}\n  b: {streams.shell_side.flow: x1.15}\naccepted: [{id: some, becaus: "
      "x}]\n");
  REQUIRE(mistakes.size() == 2);
  CHECK(mistakes[0].what.find("operating case") == std::string::npos);
  CHECK(says(mistakes, first_line + 3, "accepted.0.becaus", "because"));
  CHECK(says(mistakes, first_line + 3, "accepted.0.by", "is missing"));
}

TEST_CASE("overlay: a factor stands in overlays only, and a block of the wrong shape is refused") {
  auto text = base;
  text.replace(text.find("21.5 kg/s"), 9, "x1.15");
  CHECK_THROWS_AS(case_io::build(case_io::read_document(text, "-")), case_io::InputError);
  CHECK(says(mistakes_of("operating_cases: [a, b]\n"), first_line, "operating_cases", "a list stands here"));
  CHECK(says(mistakes_of("operating_cases: {}\n"), first_line, "operating_cases", "the block is empty"));
  CHECK(says(mistakes_of("present:\n"), first_line, "present", "has no value"));
  CHECK(says(mistakes_of("operating_cases: {a.b: {}}\n"), first_line, "operating_cases.a.b",
             "a key with dots"));
}

TEST_CASE("overlay: a value or a factor put at a key changes that key alone") {
  const auto document = with("");
  const auto more = case_io::with_factor(document, "streams.shell_side.flow", 1.2);
  CHECK(case_io::build(more).problem.shell_side.mass_flow == doctest::Approx(1.2 * 21.5).epsilon(1e-14));
  const auto warm = case_io::with_value(document, "streams.tube_side.inlet.temperature", "31 degC");
  CHECK(case_io::build(warm).problem.tube_side.inlet_temperature == doctest::Approx(304.15).epsilon(1e-14));
  CHECK(case_io::build(warm).problem.shell_side.mass_flow == 21.5);
  const auto both = case_io::with_factor(more, "streams.shell_side.flow", 0.5);
  CHECK(case_io::build(both).problem.shell_side.mass_flow == doctest::Approx(0.6 * 21.5).epsilon(1e-14));
  CHECK_THROWS_AS(case_io::with_value(document, "streams.shell_side.flwo", "1 kg/s"), case_io::InputError);
  CHECK_THROWS_AS(case_io::with_value(document, "streams", "1 kg/s"), case_io::InputError);
  CHECK_THROWS_AS(case_io::with_factor(document, "streams.shell_side.allowable_pressure_drop", 2.0),
                  case_io::InputError);
  CHECK_THROWS_AS(case_io::overlaid(document, "none"), std::invalid_argument);
}

TEST_CASE("overlay: inputs show the factor behind the text, at the overlay's line") {
  const auto cases = case_io::build_all(with("operating_cases:\n  more: {streams.shell_side.flow: x1.15}\n"));
  const auto& inputs = cases[0].inputs;
  const auto flow = std::ranges::find(inputs, "streams.shell_side.flow", &Input::key);
  REQUIRE(flow != inputs.end());
  CHECK(flow->as_typed == "21.5 kg/s x1.15");
  CHECK(flow->si == doctest::Approx(24.725).epsilon(1e-14));
  CHECK(flow->line == first_line + 1);
}

TEST_CASE("overlay: help knows the blocks and the keys in them") {
  CHECK(case_io::explain("operating_cases").has_value());
  CHECK(case_io::explain("accepted.0.because").has_value());
  CHECK(case_io::explain("present.since").has_value());
  const auto key = case_io::explain("operating_cases.design.streams.shell_side.flow");
  REQUIRE(key.has_value());
  CHECK(key->key == "streams.shell_side.flow");
  CHECK(case_io::schema().find("\"operating_cases\"") != std::string::npos);
  CHECK(case_io::starter_case().find("# operating_cases:") != std::string::npos);
}
