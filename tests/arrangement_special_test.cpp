#include <doctest/doctest.h>

#include <cmath>
#include <sstream>
#include <string>
#include <vector>

#include "arrangement_rows.hpp"

using namespace arrangement_rows;

namespace {

struct SpecialRow {
  std::string name, parameters;
  double r, ntu, p, f;
};

std::vector<SpecialRow> rows_starting(const std::string& start) {
  std::vector<SpecialRow> found;
  for (const auto& row : support::read_csv(TEST_DATA "/pntu-special.csv"))
    if (row.at("case").starts_with(start))
      found.push_back({row.at("case"), row.at("parameters"), std::stod(row.at("R")), std::stod(row.at("NTU")),
                       std::stod(row.at("P")), std::stod(row.at("F"))});
  return found;
}

/// The numbers after `key` in a text such as "ft=0.6/0.4 fs=0.5/0.5".
std::vector<double> numbers_after(const std::string& text, const std::string& key) {
  std::istringstream words(text.substr(text.find(key) + key.size()));
  std::vector<double> numbers;
  for (double number; words >> number; words.get()) {
    numbers.push_back(number == 0.3333 ? 1.0 / 3.0 : number);  // printed short
    if (words.peek() != '/') break;
  }
  return numbers;
}

void check(const SpecialRow& row, double p) {
  CAPTURE(row.name);
  CAPTURE(row.parameters);
  CAPTURE(row.r);
  CAPTURE(row.ntu);
  CHECK(std::abs(p - row.p) < 1e-9);
  const auto counterflow = counterflow_ntu(row.r, p);
  REQUIRE(counterflow.has_value());
  CHECK(std::abs(*counterflow / row.ntu - row.f) < 1e-6);
}

}  // namespace

TEST_CASE("arrangement: banks with an unequal split agree with a numerical solution") {
  const auto rows = rows_starting("bank of parallel");
  REQUIRE(rows.size() == 24);
  for (const auto& row : rows) {
    const auto tube = numbers_after(row.parameters, "ft="), shell = numbers_after(row.parameters, "fs="),
               area = numbers_after(row.parameters, "ua=");
    std::vector<BankShare> shares;
    for (std::size_t i = 0; i < tube.size(); ++i)
      shares.push_back({.tube_flow = tube[i], .shell_flow = shell.at(i), .area = area.at(i)});
    const bool two_pass = row.name.find("E 1-2") != std::string::npos;
    check(row, effectiveness_of_bank({.tube_passes = two_pass ? 2 : 1}, shares, row.r, row.ntu));
  }
}

TEST_CASE("arrangement: passes of unequal surface agree with a numerical solution") {
  for (const auto& row : rows_starting("E 1-2 unequal")) {
    const double first = numbers_after(row.parameters, "pass1=").at(0);
    check(row, effectiveness({.tube_passes = 2,
                              .first_tube_pass = FirstTubePass::with_shell_flow,
                              .pass_areas = {first, 1.0 - first}},
                             row.r, row.ntu));
  }
  const auto four = rows_starting("E 1-4 unequal");
  REQUIRE(four.size() == 1);
  check(four[0],
        effectiveness(
            {.tube_passes = 4, .first_tube_pass = FirstTubePass::with_shell_flow, .pass_areas = {3, 3, 2, 2}},
            four[0].r, four[0].ntu));
}

TEST_CASE("arrangement: a conducting longitudinal baffle agrees with a numerical solution") {
  const auto rows = rows_starting("F shell");
  REQUIRE(rows.size() == 30);
  for (const auto& row : rows)
    check(row, effectiveness({.shell_type = 'F',
                              .tube_passes = row.name.find("2-2") != std::string::npos ? 2 : 4,
                              .baffle_conductance = numbers_after(row.parameters, "UA_tubes=").at(0)},
                             row.r, row.ntu));
}

TEST_CASE("arrangement: an unequal split of a J shell agrees with a numerical solution") {
  const auto rows = rows_starting("J 1-");
  REQUIRE(rows.size() == 6);
  for (const auto& row : rows)
    check(row, effectiveness({.shell_type = 'J',
                              .tube_passes = row.name[4] - '0',
                              .tube_inlet_share = numbers_after(row.parameters, "end=").at(0)},
                             row.r, row.ntu));
}

TEST_CASE(
    "arrangement: H streams mixed at mid-length and shells in parallel order agree with a numerical one") {
  const auto h = rows_starting("H 1-2 inner"), e = rows_starting("E 1-4 two shells");
  REQUIRE(h.size() + e.size() == 2);
  check(h[0], effectiveness({.shell_type = 'H', .tube_passes = 2, .mixing = Mixing::shell_stream}, h[0].r,
                            h[0].ntu));
  check(e[0], effectiveness({.tube_passes = 4, .shells_in_series = 2, .shells_order = Flow::parallel}, e[0].r,
                            e[0].ntu));
}

TEST_CASE("arrangement: few baffles agree with a numerical solution of both models of a compartment") {
  for (const std::string model : {"well-mixed compartments", "crossflow compartments"}) {
    const auto rows = rows_starting(model);
    REQUIRE(rows.size() >= 36);
    for (const auto& row : rows) {
      const Arrangement shell{.tube_passes = row.name.find("1-2") != std::string::npos ? 2 : 1};
      const int baffles = static_cast<int>(numbers_after(row.parameters, "N_b=").at(0));
      check(row, effectiveness_with_baffles(shell, row.r, row.ntu, baffles,
                                            model[0] == 'w' ? Compartment::stirred : Compartment::crossed));
    }
  }
}

TEST_CASE("arrangement: few baffles lower P where the streams run against each other, many change nothing") {
  const Arrangement several[] = {
      {}, {.tube_passes = 2}, {.tube_passes = 3}, {.tube_passes = 4, .shells_in_series = 2}};
  for (const auto& a : several)
    for (double r : {0.0, 0.3, 1.0, 2.5}) {
      const double many = effectiveness(a, r, 1.5);
      CAPTURE(a.tube_passes);
      CAPTURE(r);
      CHECK(effectiveness_with_baffles(a, r, 1.5, 3) <= many + 1e-12);
      CHECK(std::abs(effectiveness_with_baffles(a, r, 1.5, 100) - many) < 1e-4);
      CHECK(effectiveness_with_baffles(a, r, 1.5, 8, Compartment::stirred) <=
            effectiveness_with_baffles(a, r, 1.5, 8) + 1e-12);
    }
  // Crossing the tubes is better than running along with them.
  const Arrangement along{.flow = Flow::parallel};
  CHECK(effectiveness_with_baffles(along, 1.0, 1.5, 3) > effectiveness(along, 1.0, 1.5));
  CHECK(std::abs(effectiveness_with_baffles(along, 1.0, 1.5, 200) - effectiveness(along, 1.0, 1.5)) < 1e-4);
}

TEST_CASE("arrangement: no baffle leaves one crossflow pass, the shell stream mixed along it") {
  for (double r : {0.0, 0.5, 1.0, 4.0})
    CHECK(std::abs(effectiveness_with_baffles({}, r, 2.0, 0) -
                   effectiveness({.shell_type = 'X', .mixing = Mixing::shell_stream}, r, 2.0)) < 1e-11);
}

TEST_CASE("arrangement: baffles are counted in E shells with equal passes only") {
  CHECK_THROWS_AS(effectiveness_with_baffles({.shell_type = 'J'}, 1.0, 1.0, 5), std::invalid_argument);
  CHECK_THROWS_AS(effectiveness_with_baffles({}, 1.0, 1.0, -1), std::invalid_argument);
}

TEST_CASE("arrangement: an even bank is as good as one shell and shares must sum to 1") {
  const BankShare half{0.5, 0.5, 0.5}, third{0.3, 0.5, 0.5};
  const BankShare even[] = {half, half}, uneven[] = {half, third};
  const Arrangement shell{.shell_type = 'J', .tube_passes = 4};
  CHECK(effectiveness_of_bank(shell, even, 0.8, 1.3) ==
        doctest::Approx(effectiveness(shell, 0.8, 1.3)).epsilon(1e-14));
  CHECK_THROWS_AS(effectiveness_of_bank(shell, uneven, 0.8, 1.3), std::invalid_argument);
}

TEST_CASE(
    "arrangement: behind every printed value stands ours, to the digits an independent solution gives") {
  const auto rows = support::read_csv(TEST_DATA "/pntu-published.csv");
  REQUIRE(rows.size() >= 30);
  for (const auto& row : rows) {
    CAPTURE(row.at("id"));
    // F printed to five digits, from temperatures printed to 1e-4 K.
    const double tolerance = row.at("quantity") == "P" ? 6e-10 : 1e-5;
    const double exact = std::stod(row.at("exact_value")), ours = ours_of_printed(row);
    CHECK(std::abs(ours - exact) < tolerance);
  }
}
