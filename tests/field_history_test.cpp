#include <doctest/doctest.h>
#include <fmt/format.h>
#include <sys/stat.h>
#include <unistd.h>

#include <cmath>
#include <csignal>
#include <thread>

#include "dutygauge/case_io.hpp"
#include "dutygauge/field/history.hpp"
#include "dutygauge/field/times.hpp"
#include "field_support.hpp"
#include "support.hpp"

using namespace dutygauge;
using namespace dutygauge::field;

namespace {

struct Simulated {
  explicit Simulated(const std::string& id)
      : a_case(case_io::build(case_io::read_file(TEST_DATA "/field/" + id + ".yaml"))),
        result(history(a_case.problem, a_case.readings, {TEST_DATA "/field/" + id + "-readings.csv"})) {
    for (const auto& row : support::read_csv(TEST_DATA "/field/" + id + "-truth.csv"))
      truth.push_back(std::stod(row.at("rf_apparent[1e-6 m2K/W]")) * 1e-6);
  }

  /// Mean of the truth over the day of a median [m2.K/W].
  double true_on(const Day& day) const {
    const auto first = static_cast<std::size_t>(24.0 * (day.day - 0.5));
    double sum = 0;
    for (std::size_t i = first; i < first + 24; ++i) sum += truth.at(i);
    return sum / 24.0;
  }

  struct Errors {
    double rms = 0, mean = 0;
    int days = 0;
  };
  Errors errors(double from, double to) const {
    Errors e;
    for (const Day& day : result.days) {
      if (day.day < from || day.day > to) continue;
      const double error = day.apparent.fouling - true_on(day);
      e.mean += error;
      e.rms += error * error;
      ++e.days;
    }
    e.mean /= e.days;
    e.rms = std::sqrt(e.rms / e.days);
    return e;
  }

  case_io::Case a_case;
  History result;
  std::vector<double> truth;
};

std::string dropped(const Tally& tally) {
  std::string text = fmt::format("{} rows, {} used", tally.rows, tally[Drop::none]);
  for (std::size_t i = 1; i < drop_count; ++i)
    if (tally.rows_by[i] > 0) text += fmt::format(", {} {}", name(static_cast<Drop>(i)), tally.rows_by[i]);
  return text + fmt::format("; values: {} missing, {} bad, {} frozen, {} spikes of drops", tally.missing,
                            tally.bad, tally.frozen, tally.drop_spikes);
}

}  // namespace

// The truth is an independent simulator's: see tests/data/field/README.md. The limits are those it
// suggests: what a plain method reaches, with room for another one.

TEST_CASE("field: daily fouling of plant A is within 8e-6 of the truth") {
  const Simulated a("A");
  INFO(dropped(a.result.tally));
  const auto errors = a.errors(0, 365);
  INFO(fmt::format("rms {:.2e}, mean {:.2e}, {} days", errors.rms, errors.mean, errors.days));
  CHECK(errors.rms <= 8e-6);
  CHECK(errors.days >= 350);
  CHECK(a.result.basis == Basis::films);
  CHECK(a.result.tally.rows == 8760);
  CHECK(a.result.tally[Drop::off_line] == 96);
  CHECK(a.result.tally[Drop::none] > 7500);
}

TEST_CASE("field: daily fouling of plant B is right until its sensor fails") {
  const Simulated b("B");
  INFO(dropped(b.result.tally));
  const auto errors = b.errors(0, 119);
  INFO(fmt::format("rms {:.2e}, mean {:.2e}, {} days", errors.rms, errors.mean, errors.days));
  CHECK(errors.rms <= 10e-6);
  CHECK(errors.days >= 110);
  CHECK(b.result.tally[Drop::off_line] == 120);
}

TEST_CASE("field: daily fouling of plant G is within 25e-6 of the truth, from its clean period on") {
  const Simulated g("G");
  INFO(dropped(g.result.tally));
  INFO(fmt::format("factor {:.4f} +- {:.4f}", g.result.calibration.factor,
                   g.result.calibration.standard_uncertainty));
  const auto errors = g.errors(0, 365);
  INFO(fmt::format("rms {:.2e}, mean {:.2e}, {} days", errors.rms, errors.mean, errors.days));
  CHECK(errors.rms <= 25e-6);
  CHECK(errors.days >= 350);
  CHECK(g.result.basis == Basis::clean_period);
}

TEST_CASE("field: films that are wrong by a factor are put right on a clean period, a trend in it included") {
  Simulated a("A");
  const double wrong = 1.1;  // of 1/u_clean
  rating::Problem& problem = a.a_case.problem;
  problem.tube_side.film_law->value /= wrong;
  problem.shell_side.film_law->value /= wrong;
  problem.exchanger.layer_resistance *= wrong;
  a.a_case.readings.clean_period = {read_moment("2021-01-01", {}).value(),
                                    read_moment("2021-01-08", {}).value()};
  a.result = history(problem, a.a_case.readings, {TEST_DATA "/field/A-readings.csv"});
  CHECK(a.result.basis == Basis::clean_period);
  CHECK(a.result.calibrated_on > 150);
  // The unit begins with 20e-6 m2.K/W, which is clean from now on: 3.4 % of 1/u_clean there.
  CHECK(a.result.calibration.factor == doctest::Approx((1.0 + 20e-6 * 1709.5) / wrong).epsilon(0.01));
  CHECK(a.result.calibration.standard_uncertainty < 0.01);
  for (double& value : a.truth) value -= 20e-6;
  const auto errors = a.errors(0, 170);
  INFO(fmt::format("rms {:.2e}, mean {:.2e}", errors.rms, errors.mean));
  CHECK(errors.rms <= 10e-6);
}

TEST_CASE("field: without a clean period computed films are held against the first cleaning") {
  Simulated g("G");
  g.a_case.readings.clean_period.reset();
  const std::int64_t start = read_moment("2021-01-01", {}).value();
  g.a_case.readings.events.push_back({{start, start}, Doing::cleaning});
  const auto result = history(g.a_case.problem, g.a_case.readings, {TEST_DATA "/field/G-readings.csv"});
  CHECK(result.basis == Basis::cleaning);
  CHECK(result.days.front().apparent.fouling == doctest::Approx(0.0).scale(1e-3).epsilon(0.01));
  g.a_case.readings.events.clear();
  const auto open = history(g.a_case.problem, g.a_case.readings, {TEST_DATA "/field/G-readings.csv"});
  CHECK(open.basis == Basis::films);
  CHECK(open.calibration.factor == 1.0);
  CHECK(open.film_uncertainty > 10.0 * result.film_uncertainty);
}

TEST_CASE("field: a clean period without readings is refused") {
  Simulated a("A");
  a.a_case.readings.clean_period = {0, 86400};
  CHECK_THROWS_AS(history(a.a_case.problem, a.a_case.readings, {TEST_DATA "/field/A-readings.csv"}),
                  FileError);
}

namespace {

/// What a record says through a pipe; the year twice, so that it is longer than what is kept of it.
std::optional<History> piped(const case_io::Case& a_case) {
  const std::string path = "/tmp/field-history-" + std::to_string(getpid());
  REQUIRE(mkfifo(path.c_str(), 0600) == 0);
  std::string text = support::read_text(TEST_DATA "/field/A-readings.csv");
  std::string next_year = text.substr(text.find('\n') + 1);
  for (std::size_t at = 0; (at = next_year.find("2021-", at)) != std::string::npos;) next_year[at + 3] = '2';
  std::thread writer([&] {
    std::ofstream file(path, std::ios::binary);  // a reader that gives up early breaks it: no matter
    file << text << next_year;
  });
  std::optional<History> result;
  try {
    result = history(a_case.problem, a_case.readings, {path});
  } catch (const FileError& error) {
    CHECK(error.text().what.find("a pipe is read once") != std::string::npos);
  }
  writer.join();
  unlink(path.c_str());
  return result;
}

}  // namespace

TEST_CASE("field: a pipe is judged by its first 10 000 rows, and says so") {
  std::signal(SIGPIPE, SIG_IGN);
  Simulated a("A");
  const auto result = piped(a.a_case);
  REQUIRE(result);
  CHECK_FALSE(result->survey.whole);
  CHECK(result->survey.rows == 10'000);
  CHECK(result->tally.rows == 2 * 8760);
  REQUIRE(result->days.size() > 700);
  for (std::size_t i = 0; i < 300; ++i)
    CHECK(result->days[i].apparent.fouling ==
          doctest::Approx(a.result.days[i].apparent.fouling).epsilon(0.02));
  a.a_case.readings.clean_period = {read_moment("2021-01-01", {}).value(),
                                    read_moment("2021-01-08", {}).value()};
  CHECK(piped(a.a_case)->basis == Basis::clean_period);
  a.a_case.readings.clean_period = {read_moment("2022-06-01", {}).value(),
                                    read_moment("2022-06-08", {}).value()};
  CHECK_FALSE(piped(a.a_case));
}
