#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "equations.hpp"

namespace dutygauge::fluids {
namespace {

struct Scaled {
  std::string_view property;
  double State::*value;
  double Scale::*factor;
  double usual;  ///< a factor farther from 1 than this is remarked on
};
constexpr Scaled properties[] = {
    {"density", &State::density, &Scale::density, 0.05},
    {"heat_capacity", &State::heat_capacity, &Scale::heat_capacity, 0.2},
    {"conductivity", &State::conductivity, &Scale::conductivity, 0.3},
    {"viscosity", &State::viscosity, &Scale::viscosity, 1.0},
};

// A factor outside these is a slip of the unit, not a property of this fluid.
constexpr double least_factor = 0.2, greatest_factor = 5.0;

void apply(const GivenProperty& given, const std::string& key, double pressure, Made& made) {
  const auto* scaled = std::ranges::find(properties, given.property, &Scaled::property);
  if (scaled == std::end(properties)) {
    made.objections.push_back({key, fmt::format("'{}' is not a property", given.property),
                               "density, heat_capacity, conductivity or viscosity", "correct the name"});
    return;
  }
  const TemperatureRange usable = usable_temperatures(made.fluid, pressure);
  if (!(given.temperature >= usable.low && given.temperature <= usable.high)) {
    made.objections.push_back(
        {key, fmt::format("{} is outside the range of {}", said(given.temperature), made.fluid.name),
         fmt::format("a temperature between {} and {}", said(usable.low), said(usable.high)),
         "give the property at a temperature of the service"});
    return;
  }
  double& factor = made.fluid.scale.*(scaled->factor);
  const double model = state(made.fluid, given.temperature, pressure).*(scaled->value) / factor;
  const double ratio = given.value / model;
  if (!(ratio >= least_factor && ratio <= greatest_factor)) {
    made.objections.push_back({key,
                               fmt::format("{:.4g} against {:.4g} (SI) of {} at {} cannot be meant",
                                           given.value, model, made.fluid.name, said(given.temperature)),
                               "a value near the fluid's own", "correct the value or its unit"});
    return;
  }
  factor = ratio;
  if (std::abs(ratio - 1.0) <= scaled->usual) return;
  made.findings.push_back(
      {.id = "fluids.given_far_from_model",
       .severity = Severity::should,
       .text = fmt::format(
           "the given {} is {:.3g} times what {} has at {}; check the value, its unit and the fluid",
           given.property, ratio, made.fluid.name, said(given.temperature)),
       .ground = Ground::judgement,
       .value = ratio,
       .limit = 1.0,
       .source = "common_practice"});
}

}  // namespace

Made with_given(Made made, std::string_view family, const std::vector<GivenProperty>& given,
                double pressure) {
  if (!made.objections.empty()) return made;
  const std::string prefix = family.empty() ? "given." : fmt::format("{}.given.", family);
  for (std::size_t i = 0; i < given.size(); ++i) {
    const bool twice = std::any_of(given.begin(), given.begin() + static_cast<std::ptrdiff_t>(i),
                                   [&](const auto& other) { return other.property == given[i].property; });
    if (twice)
      made.objections.push_back({prefix + given[i].property, "the property is given twice",
                                 "one value at one temperature",
                                 "keep one; for several temperatures write a table"});
    else
      apply(given[i], prefix + given[i].property, pressure, made);
  }
  return made;
}

}  // namespace dutygauge::fluids
