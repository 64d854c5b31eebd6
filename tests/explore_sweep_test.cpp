#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <nlohmann/json.hpp>
#include <sstream>

#include "dutygauge/cli.hpp"
#include "dutygauge/explore.hpp"

using namespace dutygauge;

namespace {

const std::string solvent_cooler = SOURCE_DIR "/cases/lean-solvent-cooler.yaml";

explore::Variation variation(const case_io::Document& document, const char* key, const char* range) {
  const auto read = explore::read_variation(*explore::dial(document, key), range);
  REQUIRE(std::holds_alternative<explore::Variation>(read));
  return std::get<explore::Variation>(read);
}

struct Ran {
  int status;
  std::string out, err;
};

Ran run(const std::vector<std::string>& arguments) {
  std::ostringstream out, err;
  const int status = cli::run(arguments, out, err);
  return {status, out.str(), err.str()};
}

std::size_t longest_line(const std::string& text) {
  std::size_t longest = 0, from = 0;
  for (std::size_t end = text.find('\n'); end != std::string::npos; end = text.find('\n', from)) {
    longest = std::max(longest, end - from);
    from = end + 1;
  }
  return longest;
}

}  // namespace

TEST_CASE("explore: a point of a sweep is the rating of the case with that value") {
  const auto document = case_io::read_file(solvent_cooler);
  const auto varied = variation(document, "streams.tube_side.inlet.temperature", "26..34 degC:9");
  CHECK(varied.values.size() == 9);
  CHECK(varied.values[2] == doctest::Approx(28.0 + 273.15));
  const auto sweep = explore::sweep(document, {varied});
  const auto rated = explore::rate(case_io::build(document));
  CHECK(sweep.rows[2].running->duty == doctest::Approx(rated.assessment.rating.outcome->duty).epsilon(1e-9));
  CHECK(*sweep.rows[2].running->duty_margin == doctest::Approx(*rated.assessment.margins.duty).epsilon(1e-9));
  // Colder water does more.
  for (std::size_t i = 0; i + 1 < sweep.rows.size(); ++i)
    CHECK(sweep.rows[i].running->duty > sweep.rows[i + 1].running->duty);
}

TEST_CASE("explore: factors act on the case's own value, volume flows keep their basis") {
  const auto document = case_io::read_file(solvent_cooler);
  const auto varied = variation(document, "streams.tube_side.flow", "x0.8..x1.2:5");
  CHECK(varied.values[2] == doctest::Approx(*varied.dial.own));
  const auto a_case = case_io::build(explore::turned(document, varied.dial, varied.values[4]));
  const auto own = case_io::build(document);
  CHECK(a_case.problem.tube_side.mass_flow ==
        doctest::Approx(1.2 * own.problem.tube_side.mass_flow).epsilon(1e-12));
}

TEST_CASE("explore: of two variations the last runs fastest") {
  const auto document = case_io::read_file(solvent_cooler);
  const auto sweep = explore::sweep(document, {variation(document, "streams.shell_side.flow", "x0.9..x1.1:2"),
                                               variation(document, "exchanger.tubes.plugged", "0..20:3")});
  REQUIRE(sweep.rows.size() == 6);
  CHECK(sweep.rows[1].at == std::vector<double>{sweep.rows[0].at[0], 10.0});
  CHECK(sweep.rows[3].at[0] > sweep.rows[2].at[0]);
}

TEST_CASE("explore: a point that cannot be is a row that says why, never a number") {
  const auto document = case_io::read_file(solvent_cooler);
  const auto sweep = explore::sweep(
      document, {variation(document, "streams.shell_side.inlet.temperature", "60..300 degC:2")});
  CHECK(sweep.rows[0].running.has_value());
  CHECK_FALSE(sweep.rows[1].running.has_value());
  CHECK_FALSE(sweep.rows[1].no_result.empty());
  const auto json = nlohmann::json::parse(report::json(sweep));
  CHECK_FALSE(json["rows"][1].contains("duty_W"));
  CHECK(json["rows"][1]["no_result"].is_string());
  CHECK(report::text(sweep).find("no result") != std::string::npos);
}

TEST_CASE("cli: sweep prints a page within 100 columns, JSON and CSV, the same for any number of jobs") {
  const std::vector<std::string> call = {"sweep", solvent_cooler, "--vary",
                                         "streams.tube_side.inlet.temperature=26..34 degC:9"};
  const auto with = [&call](std::vector<std::string> more) {
    std::vector<std::string> all = call;
    all.insert(all.end(), more.begin(), more.end());
    return run(all);
  };
  const auto page = with({});
  CHECK(page.status == 0);
  CHECK(page.err.empty());
  CHECK(longest_line(page.out) <= 100);
  const auto json = with({"--json"});
  CHECK(nlohmann::json::parse(json.out)["rows"].size() == 9);
  CHECK(with({"--json", "--jobs", "2"}).out == json.out);
  const auto csv = with({"--csv", "-"}).out;
  CHECK(std::ranges::count(csv, '\n') == 10);
  const auto commas = std::ranges::count(csv.substr(0, csv.find('\n')), ',');
  CHECK(std::ranges::count(csv, ',') == 10 * commas);
}

TEST_CASE("cli: what is wrong with a variation is said, with status 2") {
  struct Row {
    const char *option, *value, *said;
  };
  const Row rows[] = {
      {"--vary", "streams.tube_side.inlet.temprature=26..34 degC:9", "did you mean"},
      {"--vary", "streams.tube_side.name=1..2:3", "is no number"},
      {"--vary", "streams.tube_side.inlet.temperature=34..26 degC:9", "does not rise"},
      {"--vary", "streams.tube_side.inlet.temperature=30..30 degC:9", "does not rise"},
      {"--vary", "streams.tube_side.inlet.temperature=26..34 degC:1", "no number of steps"},
      {"--vary", "streams.tube_side.inlet.temperature=26..34 degC:10001", "no number of steps"},
      {"--vary", "streams.tube_side.inlet.temperature=26..34 degC", "steps"},
      {"--vary", "streams.tube_side.inlet.temperature=26..34 kPa:9", "kPa"},
      {"--vary", "streams.tube_side.inlet.temperature=x0.8..x1.2:5", "no factor"},
      {"--vary", "streams.tube_side.inlet.temperature", "KEY="},
      {"--vary", "exchanger.tubes.plugged=0..5:3", "whole numbers"},
  };
  for (const Row& row : rows) {
    CAPTURE(row.value);
    const auto ran = run({"sweep", solvent_cooler, row.option, row.value});
    CHECK(ran.status == 2);
    CHECK(ran.out.empty());
    CHECK(ran.err.find(row.said) != std::string::npos);
  }
  CHECK(run({"sweep", solvent_cooler}).status == 2);
  CHECK(run({"reach", solvent_cooler}).status == 2);
  const auto absent = run({"reach", solvent_cooler, "--push", "service.duty.at_least"});
  CHECK(absent.status == 2);
  CHECK(absent.err.find("not in the case") != std::string::npos);
  CHECK(run({"reach", solvent_cooler, "--push", "streams.shell_side.flw"}).status == 2);
}

TEST_CASE("cli: reach says how far, the same for any number of jobs") {
  const std::vector<std::string> call = {"reach", solvent_cooler, "--push", "streams.shell_side.flow"};
  auto parallel = call;
  parallel.insert(parallel.end(), {"--jobs", "2"});
  const auto ran = run(call);
  CHECK(ran.status == 0);
  CHECK(longest_line(ran.out) <= 100);
  CHECK(run(parallel).out == ran.out);
}
