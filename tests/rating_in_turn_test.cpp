#include <doctest/doctest.h>

#include <algorithm>

#include "case_io_good.hpp"
#include "case_io_refused.hpp"
#include "laws.hpp"
#include "support.hpp"

// Shells that share the shell stream while the tube stream passes them one after another.

using namespace dutygauge;
using good::with;
using support::relative;

namespace {

std::string in_turn(int shells, const std::string& text = std::string(good::oil_cooler)) {
  return with("in_parallel: 1",
              "in_parallel: " + std::to_string(shells) + (shells > 1 ? ", tube_side: in_series" : ""), text);
}

rating::Problem problem_of(const std::string& text) {
  return case_io::build(case_io::read_document(text, "x")).problem;
}

rating::Outcome rated(const rating::Problem& problem) {
  const auto rating = rating::rate(problem);
  REQUIRE_MESSAGE(rating.outcome.has_value(), rating.no_result);
  return *rating.outcome;
}

/// Constant properties on both sides, so that a march has to meet the closed form.
std::string constant(const std::string& solution) {
  return with("    fluid: water\n",
              "    fluid: {constant: {density: 995 kg/m3, heat_capacity: 4180 J/kg.K, conductivity: 0.61 "
              "W/m.K, viscosity: 0.8 cP, phase: liquid}}\n",
              with("solution: mean", "solution: " + solution));
}

}  // namespace

TEST_CASE("arrangement: trains in turn are one after another, each with fresh shell stream") {
  const arrangement::Arrangement one{.shell_type = 'E', .tube_passes = 2, .shells_in_series = 2};
  for (const int trains : {2, 3, 5})
    for (const double r : {0.0, 0.3, 1.0, 2.5})
      for (const double ntu : {0.2, 1.0, 2.4}) {
        CAPTURE(trains);
        CAPTURE(r);
        CAPTURE(ntu);
        auto all = one;
        all.trains_in_turn = trains;
        double left = 1.0;  // of the difference to the shell inlet, train by train
        for (int i = 0; i < trains; ++i)
          left -= left * arrangement::effectiveness(one, trains * r, ntu / trains);
        const double p = arrangement::effectiveness(all, r, ntu);
        CHECK(relative(p, 1.0 - left) < 1e-12);
        CHECK(relative(arrangement::ntu_for(all, r, p).value(), ntu) < 1e-8);
        CHECK(p < arrangement::largest_effectiveness(all, r));
        const double needed = arrangement::counterflow_ntu(r, p).value();
        CHECK(relative(arrangement::lmtd_correction(all, r, ntu).value(), needed / ntu) < 1e-12);
      }
}

TEST_CASE("rating: a march through trains in turn meets their closed form, drops and areas add up") {
  const auto by_mean = problem_of(in_turn(3, constant("mean")));
  const auto mean = rated(by_mean), march = rated(problem_of(in_turn(3, constant("march"))));
  // Viscosity is constant here, but walls are not: the wall factors differ a little along the way.
  CHECK(relative(march.duty, mean.duty) < 2e-5);
  laws::check_outcome(by_mean, mean);
  laws::check_outcome(by_mean, march);
  const auto single = problem_of(constant("mean"));
  CHECK(relative(by_mean.exchanger.area, 3.0 * single.exchanger.area) < 1e-14);
  const auto one = rated(single);
  CHECK(relative(mean.local.tube_film.velocity, one.local.tube_film.velocity) < 1e-12);
  CHECK(relative(mean.local.shell_film.reynolds, one.local.shell_film.reynolds / 3.0) < 1e-12);
  CHECK(relative(mean.tube_drop.total(), 3.0 * one.tube_drop.total()) < 1e-3);
  CHECK(mean.shell_drop.total() < 0.25 * one.shell_drop.total());
}

TEST_CASE("rating: what leaves each train in turn is warmer than what left the one before") {
  const auto march = rated(problem_of(in_turn(3, constant("march"))));
  REQUIRE(march.between_shells.size() == 3);
  double shell_outlets = 0;
  for (std::size_t k = 0; k < 3; ++k) {
    CHECK(march.between_shells[k].bank == static_cast<int>(k) + 1);
    CHECK(march.between_shells[k].position == 1);
    if (k > 0) CHECK(march.between_shells[k].tube_outlet > march.between_shells[k - 1].tube_outlet);
    shell_outlets += march.between_shells[k].shell_outlet;
  }
  CHECK(relative(march.between_shells[2].tube_outlet, march.tube_outlet) < 1e-9);
  CHECK(relative(shell_outlets / 3.0, march.shell_outlet) < 1e-9);
}

TEST_CASE("case_io: the tube stream in series needs something in parallel") {
  refused::check({{"one shell",
                   with("in_parallel: 1", "in_parallel: 1, tube_side: in_series"),
                   {"exchanger.shells.tube_side", "nothing is in parallel"}}});
}
