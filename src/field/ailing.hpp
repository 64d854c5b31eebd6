#pragma once
#include <span>
#include <vector>

#include "dutygauge/field/causes.hpp"

/// Internal to field: causes put to a plant, and how far readings lie from what it then shows.
namespace dutygauge::field {

inline constexpr std::array observables = {Channel::hot_out, Channel::cold_out, Channel::tube_dp,
                                           Channel::shell_dp};

/// Bounds of a cause's magnitude.
struct Limits {
  double low, high;
};
Limits limits_of(const Part& part, double fouling_before);

/// What the unit would show of its observables at a reading's flows and inlets; NaN in the
/// others and for drops the unit does not know. Empty where that cannot be.
std::optional<Channels> predict(const Plant& plant, const Channels& reading, double fouling_before,
                                std::span<const Part> parts);

/// How far days lie from a prediction.
struct Residuals {
  std::vector<double> values;  ///< independent and of unit variance where the prediction is right
  double log_determinant = 0;  ///< of the covariance: what a vaguer prediction owes
  double chi_square() const;
  double objective() const { return chi_square() + log_determinant; }
};

/// The days after a change against predictions that agree with the days before.
class Comparison {
 public:
  Comparison(const Plant& plant, std::span<const Observed> before, std::span<const Observed> after,
             double fouling_before);

  int count() const { return count_; }  ///< observables of all days after
  double fouling_before() const { return fouling_before_; }
  bool is_observed(Channel channel) const;
  bool is_inferred(Channel channel) const;  ///< on some day after

  /// Takes the days after for as scattered as they are about this explanation, each channel
  /// about its own mean: a mean that is off stays a reason against it.
  void widen(std::span<const Part> parts);

  /// Empty where the parts cannot be.
  std::optional<Residuals> residuals(std::span<const Part> parts) const;

  /// Predicted observables of the last day, and what they are uncertain by (2 % or 0.1 K where not read).
  std::optional<Channels> last_day(std::span<const Part> parts) const;
  Channels last_uncertainty() const;

 private:
  struct Miss {
    double value, scatter, shared;  ///< observed - expected; standard uncertainties
    double owed;                    ///< shared one of the prediction before it was bounded
  };
  using Misses = std::array<std::vector<Miss>, observables.size()>;
  std::optional<Misses> misses(std::span<const Part> parts) const;
  Channels carried_over(const Channels& predicted) const;
  double model_spread(const Observed& day, Channel channel) const;
  double deposit_rise(std::span<const Part> parts, Channel channel) const;
  bool is_lower_than_clean(const std::vector<Channels>& expected, Channel channel, double rise) const;

  const Plant* plant_;
  std::vector<Observed> after_;
  double fouling_before_;
  Channels flow_{};      ///< mean logarithm of the flow that makes a drop, before
  Channels offset_{};    ///< of the days before from the model: [K] or ratio
  Channels variance_{};  ///< of their mean
  Channels scatter_{};   ///< variance of one day, as the days show it; 0 where they are few
  int count_ = 0;
};

}  // namespace dutygauge::field
