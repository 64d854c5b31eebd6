#pragma once
#include <nlohmann/json.hpp>
#include <optional>

#include "dutygauge/uncertainty.hpp"

/// Internal to report: the spread of a result as JSON; null without one.
namespace dutygauge::report {

nlohmann::ordered_json spread_json(const std::optional<uncertainty::Result>& spread);

}  // namespace dutygauge::report
