#include "cut.hpp"

#include <cmath>
#include <numbers>

#include "dutygauge/numerics.hpp"

namespace dutygauge::case_io {

double cut_of_area(double share) {
  using std::numbers::pi;
  const auto excess = [&](double angle) { return (angle - std::sin(angle)) / (2.0 * pi) - share; };
  // The balance changes its sign between no window and the whole circle.
  const double angle = numerics::find_root(excess, {0.0, 2.0 * pi}, 1e-13).value();
  return 0.5 * (1.0 - std::cos(0.5 * angle));
}

}  // namespace dutygauge::case_io
