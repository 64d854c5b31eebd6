#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <limits>
#include <random>

#include "dutygauge/field/suspects.hpp"
#include "field_plants.hpp"
#include "field_simulated.hpp"

// Which channel is at fault where the two duties part.

using namespace dutygauge;
using field::Channel;
using field::FaultKind;
using field::index_of;

namespace {

constexpr double missing = std::numeric_limits<double>::quiet_NaN();

const field::Instruments instruments = plants::instruments({.flow_systematic = 0.01,
                                                            .flow_random = 0.01,
                                                            .temperature_systematic = 0.15,
                                                            .temperature_random = 0.15});
const field::Instruments oil_instruments = plants::instruments({.flow_systematic = 0.01,
                                                                .flow_random = 0.015,
                                                                .temperature_systematic = 0.15,
                                                                .temperature_random = 0.4});

bool is_accused(const field::Accusation& accusation, Channel channel) {
  return std::any_of(accusation.suspects.begin(),
                     accusation.suspects.begin() + static_cast<std::ptrdiff_t>(accusation.inseparable),
                     [channel](const field::Suspect& s) { return s.fault.channel == channel; });
}

double rms_error(const field::Days& days, const std::map<int, double>& truth) {
  double sum = 0.0;
  for (const field::Day& day : days)
    sum += std::pow(day.apparent.fouling - truth.at(static_cast<int>(day.day)), 2);
  return std::sqrt(sum / static_cast<double>(days.size()));
}

/// What goes wrong in a made-up record of plant A.
struct Wrong {
  std::vector<field::Fault> faults{};
  double cleaned_on = 1e9;  ///< [d]
  bool with_drops = true;
};

/// 160 days at changing flows and seasons, a deposit that grows in the tubes.
field::Days record(const field::Plant& plant, const Wrong& wrong, unsigned seed) {
  std::mt19937 random(seed);
  std::normal_distribution<double> normal;
  field::Days days;
  for (int i = 0; i < 160; ++i) {
    const double t = i + 0.5, load = 0.9 + 0.1 * std::sin(t / 9.0);
    const field::Conditions c{80.0 * load * (1.0 + 0.02 * normal(random)),
                              110.0 * (1.0 + 0.06 * std::sin(t / 23.0) + 0.02 * normal(random)),
                              328.15 + normal(random), 296.0 + 6.0 * std::sin(t / 60.0)};
    const double deposit = t < wrong.cleaned_on ? 3e-5 + 1e-6 * t : 1e-5;
    const auto shown = field::respond(plant, c, {.tube_deposit = deposit});
    REQUIRE(shown.has_value());
    field::Day day{.day = t, .count = 24};
    day.value = {c.hot_flow,      c.cold_flow,    c.hot_in,        shown->hot_out, c.cold_in,
                 shown->cold_out, shown->tube_dp, shown->shell_dp, missing};
    for (const field::Fault& fault : wrong.faults) {
      if (t < fault.since) continue;
      double& value = day.value[index_of(fault.channel)];
      const double error = fault.magnitude * (fault.drifts ? (t - fault.since) / 365.0 : 1.0);
      value = fault.kind == FaultKind::gain ? value * (1.0 + error) : value + error;
    }
    for (std::size_t k = 0; k < 8; ++k) {
      const double scatter = instruments[k].random * std::sqrt(1.57 / 24.0) * normal(random);
      day.value[k] += instruments[k].relative ? scatter * day.value[k] : scatter;
    }
    if (!wrong.with_drops)
      day.value[index_of(Channel::tube_dp)] = day.value[index_of(Channel::shell_dp)] = missing;
    const auto a = field::apparent(plant, instruments, day.value);
    if (!a) continue;
    day.apparent = *a;
    days.push_back(day);
  }
  return days;
}

}  // namespace

TEST_CASE("field: the two bad instruments of a simulated year are found, and its fouling without them") {
  // What really happened: cold_out reads 3.5 K high from day 120, the hot flow meter loses 6 % a
  // year from the first day, the cold flow is absent from day 300 to 340.
  const field::Plant plant(plants::problem(plants::oil_preheater));
  const auto days = simulated::daily(plant, oil_instruments, simulated::running_hours("B"));
  const auto truth = simulated::true_fouling("B");
  CHECK(rms_error(days, truth) > 90e-6);

  const auto step = field::accuse_step(plant, oil_instruments, days, 118.0);
  REQUIRE(step.has_value());
  CHECK(std::abs(step->since - 120.0) < 5.0);
  CHECK(step->inseparable == 1);
  const field::Fault& shifted = step->suspects.front().fault;
  CHECK(shifted.channel == Channel::cold_out);
  CHECK(std::abs(shifted.magnitude - 3.5) < 3.0 * shifted.standard_uncertainty);

  const std::vector<field::Fault> known = {shifted};
  const auto drift = field::accuse_drift(plant, oil_instruments, days, known);
  REQUIRE(drift.has_value());
  CHECK(drift->inseparable == 1);
  const field::Fault& losing = drift->suspects.front().fault;
  CHECK(losing.channel == Channel::hot_flow);
  REQUIRE(losing.kind == FaultKind::gain);
  CHECK(std::abs(losing.magnitude + 0.06) < 3.0 * losing.standard_uncertainty);

  for (const auto& faults : {std::vector{shifted, losing}, std::vector{losing, shifted}}) {
    const field::Days without = field::without_faults(plant, oil_instruments, days, faults);
    CHECK(without.size() == days.size());
    CHECK(rms_error(without, truth) < 60e-6);
  }
}

TEST_CASE("field: all faults of a record come in one go, each once") {
  const field::Plant plant(plants::problem(plants::oil_preheater));
  const auto days = simulated::daily(plant, oil_instruments, simulated::running_hours("B"));
  // Where the closure was seen to step, the cleaning and a load change among them.
  const double steps[] = {240.0, 119.0, 58.0, 122.0};
  const auto accusations = field::accuse(plant, oil_instruments, days, steps);
  REQUIRE(accusations.size() == 2);
  CHECK_FALSE(accusations[0].drifts);
  CHECK(accusations[1].drifts);
  const auto faults = field::faults_of(accusations);
  REQUIRE(faults.size() == 2);
  CHECK(faults[0].channel == Channel::cold_out);
  CHECK(faults[1].channel == Channel::hot_flow);
  // No step seen, none accused: the shift then only spoils the drift.
  for (const field::Accusation& a : field::accuse(plant, oil_instruments, days, {})) CHECK(a.drifts);
}

TEST_CASE("field: honest instruments are not accused") {
  for (const char* unit : {"A", "G"}) {
    CAPTURE(unit);
    const field::Plant plant(
        plants::problem(std::string(unit) == "A" ? plants::water_cooler : plants::drawn_cooler));
    const auto days = simulated::daily(plant, instruments, simulated::running_hours(unit));
    for (double near = 10.0; near < 360.0; near += 5.0) {
      CAPTURE(near);
      CHECK_FALSE(field::accuse_step(plant, instruments, days, near));
    }
    CHECK_FALSE(field::accuse_drift(plant, instruments, days, {}));
  }
}

TEST_CASE("field: whichever channel steps is among the accused, and few others are") {
  const field::Plant plant(plants::problem(plants::water_cooler));
  const field::Fault faults[] = {{Channel::hot_flow, FaultKind::gain, false, 80.0, -0.08, 0.0},
                                 {Channel::cold_flow, FaultKind::gain, false, 80.0, 0.08, 0.0},
                                 {Channel::hot_in, FaultKind::bias, false, 80.0, 1.5, 0.0},
                                 {Channel::hot_out, FaultKind::bias, false, 80.0, -1.5, 0.0},
                                 {Channel::cold_in, FaultKind::bias, false, 80.0, -1.5, 0.0},
                                 {Channel::cold_out, FaultKind::bias, false, 80.0, 1.5, 0.0}};
  for (const field::Fault& fault : faults)
    for (unsigned seed = 1; seed <= 5; ++seed) {
      CAPTURE(static_cast<int>(fault.channel));
      CAPTURE(seed);
      const auto days = record(plant, {.faults = {fault}}, seed);
      const auto found = field::accuse_step(plant, instruments, days, 82.0);
      REQUIRE(found.has_value());
      CHECK(std::abs(found->since - 80.0) <= 2.0);
      CHECK(found->suspects.size() == 6);
      CHECK(is_accused(*found, fault.channel));
      CHECK(found->inseparable <= 3);
      CHECK_FALSE(found->fouling_steps_too);
    }
}

TEST_CASE("field: a meter that drifts is accused by the drop of its side") {
  const field::Plant plant(plants::problem(plants::water_cooler));
  for (const Channel channel : {Channel::hot_flow, Channel::cold_flow}) {
    CAPTURE(static_cast<int>(channel));
    const field::Fault fault{channel, FaultKind::gain, true, 0.5, -0.2, 0.0};
    const auto found = field::accuse_drift(plant, instruments, record(plant, {.faults = {fault}}, 7), {});
    REQUIRE(found.has_value());
    CHECK(found->drifts);
    CHECK(is_accused(*found, channel));
    CHECK(std::abs(found->suspects.front().fault.magnitude) > 0.1);
    // Without drops the meters cannot be told from each other.
    const auto blind = field::accuse_drift(plant, instruments,
                                           record(plant, {.faults = {fault}, .with_drops = false}, 7), {});
    REQUIRE(blind.has_value());
    CHECK(is_accused(*blind, Channel::hot_flow));
    CHECK(is_accused(*blind, Channel::cold_flow));
  }
}

TEST_CASE("field: a cleaning at the same time as a fault leaves the fouling no witness") {
  const field::Plant plant(plants::problem(plants::water_cooler));
  const field::Fault fault{Channel::cold_out, FaultKind::bias, false, 80.0, 1.5, 0.0};
  const auto days = record(plant, {.faults = {fault}, .cleaned_on = 80.0}, 3);
  const auto found = field::accuse_step(plant, instruments, days, 80.0);
  REQUIRE(found.has_value());
  CHECK(found->fouling_steps_too);
  CHECK(is_accused(*found, Channel::cold_out));
  CHECK(found->inseparable > 1);
}

TEST_CASE("field: faults are left out of a reading, or taken off it where the balance cannot spare two") {
  const field::Fault out{Channel::cold_out, FaultKind::bias, false, 10.0, 2.0, 0.0};
  const field::Fault meter{Channel::hot_flow, FaultKind::gain, true, 0.0, -0.365, 0.0};
  const field::Channels reading = {80, 110, 330, 315, 300, 312, missing, missing, missing};
  const std::vector faults = {out, meter};
  const auto early = field::without_faults(reading, 5.0, faults);
  CHECK(early[index_of(Channel::cold_out)] == 312);
  CHECK(std::isnan(early[index_of(Channel::hot_flow)]));
  const auto late = field::without_faults(reading, 100.0, faults);
  CHECK(std::isnan(late[index_of(Channel::cold_out)]));
  CHECK(late[index_of(Channel::hot_flow)] == doctest::Approx(80.0 / 0.9));
  CHECK(field::truth_of(out, 312.0, 50.0) == 310.0);
  CHECK(field::truth_of({Channel::hot_flow, FaultKind::zero, false, 0.0, 3.0, 0.0}, 83.0, 1.0) == 80.0);
}
