#pragma once
#include <string>

#include "dutygauge/findings.hpp"
#include "dutygauge/service.hpp"

/// Results to text and JSON. Knows no file format of the input; no physics.
namespace dutygauge::report {

/// Everything a page or a JSON object is made from.
struct Result {
  std::string file;  ///< base name, "-" for standard input
  std::string title, tag, input_sha256;
  units::System display = units::System::metric;
  service::Assessment assessment;
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
std::string json(const Result& result);

}  // namespace dutygauge::report
