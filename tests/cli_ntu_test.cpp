#include <doctest/doctest.h>

#include <cmath>
#include <nlohmann/json.hpp>
#include <sstream>
#include <string>
#include <vector>

#include "dutygauge/cli.hpp"

namespace {

using dutygauge::cli::Status;
using Json = nlohmann::json;

struct Ran {
  int status;
  std::string out, err;
};

/// The options in one text, blanks between them.
Ran ntu(const std::string& options) {
  std::vector<std::string> words = {"ntu"};
  std::istringstream stream(options);
  for (std::string word; stream >> word;) words.push_back(word);
  std::ostringstream out, err;
  const int status = dutygauge::cli::run(words, out, err);
  return {status, out.str(), err.str()};
}

bool contains(const std::string& text, const std::string& part) {
  return text.find(part) != std::string::npos;
}

/// P of one shell pass and two tube passes: Bowman, Mueller & Nagle (1940).
double one_two(double r, double ntu) {
  const double s = std::sqrt(r * r + 1.0);
  return 2.0 / (1.0 + r + s / std::tanh(0.5 * s * ntu));
}

}  // namespace

TEST_CASE("cli: ntu prints P, F, NTU and the largest P on the tube side") {
  const Ran ran = ntu("--arrangement E --passes 2 --r 0.8 --ntu 1.3 --json");
  REQUIRE(ran.status == Status::done);
  const Json json = Json::parse(ran.out);
  CHECK(json.size() == 4);
  const double p = one_two(0.8, 1.3);
  CHECK(json["p"].get<double>() == doctest::Approx(p).epsilon(1e-12));
  CHECK(json["ntu"] == 1.3);
  CHECK(json["p_max"].get<double>() == doctest::Approx(2.0 / (1.8 + std::hypot(0.8, 1.0))).epsilon(1e-12));
  // F is the NTU of counterflow over this one.
  const double counterflow = std::log((1.0 - p * 0.8) / (1.0 - p)) / (1.0 - 0.8);
  CHECK(json["f"].get<double>() == doctest::Approx(counterflow / 1.3).epsilon(1e-9));
}

TEST_CASE("cli: ntu from P is the way back") {
  for (const char* kind :
       {"E --passes 2", "E --passes 2 --shells 2", "F --passes 2", "G --passes 2", "H --passes 2",
        "J --passes 2", "X", "K --passes 2", "E --passes 3", "E --flow-direction parallel",
        "X --passes 2 --cross parallel", "X --mixing shell_mixed", "X --mixing unmixed",
        "G --passes 2 --first-tube-pass with_shell_flow"}) {
    CAPTURE(kind);
    const std::string base = std::string("--arrangement ") + kind + " --r 0.7 --json";
    const Ran there = ntu(base + " --ntu 0.9");
    REQUIRE_MESSAGE(there.status == Status::done, there.err);
    const double p = Json::parse(there.out)["p"];
    const Ran back = ntu(base + " --p " + Json(p).dump());
    REQUIRE(back.status == Status::done);
    CHECK(Json::parse(back.out)["ntu"].get<double>() == doctest::Approx(0.9).epsilon(1e-7));
  }
}

TEST_CASE("cli: ntu explains a P that cannot be reached, with status 1") {
  const Ran json = ntu("--arrangement E --passes 2 --r 1 --p 0.7 --json");
  CHECK(json.status == Status::not_met);
  const Json answer = Json::parse(json.out);
  CHECK(answer["ntu"].is_null());
  CHECK(answer["f"].is_null());
  CHECK(answer["p"] == 0.7);
  CHECK(answer["p_max"].get<double>() == doctest::Approx(2.0 - std::sqrt(2.0)).epsilon(1e-9));
  const std::string text = answer["findings"][0]["text"];
  CHECK(contains(text, "0.5858"));
  CHECK(text.find('{') == std::string::npos);
  const Ran page = ntu("--arrangement E --passes 2 --r 1 --p 0.7");
  CHECK(page.status == Status::not_met);
  CHECK(contains(page.out, "is not reached"));
  CHECK(contains(page.out, "2 such shells in series"));
  CHECK(ntu("--arrangement E --r 0.5 --p 1.5").status == Status::not_met);
}

TEST_CASE("cli: ntu says where more surface lowers the duty") {
  const Ran ran = ntu("--arrangement E --passes 4 --r 1.5 --ntu 9");
  CHECK(ran.status == Status::done);
  CHECK(contains(ran.out, "more surface lowers the duty"));
}

TEST_CASE("cli: ntu names the option that does not fit") {
  struct Row {
    const char *options, *part;
  };
  const Row rows[] = {
      {"", "needs --arrangement"},
      {"--arrangement E --ntu 1", "needs --r"},
      {"--arrangement E --r 1", "needs --ntu or --p"},
      {"--arrangement E --r 1 --ntu 1 --p 0.4", "both given"},
      {"--arrangement EE --r 1 --ntu 1", "--arrangement: 'EE'"},
      {"--arrangement Q --r 1 --ntu 1", "--arrangement:"},
      {"--arrangement F --passes 3 --r 1 --ntu 1", "--passes:"},
      {"--arrangement E --passes 0 --r 1 --ntu 1", "--passes: '0'"},
      {"--arrangement E --passes 2.5 --r 1 --ntu 1", "--passes: '2.5'"},
      {"--arrangement E --shells 1000 --r 1 --ntu 1", "--shells: '1000'"},
      {"--arrangement E --r -1 --ntu 1", "--r: '-1'"},
      {"--arrangement E --r nan --ntu 1", "--r: 'nan'"},
      {"--arrangement E --r 1 --ntu 1e9", "--ntu: '1e9'"},
      {"--arrangement E --r 1 --p x", "--p: 'x'"},
      {"--arrangement E --passes 2 --flow-direction parallel --r 1 --ntu 1", "--flow-direction:"},
      {"--arrangement X --flow-direction parallel --r 1 --ntu 1", "--flow-direction"},
      {"--arrangement E --flow-direction up --r 1 --ntu 1", "counter or parallel"},
      {"--arrangement E --mixing unmixed --r 1 --ntu 1", "--mixing:"},
      {"--arrangement E --cross parallel --r 1 --ntu 1", "--cross"},
      {"--arrangement X --cross parallel --r 1 --ntu 1", "--cross"},
      {"--arrangement X --first-tube-pass with_shell_flow --r 1 --ntu 1", "--first-tube-pass"},
      {"--arrangement E --r 1 --ntu 1 word", "one word too many"}};
  for (const Row& row : rows) {
    CAPTURE(row.options);
    const Ran ran = ntu(row.options);
    CHECK(ran.status == Status::input_at_fault);
    CHECK(ran.out.empty());
    CHECK_MESSAGE(contains(ran.err, row.part), ran.err);
  }
}
