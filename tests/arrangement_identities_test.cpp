#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <limits>
#include <stdexcept>
#include <string>

#include "dutygauge/arrangement.hpp"

using namespace dutygauge;
using namespace dutygauge::arrangement;

namespace {

const double ratios[] = {0.0, 0.1, 0.4, 0.8, 1.0 - 1e-9, 1.0, 1.25, 3.0, 100.0};
const double ntus[] = {1e-3, 0.2, 0.7, 1.5, 4.0, 10.0, 60.0};

/// Equal passes written out, which takes the numerical route.
Arrangement written_out(Arrangement a) {
  std::fill_n(a.pass_areas.begin(), a.tube_passes, 1.0);
  return a;
}

/// Fischer's closed form of three passes, two of them against the shell stream, from
/// memory; shell-side reference, loses its digits near R = 1.
double fischer(double r, double ntu) {
  const double q = std::sqrt(2.25 + r * (r - 1.0)), l1 = -1.5 + q, l2 = -1.5 - q, d = l1 - l2;
  const auto x = [&](double l) { return std::exp(l * ntu / 3.0) / (2.0 * d); };
  const double x1 = x(l1), x2 = x(l2), x3 = x(r);
  const double a = x1 * (r + l1) * (r - l2) / (2.0 * l1) - x3 * d - x2 * (r + l2) * (r - l1) / (2.0 * l2) +
                   1.0 / (1.0 - r);
  const double b = x1 * (r - l2) - x2 * (r - l1) + x3 * d;
  const double c = x2 * (3.0 * r + l1) - x1 * (3.0 * r + l2) + x3 * d;
  return (1.0 - c / (a * c + b * b)) / r;
}

}  // namespace

TEST_CASE("arrangement: the numerical route agrees with every closed form") {
  const Arrangement closed[] = {
      {.tube_passes = 2},
      {.tube_passes = 8},
      {.shell_type = 'F', .tube_passes = 2},
      {.shell_type = 'F', .tube_passes = 8, .first_tube_pass = FirstTubePass::with_shell_flow},
      {.shell_type = 'G', .tube_passes = 2},
      {.shell_type = 'H', .tube_passes = 2},
      {.shell_type = 'J', .tube_passes = 2},
      {.shell_type = 'J', .tube_passes = 6},
  };
  for (const auto& a : closed)
    for (double r : ratios)
      for (double ntu : ntus) {
        CAPTURE(a.shell_type);
        CAPTURE(a.tube_passes);
        CAPTURE(r);
        CAPTURE(ntu);
        CHECK(std::abs(effectiveness(written_out(a), r, ntu) / effectiveness(a, r, ntu) - 1.0) < 1e-11);
      }
}

TEST_CASE("arrangement: three passes agree with Fischer's form away from R = 1") {
  for (double r : {0.3, 0.6, 1.4, 2.5})  // shell-side R
    for (double ntu : {0.3, 1.0, 3.0, 8.0})
      CHECK(std::abs(effectiveness({.tube_passes = 3}, 1.0 / r, ntu * r) / r - fischer(r, ntu)) < 1e-12);
}

TEST_CASE("arrangement: exchanging the streams changes nothing where both see the same flow path") {
  const Arrangement same[] = {{},
                              {.flow = Flow::parallel},
                              {.tube_passes = 2},
                              {.tube_passes = 2, .shells_in_series = 3},
                              {.shell_type = 'F', .tube_passes = 4},
                              {.shell_type = 'G'},
                              {.shell_type = 'X'},
                              {.shell_type = 'X', .tube_passes = 3}};
  for (const auto& a : same)
    for (double r : {0.2, 0.7, 1.0, 1.9})
      for (double ntu : ntus)
        CHECK(std::abs(effectiveness(a, 1.0 / r, ntu * r) / (r * effectiveness(a, r, ntu)) - 1.0) < 1e-11);
  // Elsewhere it does: streams must not be sorted by capacity rate.
  const Arrangement j{.shell_type = 'J'};
  CHECK(std::abs(effectiveness(j, 2.0, 1.0) - 0.5 * effectiveness(j, 0.5, 2.0)) > 1e-3);
}

TEST_CASE("arrangement: turning both streams round changes nothing") {
  const Arrangement a{.tube_passes = 4, .pass_areas = {4, 3, 2, 1}};
  Arrangement turned = a;
  turned.pass_areas = {1, 2, 3, 4};
  for (char type : {'E', 'F', 'G', 'H'})
    for (double r : ratios)
      for (double ntu : ntus) {
        Arrangement one = a, other = turned;
        one.shell_type = other.shell_type = type;
        if (type == 'E') other.first_tube_pass = FirstTubePass::with_shell_flow;  // the last pass came back
        CHECK(std::abs(effectiveness(one, r, ntu) - effectiveness(other, r, ntu)) < 1e-12);
      }
}

TEST_CASE("arrangement: two-pass H and G shells differ by less than 1.5 per cent up to NTU 10") {
  // Ishihara & Palen, 8th Int. Heat Transfer Conf., find them almost the same (abstract).
  for (double r : ratios)
    for (double ntu : {0.5, 1.0, 2.0, 5.0, 10.0})
      CHECK(std::abs(effectiveness({.shell_type = 'H', .tube_passes = 2}, r, ntu) /
                         effectiveness({.shell_type = 'G', .tube_passes = 2}, r, ntu) -
                     1.0) < 0.015);
}

TEST_CASE("arrangement: the power law printed for unmixed crossflow is not what is used") {
  // It is up to 3.8 per cent low at R = 1, NTU = 0.28.
  const double power_law = 1.0 - std::exp(std::pow(0.28, 0.22) * (std::exp(-std::pow(0.28, 0.78)) - 1.0));
  CHECK(effectiveness({.shell_type = 'X'}, 1.0, 0.28) / power_law > 1.03);
}

TEST_CASE("arrangement: asked for P, it answers with F, the limit and where it lies") {
  const auto solved = solve_for_p({.tube_passes = 4}, 1.0, 1.2);
  REQUIRE(solved.value.has_value());
  CHECK(solved.findings.empty());
  CHECK(solved.value->p == effectiveness({.tube_passes = 4}, 1.0, 1.2));
  CHECK(solved.value->f == lmtd_correction({.tube_passes = 4}, 1.0, 1.2));
  CHECK(solved.value->ntu_at_max == ntu_at_largest({.tube_passes = 4}, 1.0));
  CHECK(solved.value->p_max > solved.value->p);
  CHECK(std::isinf(solve_for_p({.tube_passes = 2}, 1.0, 1.2).value->ntu_at_max));
}

TEST_CASE("arrangement: surface beyond the maximum is a finding") {
  const auto solved = solve_for_p({.tube_passes = 4}, 1.0, 6.0);
  REQUIRE(solved.findings.size() == 1);
  CHECK(solved.findings[0].id == "arrangement.past_largest");
  CHECK(solved.findings[0].value == 6.0);
  CHECK(solved.findings[0].limit == ntu_at_largest({.tube_passes = 4}, 1.0));
  CHECK(solve_for_p({.tube_passes = 2}, 1.0, 60.0).findings.empty());
}

TEST_CASE("arrangement: a P out of reach is a finding that names the way out") {
  const auto cross = solve_for_ntu({.tube_passes = 2}, 1.0, 0.65);
  CHECK(!cross.value.has_value());
  REQUIRE(cross.findings.size() == 1);
  CHECK(cross.findings[0].id == "arrangement.infeasible");
  CHECK(cross.findings[0].value == 0.65);
  CHECK(cross.findings[0].limit == largest_effectiveness({.tube_passes = 2}, 1.0));
  CHECK(cross.findings[0].text.find("2 such shells in series") != std::string::npos);
  const auto impossible = solve_for_ntu({.tube_passes = 2}, 2.0, 0.55);
  REQUIRE(impossible.findings.size() == 1);
  CHECK(impossible.findings[0].limit == 0.5);
  CHECK(impossible.findings[0].text.find("no exchanger") != std::string::npos);
  const auto found = solve_for_ntu({.tube_passes = 2}, 1.0, 0.5);
  REQUIRE(found.value.has_value());
  CHECK(found.findings.empty());
  CHECK(std::abs(effectiveness({.tube_passes = 2}, 1.0, found.value->ntu) - 0.5) < 1e-12);
  CHECK_THROWS_AS(solve_for_ntu({}, 1.0, std::numeric_limits<double>::quiet_NaN()), std::invalid_argument);
}

TEST_CASE("arrangement: what does not exist is objected to by its key, what does is not") {
  const auto key_of = [](const Arrangement& a) {
    CHECK(is_built(a) == objections(a).empty());
    return is_built(a) ? std::string{} : objections(a)[0].key;
  };
  CHECK(key_of({.shell_type = 'E', .tube_passes = 7}).empty());
  CHECK(key_of({.shell_type = 'F', .tube_passes = 6}).empty());
  CHECK(key_of({.shell_type = 'G'}).empty());
  CHECK(key_of({.shell_type = 'K', .tube_passes = 3}).empty());
  CHECK(key_of({.shell_type = 'X', .tube_passes = 2, .flow = Flow::parallel}).empty());
  CHECK(key_of({.shell_type = 'Z'}) == "exchanger.tema");
  CHECK(key_of({.shell_type = 'F'}) == "exchanger.tubes.passes");
  CHECK(key_of({.shell_type = 'G', .tube_passes = 3}) == "exchanger.tubes.passes");
  CHECK(key_of({.tube_passes = 0}) == "exchanger.tubes.passes");
  CHECK(key_of({.shells_in_series = 0}) == "exchanger.shells.in_series");
  CHECK(key_of({.tube_passes = 2, .flow = Flow::parallel}) == "exchanger.flow_direction");
  CHECK(key_of({.shell_type = 'J', .flow = Flow::parallel}) == "exchanger.flow_direction");
  CHECK(key_of({.tube_passes = 2, .pass_areas = {1.0}}) == "exchanger.tubes.passes");
  CHECK(key_of({.tube_passes = 2, .baffle_conductance = 0.1}) == "exchanger.tema");
  CHECK(key_of({.tube_inlet_share = 0.4}) == "exchanger.tema");
  CHECK(key_of({.shell_type = 'J', .tube_inlet_share = 1.0}) == "exchanger.tema");
  CHECK(key_of({.mixing = Mixing::nowhere}) == "exchanger.tema");
}
