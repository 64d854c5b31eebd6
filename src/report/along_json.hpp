#pragma once
#include <nlohmann/json.hpp>
#include <optional>

#include "dutygauge/report.hpp"

/// Internal to report: what is found along the unit, and how it is held at its duty, as JSON.
namespace dutygauge::report {

using Json = nlohmann::ordered_json;

/// SI as the result shows it: temperatures in degC, everything else as it is.
double in_json_unit(double si, units::Kind kind);

/// What leaves each shell, along the shell stream.
Json between_shells_json(const service::Assessment& assessment);

/// Temperatures, U and flux along the tube passes.
Json profile_json(const service::Assessment& assessment);

/// The balance at exactly the required duty; null where nothing controls it.
Json control_json(const std::optional<service::Holding>& holding);

}  // namespace dutygauge::report
