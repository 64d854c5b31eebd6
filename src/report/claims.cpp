#include <fmt/core.h>

#include <algorithm>

#include "dutygauge/units/mention.hpp"
#include "sections.hpp"
#include "words.hpp"

namespace dutygauge::report {
namespace {

using bids::Agreement;
using bids::ClaimVerdict;

std::size_t count(const Result& result, Agreement agreement) {
  return static_cast<std::size_t>(std::ranges::count(result.claims, agreement, &ClaimVerdict::verdict));
}

/// "area.effective" is "effective area".
std::string spoken(std::string_view key) {
  const auto dot = key.find('.');
  std::string words(key);
  if (dot != std::string_view::npos) words = fmt::format("{} {}", key.substr(dot + 1), key.substr(0, dot));
  std::ranges::replace(words, '_', ' ');
  return words;
}

std::string figure(const ClaimVerdict& claim, double si, const Figures& figures) {
  return claim.key == "surface_margin" ? signed_percent(si) : figures.with_unit(si, claim.kind);
}

std::string why(const ClaimVerdict& claim, units::System system, bool all) {
  std::string words = units::spoken(claim.likely, system);
  if (claim.computed && (all || words.empty()))
    words += fmt::format("{}beside {}", words.empty() ? "" : "; ", claim.against);
  return words;
}

bool is_on_page_one(const ClaimVerdict& claim) {
  return claim.verdict == Agreement::contradicts || claim.verdict == Agreement::ask;
}

std::string tally(const Result& result) {
  std::string text =
      fmt::format("{} claim{} of the sheet", result.claims.size(), result.claims.size() == 1 ? "" : "s");
  const std::pair<Agreement, const char*> parts[] = {{Agreement::contradicts, "contradict{}"},
                                                     {Agreement::ask, "to ask about"},
                                                     {Agreement::agrees, "agree{}"},
                                                     {Agreement::not_checked, "not checked"}};
  std::vector<std::string> said;
  for (const auto& [agreement, words] : parts)
    if (const auto n = count(result, agreement); n > 0)
      said.push_back(fmt::format("{} {}", n, fmt::format(fmt::runtime(words), n == 1 ? "s" : "")));
  return text + ": " + listed(said) + ".";
}

}  // namespace

void sheet_contradicts(Page& page, const Result& result) {
  std::vector<std::string> places;
  for (const auto& claim : result.claims)
    if (claim.verdict == Agreement::contradicts) places.push_back(spoken(claim.key));
  if (places.empty()) return;
  page.section("SHEET", fmt::format("contradicts itself in {} place{}: {}.", places.size(),
                                    places.size() == 1 ? "" : "s", listed(places)));
}

void claims(Page& page, const Result& result, const TextOptions& options) {
  if (result.claims.empty()) return;
  const Figures figures(result.display);
  page.blank();
  page.section("CLAIMS", tally(result));
  std::vector<std::vector<std::string>> rows = {{"claim", "sheet", "here", "verdict", "why"}};
  for (const auto& claim : result.claims) {
    if (!options.all && !is_on_page_one(claim)) continue;
    std::string verdict(word(claim.verdict));
    std::ranges::replace(verdict, '_', ' ');
    rows.push_back({spoken(claim.key), figure(claim, claim.stated, figures),
                    claim.computed ? figure(claim, *claim.computed, figures) : "-", verdict,
                    why(claim, result.display, options.all)});
  }
  if (rows.size() > 1) page.table(rows, {Align::left, Align::right, Align::right, Align::left, Align::left});
  const auto hidden = result.claims.size() + 1 - rows.size();
  // Where the tally says it all, nothing more is announced.
  if (hidden > 0 && rows.size() > 1) page.line(fmt::format("  {} more: -v", hidden));
}

}  // namespace dutygauge::report
