#include <doctest/doctest.h>

#include <cmath>
#include <iterator>
#include <limits>
#include <random>

#include "field_plants.hpp"
#include "field_simulated.hpp"
#include "support.hpp"

// One reading against the exchanger: what it says, how sure, and what the exchanger would show.

using namespace dutygauge;
using field::Channel;
using support::relative;

namespace {

constexpr double missing = std::numeric_limits<double>::quiet_NaN();
constexpr double zero_celsius = 273.15;

/// Flows [kg/s] and temperatures [degC] in the order of Channel, no drops.
field::Channels reading(double hot_flow, double cold_flow, double hot_in, double hot_out, double cold_in,
                        double cold_out) {
  return {hot_flow,
          cold_flow,
          hot_in + zero_celsius,
          hot_out + zero_celsius,
          cold_in + zero_celsius,
          cold_out + zero_celsius,
          missing,
          missing,
          missing};
}

/// A worked budget: one reading, its uncertainties, and what follows from them.
struct Budget {
  const char* how;
  int passes;
  double area, hot_heat_capacity, cold_heat_capacity;
  field::Channels reading;
  double hot_duty, cold_duty, duty, u_hot, u_cold, ua, fouling, closure, u_closure, u_ua;
  std::array<double, 6> sensitivity;  ///< of the fouling, [m2.K/W] per unit of the channel
};

// Computed by an independent program: central differences with the weights held; films fixed at
// 4300 and 3600 W/m2.K, wall 4e-5 m2.K/W. Flows 1 %, temperatures 0.15 K systematic and 0.2 K
// random over 24 readings. Stated tolerance 0.002 relative.
const Budget budgets[] = {
    {"1-2 shell",
     2,
     210.0,
     4180.0,
     4180.0,
     reading(80.0, 110.0, 55.0, 43.0, 24.0, 32.7),
     4012800.0,
     4000260.0,
     4008129.0,
     83756.0,
     108710.0,
     203157.0,
     0.000483349,
     0.0031348,
     0.03427,
     3999.0,
     {-8.4358e-06, -3.262e-06, -3.4205e-05, 8.9109e-05, 1.7822e-05, -7.2726e-05}},
    {"counterflow, many transfer units",
     1,
     560.0,
     4190.0,
     4185.0,
     reading(20.0, 20.6, 90.0, 35.0, 30.0, 83.45),
     4609000.0,
     4607978.0,
     4608491.0,
     49636.0,
     49825.0,
     802766.0,
     0.000147252,
     0.0002218,
     0.01526,
     23330.0,
     {-1.0461e-06, -3.2848e-05, 5.5303e-05, 6.694e-05, -5.3901e-05, -6.8342e-05}},
};

rating::Problem problem_of(const Budget& b) {
  return plants::fixed({.passes = b.passes,
                        .area = b.area,
                        .wall = 4e-5,
                        .tube_film = 4300.0,
                        .shell_film = 3600.0,
                        .hot_heat_capacity = b.hot_heat_capacity,
                        .cold_heat_capacity = b.cold_heat_capacity});
}

const field::Instruments budget_instruments = plants::instruments(
    {.flow_systematic = 0.01, .temperature_systematic = 0.15, .temperature_random = 0.2 / std::sqrt(24.0)});

/// The fouling's uncertainty when only one channel is uncertain, by one unit.
double sensitivity(const field::Plant& plant, const Budget& b, std::size_t channel, bool systematic) {
  // The weights of the two duties must stay what they are: the rest keeps its uncertainty as
  // the other kind, and what that alone makes is nothing here.
  field::Instruments instruments = budget_instruments;
  for (field::Instrument& i : instruments) {
    const double all = std::hypot(i.systematic, i.random);
    (systematic ? i.random : i.systematic) = all;
    (systematic ? i.systematic : i.random) = 0.0;
  }
  field::Instrument& one = instruments[channel];
  std::swap(one.systematic, one.random);
  const double unit = std::hypot(one.systematic, one.random) * (one.relative ? b.reading[channel] : 1.0);
  const auto a = field::apparent(plant, instruments, b.reading);
  REQUIRE(a.has_value());
  return (systematic ? a->fouling_systematic : a->fouling_random) / unit;
}

}  // namespace

TEST_CASE("field: one reading gives the duties, U and fouling an independent program finds") {
  for (const Budget& b : budgets) {
    CAPTURE(b.how);
    const auto a = field::apparent(problem_of(b), {}, budget_instruments, b.reading);
    REQUIRE(a.has_value());
    CHECK(relative(a->hot_duty, b.hot_duty) < 1e-6);
    CHECK(relative(a->cold_duty, b.cold_duty) < 1e-6);
    CHECK(relative(a->duty, b.duty) < 1e-6);
    CHECK(relative(a->u * b.area, b.ua) < 0.002);
    CHECK(relative(a->fouling, b.fouling) < 0.002);
    CHECK(std::abs(a->closure - b.closure) < 1e-6);
    CHECK(relative(a->closure_uncertainty, b.u_closure) < 0.002);
  }
}

TEST_CASE("field: the fouling's uncertainty follows every channel through the whole inversion") {
  for (const Budget& b : budgets) {
    CAPTURE(b.how);
    const field::Plant plant(problem_of(b));
    const auto a = field::apparent(plant, budget_instruments, b.reading);
    REQUIRE(a.has_value());
    // Of the readings alone: u(UA) A/UA^2.
    const double expected = b.u_ua * b.area / (b.ua * b.ua);
    CHECK(relative(std::hypot(a->fouling_random, a->fouling_systematic), expected) < 0.002);
    for (std::size_t i = 0; i < b.sensitivity.size(); ++i) {
      CAPTURE(i);
      CHECK(relative(sensitivity(plant, b, i, true), std::abs(b.sensitivity[i])) < 0.002);
      CHECK(relative(sensitivity(plant, b, i, false), std::abs(b.sensitivity[i])) < 0.002);
    }
  }
}

TEST_CASE("field: either stream may be the hot one, in the tubes or in the shell") {
  // At consistent readings the weights of the duties do not matter, so that moving one channel
  // shows the fouling's slope. Cooling water in the shell, and drawn or given films.
  const std::string hot_tubes = R"(dutygauge: 1
exchanger: {tema: AEL, area: 180 m2, wall_resistance: 0.00003 m2.K/W, tubes: {passes: 4}}
streams:
  tube_side:
    fluid: {constant: {heat_capacity: 2400 J/kg.K}}
    flow: 60 kg/s
    inlet: {temperature: 120 degC}
    fouling: 0 m2.K/W
    film_law: {value: 1400 W/m2.K, at_flow: 60 kg/s, flow_exponent: 0.8, temperature_slope: 0.005 1/K, at_temperature: 90 degC, surface: outside}
  shell_side:
    fluid: {constant: {heat_capacity: 4180 J/kg.K}}
    flow: 70 kg/s
    inlet: {temperature: 25 degC}
    fouling: 0 m2.K/W
    film_law: {value: 2500 W/m2.K, at_flow: 70 kg/s, flow_exponent: 0.6, surface: outside}
)";
  struct Row {
    const std::string& text;
    field::Conditions conditions;
  };
  const Row rows[] = {{hot_tubes, {60, 70, 393.15, 298.15}},
                      {plants::oil_preheater, {62, 95, 563.15, 423.15}},
                      {plants::drawn_cooler, {46, 60, 325.15, 300.15}}};
  for (const Row& row : rows) {
    CAPTURE(row.text);
    const field::Plant plant(plants::problem(row.text), {.factor = 1.05});
    const auto shown = field::respond(plant, row.conditions, {.tube_deposit = 2e-4});
    REQUIRE(shown.has_value());
    const field::Conditions& c = row.conditions;
    const field::Channels at = {c.hot_flow,      c.cold_flow, c.hot_in, shown->hot_out, c.cold_in,
                                shown->cold_out, missing,     missing,  missing};
    const auto instruments = plants::instruments({.flow_systematic = 0.01, .temperature_systematic = 0.2});
    CHECK(std::abs(field::apparent(plant, instruments, at)->fouling - 2e-4) < 1e-11);
    double variance = 0.0;
    for (std::size_t i = 0; i < 6; ++i) {
      const double u = instruments[i].systematic * (instruments[i].relative ? at[i] : 1.0);
      field::Channels more = at, less = at;
      more[i] += 1e-3 * u, less[i] -= 1e-3 * u;
      const auto up = field::apparent(plant, instruments, more),
                 down = field::apparent(plant, instruments, less);
      REQUIRE((up && down));
      variance += std::pow((up->fouling - down->fouling) / 2e-3, 2);
    }
    const auto a = field::apparent(plant, instruments, at);
    REQUIRE(a.has_value());
    // Of the drawn unit walls are held where the films are moved.
    CHECK(relative(a->fouling_systematic, std::sqrt(variance)) < 1e-3);
  }
}

TEST_CASE("field: noise is amplified as the arrangement's slope says") {
  // Computed values, printed to three digits.
  struct Row {
    int passes;
    double capacity_ratio, ntu, amplification;
  };
  const Row rows[] = {{1, 0.5, 0.5, 1.39}, {1, 0.5, 2.0, 2.80}, {1, 0.5, 5.0, 8.58}, {1, 1.0, 1.0, 2.00},
                      {1, 1.0, 5.0, 6.00}, {2, 0.5, 1.0, 2.05}, {2, 0.5, 2.0, 4.31}, {2, 0.5, 4.0, 22.6},
                      {2, 1.0, 0.5, 1.61}, {2, 1.0, 1.5, 4.09}, {2, 1.0, 3.0, 19.5}};
  for (const Row& row : rows) {
    CAPTURE(row.passes);
    CAPTURE(row.capacity_ratio);
    CAPTURE(row.ntu);
    const arrangement::Arrangement arrangement{.tube_passes = row.passes};
    // The tube stream is the smaller: 50 kg/s; both heat capacities 4000 J/kg.K.
    const double p = arrangement::effectiveness(arrangement, row.capacity_ratio, row.ntu);
    const double span = 40.0, hot_flow = 50.0 / row.capacity_ratio;
    const auto problem = plants::fixed({.passes = row.passes, .area = 100.0});
    const auto a = field::apparent(
        problem, {}, budget_instruments,
        reading(hot_flow, 50.0, 70.0, 70.0 - row.capacity_ratio * p * span, 30.0, 30.0 + p * span));
    REQUIRE(a.has_value());
    CHECK(relative(a->noise_amplification, row.amplification) < 0.004);
    CHECK(relative(a->u * 100.0, row.ntu * 50.0 * 4000.0) < 1e-9);
  }
}

TEST_CASE("field: a missing flow is inferred with its uncertainty") {
  // Computed from the closed form: 54.43721 kg/s, 3.0342 %; stated tolerance 1e-5.
  const auto problem = plants::fixed({.hot_heat_capacity = 2150.0, .cold_heat_capacity = 4180.0});
  const auto instruments = plants::instruments({.flow_random = 0.012, .temperature_random = 0.25});
  const auto flow = field::inferred(field::Plant(problem), instruments,
                                    reading(missing, 60.0, 82.0, 52.0, 25.0, 39.0), Channel::hot_flow);
  REQUIRE(flow.has_value());
  CHECK(relative(flow->value, 54.43721) < 1e-6);
  CHECK(relative(flow->random / flow->value, 0.030342) < 2e-5);
}

TEST_CASE("field: any one missing flow or temperature is inferred and says the same as a full reading") {
  const field::Plant plant(plants::problem(plants::water_cooler));
  const auto shown = field::respond(
      plant, {.hot_flow = 80, .cold_flow = 110, .hot_in = 328.15, .cold_in = 301.15}, {.tube_deposit = 1e-4});
  REQUIRE(shown.has_value());
  const auto instruments = plants::instruments({.flow_systematic = 0.01,
                                                .flow_random = 0.01,
                                                .temperature_systematic = 0.15,
                                                .temperature_random = 0.15});
  const field::Channels full = {80,      110,     328.15, shown->hot_out, 301.15, shown->cold_out,
                                missing, missing, missing};
  const auto whole = field::apparent(plant, instruments, full);
  REQUIRE(whole.has_value());
  CHECK(std::abs(whole->closure) < 1e-9);
  for (std::size_t i = 0; i < 6; ++i) {
    CAPTURE(i);
    field::Channels holed = full;
    holed[i] = missing;
    const auto a = field::apparent(plant, instruments, holed);
    REQUIRE(a.has_value());
    CHECK(std::abs(a->fouling - 1e-4) < 1e-12);
    CHECK(relative(a->duty, whole->duty) < 1e-9);
    CHECK(std::isnan(a->closure));
    CHECK(std::isnan(i == 0 || i == 2 || i == 3 ? a->hot_duty : a->cold_duty));
    // One reading less never makes it surer.
    CHECK(a->fouling_random > whole->fouling_random);
    CHECK(a->fouling_systematic > whole->fouling_systematic);
  }
}

TEST_CASE("field: readings that cannot be give nothing") {
  const field::Plant plant(plants::problem(plants::water_cooler));
  const field::Instruments instruments{};
  const field::Channels fair = reading(80.0, 110.0, 55.0, 43.0, 28.0, 36.7);
  CHECK(field::apparent(plant, instruments, fair).has_value());
  // Beyond what one 1-2 shell reaches: the temperatures cross too far.
  CHECK_FALSE(field::apparent(plant, instruments, reading(80.0, 80.0, 55.0, 32.0, 28.0, 51.0)));
  CHECK_FALSE(field::apparent(plant, instruments, reading(80.0, 110.0, 55.0, 56.0, 28.0, 36.7)));
  CHECK_FALSE(field::apparent(plant, instruments, reading(80.0, 110.0, 55.0, 43.0, 28.0, 27.0)));
  CHECK_FALSE(field::apparent(plant, instruments, reading(80.0, 110.0, 20.0, 15.0, 28.0, 36.7)));
  CHECK_FALSE(field::apparent(plant, instruments, reading(0.0, 110.0, 55.0, 43.0, 28.0, 36.7)));
  CHECK_FALSE(field::apparent(plant, instruments, reading(missing, missing, 55.0, 43.0, 28.0, 36.7)));
  CHECK_FALSE(field::apparent(plant, instruments, reading(80.0, 110.0, missing, missing, 28.0, 36.7)));
}

TEST_CASE("field: no reading, however wild, gives anything but numbers or nothing") {
  const double values[] = {missing, 0.0,   -1.0,  1e-300, 1e300, std::numeric_limits<double>::infinity(),
                           1.0,     80.0,  110.0, 290.0,  301.0, 315.0,
                           328.0,   420.0, 560.0};
  const auto instruments = plants::instruments({.flow_random = 0.01, .temperature_random = 0.2});
  for (const std::string& text : {plants::water_cooler, plants::oil_preheater, plants::drawn_cooler}) {
    const field::Plant plant(plants::problem(text));
    std::mt19937 random(3);
    std::uniform_int_distribution<std::size_t> any(0, std::size(values) - 1);
    for (int i = 0; i < 20000; ++i) {
      field::Channels wild;
      for (double& value : wild) value = values[any(random)];
      const auto a = field::apparent(plant, instruments, wild);
      if (a) {
        CHECK(std::isfinite(a->fouling));
        CHECK(std::isfinite(a->fouling_random));
        CHECK(std::isfinite(a->fouling_systematic));
        CHECK(a->u > 0.0);
      }
      const auto shown = field::respond(
          plant, {wild[0], wild[1], wild[2], wild[4]},
          {.tube_deposit = 1e-6 * wild[6], .shell_deposit = 1e-6 * wild[7], .plugged = 0.01 * wild[8]});
      if (shown) CHECK(std::isfinite(shown->duty + shown->hot_out + shown->tube_dp + shown->shell_dp));
    }
  }
}

TEST_CASE("field: what the unit shows with a deposit is read back as that deposit") {
  for (const std::string& text : {plants::water_cooler, plants::oil_preheater, plants::drawn_cooler}) {
    const auto problem = plants::problem(text);
    const field::Plant plant(problem, {.factor = 1.1});
    const bool shell_is_hot = rating::shell_side_is_hot(problem);
    const rating::Stream& hot = shell_is_hot ? problem.shell_side : problem.tube_side;
    const rating::Stream& cold = shell_is_hot ? problem.tube_side : problem.shell_side;
    for (const double deposit : {0.0, 5e-5, 4e-4}) {
      for (const double load : {0.6, 1.0}) {
        const field::Conditions conditions{load * hot.mass_flow, cold.mass_flow, hot.inlet_temperature,
                                           cold.inlet_temperature};
        const auto shown = field::respond(plant, conditions, {.shell_deposit = deposit});
        REQUIRE(shown.has_value());
        const auto a =
            field::apparent(plant, {},
                            {conditions.hot_flow, conditions.cold_flow, conditions.hot_in, shown->hot_out,
                             conditions.cold_in, shown->cold_out, missing, missing, missing});
        REQUIRE(a.has_value());
        CHECK(std::abs(a->fouling - deposit) < 1e-11);
        CHECK(relative(a->duty, shown->duty) < 1e-9);
      }
    }
  }
}

TEST_CASE("field: a clean unit shows what its rating by mean properties shows") {
  for (const std::string& text : {plants::water_cooler, plants::oil_preheater, plants::drawn_cooler}) {
    const auto problem = plants::problem(text);
    const auto rated = rating::rate_mean(problem);
    REQUIRE(rated.outcome.has_value());
    const auto& o = *rated.outcome;
    const bool shell_is_hot = rating::shell_side_is_hot(problem);
    REQUIRE(shell_is_hot);
    const auto shown =
        field::respond(problem, {},
                       {problem.shell_side.mass_flow, problem.tube_side.mass_flow,
                        problem.shell_side.inlet_temperature, problem.tube_side.inlet_temperature},
                       {});
    REQUIRE(shown.has_value());
    CHECK(relative(shown->duty, o.duty) < 1e-9);
    CHECK(relative(shown->hot_out, o.shell_outlet) < 1e-10);
    CHECK(relative(shown->tube_dp, o.tube_drop.total()) < 1e-9);
    CHECK(relative(shown->shell_dp, o.shell_drop.total()) < 1e-9);
  }
}

TEST_CASE("field: single causes leave the signatures an independent simulator finds") {
  // Plant A at its service, against the same with a tube deposit of 1e-4 m2.K/W. Printed to
  // three or four digits.
  const field::Plant plant(plants::problem(plants::water_cooler));
  const field::Conditions service{80, 110, 328.15, 301.15};
  const auto show = [&](field::Ailment ailment) {
    ailment.tube_deposit += 1e-4;
    const auto shown = field::respond(plant, service, ailment);
    REQUIRE(shown.has_value());
    return *shown;
  };
  const auto ua = [&](const field::Response& r) {
    const auto a = field::apparent(
        plant, {}, {80, 110, 328.15, r.hot_out, 301.15, r.cold_out, missing, missing, missing});
    REQUIRE(a.has_value());
    return a->u;
  };
  const field::Response before = show({});
  struct Row {
    const char* cause;
    field::Ailment ailment;
    double ua_ratio, tube_dp_ratio, shell_dp_ratio, hot_out_change, cold_out_change;
  };
  const Row rows[] = {
      {"tube deposit", {.tube_deposit = 2e-4}, 0.7622, 1.105, 1.0, 1.7, -1.24},
      {"shell deposit", {.shell_deposit = 2e-4}, 0.7622, 1.0, 1.1, 1.7, -1.24},
      {"plugged", {.plugged = 0.1}, 0.9266, 1.209, 1.0, 0.468, -0.34},
      {"tube by-pass", {.tube_bypass = 0.2}, 0.8398, 0.6692, 1.0, 1.08, -0.789},
      {"shell by-pass", {.shell_bypass = 0.2}, 0.8068, 1.0, 0.6692, 1.34, -0.974},
      {"area lost", {.area_lost = 0.15}, 0.85, 1.0, 1.0, 1.01, -0.733},
  };
  for (const Row& row : rows) {
    CAPTURE(row.cause);
    const field::Response after = show(row.ailment);
    CHECK(std::abs(ua(after) / ua(before) - row.ua_ratio) < 0.0006);
    CHECK(std::abs(after.tube_dp / before.tube_dp - row.tube_dp_ratio) < 0.0006);
    CHECK(std::abs(after.shell_dp / before.shell_dp - row.shell_dp_ratio) < 0.0006);
    CHECK(std::abs(after.hot_out - before.hot_out - row.hot_out_change) < 0.006);
    CHECK(std::abs(after.cold_out - before.cold_out - row.cold_out_change) < 0.006);
  }
}

TEST_CASE("field: what cannot be shows nothing") {
  const field::Plant plant(plants::problem(plants::water_cooler));
  const field::Conditions service{80, 110, 328.15, 301.15};
  CHECK_FALSE(field::respond(plant, service, {.plugged = 1.0}));
  CHECK_FALSE(field::respond(plant, service, {.tube_bypass = -0.1}));
  CHECK_FALSE(field::respond(plant, {0, 110, 328.15, 301.15}, {}));
  CHECK_FALSE(field::respond(plant, {80, 110, 300.0, 301.15}, {}));
}

TEST_CASE("field: daily fouling of simulated years lies as close to the truth as a reading allows") {
  // Attainable by a plain method: A 3.4e-6, G 3.5e-6 with true films; to be accepted: A 8e-6, and G
  // 25e-6 relative to its clean period, as its films are those of the drawing.
  struct Row {
    const char* unit;
    const std::string& text;
    int clean_days;
    double largest;
  };
  const Row rows[] = {{"A", plants::water_cooler, 0, 8e-6}, {"G", plants::drawn_cooler, 10, 25e-6}};
  const auto instruments = plants::instruments({.flow_systematic = 0.01,
                                                .flow_random = 0.01,
                                                .temperature_systematic = 0.15,
                                                .temperature_random = 0.15});
  for (const Row& row : rows) {
    CAPTURE(row.unit);
    const field::Plant plant(plants::problem(row.text));
    const auto truth = simulated::true_fouling(row.unit);
    std::map<int, std::vector<double>> found;
    for (const simulated::Hour& hour : simulated::running_hours(row.unit))
      if (const auto a = field::apparent(plant, instruments, hour.value))
        found[static_cast<int>(hour.day)].push_back(a->fouling - truth.at(static_cast<int>(hour.day)));
    std::vector<double> clean = {0.0};
    for (int day = 0; day < row.clean_days; ++day) clean.push_back(simulated::median(found[day]));
    const double offset = row.clean_days > 0 ? simulated::median(clean) : 0.0;
    double sum = 0.0;
    int days = 0;
    for (const auto& [day, errors] : found) {
      if (errors.size() < 12) continue;
      sum += std::pow(simulated::median(errors) - offset, 2);
      ++days;
    }
    CHECK(days > 340);
    CHECK(std::sqrt(sum / days) < row.largest);
  }
}
