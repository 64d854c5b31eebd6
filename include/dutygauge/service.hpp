#pragma once
#include <optional>
#include <string>
#include <vector>

#include "dutygauge/findings.hpp"
#include "dutygauge/rating.hpp"

/// What the exchanger must do, and by how much it does.
namespace dutygauge::service {

/// What a line of the service speaks of.
enum class Quantity { shell_side_outlet, tube_side_outlet, duty };

/// One line of the service: a limit on an outlet temperature [K] or on the duty [W].
struct Demand {
  Quantity quantity;
  bool at_least;
  double limit;
};

/// What must hold, and what the two streams may lose in pressure.
struct Service {
  std::vector<Demand> demands;
  std::optional<double> shell_side_allowable_drop, tube_side_allowable_drop;  ///< [Pa]
  std::optional<double> confidence = {};        ///< probability [-] from which a "yes" may be spoken
  units::System words = units::System::metric;  ///< units of the verdict's sentences
};

/// Empty members: not defined for this service. A demand is a line that asks for heat: a
/// duty, a hot outlet at most, a cold outlet at least; the other lines are limits.
struct Margins {
  std::optional<double> required_duty;  ///< the largest demand [W]
  std::optional<double> u_required;     ///< required duty / (area x F x LMTD there) [W/m2.K]
  std::optional<double> duty;           ///< duty running free / required - 1
  std::optional<double> surface;        ///< installed / needed for the required duty - 1, fouled as given
  std::optional<double> surface_clean;  ///< the same without fouling
  std::optional<double> fouling_spare;  ///< further resistance it can carry, outside area [m2.K/W]
  std::optional<double> temperature;    ///< smallest distance of an outlet from its limit [K]
};

struct Verdict {
  std::optional<bool> met;  ///< every line holds; empty where no service is stated or no result
  std::string limited_by;   ///< key of the tightest line, or the reason there is no result
  std::string text;         ///< a sentence that can be spoken
};

/// One case, rated and judged, with a second opinion on the shell side.
struct Assessment {
  rating::Problem problem;
  Service service;
  rating::Rating rating;
  Margins margins;
  Verdict verdict;
  std::optional<rating::Outcome> second_opinion;  ///< with Kern's shell side
  Findings findings;                              ///< all of them, the rating's too
};

/// Rates a problem and judges it against the service.
Assessment assess(const rating::Problem& problem, const Service& service);

/// Rates by the problem's own solution alone and judges what runs free: without surface
/// margins, second opinion and the other solution. For cases rated many times over.
Assessment judge(const rating::Problem& problem, const Service& service);

/// How far a line is from its limit [K or W]; negative when it does not hold.
double distance(const Demand& demand, const rating::Outcome& outcome);

/// Actual value [K or W] of what a line speaks of.
double actual(const Demand& demand, const rating::Outcome& outcome);

/// The line's key in the case file ("service.shell_side_outlet").
std::string_view key_of(Quantity quantity);

/// Whether a line holds: 1e-9 relative on a duty, 1e-6 K on a temperature.
bool holds(const Demand& demand, const rating::Outcome& outcome);

/// Whether a line asks for heat to be exchanged, or only limits it.
bool asks_for_heat(const Demand& demand, const rating::Problem& problem);

}  // namespace dutygauge::service
