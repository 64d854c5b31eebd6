#pragma once
#include <fmt/core.h>

#include <cmath>
#include <ctime>

/// Costs in units of one std::pow call, measured in the same run: a measure that hardly
/// depends on the machine.
namespace bench {

/// Mean processor time of one call [s]; each call waits for the one before. Not the time on
/// the clock: other work on the machine must not count.
template <class Step>
double time_of(Step&& step, int calls) {
  double x = 1.5;
  const std::clock_t start = std::clock();
  for (int i = 0; i < calls; ++i) x = step(x);
  const double elapsed = static_cast<double>(std::clock() - start) / CLOCKS_PER_SEC;
  if (!std::isfinite(x)) fmt::print("not finite\n");
  return elapsed / calls;
}

inline double time_of_pow() {
  return time_of([](double x) { return 1.0 + 0.1 * std::pow(x, 0.613); }, 1'000'000);
}

}  // namespace bench
