#pragma once
#include <array>
#include <optional>
#include <vector>

#include "dutygauge/field/plant.hpp"

/// One reading made consistent with the heat balance, and which of its data may be wrong.
namespace dutygauge::field {

/// What is reconciled: the six flows and temperatures in the order of Channel, then UA.
inline constexpr std::size_t datum_count = 7;
inline constexpr std::size_t ua_datum = 6;
using Data = std::array<double, datum_count>;

/// UA [W/K] as something else than the reading has it.
struct UaDatum {
  double value = 0, standard_uncertainty = 0;
};

/// UA from films at the reading's flows and a fouling resistance trended over the days before.
struct TrendedFouling {
  double value = 0, standard_uncertainty = 0;  ///< [m2.K/W]
};
std::optional<UaDatum> ua_from(const Plant& plant, const Channels& reading, const TrendedFouling& fouling);

/// What is to be made consistent. A datum that is missing is NaN; without UA the exchanger
/// equation is left out.
struct ToReconcile {
  Channels reading{};
  std::array<double, ua_datum> standard_uncertainty{};  ///< [kg/s], [K]; all above zero
  std::optional<UaDatum> ua{};
};

/// What a reconciliation finds. Missing data count as free.
struct Reconciled {
  Data value{};                 ///< [kg/s], [K], [W/K]; UA is 0 where it is left out
  Data standard_uncertainty{};  ///< of the reconciled values
  Data measurement_test{};      ///< z of each datum; 0 where nothing tests it
  double duty = 0;              ///< [W]
  double objective = 0;         ///< weighted sum of squares, chi-square where nothing is wrong
  int degrees_of_freedom = 0;   ///< constraints less missing data
  double p_value = 1;           ///< of an objective as large by chance
};

/// Weighted least squares: minimises (y-x)'V^-1(y-x) subject to g(x) = 0, by
///
///     x <- y - V A'(A V A')^-1 [A(y - x) + g(x)],  A = dg/dx
///
/// with g the heat balance, from enthalpies, and with UA the exchanger's relation. Empty
/// where the data admit no solution or more is missing than the constraints can give.
std::optional<Reconciled> reconcile(const Plant& plant, const ToReconcile& data);

/// What is wrong with a reading, as far as it can be told.
struct GrossErrors {
  Reconciled all;                    ///< with nothing removed
  bool detected = false;             ///< the global test fails
  std::vector<std::size_t> failing;  ///< data whose measurement test fails, the worst first
  std::array<std::optional<double>, datum_count> objective_without{};  ///< each datum removed alone
  std::vector<std::size_t> inseparable;  ///< one of these is wrong; alone: it is named
  std::vector<std::size_t> eliminated;   ///< removed one after another until the rest agrees
  std::optional<Reconciled> rest;        ///< reconciled without them
};

/// Global test at `level`; measurement test at the level of all data together, 1-(1-level)^(1/n);
/// then every datum removed alone: all that bring the objective within 3.84 of the lowest
/// cannot be told apart. One balance detects but never locates: all of its data stay in the set.
/// Source: Mah & Tamhane (1982) for the test; Bagajewicz (2000) for equivalent sets.
std::optional<GrossErrors> find_gross_errors(const Plant& plant, const ToReconcile& data,
                                             double level = 0.05);

}  // namespace dutygauge::field
