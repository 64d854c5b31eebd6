#include <doctest/doctest.h>
#include <fmt/format.h>

#include "case_io_good.hpp"
#include "case_io_refused.hpp"

using good::and_also;
using good::with;
using namespace refused;

TEST_CASE("case_io: values that cannot be meant are named with what would do") {
  check({
      {"wrong unit",
       with("4.88 m\n", "4.88 kg\n"),
       {"x:16:13: error: exchanger.tubes.length:", "kg", "a length"}},
      {"no unit", with("4.88 m\n", "4.88\n"), {"x:16:13: error: exchanger.tubes.length:", "unit"}},
      {"decimal comma",
       with("4.88 m\n", "4,88 m\n"),
       {"x:16:13: error: exchanger.tubes.length:", "decimal comma"}},
      {"comma in braces",
       with("inside_diameter: 489 mm", "inside_diameter: 19,25 in"),
       {"x:9:31: error: exchanger.shell.25 in:", "not a comma"}},
      {"comma in brackets",
       with("outside_diameter: 19.05 mm", "outside_diameter: [0,75 in]"),
       {"x:14:5: error: exchanger.tubes.outside_diameter: a list", "not a comma"}},
      {"negative", with("4.88 m\n", "-4.88 m\n"), {"x:16:13:", "'-4.88 m' is negative"}},
      {"zero", with("4.88 m\n", "0 m\n"), {"x:16:13:", "'0 m' is zero"}},
      {"too long", with("4.88 m\n", "4880 m\n"), {"x:16:13:", "above 40 m, the most that is plausible"}},
      {"too many", with("count: 208", "count: 300000"), {"x:11:12:", "above 200000"}},
      {"too hot", with("68 degC", "2000 degC"), {"x:33:26:", "above 1500 degC"}},
      {"below zero kelvin", with("68 degC", "-300 degC"), {"x:33:26:", "absolute zero"}},
      {"not a number", with("4.88 m\n", "nan m\n"), {"x:16:13:", "not a finite number"}},
      {"YAML's not a number", with("4.88 m\n", ".nan\n"), {"x:16:13: error: exchanger.tubes.length:"}},
      {"infinite", with("4.88 m\n", "inf m\n"), {"x:16:13: error: exchanger.tubes.length:"}},
      {"overflow", with("4.88 m\n", "1e999 m\n"), {"x:16:13: error: exchanger.tubes.length:"}},
      {"half a tube", with("count: 208", "count: 208.5"), {"x:11:12:", "whole number"}},
      {"a count with a unit",
       with("count: 208", "count: 208 mm"),
       {"x:11:12: error: exchanger.tubes.count:"}},
      {"bare C", with("68 degC", "68 C"), {"x:33:26:", "degC"}},
      {"gauge on a drop", with("100 kPa", "1 barg"), {"x:35:30:", "gauge"}},
      {"per cent as a number", with("25 %", "25"), {"x:24:43:", "write 25 %"}},
      {"more than half by area", with("25 %", "60 % of area"), {"x:24:43:", "the most that is plausible"}},
      {"a range with an end that cannot be",
       with("pitch: 25.4 mm", "pitch: 0..50 mm"),
       {"x:18:12:", "'0..50 mm' is zero"}},
      {"unknown where nothing could stand for it",
       with("pitch: 25.4 mm", "pitch: unknown"),
       {"x:18:12: error: exchanger.tubes.pitch: is 'unknown'", "this value is needed"}},
      {"yes for true",
       with("nozzle_out: 154 mm}", "nozzle_out: 154 mm, impingement_plate: yes}"),
       {"x:9:94:", "write true"}},
      {"off for false",
       with("nozzle_out: 154 mm}", "nozzle_out: 154 mm, impingement_plate: off}"),
       {"x:9:94:", "true or false"}},
      {"no for a phase", with("phase: liquid", "phase: no"), {"x:31:", "liquid or gas"}},
      {"a word misspelt", with("display: metric", "display: metrc"), {"x:4:10:", "write metric"}},
      {"a layout there is not", with("layout: 30", "layout: 35"), {"x:19:13:", "30, 45, 60 or 90"}},
      {"small letters", with("tema: AES", "tema: aes"), {"x:6:9:", "three capital letters"}},
      {"a newer format", with("dutygauge: 1", "dutygauge: 2"), {"x:1:12:", "not a version"}},
      {"control characters are not echoed", with("layout: 30", "layout: \"\\e[31m30\""), {"x:19:13:"}},
      {"a value as long as a page",
       with("4.88 m\n", std::string(3000, '4') + " m\n"),
       {"x:16:13:", "too long"}},
      {"one column for two",
       with("fluid: water", "fluid: {two_point: {at: 20 degC}}"),
       {"x:38:29:", "not a pair"}},
  });
}

TEST_CASE("case_io: exchangers and services that cannot be are named at their key") {
  check({
      {"pitch below the tube",
       with("pitch: 25.4 mm", "pitch: 18 mm"),
       {"x:18:12: error: exchanger.tubes.pitch:"}},
      {"wall too thick", with("wall: 2.11 mm", "wall: 10 mm"), {"x:15:11: error: exchanger.tubes.wall:"}},
      {"an F shell with one pass",
       with("passes: 2", "passes: 1", with("tema: AES", "tema: AFS")),
       {"x:13:13: error: exchanger.tubes.passes:", "an even number"}},
      {"one pass of U-tubes",
       with("passes: 2", "passes: 1", with("tema: AES", "tema: AEU")),
       {"x:13:13: error: exchanger.tubes.passes:"}},
      {"too many tubes for the shell",
       with("count: 208", "count: 2080"),
       {"x:11:12: error: exchanger.tubes.count:", "do not fit"}},
      {"everything plugged",
       with("plugged: 4", "plugged: 208"),
       {"x:12:14: error: exchanger.tubes.plugged:"}},
      {"plugging of three passes",
       with("plugged: 4", "plugged: [1, 2, 1]"),
       {"x:12:5: error: exchanger.tubes.plugged:"}},
      {"no baffle spacing",
       with("spacing: 150 mm, inlet_spacing: 295 mm, outlet_spacing: 295 mm, ", ""),
       {"x:24:3: error: exchanger.baffles.spacing:"}},
      {"count and compartments",
       with("spacing: 150 mm,", "count: 27, compartments: 27,"),
       {"exchanger.baffles.compartments:"}},
      {"U-tubes in a floating head",
       with("count: 208", "u_tubes: 104"),
       {"x:11:14: error: exchanger.tubes.u_tubes:"}},
      {"U-tubes and holes differ",
       with("count: 208", "count: 208\n    u_tubes: 100", with("tema: AES", "tema: AEU")),
       {"x:12:14:", "200 holes"}},
      {"material and conductivity",
       with("    roughness:", "    conductivity: 111 W/m.K\n    roughness:"),
       {"x:21:19: error: exchanger.tubes.conductivity:"}},
      {"neither",
       with("    material: admiralty brass\n", ""),
       {"x:10:3: error: exchanger.tubes.material: is missing", "or conductivity"}},
      {"a material misspelt", with("admiralty brass", "admirality brass"), {"x:20:15:", "admiralty brass"}},
      {"a kettle", with("tema: AES", "tema: AKT"), {"x:6:9:", "boils on the shell side"}},
      {"Kern in a crossflow shell",
       with("shell_side: bell_delaware", "shell_side: kern", with("tema: AES", "tema: AXS")),
       {"x:48:", "methods.shell_side", "bell_delaware"}},
      {"a head there is not", with("tema: AES", "tema: ZES"), {"x:6:9: error: exchanger.tema:"}},
      {"another baffle",
       with("single_segmental", "double_segmental"),
       {"x:24:20: error: exchanger.baffles.style:"}},
      {"parallel flow with two passes",
       with("  orientation:", "  flow_direction: parallel\n  orientation:"),
       {"x:7:19: error: exchanger.flow_direction:"}},
      {"equal inlets",
       with("temperature: 29 degC", "temperature: 68 degC"),
       {"x:41:20: error: streams.tube_side.inlet.temperature:"}},
      {"water that boils",
       with("temperature: 29 degC", "temperature: 143.61 degC"),
       {"x:38:12: error: streams.tube_side.fluid:", "steam"}},
      {"a datum that decides the phase",
       with("temperature: 29 degC\n      pressure: 4 bara", "temperature: 110 degC\n      pressure: 1 bar"),
       {"x:42:17: error: streams.tube_side.inlet.pressure:", "absolute or gauge"}},
      {"a gas without a datum",
       with("phase: liquid", "phase: gas", with("6 bara", "6 bar")),
       {"x:33:45:", "absolute or gauge"}},
      {"a gas volume without a place",
       with("phase: liquid", "phase: gas", with("21.5 kg/s", "90 m3/h")),
       {"x:32:11: error: streams.shell_side.flow:", "where"}},
      {"a standard volume of a constant gas",
       with("phase: liquid", "phase: gas", with("21.5 kg/s", "90 Nm3/h")),
       {"x:32:11: error: streams.shell_side.flow:"}},
      {"a flow measured as steam",
       with("at inlet", "at 300 degC"),
       {"x:39:11: error: streams.tube_side.flow:"}},
      {"a fluid misspelt", with("fluid: water", "fluid: watr"), {"x:38:12:", "write water"}},
      {"a family without values", with("fluid: water", "fluid: table"), {"x:38:12:", "needs its properties"}},
      {"two families",
       with("fluid: water", "fluid: {constant: {density: 1 kg/m3}, table: {rows: [" + water_row + "]}}"),
       {"x:38:5:", "both given"}},
      {"one row",
       with("fluid: water", "fluid: {table: {rows: [" + water_row + "]}}"),
       {"x:38:21: error: streams.tube_side.fluid.table.rows:"}},
  });
}

TEST_CASE("case_io: what this version does not read is refused by name") {
  for (const char* key : {"requirements", "guarantee", "inquiry", "bidder"})
    check({{key,
            and_also(std::string(key) + ": {a: 1}"),
            {"x:49:1:", std::string(key) + ": not read yet", "leave the block out"}}});
  check({
      {"bidder", with("methods:", "bidder: Somebody\nmethods:"), {"x:48:", "not read yet"}},
  });
}

TEST_CASE("case_io: all mistakes of a file come at once, in file order") {
  auto text = with("    length: 4.88 m\n", "    lenght: 4.88 m\n");
  text = with("pitch: 25.4 mm", "pitch: 18 mm", text);  // told although the length is not known
  text = with("25 %", "60 %", text);
  text = with("68 degC", "68 C", text);
  text = with("fluid: water", "fluid: watr", text);
  text = with("tag: T-1\n", "tag: T-1\ntag: T-2\n", text);
  const auto lines = lines_of(text);
  REQUIRE_MESSAGE(lines.size() == 6, shown(lines));
  const char* starts[] = {"x:4:1: error: tag:",
                          "x:17:5: error: exchanger.tubes.lenght:",
                          "x:19:12: error: exchanger.tubes.pitch:",
                          "x:25:43: error: exchanger.baffles.cut:",
                          "x:34:26: error: streams.shell_side.inlet.temperature:",
                          "x:39:12: error: streams.tube_side.fluid:"};
  for (std::size_t i = 0; i < lines.size(); ++i) CHECK_MESSAGE(lines[i].starts_with(starts[i]), lines[i]);
}

TEST_CASE("case_io: after twenty mistakes the rest are counted") {
  std::string text(good::oil_cooler);
  for (int i = 0; i < 33; ++i) text += fmt::format("nothing_{}: 1\n", i);
  const auto lines = lines_of(text);
  REQUIRE(lines.size() == 21);
  CHECK(lines.back() == "x: and 13 more mistakes");
}

TEST_CASE("case_io: a misspelt or abbreviated key is one mistake, whatever it was required for") {
  const std::pair<const char*, const char*> typed[] = {
      {"    material:", "    mterial:"}, {"    length:", "    len:"},  {"  baffles:", "  baffels:"},
      {"  baffles:", "  baff:"},         {"  shell_side:", "  shel:"}, {"temperature: 68", "temp: 68"},
      {"    passes:", "    pases:"},     {"streams:", "stream:"},      {"    material:", "    mate:"}};
  for (const auto& [right, wrong] : typed) {
    CAPTURE(wrong);
    const auto lines = refused::lines_of(good::with(right, wrong));
    CHECK_MESSAGE(lines.size() == 1, refused::shown(lines));
  }
}
