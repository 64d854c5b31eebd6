#pragma once
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/report.hpp"
#include "page.hpp"

/// Words of the reports: names of streams, findings as sentences, words beside a limit.
namespace dutygauge::report {

enum class Side { shell, tube };

/// "shell-side" or "tube-side".
std::string_view side_word(Side side);

/// What a person calls the stream; the side goes with it where both bear one name.
std::string stream_name(const rating::Problem& problem, Side side);

std::string_view word(Ground ground);
std::string_view word(tubeside::Regime regime);
std::string_view word(bids::Agreement agreement);

/// The value of an assumption as it would be typed.
std::string as_typed(const Assumption& assumption, units::System system, int significant);

/// A key in plain words: "exchanger.clearances.tube_to_baffle" is "clearance tube to baffle".
std::string plain_words(std::string_view key);

/// "ok", "close" (less than a tenth left) or `broken`, for the fraction of a limit that is left.
std::string_view limit_word(double fraction_left, std::string_view broken);

/// "2.4 x", "43 x".
std::string times(double ratio);

/// "a, b and c".
std::string listed(const std::vector<std::string>& words);

/// Something that takes part of the temperature difference, and its share of the whole.
struct Share {
  std::string across;
  double fraction;
};

/// Where the temperature difference goes, the largest share first.
std::vector<Share> shares(const rating::Problem& problem, const overall::Resistances& resistances);

}  // namespace dutygauge::report
