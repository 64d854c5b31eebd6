#include <doctest/doctest.h>
#include <fcntl.h>
#include <unistd.h>

#include <algorithm>
#include <cstdlib>
#include <filesystem>
#include <fstream>
#include <nlohmann/json.hpp>
#include <sstream>
#include <string>
#include <vector>

#include "dutygauge/cli.hpp"
#include "support.hpp"

// The case below is invented: the command line is checked, not the physics.

namespace {

namespace fs = std::filesystem;
using dutygauge::cli::Status;
using Json = nlohmann::ordered_json;

struct Ran {
  int status;
  std::string out, err;
};

Ran run(const std::vector<std::string>& arguments) {
  std::ostringstream out, err;
  const int status = dutygauge::cli::run(arguments, out, err);
  return {status, out.str(), err.str()};
}

// A folder of its own for each test, gone afterwards.
class Folder {
 public:
  Folder() {
    std::string name = (fs::temp_directory_path() / "dutygauge-XXXXXX").string();
    REQUIRE(mkdtemp(name.data()) != nullptr);
    path_ = name;
  }
  ~Folder() { fs::remove_all(path_); }
  Folder(const Folder&) = delete;
  Folder& operator=(const Folder&) = delete;

  std::string path(const std::string& name = "") const { return (path_ / name).string(); }
  std::string write(const std::string& name, const std::string& text) const {
    std::ofstream(path_ / name, std::ios::binary) << text;
    return path(name);
  }

 private:
  fs::path path_;
};

constexpr const char* oil_cooler = R"(dutygauge: 1
title: Test oil cooler
tag: T-1
exchanger:
  tema: BEM
  shells: {in_series: 1, in_parallel: 1}
  shell: {inside_diameter: 489 mm, nozzle_in: 154 mm, nozzle_out: 154 mm}
  tubes: {count: 208, passes: 2, outside_diameter: 19.05 mm, wall: 2.11 mm, length: 4.88 m, tubesheet_thickness: 45 mm,
    pitch: 25.4 mm, layout: 30, conductivity: 111 W/m.K, roughness: 1.5 um, nozzle_in: 128 mm, nozzle_out: 128 mm}
  baffles: {style: single_segmental, cut: 25 %, spacing: 200 mm, thickness: 6 mm}
  clearances: {tube_to_baffle: 0.8 mm, shell_to_baffle: 4.8 mm, bundle_to_shell: 12 mm}
  sealing_strip_pairs: 0
streams:
  shell_side:
    name: oil
    fluid: {constant: {density: 860 kg/m3, heat_capacity: 2000 J/kg.K, conductivity: 0.13 W/m.K, viscosity: 20 mPa.s, phase: liquid}}
    flow: 20 kg/s
    inlet: {temperature: 68 degC, pressure: 6 bara}
    fouling: 0.00018 m2.K/W
    allowable_pressure_drop: 200 kPa
  tube_side:
    name: water
    fluid: {constant: {density: 995 kg/m3, heat_capacity: 4180 J/kg.K, conductivity: 0.62 W/m.K, viscosity: 0.7 mPa.s, phase: liquid}}
    flow: 17 kg/s
    inlet: {temperature: 29 degC, pressure: 4 bara}
    fouling: 0.00035 m2.K/W
    allowable_pressure_drop: 100 kPa
service:
  duty: {at_least: 200 kW}
)";

std::string replaced(std::string text, const std::string& what, const std::string& by) {
  const auto at = text.find(what);
  REQUIRE(at != std::string::npos);
  return text.replace(at, what.size(), by);
}

std::string too_much_asked() {
  return replaced(oil_cooler, "200 kW", "2000 kW");
}

// A trickle of water against hot oil at one bar boils: no result.
std::string boiling() {
  std::string text = replaced(oil_cooler, "temperature: 68 degC", "temperature: 190 degC");
  const auto from = text.rfind("fluid: {constant"), to = text.find('\n', from);
  text.replace(from, to - from, "fluid: water");
  text = replaced(text, "flow: 17 kg/s", "flow: 0.2 kg/s");
  return replaced(text, "pressure: 4 bara", "pressure: 1 bara");
}

std::string misspelt() {
  return replaced(oil_cooler, "baffles:", "bafles:");
}

std::vector<std::string> lines_of(const std::string& text) {
  std::vector<std::string> lines;
  std::istringstream stream(text);
  for (std::string line; std::getline(stream, line);) lines.push_back(line);
  return lines;
}

bool contains(const std::string& text, const std::string& part) {
  return text.find(part) != std::string::npos;
}

}  // namespace

TEST_CASE("cli: without arguments the usage goes to stderr") {
  const auto ran = run({});
  CHECK(ran.status == Status::input_at_fault);
  CHECK(ran.out.empty());
  CHECK(contains(ran.err, "usage: dutygauge COMMAND"));
}

TEST_CASE("cli: help of the program and of every command goes to stdout, examples before options") {
  for (const std::vector<std::string>& call : std::vector<std::vector<std::string>>{{"--help"},
                                                                                    {"-h"},
                                                                                    {"rate", "--help"},
                                                                                    {"rate", "-h"},
                                                                                    {"new", "--help"},
                                                                                    {"schema", "-h"},
                                                                                    {"explain", "--help"}}) {
    const auto ran = run(call);
    CAPTURE(call.front());
    CHECK(ran.status == Status::done);
    CHECK(ran.err.empty());
    CHECK(ran.out.find("Examples:") < ran.out.find("Options:"));
    CHECK(contains(ran.out, "Exit status:"));
    for (const auto& line : lines_of(ran.out)) CHECK(line.size() <= 100);
  }
}

TEST_CASE("cli: version names the program, the version and the build") {
  const auto ran = run({"--version"});
  CHECK(ran.status == Status::done);
  CHECK(ran.out.starts_with("dutygauge 0.1.0 ("));
}

TEST_CASE("cli: an unknown command or option is named with the nearest") {
  const auto command = run({"raet", "x.yaml"});
  CHECK(command.status == Status::input_at_fault);
  CHECK(contains(command.err, "unknown command 'raet' (did you mean 'rate'?)"));
  const auto option = run({"rate", "--jsno", "x.yaml"});
  CHECK(option.status == Status::input_at_fault);
  CHECK(contains(option.err, "unknown option '--jsno' (did you mean '--json'?)"));
  CHECK(option.out.empty());
  CHECK(contains(run({"--versoin"}).err, "did you mean '--version'?"));
  CHECK(contains(run({"--json", "rate", "x.yaml"}).err, "stand behind it"));
}

TEST_CASE("cli: options are not abbreviated, not doubled, and keep their values to themselves") {
  CHECK(contains(run({"rate", "--jso", "x.yaml"}).err, "unknown option '--jso'"));
  CHECK(contains(run({"rate", "--units", "us", "--units", "si", "x.yaml"}).err, "given twice"));
  CHECK(run({"rate", "--json=yes", "x.yaml"}).status == Status::input_at_fault);
  CHECK(contains(run({"rate", "--units", "imperial", "x.yaml"}).err, "expected si, metric or us"));
  for (const char* jobs : {"0", "-1", "two", "1.5", "nan", "1e9"}) {
    CAPTURE(jobs);
    CHECK(run({"rate", std::string("--jobs=") + jobs, "x.yaml"}).status == Status::input_at_fault);
  }
  CHECK(contains(run({"rate", "-q", "-v", "x.yaml"}).err, "contradict"));
  CHECK(contains(run({"rate"}).err, "rate needs a case"));
}

TEST_CASE("cli: the status says whether the service is met") {
  const Folder folder;
  const auto met = run({"rate", folder.write("met.yaml", oil_cooler)});
  CHECK(met.err == "");
  CHECK(met.status == Status::done);
  CHECK(contains(met.out, "ANSWER       Yes"));
  const auto missed = run({"rate", folder.write("missed.yaml", too_much_asked())});
  CHECK(missed.status == Status::not_met);
  CHECK(contains(missed.out, "ANSWER       No"));
  const auto none = run({"rate", folder.write("boiling.yaml", boiling())});
  CHECK(none.status == Status::no_result);
  CHECK(contains(none.out, "No result"));
  const auto fault = run({"rate", folder.write("bad.yaml", misspelt())});
  CHECK(fault.status == Status::input_at_fault);
  CHECK(fault.out.empty());
  CHECK(contains(fault.err, "bad.yaml:"));
  CHECK(contains(fault.err, "bafles"));
  CHECK(run({"rate", folder.path("missing.yaml")}).status == Status::input_at_fault);
}

TEST_CASE("cli: one bad case does not stop the others") {
  const Folder folder;
  const auto good = folder.write("a.yaml", oil_cooler), bad = folder.write("b.yaml", misspelt()),
             missed = folder.write("c.yaml", too_much_asked());
  const auto some = run({"rate", "--json", bad, good, missed});
  CHECK(some.status == Status::no_result);
  const auto lines = lines_of(some.out);
  REQUIRE(lines.size() == 3);
  const auto error = Json::parse(lines[0]);
  CHECK(error["case"]["file"] == "b.yaml");
  CHECK(contains(error["error"].dump(), "bafles"));
  CHECK_FALSE(contains(lines[0], folder.path()));
  CHECK(Json::parse(lines[1])["verdict"]["service_met"] == true);
  CHECK(Json::parse(lines[2])["verdict"]["service_met"] == false);
  CHECK(contains(some.err, "bafles"));
  CHECK(run({"rate", good, missed}).status == Status::not_met);
  CHECK(run({"rate", bad, bad}).status == Status::input_at_fault);
}

TEST_CASE("cli: a folder stands for its cases by name, and jobs change nothing") {
  const Folder folder;
  for (const char* name : {"c.yaml", "a.yaml", "b.yaml", "d.yaml"}) folder.write(name, oil_cooler);
  folder.write("notes.txt", "no case");
  const auto one = run({"rate", "--json", folder.path()});
  const auto lines = lines_of(one.out);
  REQUIRE(lines.size() == 4);
  for (std::size_t i = 0; i < lines.size(); ++i)
    CHECK(Json::parse(lines[i])["case"]["file"] == std::string(1, static_cast<char>('a' + i)) + ".yaml");
  for (const char* jobs : {"2", "4", "7"})
    CHECK(run({"rate", "--json", "--jobs", jobs, folder.path()}).out == one.out);
  CHECK(run({"rate", folder.path(), "--jobs", "3"}).out == run({"rate", folder.path()}).out);
  const Folder empty;
  CHECK(contains(run({"rate", empty.path()}).err, "without a case"));
}

TEST_CASE("cli: units change the page and never the JSON") {
  const Folder folder;
  const auto file = folder.write("a.yaml", oil_cooler);
  CHECK(contains(run({"rate", "--units", "us", file}).out, "degF"));
  CHECK(contains(run({"rate", "--units", "metric", file}).out, "degC"));
  CHECK_FALSE(contains(run({"rate", "--units", "si", file}).out, "degC"));
  const auto json = run({"rate", "--json", file}).out;
  CHECK(run({"rate", "--json", "--units", "us", file}).out == json);
  CHECK(run({"rate", "--json", "--units", "si", file}).out == json);
  CHECK(run({"rate", "--json", file}).out == json);
}

TEST_CASE("cli: standard input is a file named -") {
  const Folder folder;
  const int file = open(folder.write("piped.yaml", oil_cooler).c_str(), O_RDONLY), before = dup(STDIN_FILENO);
  REQUIRE(dup2(file, STDIN_FILENO) == STDIN_FILENO);
  const auto ran = run({"rate", "--json", "-"});
  dup2(before, STDIN_FILENO);
  close(before);
  close(file);
  CHECK(ran.status == Status::done);
  CHECK(Json::parse(ran.out)["case"]["file"] == "-");
  CHECK(contains(run({"rate", "-", "-"}).err, "only once"));
}

TEST_CASE("cli: --strict refuses every assumption by name") {
  const Folder folder;
  const std::string sparse = replaced(oil_cooler, "tubesheet_thickness: 45 mm,", "");
  const auto file = folder.write("a.yaml", sparse);
  CHECK(run({"rate", file}).status == Status::done);
  const auto strict = run({"rate", "--strict", file});
  CHECK(strict.status == Status::input_at_fault);
  CHECK(strict.out.empty());
  CHECK(contains(strict.err, "exchanger.tubes.tubesheet_thickness: left open"));
  const auto json = run({"rate", "--strict", "--json", file});
  CHECK(Json::parse(json.out)["error"].size() >= 1);
}

TEST_CASE("cli: --out writes a whole file and replaces none without --force") {
  const Folder folder;
  const auto file = folder.write("a.yaml", oil_cooler), target = folder.path("result.json");
  const auto first = run({"rate", "--json", file, "--out", target});
  CHECK(first.status == Status::done);
  CHECK(first.out.empty());
  CHECK(support::read_text(target) == run({"rate", "--json", file}).out);
  const auto again = run({"rate", file, "-o", target});
  CHECK(again.status == Status::input_at_fault);
  CHECK(contains(again.err, "--force"));
  CHECK(Json::parse(support::read_text(target)).contains("thermal"));
  CHECK(run({"rate", file, "-o", target, "--force"}).status == Status::done);
  CHECK(contains(support::read_text(target), "ANSWER"));
  CHECK(run({"rate", "--json", file, "-o", "-"}).out == run({"rate", "--json", file}).out);
  CHECK(run({"rate", file, "-o", folder.path("no/such/folder.txt")}).status == Status::cannot_write);
  std::size_t files = 0;
  for ([[maybe_unused]] const auto& entry : fs::directory_iterator(folder.path())) ++files;
  CHECK(files == 2);
  CHECK(run({"rate", folder.path("missing.yaml"), "-o", folder.path("nothing.txt")}).out.empty());
  CHECK_FALSE(fs::exists(folder.path("nothing.txt")));
}

TEST_CASE("cli: a result that cannot be written is status 4") {
  const Folder folder;
  const auto file = folder.write("a.yaml", oil_cooler);
  std::ofstream full("/dev/full");
  std::ostringstream err;
  CHECK(dutygauge::cli::run({"rate", file}, full, err) == Status::cannot_write);
  CHECK(contains(err.str(), "cannot write"));
}

TEST_CASE("cli: notes and details keep to their places") {
  const Folder folder;
  const auto file = folder.write("a.yaml", oil_cooler);
  CHECK(run({"rate", file}).err.empty());
  const auto all = run({"rate", "-v", file});
  CHECK(contains(all.err, "status 0"));
  CHECK(contains(all.out, "SHELL SIDE"));
  CHECK(run({"rate", "-q", file}).out == run({"rate", file}).out);
}

TEST_CASE("cli: the starter case rates as it stands, and explain knows its keys") {
  const Folder folder;
  const auto file = folder.path("new.yaml");
  CHECK(run({"new", "--out", file}).status == Status::done);
  CHECK(run({"rate", file}).status <= Status::not_met);
  CHECK_NOTHROW(Json::parse(run({"schema"}).out));
  const auto entry = run({"explain", "exchanger.baffles.cut"});
  CHECK(entry.status == Status::done);
  CHECK(contains(entry.out, "exchanger.baffles.cut"));
  CHECK(run({"explain", "exchanger.bafles"}).status == Status::input_at_fault);
  CHECK(contains(run({"explain", "exchanger.bafles"}).err, "did you mean 'exchanger.baffles'?"));
  CHECK(run({"explain"}).status == Status::input_at_fault);
  CHECK(run({"schema", "word"}).status == Status::input_at_fault);
}

TEST_CASE("cli: explain knows findings, last parts of names, and what a misspelling means") {
  const auto finding = run({"explain", "rating.mean_misleads"});
  CHECK(finding.status == Status::done);
  for (const char* part : {"rating.mean_misleads\n", "  when:", "above 1 %", "  matters:", "  do:"})
    CHECK(contains(finding.out, part));
  CHECK(contains(run({"explain", "arrangement.few_baffles"}).out, "  source:  K. Gardner"));
  CHECK(run({"explain", "mean_misleads"}).out == finding.out);
  CHECK(run({"explain", "cut", "--json"}).status == Status::done);
  const auto spacing = run({"explain", "spacing"});
  CHECK(spacing.status == Status::done);
  CHECK(contains(spacing.out, "  shellside.spacing\n"));
  CHECK(contains(spacing.out, "  exchanger.baffles.spacing\n"));
  CHECK(!contains(spacing.out, "inlet_spacing"));
  CHECK(Json::parse(run({"explain", "spacing", "--json"}).out)["names"].size() == 2);
  CHECK(run({"explain", "pitch"}).out == run({"explain", "exchanger.tubes.pitch"}).out);
  CHECK(Json::parse(run({"explain", "exchanger.tubes.pitch", "--json"}).out)["kind"] == "a length");
  for (const auto& [typed, meant] :
       {std::pair("rating.mean_mislead", "rating.mean_misleads"),
        std::pair("exchanger.tubes.lenght", "exchanger.tubes.length"), std::pair("spaceing", "spacing")}) {
    const auto refused = run({"explain", typed});
    CHECK(refused.status == Status::input_at_fault);
    CHECK(contains(refused.err, std::string("did you mean '") + meant + "'?"));
  }
  CHECK(!contains(run({"explain", "qqqqqqqqqqqqqqqqqqqqqqqq"}).err, "did you mean"));
}

TEST_CASE("cli: every case of the project gives a page that fits and JSON that stays") {
  std::vector<std::string> files;
  for (const auto& entry : fs::directory_iterator(SOURCE_DIR "/cases"))
    if (entry.path().extension() == ".yaml") files.push_back(entry.path().string());
  REQUIRE(!files.empty());
  for (const auto& file : files) {
    CAPTURE(file);
    const auto json = run({"rate", "--json", file});
    CHECK(json.status <= Status::not_met);
    CHECK(Json::parse(json.out)["case"]["file"] == fs::path(file).filename().string());
    for (const auto& call : {std::vector<std::string>{"rate", "--units", "us", file}, {"rate", "-v", file}}) {
      const auto page = run(call).out;
      CHECK(contains(page, "ANSWER"));
      for (const auto& line : lines_of(page)) {
        const bool fits =
            line.size() <= 100 && std::ranges::all_of(line, [](char c) { return c >= ' ' && c <= '~'; });
        if (!fits) FAIL_CHECK(line);
      }
    }
  }
}
