#pragma once
#include <optional>
#include <string>

#include "dutygauge/case_io.hpp"
#include "reading.hpp"

/// The parts a case is built from. Each notes what it objects to in the reading.
namespace dutygauge::case_io {

/// The drawing, where all that is required for it was read; objections are noted.
std::optional<geometry::Description> exchanger_of(Reading& reading);

/// Where a fluid enters; water needs it to know its phase.
struct Inlet {
  std::optional<double> temperature, pressure;  ///< [K], [Pa]
};

/// The fluid under `key`; empty where it cannot be made, the reasons are noted.
std::optional<fluids::Made> fluid_of(Reading& reading, const std::string& key, const Inlet& inlet);

struct MadeStream {
  rating::Stream stream;
  Assumptions assumed;
  Findings findings;
};

/// The stream of "shell_side" or "tube_side"; empty where it cannot be made.
std::optional<MadeStream> stream_of(Reading& reading, const std::string& side);

/// Builds the case of a document without overlays. Throws InputError.
Case build_plain(const Document& document);
/// What the sheet claims; empty where it claims nothing.
bids::Claims claims_of(Reading& reading);

}  // namespace dutygauge::case_io
