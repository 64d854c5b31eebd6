#pragma once
#include <optional>

#include "dutygauge/rating.hpp"

/// A part of a stream that goes round the exchanger and is mixed in behind it.
namespace dutygauge::rating {

/// Temperature [K] of the whole stream once `share` [-] of it, unchanged, has been mixed with
/// what left the exchanger at `outlet` [K].
double after_mix(const Stream& stream, double outlet, double share);

/// The exchanger's outlet [K] that gives the mixed temperature; empty where the fluid's range does
/// not reach so far.
std::optional<double> before_mix(const Stream& stream, double mixed, double share);

}  // namespace dutygauge::rating
