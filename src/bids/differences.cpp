#include <fmt/core.h>

#include <cmath>

#include "dutygauge/arrangement.hpp"
#include "sheet.hpp"

// Log-mean difference, its correction and their product, from the sheet's own outlets.

namespace dutygauge::bids {
namespace {

/// The four temperatures [K], the way the heat flows counted positive.
struct Terminals {
  double shell_in, tube_in, shell_out, tube_out, direction;

  double counterflow() const {
    return arrangement::log_mean(direction * (shell_in - tube_out), direction * (shell_out - tube_in));
  }
  double cocurrent() const {
    return arrangement::log_mean(direction * (shell_in - tube_in), direction * (shell_out - tube_out));
  }
  double arithmetic() const { return 0.5 * direction * (shell_in + shell_out - tube_in - tube_out); }
};

Terminals terminals_of(const rating::Problem& problem, std::span<const double> outlets) {
  return {problem.shell_side.inlet_temperature, problem.tube_side.inlet_temperature, outlets[0], outlets[1],
          rating::shell_side_is_hot(problem) ? 1.0 : -1.0};
}

double positive_or_nan(double value) {
  return value > 0.0 ? value : std::nan("");
}

/// F [-] of an arrangement between the terminals; not finite where it cannot reach them.
double correction(const arrangement::Arrangement& arrangement, const Terminals& t) {
  const double r = (t.shell_in - t.shell_out) / (t.tube_out - t.tube_in);
  const double p = (t.tube_out - t.tube_in) / (t.shell_in - t.tube_in);
  if (!(p > 0.0 && p < 1.0 && r > 0.0) || !std::isfinite(r)) return std::nan("");
  const auto ntu = arrangement::ntu_for(arrangement, r, p);
  if (!ntu) return std::nan("");
  return arrangement::lmtd_correction(arrangement, r, *ntu).value_or(std::nan(""));
}

bool runs_parallel(const Sheet& sheet) {
  const auto& exchanger = sheet.problem().exchanger;
  return exchanger.tube_side.passes == 1 && exchanger.flow_direction == geometry::FlowDirection::parallel;
}

/// The first outlets that may hold, for the values a slip would lead to.
std::optional<Terminals> first_terminals(const Sheet& sheet) {
  if (sheet.shell_outlet.empty() || sheet.tube_outlet.empty()) return {};
  const double outlets[] = {sheet.shell_outlet.front().value, sheet.tube_outlet.front().value};
  return terminals_of(sheet.problem(), outlets);
}

void check_log_mean(Sheet& sheet) {
  const auto log_mean = [&](std::span<const double> outlets) {
    return positive_or_nan(terminals_of(sheet.problem(), outlets).counterflow());
  };
  Check check{.key = "lmtd",
              .computed = derived({&sheet.shell_outlet, &sheet.tube_outlet}, log_mean),
              .against = "the four terminal temperatures",
              .otherwise = "taken from other terminal temperatures",
              .if_empty = "it needs both outlets, or the duty"};
  if (runs_parallel(sheet))
    for (const Number& one : derived({&sheet.shell_outlet, &sheet.tube_outlet}, [&](auto outlets) {
           return positive_or_nan(terminals_of(sheet.problem(), outlets).cocurrent());
         }))
      check.computed.push_back(one);
  if (const auto t = first_terminals(sheet)) {
    check.causes = {{t->cocurrent(), "LMTD of cocurrent flow"},
                    {t->arithmetic(), "arithmetic mean instead of the LMTD"}};
    if (!check.computed.empty())
      check.causes.push_back(
          {check.computed.front().value * correction(rating::arrangement_of(sheet.problem().exchanger), *t),
           "F is already in it"});
  }
  sheet.log_mean = judge(sheet, sheet.claims.lmtd, check);
}

void check_correction(Sheet& sheet) {
  const auto arrangement = rating::arrangement_of(sheet.problem().exchanger);
  const auto f = [&](std::span<const double> outlets) {
    return correction(arrangement, terminals_of(sheet.problem(), outlets));
  };
  Check check{.key = "f_correction",
              .computed = derived({&sheet.shell_outlet, &sheet.tube_outlet}, f),
              .against = "the terminal temperatures and the arrangement",
              .otherwise = "F of another arrangement or of other temperatures",
              .if_empty = "it needs both outlets, or the duty",
              .nothing_fits = false};
  if (runs_parallel(sheet)) check.computed.push_back({1.0, 0.0});
  const auto t = first_terminals(sheet);
  check.nothing_fits = t && check.computed.empty();
  if (check.nothing_fits)
    check.otherwise =
        "this arrangement cannot reach these outlets with any surface: shells in series, or counterflow";
  if (t && !check.computed.empty()) {
    check.causes = {{1.0, "F of pure counterflow: no correction was made"}};
    for (int shells = 1; shells <= 6; ++shells) {
      arrangement::Arrangement other = arrangement;
      other.shells_in_series = shells;
      if (shells != arrangement.shells_in_series)
        check.causes.push_back(
            {correction(other, *t),
             fmt::format("F of {} in series",
                         shells == 1 ? "one shell, not several" : fmt::format("{} shells", shells))});
    }
  }
  auto claim = sheet.claims.f_correction;
  if (claim && claim->value == 1.0) claim->rounding = 0.0;  // a statement, not a rounded number
  sheet.f_correction = judge(sheet, claim, check);
}

void check_product(Sheet& sheet) {
  const auto product = [](std::span<const double> of) { return of[0] * of[1]; };
  Check check{.key = "mtd",
              .computed = derived({&sheet.f_correction, &sheet.log_mean}, product),
              .against = "F times LMTD",
              .otherwise = "F and LMTD are not those of this difference",
              .if_empty = "it needs LMTD and F, or both outlets"};
  if (!sheet.f_correction.empty() && !sheet.log_mean.empty()) {
    const double f = sheet.f_correction.back().value, lmtd = sheet.log_mean.back().value;
    check.causes = {{lmtd, "LMTD without F"}, {f * f * lmtd, "F applied twice"}};
  }
  sheet.mtd = judge(sheet, sheet.claims.mtd, check);
}

}  // namespace

void check_differences(Sheet& sheet) {
  check_log_mean(sheet);
  check_correction(sheet);
  check_product(sheet);
}

}  // namespace dutygauge::bids
