#include <fmt/core.h>

#include <algorithm>
#include <cmath>
#include <string>

#include "equations.hpp"

// Fluids from the user's own numbers, and what such numbers often get wrong.

namespace dutygauge::fluids {
namespace {

struct Band {
  double low, high;
};

/// A column of user data: what is common for it. Outside the bands a slip of the unit is likely.
struct Column {
  const char* key;
  double PropertyRow::*value;
  units::Kind kind;
  Band liquid, gas;
};

// Common practice, no source: wide enough for hydrogen, helium, refrigerants and residues.
constexpr Column columns[] = {
    {"density", &PropertyRow::density, units::Kind::density, {300.0, 3000.0}, {0.01, 300.0}},
    {"heat_capacity",
     &PropertyRow::heat_capacity,
     units::Kind::heat_capacity,
     {500.0, 15000.0},
     {500.0, 15000.0}},
    {"conductivity", &PropertyRow::conductivity, units::Kind::conductivity, {0.03, 1.0}, {0.003, 0.6}},
    {"viscosity", &PropertyRow::viscosity, units::Kind::viscosity, {3e-5, 100.0}, {3e-6, 3e-4}},
};

void object_to_impossible(const PropertyRow& row, const std::string& prefix, Objections& objections) {
  for (const Column& column : columns) {
    const double value = row.*column.value;
    if (std::isfinite(value) && value > 0.0) continue;
    objections.push_back({prefix + column.key,
                          fmt::format("{:.4g} {} is impossible", value, units::json_unit(column.kind)),
                          "a number above zero", "correct the value or its unit"});
  }
}

void remark_on_unusual(const PropertyRow& row, Phase phase, const std::string& place, Findings& findings) {
  for (const Column& column : columns) {
    const double value = row.*column.value;
    const auto [low, high] = phase == Phase::liquid ? column.liquid : column.gas;
    if (value >= low && value <= high) continue;
    findings.push_back(
        {.id = "fluids.unusual_value",
         .severity = Severity::should,
         .text = fmt::format("{}: a {} of {{value}} is unusual for a {} (common: {} to {}); check its unit",
                             place, column.key, phase == Phase::liquid ? "liquid" : "gas",
                             units::mention(low, column.kind), units::mention(high, column.kind)),
         .ground = Ground::judgement,
         .value = value,
         .limit = value < low ? low : high,
         .kind = column.kind,
         .source = "common_practice"});
  }
}

Finding trend(const std::string& text, double value) {
  return {.id = "fluids.unusual_trend",
          .severity = Severity::should,
          .text = text,
          .ground = Ground::judgement,
          .value = value,
          .limit = 1.0,
          .source = "common_practice"};
}

/// What two neighbouring rows say together. A liquid thins when it warms, a gas thickens.
void judge_trend(const PropertyRow& cold, const PropertyRow& warm, Phase phase, const std::string& key,
                 Made& made) {
  const double ratio = warm.viscosity / cold.viscosity;
  const std::string between =
      fmt::format("between {} and {}", said(cold.temperature), said(warm.temperature));
  if (phase == Phase::gas) {
    if (ratio < 1.0 || ratio > 3.0)
      made.findings.push_back(trend(
          fmt::format("the viscosity changes by a factor of {:.3g} {}, unlike a gas; check the values, their "
                      "unit and the phase",
                      ratio, between),
          ratio));
    return;
  }
  if (ratio > 2.0)
    made.objections.push_back(
        {key, fmt::format("the viscosity of a liquid cannot rise by a factor of {:.3g} {}", ratio, between),
         "a viscosity that falls as the temperature rises",
         "check the units (cP is mPa.s) and the order of the values"});
  else if (ratio > 1.0)
    made.findings.push_back(
        trend(fmt::format("the viscosity of the liquid rises by a factor of {:.3g} {}; check the values",
                          ratio, between),
              ratio));
  else if (-std::log(ratio) > 0.25 * (warm.temperature - cold.temperature))
    made.findings.push_back(trend(
        fmt::format("the viscosity falls by a factor of {:.4g} {}, faster than liquids do; check its unit",
                    1.0 / ratio, between),
        ratio));
  if (warm.density > 1.01 * cold.density)
    made.findings.push_back(
        trend(fmt::format("the density of the liquid rises by a factor of {:.4g} {}; check the values",
                          warm.density / cold.density, between),
              warm.density / cold.density));
}

/// How far past an end row a straight continuation of `value` stays positive, at most `reach`.
double positive_reach(double value, double slope_outwards, double reach) {
  if (slope_outwards >= 0.0) return reach;
  return std::min(reach, value / -slope_outwards * (1.0 - 1e-9));
}

/// How far the end slopes may be followed: `reach`, while every value stays positive.
TemperatureRange usable_range(const TableModel& model, double reach) {
  double below = std::min(reach, model.temperature.front() - 1.0), above = reach;
  const auto narrow = [&](const std::vector<double>& value, const std::vector<double>& slope) {
    below = positive_reach(value.front(), -slope.front(), below);
    above = positive_reach(value.back(), slope.back(), above);
  };
  narrow(model.density, model.density_slope);
  narrow(model.heat_capacity, model.heat_capacity_slope);
  narrow(model.conductivity, model.conductivity_slope);
  return {model.temperature.front() - below, model.temperature.back() + above};
}

TableModel interpolant(const std::vector<PropertyRow>& rows, double reach) {
  TableModel model;
  std::vector<double> inverse;
  for (const PropertyRow& row : rows) {
    model.temperature.push_back(row.temperature);
    model.density.push_back(row.density);
    model.heat_capacity.push_back(row.heat_capacity);
    model.conductivity.push_back(row.conductivity);
    model.log_viscosity.push_back(std::log(row.viscosity));
    inverse.push_back(1.0 / row.temperature);
  }
  model.density_slope = monotone_slopes(model.temperature, model.density);
  model.heat_capacity_slope = monotone_slopes(model.temperature, model.heat_capacity);
  model.conductivity_slope = monotone_slopes(model.temperature, model.conductivity);
  model.log_viscosity_slope = monotone_slopes(inverse, model.log_viscosity);
  fill_enthalpies(model);
  model.usable = usable_range(model, reach);
  return model;
}

void object_to_temperature(double temperature, const std::string& key, Objections& objections) {
  if (std::isfinite(temperature) && temperature > 1.0) return;
  objections.push_back({key, "the temperature is impossible", "a temperature above absolute zero",
                        "correct the value or its unit"});
}

void object_to_order(const std::vector<PropertyRow>& rows, Objections& objections) {
  for (std::size_t i = 1; i < rows.size(); ++i) {
    if (rows[i].temperature > rows[i - 1].temperature) continue;
    objections.push_back({fmt::format("table.rows.{}.temperature", i),
                          fmt::format("{} does not rise above the {} of the row before",
                                      said(rows[i].temperature), said(rows[i - 1].temperature)),
                          "rows in rising temperature, each temperature once", "sort the rows"});
  }
}

}  // namespace

Made make_constant(const ConstantModel& values, Phase phase) {
  Made made;
  const PropertyRow row{273.15, values.density, values.heat_capacity, values.conductivity, values.viscosity};
  object_to_impossible(row, "constant.", made.objections);
  if (!made.objections.empty()) return made;
  remark_on_unusual(row, phase, "constant properties", made.findings);
  made.fluid = {.model = values, .phase = phase, .name = "constant properties", .source = ""};
  return made;
}

Made make_table(std::vector<PropertyRow> rows, Phase phase) {
  Made made;
  if (rows.size() < 2 || rows.size() > 200)
    made.objections.push_back(
        {"table.rows", fmt::format("{} rows", rows.size()), "2 to 200 rows",
         rows.size() < 2 ? "add a row, or give the properties as constant" : "leave rows out"});
  for (std::size_t i = 0; i < rows.size(); ++i) {
    const std::string prefix = fmt::format("table.rows.{}.", i);
    object_to_temperature(rows[i].temperature, prefix + "temperature", made.objections);
    object_to_impossible(rows[i], prefix, made.objections);
  }
  object_to_order(rows, made.objections);
  if (!made.objections.empty()) return made;
  for (std::size_t i = 0; i < rows.size(); ++i) {
    remark_on_unusual(rows[i], phase, fmt::format("table row {}", i + 1), made.findings);
    if (i > 0) judge_trend(rows[i - 1], rows[i], phase, fmt::format("table.rows.{}.viscosity", i), made);
  }
  if (!made.objections.empty()) return made;
  const double span = rows.back().temperature - rows.front().temperature;
  made.fluid = {
      .model = interpolant(rows, 0.5 * span), .phase = phase, .name = "tabulated properties", .source = ""};
  return made;
}

Made make_two_point(const PropertyRow& first, const PropertyRow& second, Phase phase) {
  Made made;
  object_to_temperature(first.temperature, "two_point.at", made.objections);
  object_to_temperature(second.temperature, "two_point.at", made.objections);
  object_to_impossible(first, "two_point.", made.objections);
  object_to_impossible(second, "two_point.", made.objections);
  const double span = std::abs(second.temperature - first.temperature);
  if (made.objections.empty() && span < 1.0)
    made.objections.push_back({"two_point.at", fmt::format("the two temperatures are {:.2g} K apart", span),
                               "two temperatures at least 1 K apart",
                               "give the properties as constant, or two different temperatures"});
  if (!made.objections.empty()) return made;
  const bool rising = second.temperature > first.temperature;
  const PropertyRow &cold = rising ? first : second, &warm = rising ? second : first;
  remark_on_unusual(first, phase, "first of two points", made.findings);
  remark_on_unusual(second, phase, "second of two points", made.findings);
  judge_trend(cold, warm, phase, "two_point.viscosity", made);
  if (!made.objections.empty()) return made;
  made.fluid = {.model = interpolant({cold, warm}, std::max(40.0, 0.5 * span)),
                .phase = phase,
                .name = "two-point properties",
                .source = ""};
  return made;
}

}  // namespace dutygauge::fluids
