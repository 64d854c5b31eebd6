#include <fmt/format.h>

#include <cmath>

#include "parts.hpp"
#include "wording.hpp"

namespace dutygauge::case_io {
namespace {

using fluids::Fluid;
using fluids::Phase;
using units::FlowBasis;
using units::Kind;

constexpr double standard_atmosphere =
    101325.0;  // of gauge pressures and of gas volumes "at" a temperature [Pa]

bool is_bare_pressure(const Reading& reading, const std::string& key) {
  const auto found = reading.entries().find(key);
  return found != reading.entries().end() && found->second.value.bare_pressure;
}

/// What would be objected to if the pressure were a gauge pressure, and the phase then.
struct IfGauge {
  bool objected = false;
  Phase phase = Phase::liquid;
};

IfGauge if_gauge(const Reading& reading, const std::string& side, const Inlet& inlet,
                 const fluids::Made& made) {
  const fluids::Inlet absolute{*inlet.temperature, *inlet.pressure + standard_atmosphere};
  if (const auto name = word(reading.entries(), side + ".fluid")) {
    const fluids::Made other = fluids::make_named(shown(*name), absolute);
    return {!other.objections.empty(), other.fluid.phase};
  }
  return {!fluids::object_to_inlet(made.fluid, absolute).empty(), made.fluid.phase};
}

/// A pressure without a datum is read as absolute, unless that decides what the fluid is.
void check_datum(Reading& reading, const std::string& side, const Inlet& inlet, const fluids::Made& made) {
  const std::string key = side + ".inlet.pressure";
  if (!is_bare_pressure(reading, key)) return;
  const auto note = [&](const std::string& why) {
    reading.note(key,
                 fmt::format("'{}' does not say whether it is absolute or gauge, and {}",
                             shown(reading.entries().at(key).text), why),
                 "a pressure with its datum, such as 6 bara or 6 barg", "take it from the datasheet");
  };
  if (made.objections.empty() && made.fluid.phase == Phase::gas)
    return note("the density of a gas depends on it");
  const IfGauge other = if_gauge(reading, side, inlet, made);
  const bool differ = made.objections.empty() == other.objected ||
                      (made.objections.empty() && made.fluid.phase != other.phase);
  if (differ) note("the phase at the inlet depends on it");
}

/// Gases whose density at 101325 Pa follows from their model, not from a sheet made for another pressure.
bool knows_pressure(const Fluid& fluid) {
  return std::holds_alternative<fluids::WaterModel>(fluid.model) ||
         std::holds_alternative<fluids::GasModel>(fluid.model) ||
         std::holds_alternative<fluids::AirModel>(fluid.model);
}

/// Where a written volume flow is measured: gases "at" a temperature have 101325 Pa there, whether
/// they could be rated there or not; liquids are under the pressure of the inlet.
std::optional<double> density_there(Reading& reading, const std::string& key, const Fluid& fluid,
                                    const fluids::Inlet& there) {
  const auto usable = fluids::usable_temperatures(fluid, there.pressure);
  const double density = fluids::reference_density(fluid, there.temperature, there.pressure);
  const bool inside = there.temperature >= usable.low && there.temperature <= usable.high;
  if ((inside || fluid.phase == Phase::gas) && std::isfinite(density) && density > 0.0) return density;
  reading.note(
      key,
      fmt::format("the density at {} is not known: {}", units::typed(there.temperature, Kind::temperature),
                  fluids::why_it_ends(fluid, there.pressure, there.temperature > usable.low)),
      "a mass flow, or a volume flow where the fluid is known", "give the mass flow");
  return {};
}

}  // namespace

std::optional<double> flow_density(Reading& reading, const std::string& side, const Fluid& fluid,
                                   const Inlet& inlet) {
  const std::string key = side + ".flow";
  const Entry& flow = reading.entries().at(key);
  const bool is_gas = fluid.phase == Phase::gas;
  if (is_gas && flow.basis == FlowBasis::inlet_assumed) {
    reading.note(key, fmt::format("'{}' does not say where the gas has that volume", shown(flow.text)),
                 "a mass flow, or a volume flow with its place: 900 m3/h at inlet, 9000 Nm3/h",
                 "say where it is measured");
    return {};
  }
  const bool at_inlet = flow.basis != FlowBasis::temperature;
  if (!at_inlet && is_gas && !knows_pressure(fluid)) {
    reading.note(key, "the fluid's properties do not give the density of this gas at 101325 Pa",
                 "a mass flow, or a volume flow at inlet",
                 "convert it with the gas's density at the stated temperature");
    return {};
  }
  return density_there(reading, key, fluid,
                       {at_inlet ? *inlet.temperature : flow.at_temperature,
                        at_inlet || !is_gas ? *inlet.pressure : standard_atmosphere});
}

bool knows_density(const Reading& reading, const std::string& side) {
  for (const char* family : {".fluid.constant", ".fluid.two_point"})
    if (reading.has(side + family) && !reading.has(side + family + ".density")) return false;
  return true;
}

namespace {

std::optional<double> mass_flow(Reading& reading, const std::string& side, const Fluid& fluid,
                                const Inlet& inlet) {
  const auto found = reading.entries().find(side + ".flow");
  if (found == reading.entries().end()) return {};
  if (found->second.from_duty) return 0.0;  // found once both streams are known
  if (reading.has("exchanger.area") && found->second.basis != FlowBasis::mass &&
      !knows_density(reading, side)) {
    reading.note(side + ".flow", "a volume, and the fluid's density is not given",
                 "a mass flow such as 80 kg/s", "give the mass flow, or the density");
    return {};
  }
  if (found->second.basis == FlowBasis::mass) return found->second.value.si;
  const auto density = flow_density(reading, side, fluid, inlet);
  return density ? std::optional(*density * found->second.value.si) : std::nullopt;
}

std::string name_of(const Reading& reading, const std::string& side, const Fluid& fluid) {
  const auto typed = word(reading.entries(), side + ".name");
  return typed ? std::string(*typed) : fluid.name;
}

/// Where films and drops are laws and the fluid is a heat capacity, nothing depends on the pressure.
std::optional<double> pressure_of(const Reading& reading, const std::string& side) {
  const auto typed = si(reading.entries(), side + ".inlet.pressure");
  const bool is_heat_capacity =
      reading.has(side + ".fluid.constant") || reading.has(side + ".fluid.two_point");
  const bool matters =
      !reading.has("exchanger.area") || !is_heat_capacity || reading.has(side + ".inlet.pressure");
  return matters ? typed : std::optional(standard_atmosphere);
}

}  // namespace

std::optional<MadeStream> stream_of(Reading& reading, const std::string& name) {
  const std::string side = "streams." + name;
  const Inlet inlet{si(reading.entries(), side + ".inlet.temperature"), pressure_of(reading, side)};
  auto made = fluid_of(reading, side + ".fluid", inlet);
  if (!made) return {};
  if (inlet.temperature && inlet.pressure) check_datum(reading, side, inlet, *made);
  if (!reading.is_at_fault(side + ".inlet.pressure")) reading.note_all(made->objections);
  if (!made->objections.empty() || !inlet.temperature || !inlet.pressure) return {};
  const auto flow = mass_flow(reading, side, made->fluid, inlet);
  const auto fouling = si(reading.entries(), side + ".fouling");
  if (!flow || !fouling) return {};
  return MadeStream{.stream = {.name = name_of(reading, side, made->fluid),
                               .fluid = std::move(made->fluid),
                               .mass_flow = *flow,
                               .inlet_temperature = *inlet.temperature,
                               .inlet_pressure = *inlet.pressure,
                               .fouling_resistance = *fouling,
                               .pressure_is_known = reading.has(side + ".inlet.pressure")},
                    .assumed = std::move(made->assumed),
                    .findings = std::move(made->findings)};
}

}  // namespace dutygauge::case_io
