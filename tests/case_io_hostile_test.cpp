#include <doctest/doctest.h>

#include <chrono>

#include "case_io_good.hpp"
#include "case_io_refused.hpp"

using dutygauge::case_io::read_file;
using good::and_also;
using good::with;
using namespace refused;

namespace {

struct File {
  std::string name;
  Fragments fragments;
};

}  // namespace

TEST_CASE("case_io: files that are no case are refused where they stop being one") {
  const std::vector<File> rows = {
      {"alias-bomb.yaml", {":1:4: error:", "anchors"}},
      {"two-documents.yaml", {":2:1: error:", "second document"}},
      {"binary.yaml", {":1:1: error:", "control character"}},
      {"nul.yaml", {":2:9: error:", "control character"}},
      {"utf-16.yaml", {":1:1: error:", "UTF-16", "save it as UTF-8"}},
      {"latin-1.yaml", {":2:9: error:", "not UTF-8"}},
      {"tabs.yaml", {":3:1: error:", "tab in the indentation"}},
      {"old-mac.yaml", {":1:13: error:", "carriage return"}},
      {"empty.yaml", {":1:1: error:", "empty"}},
      {"comments-only.yaml", {":1:1: error:", "empty"}},
      {"open-quote.yaml", {":2:8: error:", "never closed"}},
      {"open-bracket.yaml", {"error:", "brackets"}},
      {"a-list.yaml", {":1:1: error:", "a list"}},
      {"a-text.yaml", {":1:1: error:", "blank after each colon"}},
      {"hash-in-value.yaml", {":3:3: error:", "' #'"}},
      {"json-like.yaml", {":1:18: error:", "exchanger: a list stands here"}},
      {"merge.yaml", {":2:13: error:", "merging"}},
      {"tag.yaml", {":1:12: error:", "tags"}},
      {"percent.yaml", {":4:10: error:", "begins with '%'", "quotes"}},
      {"at-sign.yaml", {":2:6: error:", "begins with '@'", "quotes"}},
      {"a-page.yaml", {"error:"}},
      {"no-key.yaml", {":2:1: error:", "key is empty"}},
      {"list-as-key.yaml", {":2:3: error:", "where a key belongs"}},
      {"dotted-key.yaml", {":2:1: error:", "exchanger.tubes.count: a key with dots"}},
  };
  for (const File& row : rows) {
    CAPTURE(row.name);
    std::vector<std::string> lines;
    try {
      build(read_file(TEST_DATA "/hostile/" + row.name));
    } catch (const InputError& error) {
      lines = error.lines();
    }
    CHECK_MESSAGE(has_line_with(lines, row.fragments), shown(lines));
  }
}

TEST_CASE("case_io: files made to exhaust the reader are refused at once") {
  const int deep = 20'000;
  std::string indented;
  for (int i = 0; i < 400; ++i) indented += std::string(static_cast<std::size_t>(i), ' ') + "a:\n";
  const std::vector<Text> rows = {
      {"lists in lists",
       "a: " + repeated("[", deep) + repeated("]", deep),
       {":1:36: error:", "nested too deeply"}},
      {"maps in maps", "a: " + repeated("{a: \n", deep) + repeated("}", deep), {"nested more than 32 deep"}},
      {"lists in lists, a line each",
       "a: " + repeated("[\n", deep) + repeated("]", deep),
       {"nested more than 32 deep"}},
      {"indented blocks", indented, {":33:33: error:", "nested more than 32 deep"}},
      {"too many entries", "a: [" + repeated("x,\n", 100'001) + "]", {"more than 100000 keys and values"}},
      {"too many keys", repeated("a: 1\n", 60'000), {"more than 100000 keys and values"}},
      {"a very long line", "title: " + repeated("x", 1'000'000), {":1:1: error:", "a line of 1000007 bytes"}},
      {"a very long text",
       "title: |\n" + repeated("  x y z\n", 10'000),
       {":1:8: error: title:", "at most 4096 bytes"}},
      {"a long list on one line", "a: [" + repeated("x,", 1'000'000) + "]", {"a line of"}},
      {"five megabytes", repeated("# nothing\n", 500'000), {"larger than 4 MB"}},
      {"quotes without end", "a: \"" + repeated("\n", 1'000'000), {":1:4: error:", "never closed"}},
      {"documents without end", repeated("---\n", 500'000), {":2:1: error:", "second document"}},
  };
  const auto start = std::chrono::steady_clock::now();
  check(rows);
  const std::chrono::duration<double> taken = std::chrono::steady_clock::now() - start;
  CHECK(taken.count() < 30.0);  // about 1 s; a slow or checked build takes longer
}

TEST_CASE("case_io: keys that are missing, misspelt, doubled or in the wrong place are named") {
  check({
      {"missing",
       with("    length: 4.88 m\n", ""),
       {"x:10:3: error: exchanger.tubes.length: is missing", "a length such as"}},
      {"missing fouling",
       with("    fouling: 0.00018 m2.K/W\n", ""),
       {"x:29:3:", "streams.shell_side.fouling: is missing", "0 m2.K/W for clean"}},
      {"missing block", with("streams:", "document:"), {"x:1:1:", "streams: is missing"}},
      {"missing version", with("dutygauge: 1\n", ""), {"x:1:1:", "dutygauge: is missing"}},
      {"misspelt",
       with("    length:", "    lenght:"),
       {"x:16:5: error: exchanger.tubes.lenght: there is no such key", "write length"}},
      {"misspelt block", with("  baffles:", "  bafles:"), {"x:24:3:", "exchanger.bafles:", "write baffles"}},
      {"hyphen",
       with("    allowable_pressure_drop: 70", "    allowable-pressure-drop: 70"),
       {"x:44:5:", "write allowable_pressure_drop"}},
      {"capitals", with("title:", "TITLE:"), {"x:2:1:", "write title"}},
      {"elsewhere", and_also("pitch: 25 mm"), {"x:49:1: error: pitch:", "belongs under exchanger.tubes"}},
      {"a level too high",
       with("    inlet: {temperature: 68 degC, pressure: 6 bara}",
            "    temperature: 68 degC\n    pressure: 6 bara"),
       {"x:33:5:", "belongs under streams.shell_side.inlet"}},
      {"doubled",
       with("    passes: 2\n", "    passes: 2\n    passes: 4\n"),
       {"x:14:5: error: exchanger.tubes.passes: the key is given twice"}},
      {"unheard of", and_also("colour: red"), {"x:49:1: error: colour:", "one of dutygauge, title"}},
      {"empty value",
       with("length: 4.88 m", "length:"),
       {"x:16:5: error: exchanger.tubes.length: has no value"}},
      {"null", with("length: 4.88 m", "length: ~"), {"x:16:5: error: exchanger.tubes.length: has no value"}},
      {"empty block",
       with("  shell_side_outlet: {at_most: 58 degC}\n  duty: {at_least: 400 kW}\n", ""),
       {"x:45:1: error: service: the block is empty"}},
      {"empty braces", with("{at_least: 400 kW}", "{}"), {"x:47:3: error: service.duty: the block is empty"}},
      {"list for a block",
       with("{at_most: 58 degC}", "[58 degC]"),
       {"x:46:3: error: service.shell_side_outlet: a list stands here"}},
      {"block for a value",
       with("count: 208", "count: {holes: 208}"),
       {"x:11:5: error: exchanger.tubes.count: a block of keys stands here"}},
      {"value for a block",
       with("{at_least: 400 kW}", "400 kW"),
       {"x:47:3: error: service.duty: a single value stands here"}},
      {"block for a list",
       with("fluid: water", "fluid: {table: {rows: " + water_row + "}}"),
       {"x:38:21:", "table.rows: a block of keys stands here"}},
      {"values for rows",
       with("fluid: water", "fluid: {table: {rows: [20 degC, 30 degC]}}"),
       {"table.rows.0: a single value stands here"}},
      {"a row's key",
       with("fluid: water", "fluid: {table: {rows: [" + water_row + ", {temprature: 30 degC}]}}"),
       {"x:38:", "table.rows.1.temprature:", "write temperature"}},
  });
}
