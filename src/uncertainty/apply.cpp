#include <algorithm>
#include <boost/math/distributions/normal.hpp>
#include <cmath>
#include <numbers>
#include <stdexcept>

#include "dutygauge/uncertainty.hpp"

namespace dutygauge::uncertainty {
namespace {

/// Symmetric around 0 with standard deviation 1, from -sqrt(6) to sqrt(6).
double triangular(double p) {
  const double half_width = std::sqrt(6.0);
  return p < 0.5 ? half_width * (std::sqrt(2.0 * p) - 1.0) : half_width * (1.0 - std::sqrt(2.0 * (1.0 - p)));
}

/// A property that is wrong is so too where the films and drops scaled from it hold.
void scale_property(rating::Stream& stream, double fluids::Scale::*of_fluid, double fluids::State::*of_state,
                    double value) {
  stream.fluid.scale.*of_fluid *= value;
  if (stream.film_law && stream.film_law->at_state) (*stream.film_law->at_state).*of_state *= value;
  if (stream.drop_law && stream.drop_law->at_state) (*stream.drop_law->at_state).*of_state *= value;
}

void apply_to_stream(Varied varied, double value, rating::Stream& stream) {
  using fluids::Scale, fluids::State;
  switch (varied) {
    case Varied::fouling:
      stream.fouling_resistance *= value;
      return;
    case Varied::density:
      return scale_property(stream, &Scale::density, &State::density, value);
    case Varied::heat_capacity:
      return scale_property(stream, &Scale::heat_capacity, &State::heat_capacity, value);
    case Varied::conductivity:
      return scale_property(stream, &Scale::conductivity, &State::conductivity, value);
    case Varied::viscosity:
      return scale_property(stream, &Scale::viscosity, &State::viscosity, value);
    case Varied::flow:
      stream.mass_flow *= value;
      return;
    case Varied::inlet_temperature:
      stream.inlet_temperature += value;
      return;
    default:
      throw std::invalid_argument("uncertainty::apply: not of a stream");
  }
}

/// How far from the middle a swing is, its ends at -1 and 1.
double place_of(Distribution distribution, double deviate) {
  const double sigmas = deviation(distribution, deviate);
  if (distribution == Distribution::uniform) return sigmas / std::numbers::sqrt3;
  return distribution == Distribution::triangular ? sigmas / std::sqrt(6.0) : sigmas;
}

}  // namespace

double deviation(Distribution distribution, double deviate) {
  const double p = boost::math::cdf(boost::math::normal(), deviate);
  if (distribution == Distribution::uniform) return std::numbers::sqrt3 * (2.0 * p - 1.0);
  return distribution == Distribution::triangular ? triangular(p) : deviate;
}

double drawn(const Source& source, double deviate) {
  const bool moved = source.varied == Varied::inlet_temperature || source.varied == Varied::read_inlet ||
                     source.varied == Varied::read_outlet || source.varied == Varied::found_fouling;
  if (source.distribution != Distribution::lognormal)
    return (moved ? 0.0 : 1.0) + source.sigma * deviation(source.distribution, deviate);
  if (moved) throw std::invalid_argument("uncertainty::drawn: what is moved has no lognormal error");
  return std::exp(deviate * std::sqrt(std::log1p(source.sigma * source.sigma)));
}

void apply(const Source& source, double deviate, rating::Problem& problem) {
  const double value = drawn(source, deviate);
  const bool shell = source.side == Side::shell;
  switch (source.varied) {
    case Varied::film:
    case Varied::film_with_flow:
      (shell ? problem.factors.shell_film : problem.factors.tube_film) *= value;
      return;
    case Varied::drop:
      (shell ? problem.factors.shell_drop : problem.factors.tube_drop) *= value;
      return;
    case Varied::wall_conductivity:
      for (double& conductivity : problem.exchanger.wall_conductivity.value) conductivity *= value;
      return;
    default:
      apply_to_stream(source.varied, value, shell ? problem.shell_side : problem.tube_side);
  }
}

void apply(const Source& source, double deviate, SteadyReading& reading) {
  const double value = drawn(source, deviate);
  ReadStream& stream = source.side == Side::shell ? reading.shell_side : reading.tube_side;
  if (source.varied == Varied::read_inlet)
    stream.inlet += value;
  else if (source.varied == Varied::read_outlet)
    stream.outlet += value;
  else if (source.varied == Varied::read_flow && stream.mass_flow)
    *stream.mass_flow *= value;
  else
    throw std::invalid_argument("uncertainty::apply: not of a reading");
}

void apply(const Swing& swing, double deviate, rating::Outcome& outcome) {
  // The parabola through three points says nothing beyond its ends: straight on from there.
  const double place = place_of(swing.distribution, deviate);
  const double inside = std::clamp(place, -1.0, 1.0);
  const auto at = [&](Output output) {
    const auto k = static_cast<std::size_t>(output);
    const double slope = 0.5 * (swing.at_high[k] - swing.at_low[k]);
    const double bend = 0.5 * (swing.at_high[k] + swing.at_low[k]);
    return slope * place + bend * inside * inside;
  };
  outcome.duty *= 1.0 + at(Output::duty);
  outcome.shell_outlet += at(Output::shell_outlet);
  outcome.tube_outlet += at(Output::tube_outlet);
  outcome.shell_drop = outcome.shell_drop.times(1.0 + at(Output::shell_drop));
  outcome.tube_drop = outcome.tube_drop.times(1.0 + at(Output::tube_drop));
}

}  // namespace dutygauge::uncertainty
