#include <algorithm>
#include <cmath>
#include <utility>

#include "balance.hpp"
#include "dutygauge/numerics.hpp"

namespace dutygauge::field {
namespace {

bool is_share(double x) {
  return x >= 0.0 && x < 1.0;
}

bool is_possible(const Plant& plant, const Conditions& c, const Ailment& a) {
  const fluids::TemperatureRange &hot = hot_range(plant), &cold = cold_range(plant);
  return c.hot_flow > 0.0 && c.cold_flow > 0.0 && std::isfinite(c.hot_flow) && std::isfinite(c.cold_flow) &&
         c.hot_in > c.cold_in && c.hot_in >= hot.low && c.hot_in <= hot.high && c.cold_in >= cold.low &&
         c.cold_in <= cold.high && is_share(a.plugged) && is_share(a.tube_bypass) &&
         is_share(a.shell_bypass) && is_share(a.area_lost) && std::isfinite(a.tube_deposit) &&
         std::isfinite(a.shell_deposit);
}

/// The unit under one set of conditions with one ailment.
class Ailing {
 public:
  Ailing(const Plant& plant, const Conditions& conditions, const Ailment& ailment)
      : plant_(plant), c_(conditions), a_(ailment), shell_is_hot_(plant.prepared.shell_side_is_hot()) {
    hot_bundle_ = c_.hot_flow * (1.0 - (shell_is_hot_ ? a_.shell_bypass : a_.tube_bypass));
    cold_bundle_ = c_.cold_flow * (1.0 - (shell_is_hot_ ? a_.tube_bypass : a_.shell_bypass));
  }

  /// What the bundle's streams could exchange at most [W].
  double largest_duty() const {
    const auto &hot_end = hot_range(plant_), &cold_end = cold_range(plant_);
    const double hot = hot_bundle_ * heat(hot_stream(plant_), c_.hot_in, std::max(c_.cold_in, hot_end.low));
    const double cold =
        cold_bundle_ * heat(cold_stream(plant_), std::min(c_.hot_in, cold_end.high), c_.cold_in);
    return std::min(hot, cold);
  }

  /// Whether the films settled in every trial so far.
  bool settled() const { return settled_; }

  /// The arrangement's duty at a trial less the trial duty.
  double excess(double duty) {
    place(duty);
    const double hot_rate = rate(duty, c_.hot_in - hot_end_, hot_bundle_, hot_stream(plant_), c_.hot_in);
    const double cold_rate =
        rate(duty, cold_end_ - c_.cold_in, cold_bundle_, cold_stream(plant_), c_.cold_in);
    const auto [tube, shell] =
        shell_is_hot_ ? std::pair{cold_rate, hot_rate} : std::pair{hot_rate, cold_rate};
    const double area = plant_.prepared.problem().exchanger.area * (1.0 - a_.plugged) * (1.0 - a_.area_lost);
    settle_films();
    const double p =
        arrangement::effectiveness(plant_.prepared.arrangement(), tube / shell, u_ * area / tube);
    return p * tube * (c_.hot_in - c_.cold_in) - duty;
  }

  Response response(double duty) {
    excess(duty);
    Response r{.duty = duty};
    r.hot_out = outlet(hot_stream(plant_), c_.hot_in, -duty / c_.hot_flow);
    r.cold_out = outlet(cold_stream(plant_), c_.cold_in, duty / c_.cold_flow);
    const rating::PlaceDrops drops = plant_.prepared.drops(at_);
    const double narrowing =
        deposit_on_tube_drop(plant_.deposit_on_drops, plant_.prepared.problem().exchanger, a_.tube_deposit);
    const double tube_nozzles = square(1.0 - a_.plugged) / square(1.0 - a_.tube_bypass);
    const double shell_nozzles = 1.0 / square(1.0 - a_.shell_bypass);
    r.tube_dp = drops.tube_bundle * narrowing + drops.tube_nozzles * tube_nozzles;
    r.shell_dp = drops.shell_bundle * (1.0 + plant_.deposit_on_drops.shell_rise * a_.shell_deposit) +
                 drops.shell_nozzles * shell_nozzles;
    return r;
  }

 private:
  static double square(double x) { return x * x; }

  static double heat(const rating::Stream& stream, double warm, double cool) {
    return fluids::enthalpy(stream.fluid, warm, stream.inlet_pressure) -
           fluids::enthalpy(stream.fluid, cool, stream.inlet_pressure);
  }

  static double outlet(const rating::Stream& stream, double inlet, double gain) {
    return fluids::temperature_at(stream.fluid,
                                  fluids::enthalpy(stream.fluid, inlet, stream.inlet_pressure) + gain,
                                  stream.inlet_pressure);
  }

  /// Below this change [K] the secant loses its digits.
  static double rate(double duty, double change, double flow, const rating::Stream& stream, double inlet) {
    if (std::abs(change) > 1e-6) return duty / change;
    return flow * fluids::state(stream.fluid, inlet, stream.inlet_pressure).heat_capacity;
  }

  /// The bundle's ends and the streams' means at a trial duty.
  void place(double duty) {
    hot_end_ = outlet(hot_stream(plant_), c_.hot_in, -duty / hot_bundle_);
    cold_end_ = outlet(cold_stream(plant_), c_.cold_in, duty / cold_bundle_);
    const double hot_mean = 0.5 * (c_.hot_in + outlet(hot_stream(plant_), c_.hot_in, -duty / c_.hot_flow));
    const double cold_mean =
        0.5 * (c_.cold_in + outlet(cold_stream(plant_), c_.cold_in, duty / c_.cold_flow));
    at_ = shell_is_hot_ ? rating::Place{cold_bundle_, hot_bundle_, cold_mean, hot_mean, u_}
                        : rating::Place{hot_bundle_, cold_bundle_, hot_mean, cold_mean, u_};
    at_.tube_flow /= 1.0 - a_.plugged;
  }

  /// U with the films at the walls it makes itself.
  void settle_films() {
    bool stands = false;
    for (int pass = 0; pass < 30 && !stands; ++pass) {
      at_.u = u_;
      const rating::CleanFilms films = plant_.prepared.films(at_);
      const double resistance = plant_.calibration.factor * films.sum() + a_.tube_deposit + a_.shell_deposit;
      if (!films.converged || !(resistance > 0.0)) break;
      u_ = 1.0 / resistance;
      stands = std::abs(u_ - at_.u) < 1e-11 * u_;
    }
    settled_ = settled_ && stands;
  }

  const Plant& plant_;
  Conditions c_;
  Ailment a_;
  bool shell_is_hot_;
  double hot_bundle_ = 0, cold_bundle_ = 0;  ///< flows through the bundle [kg/s]
  double hot_end_ = 0, cold_end_ = 0;        ///< of the bundle, before by-passes mix [K]
  rating::Place at_{};
  double u_ = 1000.0;  ///< of the trial before: where the walls of the next begin
  bool settled_ = true;
};

}  // namespace

std::optional<Response> respond(const Plant& plant, const Conditions& conditions, const Ailment& ailment) {
  if (!is_possible(plant, conditions, ailment)) return {};
  Ailing unit(plant, conditions, ailment);
  const double limit = unit.largest_duty();
  if (!(limit > 0.0)) return {};
  const auto duty =
      numerics::find_root([&](double trial) { return unit.excess(trial); }, {0.0, limit}, 1e-10 * limit);
  if (!duty) return {};
  const Response response = unit.response(*duty);
  const double all = response.hot_out + response.cold_out + response.tube_dp + response.shell_dp;
  if (!unit.settled() || !std::isfinite(all)) return {};
  return response;
}

std::optional<Response> respond(const rating::Problem& problem, const Calibration& calibration,
                                const Conditions& conditions, const Ailment& ailment) {
  return respond(Plant(problem, calibration), conditions, ailment);
}

}  // namespace dutygauge::field
