#pragma once
#include <array>
#include <cstdint>
#include <optional>
#include <string_view>
#include <vector>

/// Laws of how a deposit grows, fitted to daily values: which law, how sure, and what a
/// record without a trend would have shown.
namespace dutygauge::field {

/// One value of a series.
struct TrendPoint {
  double time = 0;   ///< [d] since the first reading of the record
  double value = 0;  ///< a fouling resistance [m2.K/W], or any other series
  double sigma = 0;  ///< standard uncertainty from the scatter of the readings; 0: not known
};
using Trend = std::vector<TrendPoint>;

enum class LawKind : std::uint8_t { constant, linear, root_time, falling, asymptotic };

/// "linear", "falling rate", ...
std::string_view name_of(LawKind kind);

/// R = r0 + rise g(t), t counted from `origin`:
///
///     constant    g = 0
///     linear      g = t                      rise [m2.K/W.d]
///     root_time   g = sqrt(t)                rise [m2.K/W.d^0.5], the falling rate of a thick deposit
///     falling     g = sqrt(1 + t/s) - 1      dR/dt = k/(1 + b (R - r0)), b = 1/rise, k = rise/(2 s)
///     asymptotic  g = 1 - exp(-t/s)          s = tau, r0 + rise the asymptote
///
/// Source: Kern & Seaton, Brit. Chem. Eng. 4, 258 (1959), for the asymptotic law.
struct Law {
  LawKind kind = LawKind::constant;
  double origin = 0;  ///< [d]
  double r0 = 0;      ///< [m2.K/W]
  double rise = 0;
  double shape = 0;  ///< s [d]; 0 for the laws without one

  double at(double time) const;       ///< [m2.K/W]; r0 before the origin of a curved law
  double rate_at(double time) const;  ///< [m2.K/W.d]
  /// First time from the origin on at which the law reaches a level [d]; empty: never.
  std::optional<double> reaches(double level) const;
};

/// g of a law at t days from its origin.
double growth(LawKind kind, double shape, double t);

/// Number of parameters of a law.
int parameters_of(LawKind kind);

struct FitOptions {
  /// Distance from the law, in scale units, past which a point counts less (Huber 1964);
  /// infinite: plain least squares.
  double huber = 1.345;
  /// Lag-1 correlation of the residuals; empty: estimated from them.
  std::optional<double> correlation = {};
};

/// A law fitted to a series.
struct Fit {
  Law law;
  double loss = 0;                         ///< sum of squared residuals, linear beyond the Huber distance
  double bic = 0;                          ///< n ln(loss/n) + k ln n, n the effective number
  double scatter = 0;                      ///< standard deviation of one point about the law
  double correlation = 0;                  ///< lag-1, of the residuals
  double n_effective = 0;                  ///< independent points the series is worth
  std::array<double, 3> standard_error{};  ///< of r0, rise, shape
  std::array<std::array<double, 3>, 3> covariance{};  ///< of r0, rise, shape
};

/// The law of one kind that fits best: r0 and rise by iteratively re-weighted least squares
/// inside, the shape by a search from many starts outside (variable projection).
/// Empty with fewer than `parameters_of(kind) + 2` points or where all times are equal.
std::optional<Fit> fit(const Trend& trend, LawKind kind, const FitOptions& options = {});

/// All laws held against one series.
struct Choice {
  std::vector<Fit> fits = {};       ///< lowest BIC first
  std::size_t chosen = 0;      ///< the simplest of those within 2 of the lowest BIC
  std::size_t undecided = 1;   ///< how many of the first `fits` lie within 2
  bool trend = false;          ///< something other than a constant was chosen
  double detectable_rate = 0;  ///< a steady rate above it would have been seen [m2.K/W.d]

  const Fit& best() const { return fits[chosen]; }
};

/// Chooses by BIC with one effective number for all laws. Empty with fewer than 5 points.
/// Source: Schwarz, Ann. Stat. 6, 461 (1978) [memory].
std::optional<Choice> choose_law(const Trend& trend, const FitOptions& options = {});

/// Whether an asymptotic fit says where it ends: tau below the length of the record [d] and
/// the rise known within 30 %.
bool asymptote_identified(const Fit& fit, double record);

/// Standard error of the slope of n evenly spaced values, a day apart:
/// s sqrt(12/(n (n^2 - 1))) sqrt((1 + rho)/(1 - rho)).
double slope_error(double scatter, double n, double correlation);

}  // namespace dutygauge::field
