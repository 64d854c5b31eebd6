#include <fmt/core.h>
#include <sys/resource.h>
#include <unistd.h>

#include <cmath>
#include <cstdlib>
#include <ctime>
#include <filesystem>
#include <fstream>
#include <string>

#include "dutygauge/case_io.hpp"
#include "dutygauge/field/history.hpp"
#include "dutygauge/field/times.hpp"
#include "dutygauge/report/series.hpp"

// The cost of a record of readings: the reader alone, and all that is done with a row where films are
// laws. Rows as the first argument; without it, 300 000.

namespace {

using namespace dutygauge;

/// Processor time: other work on the machine must not count.
double seconds() {
  return static_cast<double>(std::clock()) / CLOCKS_PER_SEC;
}

/// A cheap generator with a fixed seed: uniform in [-1, 1).
struct Wobble {
  std::uint64_t state = 42;
  double operator()() {
    state = state * 6364136223846793005ULL + 1442695040888963407ULL;
    return static_cast<double>(static_cast<std::int64_t>(state)) * 0x1p-63;
  }
};

/// An invented record of plant A of the tests, a reading a minute.
void write_record(const std::string& path, std::int64_t rows) {
  std::ofstream file(path, std::ios::binary);
  file << "time,hot_flow[kg/s],cold_flow[kg/s],hot_in[degC],hot_out[degC],cold_in[degC],cold_out[degC],"
          "tube_dp[kPa],shell_dp[kPa]\n";
  Wobble wobble;
  char time[21] = {};
  for (std::int64_t i = 0; i < rows; ++i) {
    field::write_time(60 * i, time);
    const double season = std::sin(static_cast<double>(i) * 2e-6);
    file << fmt::format("{},{:.2f},{:.2f},{:.2f},{:.2f},{:.2f},{:.2f},{:.2f},{:.2f}\n", time,
                        80.0 + 0.8 * wobble(), 110.0 + wobble(), 55.0 + 0.2 * wobble() + season,
                        42.0 + 0.2 * wobble() + season, 28.0 + 0.2 * wobble() + season,
                        37.4 + 0.2 * wobble() + season, 38.0 + 0.7 * wobble(), 45.0 + 0.7 * wobble());
  }
}

}  // namespace

int main(int count, char** words) {
  const std::int64_t rows = count > 1 ? std::atoll(words[1]) : 300'000;
  const std::string path =
      (std::filesystem::temp_directory_path() / fmt::format("bench-field-{}.csv", getpid())).string();
  write_record(path, rows);
  const auto a_case = case_io::build(case_io::read_file(SOURCE_DIR "/tests/data/field/A.yaml"));

  const double start = seconds();
  field::Record record({path}, a_case.readings, field::streams_of(a_case.problem, a_case.readings));
  std::int64_t read = 0;
  for (field::Reading reading; record.next(reading);) ++read;
  const double reader = seconds() - start;

  std::string text;
  std::size_t written = 0;
  field::Wishes wishes;
  wishes.row = [&](const field::SeriesRow& row) {
    report::append_series_row(row, text);
    if (text.size() > 65536) written += text.size(), text.clear();
  };
  const double begin = seconds();
  const auto history = field::history(a_case.problem, a_case.readings, {path}, wishes);
  const double whole = seconds() - begin;
  std::filesystem::remove(path);

  rusage usage{};
  getrusage(RUSAGE_SELF, &usage);
  fmt::print("{} rows, {} used, {} MB of series\n", read, history.tally[field::Drop::none],
             (written + text.size()) / 1'000'000);
  fmt::print("reader alone        {:>10.0f} rows/s\n", static_cast<double>(rows) / reader);
  fmt::print("everything          {:>10.0f} rows/s   {:.1f} times the reader (target 10)\n",
             static_cast<double>(rows) / whole, whole / reader);
  fmt::print("peak memory         {:>10.1f} MB (target 100)\n",
             static_cast<double>(usage.ru_maxrss) / 1024.0);
}
