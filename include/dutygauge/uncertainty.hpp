#pragma once
#include <array>
#include <cstdint>
#include <functional>
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/rating.hpp"
#include "dutygauge/uncertainty/anchor.hpp"

/// How sure a rating is: what each of its sources may be wrong by, carried to the
/// outcome to first order and by sampling. Knows no service, no file.
namespace dutygauge::uncertainty {

// --- any model of independent standard normal inputs

/// Outputs of a model at standard normal deviates, one each input; empty where it has no result.
using Model = std::function<std::optional<std::vector<double>>(std::span<const double> deviates)>;

/// Linear in each input around zero deviates.
struct FirstOrder {
  std::vector<double> nominal;               ///< by output
  std::vector<double> sigma;                 ///< by output: one standard deviation
  std::vector<std::vector<double>> effects;  ///< [input][output]: change for one deviate

  /// Part of an output's variance that an input carries [-]; 0 where nothing varies.
  double share(std::size_t input, std::size_t output) const;
};

/// Central differences, 2 inputs + 1 evaluations; one-sided where one side has no result.
/// Empty where the nominal has none, or neither side of an input.
/// Source: JCGM 100:2008 (GUM), clause 5, without correlation.
std::optional<FirstOrder> first_order(const Model& model, std::size_t inputs);

struct Sampling {
  int samples = 1024;                        ///< best a power of two
  std::uint64_t seed = 0x64757479'67617567;  ///< of the digital shift: the same points every run
};

/// Points of a Sobol sequence with a digital shift, as standard normal deviates: [sample][input].
/// Source: Bratley & Fox, TOMS 14, 88-100 (1988), by Boost.Random; JCGM 101:2008 for its use.
std::vector<std::vector<double>> normal_points(std::size_t inputs, const Sampling& sampling);

/// What the samples of one output say.
struct Spread {
  double mean = 0, sigma = 0;
  double low = 0, high = 0;  ///< 5 and 95 % of the samples lie below
};

/// Quantiles between samples are linear in their rank. Needs: at least one value.
Spread spread_of(std::vector<double> values);

// --- the sources of a rating

enum class Distribution {
  normal,
  lognormal,   ///< median 1: sigma is its coefficient of variation
  uniform,     ///< half-width sigma sqrt(3)
  triangular,  ///< half-width sigma sqrt(6)
};

/// What a source varies of a problem, on its side where it has one.
enum class Varied {
  film,
  drop,
  fouling,
  density,
  heat_capacity,
  conductivity,
  viscosity,
  flow,
  inlet_temperature,  ///< the only one of a problem that is moved, not multiplied
  wall_conductivity,
  film_with_flow,  ///< a film away from where an anchor has tied it
  read_flow,       ///< of an anchor's reading, and its temperatures, which are moved
  read_inlet,
  read_outlet,
  found_fouling,  ///< of a record; moved [m2.K/W]
};

/// One thing that may be wrong.
struct Source {
  std::string name;  ///< "the shell-side film"
  std::string key;   ///< "shell_side.film"; common sources with the same key are wrong together
  Varied varied = Varied::film;
  Side side = Side::shell;
  double sigma = 0;  ///< one standard deviation: a fraction of the value; of what is moved its own unit
  Distribution distribution = Distribution::lognormal;
  bool common = true;  ///< the same error in every case and state of one unit; false: in each anew
  std::string source;  ///< key in sources.hpp
};

/// A deviation in standard deviations, from a standard normal deviate.
double deviation(Distribution distribution, double deviate);

/// What a source's value is multiplied by, or moved by, at a standard normal deviate.
double drawn(const Source& source, double deviate);

/// A problem with one of its sources at a deviate.
void apply(const Source& source, double deviate, rating::Problem& problem);

/// A reading with one of its sources at a deviate.
void apply(const Source& source, double deviate, SteadyReading& reading);

/// What is uncertain in a rating by its nature: scatter of the methods in the regimes of
/// the outcome, the bands of both fluids' properties, both foulings, the wall.
std::vector<Source> sources_of(const rating::Problem& problem, const rating::Outcome& outcome);

/// What is uncertain in a rating of today, tied to a reading: of `sources_of` what is not a
/// fouling, both films away from the flows read, and the reading itself.
std::vector<Source> sources_of_today(const Anchor& anchor, const rating::Problem& problem,
                                     const rating::Outcome& outcome);

// --- the spread of ratings

enum class Output { duty, shell_outlet, tube_outlet, shell_drop, tube_drop };
inline constexpr std::size_t output_count = 5;
using Spreads = std::array<Spread, output_count>;

/// An input of a case that lies open, by what the outcome becomes at both ends of its span.
/// For what no factor on a problem stands for: a dimension, a choice.
struct Swing {
  std::string name, key;
  Distribution distribution = Distribution::triangular;
  /// Change of each output at the ends: of temperatures [K], else relative [-].
  std::array<double, output_count> at_low{}, at_high{};
};

/// Adds a swing to an outcome: along the parabola through both ends, at a standard normal
/// deviate; a normal distribution has its ends one standard deviation away.
void apply(const Swing& swing, double deviate, rating::Outcome& outcome);

/// Whether an outcome is what is asked for.
using Predicate = std::function<bool(const rating::Outcome&)>;

/// A problem with its result as shown, what may be wrong in it, and what must hold.
struct Question {
  rating::Problem problem;
  rating::Outcome nominal;
  std::vector<Source> sources;
  std::vector<Swing> swings{};     ///< common to all cases of one unit, by key
  std::optional<Anchor> anchor{};  ///< the problem is the unit of today: each sample is tied to the reading
  Predicate meets{};               ///< empty: no probability
};

/// Part of the variance of each output that a source carries, first order [-].
struct Share {
  std::string name, key;
  std::array<double, output_count> of{};
  double operator[](Output output) const { return of[static_cast<std::size_t>(output)]; }
};

struct Result {
  Spreads spreads{};
  std::array<double, output_count> first_order_sigma{};
  std::vector<Share> shares;          ///< the largest share of the duty first
  std::optional<double> probability;  ///< that the predicate holds; a sample without result does not
  int samples = 0, failed = 0;        ///< failed: without result, not in the spreads
  int evaluations = 0;                ///< ratings it took

  const Spread& operator[](Output output) const { return spreads[static_cast<std::size_t>(output)]; }
};

/// Several ratings of one unit, sample by sample.
struct Together {
  std::vector<std::optional<Result>> each;         ///< as `propagate` gives
  std::vector<std::optional<Spreads>> less_first;  ///< each outcome less that of the first question
  std::optional<double> probability_all;           ///< that every predicate holds at once
};

/// The spread of one rating. Each sample is rated by mean properties; its deviation from
/// the nominal rated so (duty, change of each temperature and drops as ratios) is put on the
/// question's own nominal. A march would cost some ten times as much, and its deviations
/// differ from these by second order only. Empty where mean properties give no result.
std::optional<Result> propagate(const Question& question, const Sampling& sampling = {});

/// The same for several with the common sources drawn once.
Together propagate_together(std::span<const Question> questions, const Sampling& sampling = {});

// --- in words

/// How sure it is that a service is met.
enum class Grade {
  meets,      ///< probability 0.95 and more
  likely,     ///< 0.80 and more
  too_close,  ///< 0.20 and more
  unlikely,   ///< 0.05 and more
  fails,
};
Grade grade_of(double probability);
std::string_view word(Grade grade);  ///< "too_close"

/// "91 %"; beyond 0.01 and 0.99 "< 1 %" and "> 99 %": the tails are not known better.
std::string in_words(double probability);

}  // namespace dutygauge::uncertainty
