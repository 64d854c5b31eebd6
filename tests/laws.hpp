#pragma once
#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>

#include "dutygauge/service.hpp"

/// What every balanced rating must satisfy, whatever the case.
namespace laws {

inline void check_outcome(const dutygauge::rating::Problem& problem,
                          const dutygauge::rating::Outcome& outcome) {
  const auto& local = outcome.local;
  CHECK(std::isfinite(outcome.duty));
  CHECK(outcome.duty > 0.0);
  CHECK(outcome.balance_error <= 1e-9);
  CHECK(std::abs(outcome.duty_ntu / outcome.duty - 1.0) <= 1e-7);
  CHECK(std::abs(outcome.duty_lmtd / outcome.duty - 1.0) <= 1e-7);
  CHECK(std::abs(local.u_dirty * local.resistances.sum() - 1.0) <= 1e-9);
  CHECK(std::abs(local.tube_film.coefficient * local.resistances.tube_film /
                     problem.exchanger.outside_per_inside -
                 1.0) <= 1e-9);
  CHECK(std::abs(local.shell_film.coefficient * local.fin_effectiveness * local.resistances.shell_film -
                 1.0) <= 1e-9);
  CHECK(outcome.effectiveness > 0.0);
  CHECK(outcome.effectiveness <= 1.0 + 1e-12);
  CHECK(outcome.f_correction > 0.0);
  CHECK(outcome.f_correction <= 1.0 + 1e-9);
  const double shell_in = problem.shell_side.inlet_temperature, tube_in = problem.tube_side.inlet_temperature;
  const auto [coldest, hottest] = std::minmax(shell_in, tube_in);
  for (double outlet : {outcome.shell_outlet, outcome.tube_outlet}) {
    CHECK(outlet >= coldest - 1e-9);
    CHECK(outlet <= hottest + 1e-9);
  }
  const auto [mean_low, mean_high] = std::minmax(outcome.shell_mean, outcome.tube_mean);
  for (double wall : {local.walls.tube_wetted, local.walls.shell_wetted}) {
    CHECK(wall >= mean_low - 1e-6);
    CHECK(wall <= mean_high + 1e-6);
  }
  CHECK(local.u_clean >= local.u_dirty);
  CHECK(outcome.tube_drop.total() > 0.0);
  CHECK(outcome.shell_drop.total() > 0.0);
  CHECK(std::isfinite(outcome.shell_drop.total()));
}

/// Entropy produced by the exchange [W/K], from heat capacities at the mean: never negative.
inline void check_second_law(const dutygauge::rating::Problem& problem,
                             const dutygauge::rating::Outcome& outcome) {
  const double shell_in = problem.shell_side.inlet_temperature, tube_in = problem.tube_side.inlet_temperature;
  const double produced = outcome.shell_capacity_rate * std::log(outcome.shell_outlet / shell_in) +
                          outcome.tube_capacity_rate * std::log(outcome.tube_outlet / tube_in);
  CHECK(produced >= -1e-9 * outcome.duty / std::min(shell_in, tube_in));
}

}  // namespace laws
