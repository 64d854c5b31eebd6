#include <boost/math/quadrature/gauss_kronrod.hpp>
#include <cmath>

#include "dutygauge/field/decision.hpp"
#include "dutygauge/numerics.hpp"

namespace dutygauge::field {

std::optional<Interval> best_interval(const CleaningCost& cost, const std::function<double(double)>& loss) {
  using boost::math::quadrature::gauss_kronrod;
  constexpr double century = 36525.0;
  const double fixed = cost.cleaning + cost.down_rate * cost.downtime;
  const auto spent = [&](double t) {
    return fixed + gauss_kronrod<double, 31>::integrate(loss, 0.0, t, 12, 1e-11);
  };
  // Above zero once running on costs more a day than the average so far.
  const auto excess = [&](double t) { return loss(t) * (t + cost.downtime) - spent(t); };
  double low = 0.0, high = 1.0;
  while (high < century && excess(high) < 0.0) {
    low = high;
    high *= 2.0;
  }
  const auto days = numerics::find_root(excess, {low, high}, 1e-9 * high);
  if (!days || *days > century) return {};
  return Interval{.days = *days, .cost_rate = spent(*days) / (*days + cost.downtime)};
}

}  // namespace dutygauge::field
