#pragma once
#include <optional>
#include <span>

#include "dutygauge/uncertainty.hpp"

/// One rating within the spreads of a question.
namespace dutygauge::uncertainty {

/// A problem and what mean properties make of it.
struct Sample {
  rating::Problem problem;
  rating::Outcome outcome;
};

/// The question itself by mean properties; with an anchor, tied to the reading by them too.
std::optional<Sample> nominal_by_means(const Question& question);

/// The outcome at the deviates of the sources, then of the swings: its deviation from
/// `by_means` put on the outcome as shown.
std::optional<rating::Outcome> shown_sample(const Question& question, const Sample& by_means,
                                            std::span<const double> deviates);

}  // namespace dutygauge::uncertainty
