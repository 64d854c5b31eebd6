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

/// Finds the flows written from_duty from the stated outlets and a duty.
void find_flows(Reading& reading, std::optional<MadeStream>& shell_side,
                std::optional<MadeStream>& tube_side);

/// What a case says of one side's film and drop instead of leaving them to the methods.
struct GivenFilm {
  std::optional<rating::FilmLaw> film;  ///< as typed
  bool on_other_surface = false;        ///< the value is on the surface of the other side
  std::optional<rating::DropLaw> drop;
  double multiplier = 1;
  Findings findings;
};
GivenFilm given_film_of(Reading& reading, const std::string& side);

/// Puts it into the problem; the exchanger must be there, for the ratio of the surfaces.
void put_film(const GivenFilm& given, bool is_shell_side, rating::Problem& problem);

/// Whether the fluid of "streams.shell_side" has a density: one that is a heat capacity alone has none.
bool knows_density(const Reading& reading, const std::string& side);

/// The stream of "shell_side" or "tube_side"; empty where it cannot be made.
std::optional<MadeStream> stream_of(Reading& reading, const std::string& side);

/// Takes what goes round the exchanger off the flows, and puts limits on the mixed outlets where the
/// exchanger has them. Throws InputError.
void take_bypasses(const Reading& reading, Case& result);

/// Whether the shell side is scaled from the sheet's claims.
bool is_scaled(const Entries& entries);

/// Notes what that needs and is missing, and what contradicts it.
void check_scaled(Reading& reading);

/// Puts film and drop scaled from the case the sheet speaks of into a case that was read.
/// Throws InputError.
void scale_shell_side(const Document& document, const Case& stated_case, Case& result);

/// The density [kg/m3] that turns the volume flow written at `side`.flow into a mass flow; empty
/// with a mistake noted.
std::optional<double> flow_density(Reading& reading, const std::string& side, const fluids::Fluid& fluid,
                                   const Inlet& inlet);

/// The reading the unit is to be tied to; empty where there is none or it cannot be one, which
/// is noted.
std::optional<AnchorReading> anchor_of(Reading& reading, const rating::Stream& shell_side,
                                       const rating::Stream& tube_side);

/// Builds the case of a document without overlays. Throws InputError.
Case build_plain(const Document& document);
/// What the sheet claims; empty where it claims nothing.
bids::Claims claims_of(Reading& reading);

/// How the plant's record is to be read, and what is planned.
field::Mapping mapping_of(Reading& reading);
field::Planned plan_of(Reading& reading, std::optional<int> offset);

}  // namespace dutygauge::case_io
