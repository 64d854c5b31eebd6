#pragma once
#include <string>
#include <vector>

#include "dutygauge/fluids.hpp"

/// A fluid at one or several states, as page, JSON and CSV.
namespace dutygauge::cli {

struct FluidRow {
  double pressure;  ///< [Pa]
  fluids::State state;
};

struct FluidTable {
  fluids::Fluid fluid;
  Assumptions assumed;
  Findings findings;
  std::vector<FluidRow> rows{};  ///< one: a single state
};

std::string fluid_page(const FluidTable& table, units::System system);

/// One state: the six properties, and `findings` where there are any. Several: an object
/// with `rows`, each with its temperature and pressure, and `findings` likewise.
std::string fluid_json(const FluidTable& table);

/// A line of names, then one line a state; SI, temperatures in degC.
std::string fluid_csv(const FluidTable& table);

/// The built-in fluids with their ranges and sources.
std::string catalogue_page(units::System system);
std::string catalogue_json();

}  // namespace dutygauge::cli
