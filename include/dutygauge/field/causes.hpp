#pragma once
#include <array>
#include <cstdint>
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/field/plant.hpp"

/// Why a unit shows something else than before: single causes, each of one magnitude.
namespace dutygauge::field {

enum class Cause : std::uint8_t {
  none,
  tube_deposit,   ///< magnitude: resistance more than before, on the outside area [m2.K/W]
  shell_deposit,  ///< the same
  plugging,       ///< share of the tubes
  tube_bypass,    ///< share of the tube flow: a leak through the pass partition, where there is one
  shell_bypass,   ///< share of the shell flow: strips lost, baffles damaged
  area_lost,      ///< share of the surface: gas or vapour over it
  instrument,     ///< reading - truth [K]; of flows and drops reading/truth - 1 [-]
};

/// How the change came. A deposit, a leaking partition and an instrument may come gradually;
/// tubes are plugged, strips lost and gas gathers at once.
enum class Onset : std::uint8_t { sudden, gradual };

/// One cause with its magnitude.
struct Part {
  Cause cause = Cause::none;
  std::optional<Channel> channel{};  ///< of an instrument
  double magnitude = 0;
  double standard_uncertainty = 0;  ///< of the magnitude
};

/// What is said to have happened, and how well that explains the readings.
struct Explanation {
  std::vector<Part> parts;  ///< none: nothing changed
  double chi_square = 0;    ///< of the observables' changes
  double p_value = 0;       ///< of a chi-square as large by chance
  std::vector<double> effects{};  ///< of each part alone on the last day's outlets [K]
  double bic = 0;           ///< chi_square + parts ln(observables), and what a vaguer prediction owes
  double weight = 0;        ///< exp(-bic/2), normalised among explanations of as many parts or fewer
  Channels predicted{};     ///< what the last day would then show; NaN where the unit has no drop
};

/// What may be said of a ranking.
enum class Ranked : std::uint8_t {
  no_change,      ///< no change explains the readings, and nothing explains them better
  most_likely,    ///< the first of `open` has a weight above 0.9 and an acceptable chi-square
  not_separable,  ///< several remain: `Ranking::open`
  unexplained,    ///< no single cause is acceptable, and no pair either
};

/// The reading that would decide between the first two explanations.
struct Separator {
  Channel channel = Channel::tube_dp;
  bool measured = false;  ///< false: it is not among the readings
  double distance = 0;    ///< between the two predictions, in standard uncertainties
};

struct Ranking {
  Ranked verdict = Ranked::not_separable;
  std::vector<Explanation> singles;  ///< no change and every single cause, the best first
  std::vector<Explanation> pairs;    ///< only where no single one is acceptable; the best first
  std::vector<Explanation> open;     ///< those that remain: together more than 95 % of the weight
  std::optional<Separator> separator;
};

/// Readings and the standard uncertainties of their change, absolute: what scatters from day
/// to day, and what is alike on all days after, such as the model's own error. Missing: NaN.
/// Flows and inlets are taken as they read.
struct Observed {
  Channels value{}, scatter{}, shared{};
  std::optional<Channel> inferred{};  ///< came from the balance: no instrument to blame
};

/// Error of a model's changes: of outlets, of a drop, and of a drop's exponent on the flow,
/// which counts as the flow differs from that of the days before.
struct ModelError {
  double temperature = 0.1;    ///< [K]
  double drop = 0.02;          ///< [-]
  double drop_exponent = 0.1;  ///< [-]
};

/// A day's medians with their scatter and the model's error.
Observed observed(const Day& day, const Instruments& instruments, const ModelError& error = {});

/// Ranks causes of the change from `before` to `after` by BIC (Schwarz 1978). Each cause is fitted to the
/// outlets and drops of all days after; what the model with `fouling_before` in the tubes
/// misses before is carried over: temperatures by difference, drops by ratio.
/// Days are no surer than they scatter about the best explanation, where they are five or more.
/// Magnitudes stay where they can be: shares 0 to 0.7, a deposit at most as much less as there was. With
/// several days at several flows a deposit, the same for all, parts from a by-pass. Empty where `before` or
/// `after` hold no day that can be predicted.
std::optional<Ranking> rank_causes(const Plant& plant, std::span<const Observed> before,
                                   std::span<const Observed> after, double fouling_before,
                                   Onset onset = Onset::sudden);

/// The same over days, with the median apparent fouling of the days before. A missing flow or
/// inlet comes from the balance, and that side's outlet then says nothing more.
std::optional<Ranking> rank_over_days(const Plant& plant, const Instruments& instruments,
                                      std::span<const Day> before, std::span<const Day> after,
                                      Onset onset = Onset::sudden);

/// What a plant would call it. A by-pass has its own name only where that side's drop is read.
std::string_view name_of(const Part& part, const Channels& observed);

/// The weights of a ranking by name, the greatest first. A pair's weight is divided by what each of
/// the two does to the outlets. An instrument is one cause, however many there are: its weight is the mean of
/// theirs. `observed` as above.
struct NamedWeight {
  std::string name;
  double weight = 0;  ///< sum 1
};
std::vector<NamedWeight> weights_of(const Ranking& ranking, const Channels& observed);

}  // namespace dutygauge::field
