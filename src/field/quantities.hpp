#pragma once
#include <optional>

#include "dutygauge/field/changes.hpp"

/// Internal to field: the quantities of which there are series.
namespace dutygauge::field {

/// The channel a quantity is of; empty where it is of several.
std::optional<Channel> channel_of(Quantity quantity);

}  // namespace dutygauge::field
