#include "dutygauge/service/control.hpp"

#include <fmt/core.h>

#include <cmath>

#include "dutygauge/numerics.hpp"
#include "dutygauge/rating/bypass.hpp"

namespace dutygauge::service {
namespace {

constexpr double least_share = 0.02;  // no valve holds less
constexpr double narrow = 0.9;        // a step of the search from the full flow downwards

rating::Stream& held(rating::Problem& problem, Control by) {
  return by == Control::throttle_tube_side ? problem.tube_side : problem.shell_side;
}

rating::Rating rated_at(rating::Problem problem, Control by, double share) {
  held(problem, by).mass_flow *= share;
  return rating::rate(problem);
}

}  // namespace

Holding hold(const rating::Problem& problem, Control by, double required_duty) {
  const auto excess = [&](double share) {
    const auto rating = rated_at(problem, by, share);
    return rating.outcome ? rating.outcome->duty / required_duty - 1.0 : std::nan("");
  };
  const double free = excess(1.0);
  if (std::isnan(free)) return {{}, "running free has no result"};
  if (free < 0.0)
    return {
        {},
        fmt::format("running free it falls short by {:.1f} %, and no control adds to that", -100.0 * free)};
  double high = 1.0, low = 1.0;
  while (low > least_share && excess(low) >= 0.0) {
    high = low;
    low *= narrow;
  }
  const double below = excess(low);
  if (std::isnan(below))
    return {{}, fmt::format("at {:.0f} % of the flow the unit cannot be rated any more", 100.0 * low)};
  if (below >= 0.0)
    return {{}, fmt::format("even {:.0f} % of the flow gives more than is required", 100.0 * low)};
  const auto share = numerics::find_root(excess, {low, high}, 1e-9);
  if (!share) return {{}, "no flow gives exactly the required duty"};
  auto rating = rated_at(problem, by, *share);
  if (!rating.outcome) return {{}, rating.no_result};
  rating::Problem there = problem;
  rating::Stream& stream = held(there, by);
  const bool is_tube_side = by == Control::throttle_tube_side;
  const double outlet = is_tube_side ? rating.outcome->tube_outlet : rating.outcome->shell_outlet;
  return {Controlled{.by = by,
                     .share = *share,
                     .flow = stream.mass_flow * *share,
                     .mixed_outlet = is_tube_side ? outlet : rating::after_mix(stream, outlet, 1.0 - *share),
                     .outcome = std::move(*rating.outcome)},
          {}};
}

}  // namespace dutygauge::service
