#include "dutygauge/field/plant.hpp"

#include <algorithm>
#include <cmath>

#include "balance.hpp"

namespace dutygauge::field {
namespace {

/// Half of the 95 % the property's source claims; unknown for what a user gave.
double heat_capacity_uncertainty(const fluids::Fluid& fluid) {
  for (const fluids::PropertyNote& note : fluids::notes(fluid))
    if (note.property == "heat_capacity") return 0.5 * note.uncertainty;
  return 0.0;
}

}  // namespace

Plant::Plant(const rating::Problem& problem, const Calibration& found)
    : prepared(problem), calibration(found) {
  hot_heat_capacity_uncertainty = heat_capacity_uncertainty(hot_stream(*this).fluid);
  cold_heat_capacity_uncertainty = heat_capacity_uncertainty(cold_stream(*this).fluid);
}

double deposit_on_tube_drop(const DepositOnDrops& rule, const geometry::Exchanger& exchanger,
                            double deposit) {
  const double bore = exchanger.tubes_drawn ? exchanger.tube_side.inside_diameter : rule.bore;
  const double thickness = rule.conductivity * deposit / exchanger.outside_per_inside;
  const double left = std::max(bore - 2.0 * thickness, 0.01 * bore);  // a bore never closes altogether
  return std::pow(bore / left, rule.narrowing_exponent);
}

}  // namespace dutygauge::field
