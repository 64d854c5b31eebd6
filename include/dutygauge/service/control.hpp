#pragma once
#include <optional>
#include <string>

#include "dutygauge/rating.hpp"

/// A unit that is held at its duty instead of running free.
namespace dutygauge::service {

/// What holds it there.
enum class Control { throttle_tube_side, bypass_shell_side };

/// The balance at exactly the required duty.
struct Controlled {
  Control by = Control::throttle_tube_side;
  double share = 1;         ///< of the controlled stream's stated flow that passes the exchanger [-]
  double flow = 0;          ///< that is [kg/s] of the whole unit
  double mixed_outlet = 0;  ///< of the controlled stream, what went round mixed in [K]
  rating::Outcome outcome;  ///< of the exchanger itself
};

/// How far the control closes or opens, and what the unit then does; or why it cannot hold the duty.
struct Holding {
  std::optional<Controlled> controlled;
  std::string no_result;  ///< a sentence without its full stop
};

/// Needs: the duty is above zero. Less flow gives less duty; of several flows with that duty the
/// largest is taken.
Holding hold(const rating::Problem& problem, Control by, double required_duty);

}  // namespace dutygauge::service
