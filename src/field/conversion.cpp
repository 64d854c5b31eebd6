#include "conversion.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace dutygauge::field {
namespace {

using units::Kind;

constexpr double span = 100.0;  ///< either side of the case's inlet temperature [K]
constexpr int steps = 64;

/// What a flow is shown as, and at which temperature its volume counts.
struct Shown {
  bool is_volume = false;
  std::optional<double> reference;  ///< [K] of a volume that is not the flowing one
  bool place_assumed = false;
};

FileError::Text objection_of(const units::Misread& misread) {
  return {misread.what, misread.expected, misread.remedy};
}

/// "1 2..3 kg/s" reads as a range: no unit holds one.
bool is_plain(const units::Value& value) {
  return !value.low && !value.standard_deviation;
}

FileError::Text no_unit(std::string_view unit, Kind kind) {
  return {fmt::format("'{}' is no unit", unit), fmt::format("a unit of {}", units::name(kind)),
          "write the unit alone"};
}

double density_at(const rating::Stream& stream, double temperature) {
  return fluids::state(stream.fluid, temperature, stream.inlet_pressure).density;
}

/// Mass of a unit shown, at a temperature of the stream at the meter.
double mass_of(const rating::Stream& stream, const Meter& meter, const Shown& shown, double temperature) {
  const double density = density_at(stream, temperature);
  constexpr double atmosphere = 101325.0;
  double mass = 1.0;
  if (shown.is_volume)
    mass = shown.reference ? fluids::reference_density(stream.fluid, *shown.reference, atmosphere) : density;
  if (meter.compensated || meter.density <= 0.0) return mass;
  // The meter takes its design density for the true one: it senses rho v2, or v.
  const double ratio = density / meter.density;
  const bool flowing_volume = shown.is_volume && !shown.reference;
  if (meter.principle == Principle::differential_pressure)
    return mass * (flowing_volume ? std::sqrt(1.0 / ratio) : std::sqrt(ratio));
  if (meter.principle == Principle::velocity && !flowing_volume) return mass * ratio;
  return mass;
}

OfTemperature tabulated(const rating::Stream& stream, const Meter& meter, const Shown& shown) {
  const auto usable = fluids::usable_temperatures(stream.fluid, stream.inlet_pressure);
  const double low = std::max(usable.low, stream.inlet_temperature - span);
  const double high = std::min(usable.high, stream.inlet_temperature + span);
  std::vector<double> values;
  for (int i = 0; i <= steps; ++i)
    values.push_back(mass_of(stream, meter, shown, low + (high - low) * i / steps));
  return {low, high, std::move(values), mass_of(stream, meter, shown, stream.inlet_temperature)};
}

std::string in_words(const rating::Stream& stream, const Meter& meter, const Shown& shown) {
  const double inlet = stream.inlet_temperature;
  const auto typed_density = [](double density) { return units::typed(density, Kind::density); };
  std::string text;
  if (shown.is_volume && shown.reference)
    text = fmt::format("volume at {}, times {}", units::typed(*shown.reference, Kind::temperature),
                       typed_density(mass_of(stream, {}, shown, inlet)));
  else if (shown.is_volume)
    text = fmt::format("volume at the inlet{}, times the density there: {} at {}",
                       shown.place_assumed ? " (assumed)" : "", typed_density(density_at(stream, inlet)),
                       units::typed(inlet, Kind::temperature));
  if (!meter.compensated && meter.density > 0.0)
    text += fmt::format("{}meter set for {}, corrected to the density it meets", text.empty() ? "" : "; ",
                        typed_density(meter.density));
  return text;
}

Resolved resolve_flow(Channel channel, std::string_view unit, const Column& column, const Streams& streams) {
  const bool is_hot = channel == Channel::hot_flow;
  const rating::Stream& stream = is_hot ? *streams.hot : *streams.cold;
  const std::string text = fmt::format("1 {}{}{}", unit, column.at.empty() ? "" : " at ", column.at);
  auto read = units::read_flow(text);
  if (const auto* misread = std::get_if<units::Misread>(&read)) return {{}, objection_of(*misread)};
  const units::Flow& flow = std::get<units::Flow>(read);
  if (!is_plain(flow.amount)) return {{}, no_unit(unit, Kind::mass_flow)};
  Shown shown;
  shown.is_volume = flow.basis != units::FlowBasis::mass;
  shown.place_assumed = flow.basis == units::FlowBasis::inlet_assumed;
  if (flow.basis == units::FlowBasis::temperature) shown.reference = flow.basis_temperature;
  Resolved result;
  result.conversion.factor = flow.amount.si;
  const bool corrects =
      !column.meter.compensated && column.meter.density > 0.0 && column.meter.principle != Principle::mass;
  if (!shown.is_volume && !corrects) return result;
  if (!(is_hot ? streams.hot_density_known : streams.cold_density_known))
    return {{},
            {"is a volume, and the case gives no density of its fluid", "a mass flow such as kg/s",
             "give the fluid's density in the case"}};
  if (shown.place_assumed && stream.fluid.phase == fluids::Phase::gas)
    return {{},
            {"is a volume of a gas, and nothing says where it is measured", "at: inlet, or Nm3/h",
             "say it in the case, under readings.columns"}};
  result.conversion.density_factor = tabulated(stream, column.meter, shown);
  result.conversion.density_in_words = in_words(stream, column.meter, shown);
  return result;
}

Kind kind_of(Channel channel) {
  if (is_temperature(channel)) return Kind::temperature;
  return is_drop(channel) ? Kind::pressure_difference : Kind::ratio;
}

}  // namespace

OfTemperature::OfTemperature(double low, double high, std::vector<double> values, double at_rest)
    : low_(low),
      per_step_(static_cast<double>(values.size() - 1) / (high - low)),
      at_rest_(at_rest),
      values_(std::move(values)) {}

double OfTemperature::operator()(double temperature) const {
  if (!std::isfinite(temperature)) return at_rest_;
  const double last = static_cast<double>(values_.size() - 1);
  const double at = std::clamp((temperature - low_) * per_step_, 0.0, last);
  const auto i = static_cast<std::size_t>(std::min(std::floor(at), last - 1.0));
  return values_[i] + (at - static_cast<double>(i)) * (values_[i + 1] - values_[i]);
}

Resolved resolve(Channel channel, std::string_view unit, const Column& column, const Streams& streams) {
  if (is_flow(channel)) return resolve_flow(channel, unit, column, streams);
  const Kind kind = kind_of(channel);
  const std::string one = fmt::format("1 {}", unit);
  const auto read = units::read(one, kind);
  if (const auto* misread = std::get_if<units::Misread>(&read)) return {{}, objection_of(*misread)};
  if (!is_plain(std::get<units::Value>(read))) return {{}, no_unit(unit, kind)};
  Resolved result;
  result.conversion.factor = std::get<units::Value>(read).si;
  if (kind != Kind::temperature) return result;
  // A factor and a zero, each exact where the other is left out.
  result.conversion.factor = std::get<units::Value>(units::read(one, Kind::temperature_difference)).si;
  result.conversion.offset = std::get<units::Value>(units::read(fmt::format("0 {}", unit), kind)).si;
  return result;
}

Streams streams_of(const rating::Problem& problem, const Mapping& mapping) {
  const bool shell_is_hot = rating::shell_side_is_hot(problem);
  const bool shell = mapping.shell_density_known, tube = mapping.tube_density_known;
  return {.hot = shell_is_hot ? &problem.shell_side : &problem.tube_side,
          .cold = shell_is_hot ? &problem.tube_side : &problem.shell_side,
          .hot_density_known = shell_is_hot ? shell : tube,
          .cold_density_known = shell_is_hot ? tube : shell};
}

}  // namespace dutygauge::field
