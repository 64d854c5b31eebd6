#include <doctest/doctest.h>
#include <fmt/format.h>

#include <cmath>

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
