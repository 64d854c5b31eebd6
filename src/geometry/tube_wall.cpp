#include <fmt/core.h>

#include <cmath>
#include <numbers>

#include "parts.hpp"

// From the bore to the outside surface: metal, layers on it, fins rolled from it.

namespace dutygauge::geometry {
namespace {

using std::numbers::pi;

/// Outside diameter of the metal under the surface; the root of fins.
double metal_outside(const Description& d) {
  return d.fins ? d.fins->root_diameter : d.tube_outside_diameter;
}

double fin_surface(const Fins& fins) {
  const double tip = fins.tip_diameter, root = fins.root_diameter;
  return fins.per_length * pi * (0.5 * (tip * tip - root * root) + tip * fins.thickness);
}

std::string length(double si) {
  return units::typed(si, units::Kind::length);
}

void check_fins(const Description& d, Objections& out) {
  if (!d.fins) return;
  const Fins& fins = *d.fins;
  if (!(fins.root_diameter > 0.0 && fins.root_diameter < fins.tip_diameter))
    out.push_back({"exchanger.tubes.fins.root_diameter",
                   fmt::format("{} is not less than the tip's {}", length(fins.root_diameter),
                               length(fins.tip_diameter)),
                   "more than 0 and less than the tip diameter", "check both against the tube's data sheet"});
  if (fins.tip_diameter > 1.001 * d.tube_outside_diameter)
    out.push_back({"exchanger.tubes.fins.tip_diameter",
                   fmt::format("{} is more than the tube's outside diameter of {}", length(fins.tip_diameter),
                               length(d.tube_outside_diameter)),
                   "at most the outside diameter: low fins are rolled from the tube and pass its holes",
                   "check both; high fins are not rated here"});
  if (!(fins.per_length > 0.0 && fins.thickness > 0.0 && fins.per_length * fins.thickness < 1.0))
    out.push_back(
        {"exchanger.tubes.fins.thickness",
         fmt::format("{} fins of {} leave no gaps on a metre", fins.per_length, length(fins.thickness)),
         "thinner than the pitch of the fins", "check thickness and fins per length"});
}

void check_layers(const Description& d, Objections& out) {
  for (std::size_t i = 0; i < d.layers.size(); ++i) {
    const Layer& layer = d.layers[i];
    const std::string key = fmt::format("exchanger.tubes.layers.{}", i);
    if (!(layer.thickness > 0.0) || !(layer.conductivity > 0.0))
      out.push_back({key, "a layer needs a thickness and a conductivity above zero", "both above zero",
                     "give both, or leave the layer out"});
    if (!layer.inside && d.fins)
      out.push_back({key, "a layer on fins is not rated: how it fills the gaps is not known",
                     "layers inside, or a plain tube", "leave it out and give its resistance as fouling"});
  }
}

}  // namespace

double outside_per_length(const Description& d) {
  if (!d.fins) return pi * d.tube_outside_diameter;
  const double root = pi * d.fins->root_diameter * (1.0 - d.fins->per_length * d.fins->thickness);
  return root + fin_surface(*d.fins);
}

double bore(const Description& d) {
  double diameter = metal_outside(d) - 2.0 * d.tube_wall;
  for (const Layer& layer : d.layers)
    if (layer.inside) diameter -= 2.0 * layer.thickness;
  return diameter;
}

void check_wall(const Description& d, Objections& out) {
  const std::size_t before = out.size();
  check_fins(d, out);
  check_layers(d, out);
  if (out.size() > before || bore(d) > 0.0) return;
  if (d.layers.empty())
    out.push_back(
        {"exchanger.tubes.wall",
         fmt::format("{} leaves no bore in a tube of {}", length(d.tube_wall), length(metal_outside(d))),
         d.fins ? "less than half the fins' root diameter" : "less than half the outside diameter",
         "check wall and outside diameter"});
  else
    out.push_back({"exchanger.tubes.layers", "wall and layers leave no bore", "a bore that is open",
                   "check the thicknesses"});
}

void set_wall_path(const Description& d, Exchanger& exchanger) {
  const double surface = outside_per_length(d), outside = metal_outside(d);
  double inner = outside - 2.0 * d.tube_wall, outer = d.tube_outside_diameter;
  exchanger.wall_length = surface / pi * std::log(outside / inner) / 2.0;
  exchanger.outside_per_inside = surface / (pi * bore(d));
  for (const Layer& layer : d.layers) {
    double& face = layer.inside ? inner : outer;
    const double next = face + (layer.inside ? -2.0 : 2.0) * layer.thickness;
    exchanger.layer_resistance += surface / pi * std::abs(std::log(face / next)) / (2.0 * layer.conductivity);
    face = next;
  }
  if (!d.fins) return;
  const double root = 0.5 * d.fins->root_diameter;
  const double tip = 0.5 * (d.fins->tip_diameter + d.fins->thickness);
  exchanger.finned = {.fin_share = fin_surface(*d.fins) / surface,
                      .root_radius = root,
                      .reach = (tip - root) * (1.0 + 0.35 * std::log(tip / root)),
                      .thickness = d.fins->thickness};
}

}  // namespace dutygauge::geometry
