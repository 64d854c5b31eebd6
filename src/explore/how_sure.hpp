#pragma once
#include <optional>
#include <span>
#include <vector>

#include "dutygauge/service.hpp"
#include "dutygauge/uncertainty.hpp"

/// Internal to explore: how sure assessments are.
namespace dutygauge::explore {

/// The spreads of several assessments of one unit, what they share drawn once. Empty for one
/// without a result; without a probability where no service is stated.
std::vector<std::optional<uncertainty::Result>> how_sure(
    std::span<const service::Assessment* const> assessments);

/// Puts the grade into the verdict's sentence. Where the service states a confidence, the
/// sentence begins with yes only if the probability reaches it.
void qualify(service::Assessment& assessment, const std::optional<uncertainty::Result>& spread);

}  // namespace dutygauge::explore
