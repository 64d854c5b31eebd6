#pragma once
#include <algorithm>
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/bids.hpp"
#include "dutygauge/case_io.hpp"
#include "support.hpp"

/// Sheets of tests/data/claims with one text in place of another, audited.
namespace claims_support {

inline std::string sound_sheet() {
  return support::read_text(TEST_DATA "/claims/sound-sheet.yaml");
}

inline std::string with(std::string_view from, std::string_view to, std::string text = sound_sheet()) {
  const auto at = text.find(from);
  if (at == std::string::npos) throw std::logic_error("not in the sheet: " + std::string(from));
  return text.replace(at, from.size(), to);
}

inline dutygauge::case_io::Case built(const std::string& text) {
  return dutygauge::case_io::build(dutygauge::case_io::read_document(text, "x"));
}

inline std::vector<dutygauge::bids::ClaimVerdict> audited(const std::string& text) {
  const auto a_case = built(text);
  return dutygauge::bids::audit(a_case.claims, dutygauge::service::assess(a_case.problem, a_case.service));
}

inline const dutygauge::bids::ClaimVerdict& of(const std::vector<dutygauge::bids::ClaimVerdict>& verdicts,
                                               std::string_view key) {
  const auto found = std::ranges::find(verdicts, key, &dutygauge::bids::ClaimVerdict::key);
  if (found == verdicts.end()) throw std::logic_error("no verdict on " + std::string(key));
  return *found;
}

/// Keys with a verdict, in order, "a b c".
inline std::string keys_with(const std::vector<dutygauge::bids::ClaimVerdict>& verdicts,
                             dutygauge::bids::Agreement agreement) {
  std::string keys;
  for (const auto& one : verdicts)
    if (one.verdict == agreement) keys += (keys.empty() ? "" : " ") + one.key;
  return keys;
}

}  // namespace claims_support
