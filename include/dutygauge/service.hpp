#pragma once
#include <optional>
#include <string>
#include <vector>

#include "dutygauge/findings.hpp"
#include "dutygauge/rating.hpp"

/// What the exchanger must do, and by how much it does.
namespace dutygauge::service {

enum class Line { shell_side_outlet, tube_side_outlet, duty };

/// One line of the service: a limit on an outlet temperature [K] or the duty [W].
struct Demand {
  Line line;
  bool at_least;
  double limit;
};

/// What must hold, and what the two streams may lose in pressure.
struct Service {
  std::vector<Demand> demands;
  std::optional<double> shell_side_allowable_drop, tube_side_allowable_drop;  ///< [Pa]
  units::System words = units::System::metric;  ///< units of the verdict's sentence
};

/// Empty members: not defined for this service (rating-procedure section 6).
struct Margins {
  std::optional<double> required_duty;                 ///< [W]
  std::optional<double> u_required;                    ///< [W/m2.K]
  std::optional<double> duty, surface, surface_clean;  ///< fractions
  std::optional<double> fouling_spare;                 ///< outside area [m2.K/W]
  std::optional<double> temperature;                   ///< [K]
};

struct Verdict {
  std::optional<bool> met;  ///< empty where no service is stated
  std::string limited_by;   ///< the line or limit that is tightest, in the case's words
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
  Findings findings;                              ///< all of them, rating's too
};

Assessment assess(const rating::Problem& problem, const Service& service);

}  // namespace dutygauge::service
