#pragma once
#include <algorithm>
#include <cmath>
#include <cstdlib>
#include <limits>
#include <map>
#include <string>
#include <vector>

#include "dutygauge/field/plant.hpp"
#include "support.hpp"

/// A year of a simulated unit from tests/data/field, made by an independent simulator: hourly
/// readings with noise and faults, and what really happened.
namespace simulated {

using dutygauge::field::Channel;
using dutygauge::field::Channels;
using dutygauge::field::index_of;

struct Hour {
  double day = 0;  ///< since the first reading
  Channels value{};
};

/// What the columns are called, in the order of Channel.
constexpr std::array<const char*, 8> columns = {"hot_flow[kg/s]", "cold_flow[kg/s]", "hot_in[degC]",
                                                "hot_out[degC]",  "cold_in[degC]",   "cold_out[degC]",
                                                "tube_dp[kPa]",   "shell_dp[kPa]"};

inline double number(const std::string& text) {
  char* end = nullptr;
  const double value = std::strtod(text.c_str(), &end);
  return end == text.c_str() ? std::numeric_limits<double>::quiet_NaN() : value;
}

inline double median(std::vector<double> values) {
  std::erase_if(values, [](double x) { return std::isnan(x); });
  if (values.empty()) return std::numeric_limits<double>::quiet_NaN();
  const auto middle = values.begin() + static_cast<std::ptrdiff_t>(values.size() / 2);
  std::ranges::nth_element(values, middle);
  return *middle;
}

/// Hours with both flows running, where they are read, and six hours of running before them.
inline std::vector<Hour> running_hours(const std::string& unit) {
  std::vector<Hour> hours;
  int since_stop = 0, row_number = 0;
  for (const auto& row : support::read_csv(std::string(TEST_DATA) + "/field/" + unit + "-readings.csv")) {
    Hour hour{.day = row_number++ / 24.0, .value = {}};
    hour.value.fill(std::numeric_limits<double>::quiet_NaN());
    for (std::size_t i = 0; i < columns.size(); ++i) {
      const double value = number(row.at(columns[i]));
      hour.value[i] = i >= 6 ? 1e3 * value : i >= 2 ? value + 273.15 : value;
    }
    const double hot = hour.value[index_of(Channel::hot_flow)],
                 cold = hour.value[index_of(Channel::cold_flow)];
    const double span = hour.value[index_of(Channel::hot_in)] - hour.value[index_of(Channel::cold_in)];
    const bool stopped = hot < 10.0 || cold < 10.0 || span < 5.0;
    since_stop = stopped ? 0 : since_stop + 1;
    if (since_stop > 6 || (row_number == since_stop && since_stop > 0)) hours.push_back(hour);
  }
  return hours;
}

/// Medians of the days with 12 hours or more, and what these say.
inline dutygauge::field::Days daily(const dutygauge::field::Plant& plant,
                                    const dutygauge::field::Instruments& instruments,
                                    const std::vector<Hour>& hours) {
  std::map<int, std::vector<Hour>> by_day;
  for (const Hour& hour : hours) by_day[static_cast<int>(hour.day)].push_back(hour);
  dutygauge::field::Days days;
  for (const auto& [number, of_day] : by_day) {
    if (of_day.size() < 12) continue;
    dutygauge::field::Day day{.day = number + 0.5, .count = static_cast<int>(of_day.size())};
    for (std::size_t i = 0; i < day.value.size(); ++i) {
      std::vector<double> values;
      for (const Hour& hour : of_day) values.push_back(hour.value[i]);
      day.value[i] = median(values);
    }
    dutygauge::field::Instruments medians = instruments;
    for (auto& instrument : medians) instrument.random *= std::sqrt(1.57 / day.count);
    const auto a = dutygauge::field::apparent(plant, medians, day.value);
    if (!a) continue;
    day.apparent = *a;
    days.push_back(day);
  }
  return days;
}

/// True apparent fouling by day, median of its hours [m2.K/W].
inline std::map<int, double> true_fouling(const std::string& unit) {
  std::map<int, std::vector<double>> hours;
  int row_number = 0;
  for (const auto& row : support::read_csv(std::string(TEST_DATA) + "/field/" + unit + "-truth.csv"))
    hours[row_number++ / 24].push_back(1e-6 * number(row.at("rf_apparent[1e-6 m2K/W]")));
  std::map<int, double> days;
  for (const auto& [day, values] : hours) days[day] = median(values);
  return days;
}

}  // namespace simulated
