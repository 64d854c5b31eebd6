#pragma once
#include <nlohmann/json.hpp>
#include <optional>

#include "dutygauge/report.hpp"

/// The reading a unit is tied to, as JSON.
namespace dutygauge::report {

nlohmann::ordered_json anchor_json(const std::optional<Anchored>& anchored);

/// How sure the change from the reading's conditions to a case is.
nlohmann::ordered_json change_json(const std::optional<uncertainty::Spreads>& change);

}  // namespace dutygauge::report
