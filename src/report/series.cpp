#include "dutygauge/report/series.hpp"

#include <array>
#include <charconv>
#include <cmath>

#include "dutygauge/field/times.hpp"

namespace dutygauge::report {
namespace {

void append_number(double value, std::string& text) {
  text += ',';
  if (!std::isfinite(value)) return;
  std::array<char, 32> digits;
  // The shortest text of single precision: seven digits at half the cost of rounding to seven.
  const auto written = std::to_chars(digits.data(), digits.data() + digits.size(), static_cast<float>(value));
  text.append(digits.data(), written.ptr);
}

}  // namespace

std::string_view series_header() {
  return "time,hot_duty_W,cold_duty_W,closure,duty_W,u_W_m2K,u_clean_W_m2K,fouling_m2K_W,"
         "fouling_u95_m2K_W,used,why\n";
}

void append_series_row(const field::SeriesRow& row, std::string& text) {
  std::array<char, 20> time;
  field::write_time(row.time, time.data());
  text.append(time.data(), time.size());
  if (row.apparent) {
    const field::Apparent& said = *row.apparent;
    for (const double value : {said.hot_duty, said.cold_duty, said.closure, said.duty, said.u, said.u_clean,
                               said.fouling, row.fouling_u95})
      append_number(value, text);
  } else {
    text += ",,,,,,,,";
  }
  const bool used = row.drop == field::Drop::none;
  text += used ? ",1," : ",0,";
  if (!used) text += field::name(row.drop);
  text += '\n';
}

}  // namespace dutygauge::report
