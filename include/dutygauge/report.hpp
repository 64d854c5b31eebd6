#pragma once
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/bids.hpp"
#include "dutygauge/findings.hpp"
#include "dutygauge/service.hpp"
#include "dutygauge/uncertainty.hpp"

/// Results to text and JSON. Knows no file format of the input; no physics.
namespace dutygauge::report {

/// Everything a page or a JSON object is made from.
struct Result {
  std::string file;  ///< base name, "-" for standard input
  std::string title, tag, input_sha256;
  units::System display = units::System::metric;
  service::Assessment assessment;
  std::optional<uncertainty::Result> spread{};  ///< of the assessment
  std::vector<bids::ClaimVerdict> claims{};  ///< of the sheet, as built
  Inputs inputs;
  Assumptions assumed;
  Findings findings;  ///< all, the gravest first
};

struct TextOptions {
  bool all = false;  ///< every finding and assumption, resistances and factors (-v)
};

/// The text page: at most 100 columns, ASCII.
std::string text(const Result& result, const TextOptions& options);

/// The JSON object of one file, schema_version 1, on one line, without newline.
/// Throws std::logic_error where a number is not finite: null means "not defined".
std::string json(const Result& result);

/// The finding's text with its two numbers in a system of units.
std::string sentence(const Finding& finding, units::System system);

std::string_view word(Severity severity);

/// The JSON object that stands for a file without a result: its base name and
/// the messages, so that a reader of several files sees every one of them.
std::string error_json(const std::string& file, const std::vector<std::string>& messages);

}  // namespace dutygauge::report
