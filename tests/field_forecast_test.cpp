#include <doctest/doctest.h>

#include <boost/random/uniform_01.hpp>
#include <cmath>
#include <limits>
#include <string>

#include "dutygauge/field/forecast.hpp"
#include "field_series.hpp"
#include "support.hpp"

using namespace dutygauge::field;

namespace {

/// Daily truth of a simulated unit from `from` to `to` [d], with scatter as a plain method leaves it.
Trend daily(const std::string& unit, double from, double to, std::uint64_t seed) {
  series::Noise noise(seed, 3.4e-6, 0.3);
  Trend trend;
  for (const auto& row : support::read_csv(TEST_DATA "/field/" + unit + "-daily-truth.csv")) {
    const double day = std::stod(row.at("day")) + 0.5;
    if (day < from || day > to) continue;
    trend.push_back({.time = day, .value = 1e-6 * std::stod(row.at("rf_apparent_1e6_m2K_W")) + noise()});
  }
  return trend;
}

bool holds(const LossDays& days, double truth) {
  return days.early && *days.early <= truth && (!days.late || truth <= *days.late);
}

/// A made-up year of which the truth is known.
struct Year {
  Trend cycle;
  Allowed allowed;
  std::optional<double> lost;  ///< [d]; empty: never
};

class Years {
 public:
  explicit Years(std::uint64_t seed) : engine_(seed), seed_(seed) {}

  Year next() {
    Year year;
    const double length = between(30.0, 300.0), end = between(length, 365.0);
    Law law = law_for(length);
    law.origin = end - length;
    law.r0 = between(0.0, 5e-5);
    year.allowed.standard_uncertainty = between(0.0, 1.5e-5);
    const double allowed = level_to_lose(law, length);
    year.lost = law.reaches(allowed);
    series::Noise noise(++seed_ * 7919, between(2e-6, 8e-6), between(0.0, 0.6)), doubt(seed_, 1.0, 0.0);
    year.allowed.fouling = allowed + year.allowed.standard_uncertainty * doubt();
    for (double day = law.origin + 0.5; day < end; day += 1.0)
      year.cycle.push_back({.time = day, .value = law.at(day) + noise()});
    return year;
  }

 private:
  double between(double low, double high) { return low + (high - low) * uniform_(engine_); }

  /// Linear, falling, asymptotic, or the cycle of a saw-tooth: linear between cleanings.
  Law law_for(double length) {
    const double grown = between(1e-4, 4e-4);  // at the end of the cycle
    switch (static_cast<int>(between(0.0, 4.0))) {
      case 0:
        return shaped(LawKind::falling, length * between(0.05, 1.0), grown, length);
      case 1:
        return shaped(LawKind::asymptotic, length * between(0.15, 1.5), grown, length);
      default:
        return shaped(LawKind::linear, 0.0, grown, length);
    }
  }

  static Law shaped(LawKind kind, double shape, double grown, double length) {
    return {.kind = kind, .rise = grown / growth(kind, shape, length), .shape = shape};
  }

  /// Where the law stands between 0.6 and 2 lengths of the record; for an asymptote also above its end.
  double level_to_lose(const Law& law, double length) {
    const double at = law.at(law.origin + length * between(0.6, 2.0));
    const double asymptote = law.r0 + law.rise;
    return law.kind == LawKind::asymptotic && between(0.0, 1.0) < 0.25 ? asymptote * between(1.05, 1.4) : at;
  }

  boost::random::mt19937_64 engine_;
  boost::random::uniform_01<> uniform_;
  std::uint64_t seed_;
};

}  // namespace

TEST_CASE("x") {
  (void)holds;
  (void)daily;
  for (std::uint64_t seed = 1; seed <= 10; ++seed) {
    Years years(seed * 1000);
    int in = 0, low = 0;
    for (int i = 0; i < 200; ++i) {
      auto y = years.next();
      auto f = forecast(y.cycle, y.allowed);
      bool h = y.lost ? holds(f->lost, *y.lost) : !f->lost.late;
      in += h;
      if (!h && y.lost && f->lost.early && *f->lost.early > *y.lost) ++low;
    }
    printf("seed %d: %d of 200; too late %d\n", int(seed), in, low);
  }
}
