#include <doctest/doctest.h>

#include <cmath>
#include <functional>

#include "dutygauge/field/screening.hpp"
#include "field_series.hpp"
#include "field_support.hpp"

using namespace dutygauge::field;

namespace {

constexpr std::int64_t hour = 3600;

/// An hourly record of a quiet unit with noise, changed by the test.
struct Made {
  explicit Made(int count = 200) {
    for (int i = 0; i < count; ++i) {
      Reading reading{.time = i * hour};
      const auto set = [&](Channel channel, double value, double noise) {
        // Two decimals, as a plant's export has them.
        reading.value[index_of(channel)] = std::round(100.0 * (value + noise * normal())) / 100.0;
      };
      set(Channel::hot_flow, 80, 0.8), set(Channel::cold_flow, 110, 1.1);
      set(Channel::hot_in, 328, 0.15), set(Channel::hot_out, 315, 0.15);
      set(Channel::cold_in, 300, 0.15), set(Channel::cold_out, 310, 0.15);
      set(Channel::tube_dp, 38000, 700), set(Channel::shell_dp, 45000, 900);
      reading.value[index_of(Channel::valve)] = std::nan("");
      readings.push_back(reading);
    }
    for (std::size_t c = 0; c < channel_count; ++c) {
      const auto channel = static_cast<Channel>(c);
      mapping.instruments[c] =
          is_temperature(channel) ? Instrument{0.15, 0.15} : Instrument{0.01, 0.01, true};
      if (is_drop(channel)) mapping.instruments[c].random = 0.02;
    }
    resolution.fill(0.01);
  }

  double& at(int row, Channel channel) {
    return readings[static_cast<std::size_t>(row)].value[index_of(channel)];
  }

  std::vector<Screened> screened() {
    std::vector<Screened> result;
    const Survey survey{.hot_flow = 80, .cold_flow = 110, .interval = hour, .rows = readings.size()};
    Screen screen(mapping, survey, resolution, tally, [&](const Screened& row) { result.push_back(row); });
    for (const Reading& reading : readings) screen.push(reading);
    screen.finish();
    return result;
  }

  series::Noise normal{11, 1.0, 0.0};
  std::vector<Reading> readings;
  Mapping mapping;
  Channels resolution{};
  Tally tally;
};

/// Rows with a reason, as "17 18 40".
std::string rows_with(const std::vector<Screened>& rows, Drop drop) {
  std::string text;
  for (std::size_t i = 0; i < rows.size(); ++i)
    if (rows[i].drop == drop) text += (text.empty() ? "" : " ") + std::to_string(i);
  return text;
}

std::size_t used(const std::vector<Screened>& rows) {
  return static_cast<std::size_t>(
      std::ranges::count_if(rows, [](const Screened& row) { return row.drop == Drop::none; }));
}

}  // namespace

TEST_CASE("field: nothing is dropped of a quiet unit, and the order is kept") {
  Made made;
  const auto rows = made.screened();
  REQUIRE(rows.size() == 200);
  CHECK(used(rows) >= 198);  // of 1600 values with normal noise
  for (std::size_t i = 0; i < rows.size(); ++i) CHECK(rows[i].reading.time == made.readings[i].time);
  CHECK(made.tally.frozen == 0);
}

TEST_CASE("field: a record shorter than every window passes") {
  for (const int count : {1, 2, 3, 12, 13, 19}) {
    CAPTURE(count);
    Made made(count);
    CHECK(made.screened().size() == static_cast<std::size_t>(count));
  }
}

TEST_CASE("field: a stop is off-line and its restart left out for six hours") {
  Made made;
  for (int i = 50; i < 60; ++i) {
    made.at(i, Channel::hot_flow) = made.at(i, Channel::cold_flow) = 0.0;
    for (const Channel t : {Channel::hot_in, Channel::hot_out, Channel::cold_in, Channel::cold_out})
      made.at(i, t) = 293.0 + 0.01 * i;
  }
  const auto rows = made.screened();
  CHECK(rows_with(rows, Drop::off_line) == "50 51 52 53 54 55 56 57 58 59");
  CHECK(rows_with(rows, Drop::after_restart) == "60 61 62 63 64 65");
  CHECK(made.tally.frozen == 0);
}

TEST_CASE("field: a trip of two hours is a stop, one zero of a meter is a spike") {
  Made made;
  made.at(50, Channel::cold_flow) = made.at(51, Channel::cold_flow) = 0.0;
  made.at(120, Channel::cold_flow) = 0.0;
  const auto rows = made.screened();
  CHECK(rows_with(rows, Drop::off_line) == "50 51");
  CHECK(rows_with(rows, Drop::after_restart) == "52 53 54 55 56 57");
  CHECK(rows_with(rows, Drop::spike) == "120");
}

TEST_CASE("field: a logged outage is off-line whatever the instruments say") {
  Made made;
  made.mapping.events = {{{80 * hour, 83 * hour}, Doing::outage},
                         {{150 * hour, 150 * hour}, Doing::cleaning}};
  const auto rows = made.screened();
  CHECK(rows_with(rows, Drop::off_line) == "80 81 82");
  CHECK(rows_with(rows, Drop::after_restart) == "83 84 85 86 87 88");
}

TEST_CASE("field: a spike is one reading far from its neighbours, a step is none") {
  Made made;
  made.at(40, Channel::hot_in) += 6.0;
  made.at(70, Channel::tube_dp) *= 2.0;
  for (int i = 100; i < 200; ++i) made.at(i, Channel::cold_out) += 3.5;  // a sensor that shifts
  const auto rows = made.screened();
  CHECK(rows_with(rows, Drop::spike) == "40");
  CHECK(std::isnan(rows[70].reading.value[index_of(Channel::tube_dp)]));
  CHECK(made.tally.drop_spikes == 1);
  CHECK(rows[39].drop == Drop::none);  // a spike is no step
}

TEST_CASE("field: readings about a step of load are left out, and the hour after it") {
  Made made;
  for (int i = 100; i < 200; ++i) made.at(i, Channel::hot_flow) *= 0.8;
  const auto rows = made.screened();
  CHECK(rows_with(rows, Drop::unsteady) == "99 100 101");
}

TEST_CASE("field: a flow that a controller moves all the time is steady while it moves as usual") {
  const Survey calm{.hot_flow_change = 0.008, .hot_in_change = 0.2};
  CHECK(steady_limits(calm).hot_flow == 0.05);
  CHECK(steady_limits(calm).hot_in == 1.0);
  const Survey hunting{.cold_flow_change = 0.03, .cold_in_change = 0.5};
  CHECK(steady_limits(hunting).cold_flow == doctest::Approx(0.1334).epsilon(1e-3));
  CHECK(steady_limits(hunting).cold_in == doctest::Approx(2.22).epsilon(2e-3));
}

TEST_CASE("field: a step across a gap is not seen as one") {
  Made made;
  for (int i = 100; i < 200; ++i) {
    made.at(i, Channel::hot_flow) *= 0.8;
    made.readings[static_cast<std::size_t>(i)].time += 30 * hour;
  }
  CHECK(rows_with(made.screened(), Drop::unsteady).empty());
}

TEST_CASE("field: what the second law forbids is dropped") {
  Made made;
  std::swap(made.at(30, Channel::hot_in), made.at(30, Channel::hot_out));
  for (int i = 60; i < 80; ++i) made.at(i, Channel::cold_out) = 330.0 + 0.1 * (i % 3);
  const auto rows = made.screened();
  CHECK(rows[30].drop == Drop::spike);
  CHECK(rows[70].drop == Drop::unphysical);
}

TEST_CASE("field: a value that stands still while others move is missing, from its first reading on") {
  Made made;
  for (int i = 50; i < 70; ++i) made.at(i, Channel::cold_in) = 300.07;
  for (int i = 100; i < 111; ++i) made.at(i, Channel::cold_in) = 300.02;  // eleven may be chance
  const auto rows = made.screened();
  for (int i = 50; i < 70; ++i)
    CHECK(std::isnan(rows[static_cast<std::size_t>(i)].reading.value[index_of(Channel::cold_in)]));
  CHECK(made.tally.frozen == 20);
  CHECK_FALSE(std::isnan(rows[49].reading.value[index_of(Channel::cold_in)]));
  CHECK_FALSE(std::isnan(rows[105].reading.value[index_of(Channel::cold_in)]));
}

TEST_CASE("field: a gap filled with straight lines, or with the last value, is found") {
  for (const bool held : {false, true}) {
    CAPTURE(held);
    Made made;
    for (int i = 61; i < 72; ++i)
      for (std::size_t c = 0; c < index_of(Channel::valve); ++c) {
        const double from = made.readings[60].value[c], to = held ? from : made.readings[72].value[c];
        made.readings[static_cast<std::size_t>(i)].value[c] =
            std::round(100.0 * (from + (to - from) * (i - 60) / 12.0)) / 100.0;
      }
    const auto rows = made.screened();
    CHECK(rows_with(rows, Drop::filled) ==
          (held ? "61 62 63 64 65 66 67 68 69 70" : "61 62 63 64 65 66 67 68 69 70 71"));
  }
}

TEST_CASE("field: the median of a thinned stream is that of the stream") {
  Thinned thinned(64);
  CHECK(thinned.median() == 0.0);
  for (int i = 0; i < 100'000; ++i) thinned.add((i * 7919) % 100'000);
  CHECK(thinned.median() == doctest::Approx(50'000).epsilon(0.15));  // 64 values: sigma of 6 %
  Thinned few;
  for (const double value : {3.0, 1.0, 2.0}) few.add(value);
  CHECK(few.median() == 2.0);
}
