#include <fmt/core.h>

#include <algorithm>
#include <cmath>
#include <iterator>

#include "oil.hpp"

namespace dutygauge::fluids {
namespace {

constexpr TemperatureRange density_tables{223.15, 423.15};  // [K]
constexpr double viscosity_reach = 30.0;                    // [K] past the points, ASTM D341
constexpr double low_temperature = 313.15, high_temperature = 373.15;

/// Grades of ISO 3448 and the viscosity at 100 degC [mm2/s] that a viscosity index of 95 and of 150
/// stand for, by ASTM D2270; 0 where the index is not defined for so thin an oil.
struct Grade {
  double at_40c, at_100c_index_95, at_100c_index_150;
};
constexpr Grade grades[] = {{2.2, 0.0, 0.0},       {3.2, 0.0, 0.0},        {4.6, 0.0, 0.0},
                            {6.8, 2.06, 2.23},     {10.0, 2.64, 2.9},      {15.0, 3.38, 3.79},
                            {22.0, 4.25, 4.86},    {32.0, 5.29, 6.27},     {46.0, 6.65, 8.1},
                            {68.0, 8.53, 10.85},   {100.0, 11.07, 14.52},  {150.0, 14.55, 19.59},
                            {220.0, 18.75, 25.92}, {320.0, 23.96, 34.07},  {460.0, 30.35, 44.24},
                            {680.0, 39.06, 58.23}, {1000.0, 49.86, 76.02}, {1500.0, 64.22, 99.81}};

/// Grades are named by the whole number nearest to their viscosity: VG 2, 3, 5, 7, then as it stands.
const Grade* grade_of(double name) {
  const auto* found = std::ranges::find_if(
      grades, [&](const Grade& grade) { return std::abs(std::round(grade.at_40c) - name) < 1e-6; });
  return found == std::end(grades) ? nullptr : found;
}

std::string grade_names() {
  std::string names;
  for (const Grade& grade : grades) names += fmt::format("{}{:.0f}", names.empty() ? "" : ", ", grade.at_40c);
  return names;
}

Objections object_to_grade(const OilData& data) {
  const Grade* grade = grade_of(*data.iso_vg);
  if (grade == nullptr)
    return {{"oil.iso_vg", fmt::format("{:.5g} is not an ISO viscosity grade", *data.iso_vg), grade_names(),
             "take the nearest grade, or give two viscosities"}};
  if (grade->at_100c_index_95 == 0.0)
    return {{"oil.iso_vg", fmt::format("no viscosity index is defined for ISO VG {:.0f}", *data.iso_vg),
             "a grade from 7 upwards", "give two viscosities under oil.viscosity"}};
  if (data.viscosity_index && !(*data.viscosity_index >= 90.0 && *data.viscosity_index <= 160.0))
    return {{"oil.viscosity_index",
             fmt::format("{:.4g} cannot be turned into a viscosity here", *data.viscosity_index),
             "a viscosity index from 90 to 160", "give two viscosities under oil.viscosity"}};
  return {};
}

Objections object_to(const OilData& data) {
  Objections objections;
  const auto add = [&](const Objections& more) {
    objections.insert(objections.end(), more.begin(), more.end());
  };
  if (data.iso_vg && !data.viscosity.empty())
    add({{"oil.iso_vg", "both iso_vg and two viscosities are given", "one of them",
          "keep the measured viscosities"}});
  else if (data.iso_vg)
    add(object_to_grade(data));
  else if (data.viscosity.empty())
    add({{"oil", "neither iso_vg nor viscosity is given", "an ISO grade or two viscosities",
          "take them from the oil's data sheet"}});
  else
    add(object_to_points(data.viscosity, "oil.viscosity"));
  if (data.density_15c && !(*data.density_15c >= 801.3 && *data.density_15c <= 1163.9))
    add({{"oil.density_15c", fmt::format("{:.4g} kg/m3 is no mineral oil", *data.density_15c),
          "801.3 to 1163.9 kg/m3", "correct the value; other oils need two_point or table"}});
  return objections;
}

double density_of(const OilData& data, Made& made) {
  if (data.density_15c) return *data.density_15c;
  constexpr double usual = 875.0;
  made.assumed.push_back({.key = "oil.density_15c",
                          .value = usual,
                          .kind = units::Kind::density,
                          .word = "",
                          .why = "usual for mineral oils",
                          .low = 850.0,
                          .high = 900.0,
                          .look_in = "oil data sheet"});
  return usual;
}

/// The two points a grade stands for. Between the indices ln(viscosity at 100 degC) runs straight.
std::vector<ViscosityPoint> points_of_grade(const OilData& data, Made& made) {
  const Grade& grade = *grade_of(*data.iso_vg);
  const double index = data.viscosity_index.value_or(95.0);
  if (!data.viscosity_index)
    made.assumed.push_back({.key = "oil.viscosity_index",
                            .value = index,
                            .kind = units::Kind::count,
                            .word = "",
                            .why = "usual for mineral oils without viscosity improver",
                            .low = 90.0,
                            .high = 150.0,
                            .look_in = "oil data sheet"});
  const double share = (index - 95.0) / 55.0;
  const double at_100c =
      grade.at_100c_index_95 * std::pow(grade.at_100c_index_150 / grade.at_100c_index_95, share);
  return {{low_temperature, grade.at_40c * 1e-6}, {high_temperature, at_100c * 1e-6}};
}

}  // namespace

Made make_oil(const OilData& data) {
  Made made;
  made.objections = object_to(data);
  if (!made.objections.empty()) return made;
  OilModel model{};
  model.density_15c = density_of(data, made);
  model.expansion = expansion_15c(OilGroup::lubricating, model.density_15c);
  model.range = density_tables;
  const double gravity = model.density_15c / 999.1;
  model.heat_capacity = cragoe_heat_capacity(gravity);
  model.conductivity = cragoe_conductivity(gravity);
  const std::vector<ViscosityPoint> points = data.iso_vg ? points_of_grade(data, made) : data.viscosity;
  const ViscosityPoint one = kinematic(points[0], model), other = kinematic(points[1], model);
  fit_walther(one, other, model);
  model.viscosity_range = {std::min(one.temperature, other.temperature) - viscosity_reach,
                           std::max(one.temperature, other.temperature) + viscosity_reach};
  model.heat_capacity_source = "cragoe_1929";
  model.viscosity_source = "astm_d341";
  model.heat_capacity_uncertainty = 0.05;
  model.conductivity_uncertainty = 0.10;
  // A grade allows 10 % either way at 40 degC.
  model.viscosity_uncertainty = data.iso_vg ? 0.10 : 0.05;
  made.fluid.model = model;
  made.fluid.name = "oil";
  made.fluid.source = "astm_d341";
  return made;
}

}  // namespace dutygauge::fluids
