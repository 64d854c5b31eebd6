#include <doctest/doctest.h>
#include <fmt/format.h>
#include <sys/stat.h>
#include <unistd.h>

#include <algorithm>
#include <cmath>
#include <filesystem>
#include <fstream>
#include <thread>

#include "case_io_good.hpp"
#include "dutygauge/case_io.hpp"
#include "support.hpp"

namespace units = dutygauge::units;
namespace fluids = dutygauge::fluids;
namespace service = dutygauge::service;
using dutygauge::case_io::build;
using dutygauge::case_io::Case;
using dutygauge::case_io::Document;
using dutygauge::case_io::InputError;
using dutygauge::case_io::read_document;
using dutygauge::case_io::read_file;
using support::relative;
using units::Kind;

namespace {

Case built(std::string_view text) {
  return build(read_document(text, "good.yaml"));
}

bool is_assumed(const Case& a_case, std::string_view key) {
  return std::ranges::any_of(a_case.assumed, [&](const auto& line) { return line.key == key; });
}

/// Every case file of the repository.
std::vector<std::string> case_files() {
  std::vector<std::string> files;
  for (const auto& entry : std::filesystem::directory_iterator(SOURCE_DIR "/cases"))
    if (entry.path().extension() == ".yaml") files.push_back(entry.path().string());
  std::ranges::sort(files);
  return files;
}

/// The case with every single quantity written in a system's units, 17 digits.
Document rewritten(Document document, units::System system) {
  const Case original = build(document);
  for (const auto& input : original.inputs) {
    const auto unit = units::shown_unit(input.kind, system);
    auto leaf = document.leaves.find(input.key);
    if (input.is_word || unit.empty() || leaf == document.leaves.end()) continue;
    std::string& text = leaf->second.text;
    if (text.find("->") != std::string::npos) continue;
    const auto at = text.find(" at ");
    const std::string place = at == std::string::npos ? "" : text.substr(at);
    const bool is_absolute = input.kind == Kind::pressure;
    text = is_absolute ? fmt::format("{:.17g} {}", units::from_si(input.si, "psia", input.kind), "psia")
                       : fmt::format("{:.17g} {}{}", units::from_si(input.si, unit, input.kind), unit, place);
  }
  return document;
}

/// Numbers that hold a whole problem, in a fixed order.
std::vector<double> numbers_of(const Case& a_case) {
  const auto& [exchanger, shell, tube, methods, factors] = a_case.problem;
  std::vector<double> numbers = {
      exchanger.area,
      exchanger.effective_length,
      exchanger.tube_side.inside_diameter,
      exchanger.tube_side.flow_area,
      exchanger.tube_side.friction_length,
      exchanger.tube_side.roughness,
      exchanger.tube_side.nozzle_in_area,
      exchanger.shell_side.inside_diameter,
      exchanger.shell_side.pitch,
      exchanger.shell_side.baffle_cut,
      exchanger.shell_side.central_spacing,
      exchanger.shell_side.inlet_spacing,
      exchanger.shell_side.outlet_spacing,
      exchanger.shell_side.tube_to_baffle,
      exchanger.shell_side.bundle_to_shell,
      exchanger.shell_side.nozzle_out_area,
      exchanger.tubes_drawn ? exchanger.wall_conductivity.at(320.0) : exchanger.layer_resistance,
      factors.tube_film,
      factors.shell_film};
  for (const auto* stream : {&shell, &tube}) {
    const auto state = fluids::state(stream->fluid, stream->inlet_temperature, stream->inlet_pressure);
    for (const double value :
         {stream->mass_flow, stream->inlet_temperature, stream->inlet_pressure, stream->fouling_resistance,
          state.density, state.heat_capacity, state.conductivity, state.viscosity})
      numbers.push_back(value);
  }
  for (const auto& demand : a_case.service.demands) numbers.push_back(demand.limit);
  numbers.push_back(a_case.service.shell_side_allowable_drop.value_or(0.0));
  numbers.push_back(a_case.service.tube_side_allowable_drop.value_or(0.0));
  return numbers;
}

}  // namespace

TEST_CASE("case_io: keys, values, blocks and list items know where they stand") {
  const auto document = read_document("a: 1\nb:\n  \xC3\xB6l: \"x y\"\n  c: [5, 6]\nd:\ne: 2\n", "x");
  const auto at = [](const dutygauge::case_io::Position& p) { return std::pair(p.line, p.column); };
  CHECK(at(document.leaves.at("a").key_at) == std::pair(1, 1));
  CHECK(at(document.leaves.at("a").value_at) == std::pair(1, 4));
  CHECK(at(document.leaves.at("b.\xC3\xB6l").key_at) == std::pair(3, 3));
  CHECK(at(document.leaves.at("b.\xC3\xB6l").value_at) == std::pair(3, 7));  // characters, not bytes
  CHECK(document.leaves.at("b.\xC3\xB6l").quoted);
  CHECK(at(document.leaves.at("b.c.1").value_at) == std::pair(4, 10));
  CHECK(at(document.blocks.at("b").at) == std::pair(2, 1));
  CHECK(document.blocks.at("b.c").is_list);
  CHECK(at(document.leaves.at("d").value_at) == std::pair(5, 1));  // nothing there: where its key stands
  CHECK(document.leaves.at("d").text.empty());
}

TEST_CASE("case_io: the checksum is SHA-256 of the bytes") {
  // Of the five bytes "a: 1\n", by sha256sum (GNU coreutils).
  CHECK(read_document("a: 1\n", "x").sha256 ==
        "37b128c59f1f5097f73f82691cb519f1f568667faab5ced1b4ab979d36837eae");
  CHECK(read_document("\xEF\xBB\xBF"
                      "a: 1\n",
                      "x")
            .sha256 != read_document("a: 1\n", "x").sha256);
}

TEST_CASE("case_io: of a doubled key the first holds, and both it and other mistakes are told") {
  const auto document = read_document("a: 1\na: {b: 2}\na: 3\nc: 4\n", "x");
  CHECK(document.leaves.at("a").text == "1");
  CHECK(document.leaves.at("c").text == "4");
  CHECK(!document.leaves.contains("a.b"));
  REQUIRE(document.mistakes.size() == 2);
  CHECK(document.mistakes[0].at.line == 2);
}

TEST_CASE("case_io: a byte-order mark and CR LF change nothing") {
  std::string text = "\xEF\xBB\xBF";
  for (const char c : good::oil_cooler) text += c == '\n' ? std::string("\r\n") : std::string(1, c);
  const Case a_case = built(text), plain = built(good::oil_cooler);
  CHECK(numbers_of(a_case) == numbers_of(plain));
  CHECK(a_case.title == "Oil cooler of the tests");
}

TEST_CASE("case_io: a good case has the numbers it was given") {
  const Case a_case = built(good::oil_cooler);
  CHECK(a_case.file == "good.yaml");
  CHECK(a_case.title == "Oil cooler of the tests");
  CHECK(a_case.tag == "T-1");
  CHECK(a_case.display == units::System::metric);
  const auto& exchanger = a_case.problem.exchanger;
  const double pi = std::acos(-1.0);
  CHECK(relative(exchanger.area, pi * 0.01905 * (4.88 - 2 * 0.045) * 204) < 1e-12);
  CHECK(relative(exchanger.tube_side.inside_diameter, 0.01905 - 2 * 0.00211) < 1e-12);
  CHECK(exchanger.tubes_open == 204);
  CHECK(exchanger.shell_side.tube_count == 208);
  CHECK(exchanger.shell_side.layout == 30);
  CHECK(relative(exchanger.shell_side.baffle_cut, 0.25) < 1e-12);
  CHECK(exchanger.shell_side.pass_lane_half_width == 0.0);
  const auto& oil = a_case.problem.shell_side;
  CHECK(oil.name == "oil");
  CHECK(oil.mass_flow == 21.5);
  CHECK(oil.inlet_temperature == doctest::Approx(341.15).epsilon(1e-14));
  CHECK(oil.inlet_pressure == doctest::Approx(6e5).epsilon(1e-14));
  CHECK(oil.fouling_resistance == 0.00018);
  const auto& water = a_case.problem.tube_side;
  const auto made = fluids::make_water(302.15, 4e5);
  CHECK(relative(water.mass_flow, 62.0 / 3600.0 * fluids::state(made.fluid, 302.15, 4e5).density) < 1e-12);
  REQUIRE(a_case.service.demands.size() == 2);
  CHECK(a_case.service.demands[0].quantity == service::Quantity::shell_side_outlet);
  CHECK(!a_case.service.demands[0].at_least);
  CHECK(a_case.service.demands[0].limit == doctest::Approx(331.15).epsilon(1e-14));
  CHECK(a_case.service.demands[1].limit == 400e3);
  CHECK(a_case.service.shell_side_allowable_drop == 100e3);
  CHECK(a_case.assumed.empty());
}

TEST_CASE("case_io: every leaf is an input with its text, value and line") {
  const Case a_case = built(good::oil_cooler);
  const auto document = read_document(good::oil_cooler, "x");
  CHECK(a_case.inputs.size() == document.leaves.size());
  const auto find = [&](std::string_view key) {
    const auto found = std::ranges::find(a_case.inputs, key, &dutygauge::Input::key);
    REQUIRE(found != a_case.inputs.end());
    return *found;
  };
  const auto wall = find("exchanger.tubes.wall");
  CHECK(wall.as_typed == "2.11 mm");
  CHECK(relative(wall.si, 0.00211) < 1e-12);
  CHECK(wall.kind == Kind::length);
  CHECK(wall.line == 15);
  CHECK(wall.origin == "typed");
  CHECK(find("exchanger.tema").is_word);
  CHECK(find("streams.tube_side.flow").kind == Kind::volume_flow);
  CHECK(find("streams.shell_side.flow").kind == Kind::mass_flow);
}

TEST_CASE("case_io: what is left open is assumed, with its key") {
  auto text = good::with(", phase: liquid", "");
  text = good::with("62 m3/h at inlet", "62 m3/h", text);
  text = good::with("4 bara", "4 bar", text);
  text =
      good::with("methods: {tube_side: gnielinski, shell_side: bell_delaware, solution: mean}\n", "", text);
  const Case a_case = built(text);
  for (const char* key : {"streams.shell_side.fluid.constant.phase", "streams.tube_side.flow",
                          "streams.tube_side.inlet.pressure"})
    CHECK_MESSAGE(is_assumed(a_case, key), key);
  const auto pressure =
      std::ranges::find(a_case.assumed, "streams.tube_side.inlet.pressure", &dutygauge::Assumption::key);
  CHECK(pressure->low == doctest::Approx(4e5));
  CHECK(pressure->high == doctest::Approx(4e5 + 101325.0));
  // The methods' defaults are part of the format, not a guess about the exchanger.
  CHECK(a_case.problem.methods.solution == dutygauge::rating::Solution::march);
}

TEST_CASE("case_io: a least wall is rated above its gauge, with a span") {
  const Case a_case = built(good::with("wall: 2.11 mm", "wall: 14 BWG min"));
  CHECK(relative(a_case.problem.exchanger.as_described.tube_wall, 1.10 * 0.083 * 0.0254) <
        1e-9);  // 14 BWG: 0.083 in
  REQUIRE(a_case.assumed.size() == 1);
  CHECK(a_case.assumed[0].key == "exchanger.tubes.wall");
  CHECK(a_case.assumed[0].low.value_or(0) < a_case.assumed[0].value);
  CHECK(a_case.assumed[0].high.value_or(0) > a_case.assumed[0].value);
}

TEST_CASE("case_io: the same case in SI and in US units is the same problem") {
  for (const auto& file : case_files()) {
    CAPTURE(file);
    const auto document = read_file(file);
    const auto original = numbers_of(build(document));
    for (const auto system : {units::System::si, units::System::us}) {
      const auto other = numbers_of(build(rewritten(document, system)));
      REQUIRE(other.size() == original.size());
      for (std::size_t i = 0; i < other.size(); ++i)
        CHECK_MESSAGE(relative(other[i], original[i]) < 1e-12, i);
    }
  }
  const auto document = read_document(good::oil_cooler, "x");
  const auto original = numbers_of(build(document)),
             other = numbers_of(build(rewritten(document, units::System::us)));
  for (std::size_t i = 0; i < other.size(); ++i) CHECK_MESSAGE(relative(other[i], original[i]) < 1e-12, i);
}

TEST_CASE("case_io: a case is varied by the text of its leaves") {
  auto document = read_document(good::oil_cooler, "x");
  const double area = build(document).problem.exchanger.area;
  document.leaves.at("exchanger.tubes.plugged").text = "0";
  CHECK(relative(build(document).problem.exchanger.area, area * 208.0 / 204.0) < 1e-12);
  document.leaves.at("exchanger.tubes.plugged").text = "4";
  CHECK(build(document).problem.exchanger.area == area);
}

TEST_CASE("case_io: counts may be given the other way round") {
  auto text = good::with("    count: 208\n", "    u_tubes: 104\n");
  text = good::with("tema: AES", "tema: AEU", text);
  const Case u_tubes = built(text);
  CHECK(u_tubes.problem.exchanger.shell_side.tube_count == 208);
  const Case rooms = built(good::with("spacing: 150 mm,", "compartments: 29,"));
  CHECK(rooms.problem.exchanger.shell_side.baffles == 28);
  const Case by_pass = built(good::with("plugged: 4", "plugged: [3, 1]"));
  CHECK(by_pass.problem.exchanger.tubes_open == 204);
  CHECK(by_pass.problem.exchanger.as_described.plugged_per_pass == std::vector{3, 1});
}

TEST_CASE("case_io: fluids come by name, as constants, columns and rows") {
  const auto two = built(good::with(
      "fluid: water",
      "fluid: {two_point: {phase: liquid, at: 45 -> 29 degC, density: 990 -> 996 kg/m3, "
      "heat_capacity: 4.18 -> 4.17 kJ/kg.K, conductivity: 0.64 -> 0.61 W/m.K, viscosity: 0.6 -> 0.82 cP}}"));
  CHECK(fluids::state(two.problem.tube_side.fluid, 302.15, 4e5).density ==
        doctest::Approx(996.0).epsilon(1e-12));
  const auto table = built(good::with("fluid: water",
                                      "fluid: {table: {phase: liquid, rows: ["
                                      "{temperature: 20 degC, density: 998 kg/m3, heat_capacity: 4.18 "
                                      "kJ/kg.K, conductivity: 0.60 W/m.K, viscosity: 1 cP},"
                                      "{temperature: 50 degC, density: 988 kg/m3, heat_capacity: 4.18 "
                                      "kJ/kg.K, conductivity: 0.64 W/m.K, viscosity: 0.55 cP}]}}"));
  CHECK(fluids::state(table.problem.tube_side.fluid, 293.15, 4e5).viscosity ==
        doctest::Approx(1e-3).epsilon(1e-12));
}

TEST_CASE("case_io: a volume flow is measured where it says") {
  const auto made = fluids::make_water(302.15, 4e5);
  const auto at_60 = built(good::with("62 m3/h at inlet", "62 m3/h at 60 degF"));
  // A liquid has the pressure of the inlet there, 4 bara in this case.
  const double density = fluids::state(made.fluid, units::to_si(60, "degF", Kind::temperature), 4e5).density;
  CHECK(relative(at_60.problem.tube_side.mass_flow, density * 62.0 / 3600.0) < 1e-12);
}

TEST_CASE("case_io: a fluid can be read alone") {
  const auto water = dutygauge::case_io::read_fluid_spec("water", 300.0, 1e5);
  CHECK(water.fluid.name == "water");
  const auto made = dutygauge::case_io::read_fluid_spec(
      "{constant: {density: 865 kg/m3, heat_capacity: 2050 J/kg.K, conductivity: 0.13 W/m.K, viscosity: 22 "
      "cP}}",
      300.0, 1e5);
  CHECK(fluids::state(made.fluid, 300.0, 1e5).density == 865.0);
  REQUIRE(made.assumed.size() == 1);
  CHECK(made.assumed[0].word == "liquid");
  try {
    dutygauge::case_io::read_fluid_spec("watr", 300.0, 1e5);
    FAIL("not refused");
  } catch (const InputError& error) {
    REQUIRE(error.lines().size() == 1);
    CHECK(error.lines()[0].starts_with("fluid:1:1: error: fluid: 'watr'"));
  }
  CHECK_THROWS_AS(dutygauge::case_io::read_fluid_spec("{constant: {density: 865 kg/m3}}", 300.0, 1e5),
                  InputError);
  CHECK_THROWS_AS(dutygauge::case_io::read_fluid_spec("water\nb: 1", 300.0, 1e5), InputError);
  CHECK_THROWS_AS(dutygauge::case_io::read_fluid_spec("", 300.0, 1e5), InputError);
}

TEST_CASE("case_io: files and pipes are read, other things are refused in the system's words") {
  const auto folder = std::filesystem::temp_directory_path() / fmt::format("case_io_test.{}", ::getpid());
  std::filesystem::create_directories(folder);
  const auto refusal = [](const std::string& path) {
    try {
      read_file(path);
    } catch (const InputError& error) {
      return error.lines().front();
    }
    return std::string();
  };
  CHECK(refusal(folder.string()).find("is a folder") != std::string::npos);
  CHECK(refusal((folder / "none.yaml").string()).find("No such file or directory") != std::string::npos);
  CHECK(refusal("/dev/null").find("neither a file nor a pipe") != std::string::npos);
  const auto big = folder / "big.yaml", pipe = folder / "pipe";
  std::ofstream(big) << "title: " << std::string(5'000'000, 'x') << "\n";
  CHECK(refusal(big.string()).find("larger than 4 MB") != std::string::npos);
  REQUIRE(::mkfifo(pipe.c_str(), 0600) == 0);
  std::thread writer([&] { std::ofstream(pipe) << good::oil_cooler; });
  const auto document = read_file(pipe.string());
  writer.join();
  CHECK(document.leaves.at("tag").text == "T-1");
  std::filesystem::remove_all(folder);
}
