#pragma once
#include <nlohmann/json.hpp>
#include <string>
#include <vector>

#include "dutygauge/field/history.hpp"

/// How a plant's record was understood, and what of it counts.
namespace dutygauge::report {

/// The object `record`.
nlohmann::ordered_json record_json(const field::History& record);

/// The same in sentences.
std::vector<std::string> record_lines(const field::History& record);

}  // namespace dutygauge::report
