#include <doctest/doctest.h>

#include <filesystem>
#include <map>
#include <set>

#include "dutygauge/explore.hpp"

// Demo cases with a sheet: it is given back within the spread, or what is wrong in it is said.

using namespace dutygauge;

namespace {

/// Claims a sheet is wrong in on purpose, as its comment says; `unchecked`: what nothing speaks about.
struct Expected {
  std::set<std::string> contradicts, unchecked;
};

const std::map<std::string, Expected> sheets = {
    {"finned-gas-cooler", {}},
    {"naphtha-cooler", {}},
    {"no-baffle-data", {{}, {"shell_side_pressure_drop"}}},
    {"quoted-oil-cooler", {{"area.effective", "surface_margin"}, {"weight"}}},
    {"stacked-crude-preheater", {{"u_service"}, {"weight"}}},
};

}  // namespace

TEST_CASE("cases: every sheet is given back within the spread, but for what its comment says is wrong") {
  for (const auto& [name, expected] : sheets) {
    CAPTURE(name);
    const auto document = case_io::read_file(SOURCE_DIR "/cases/" + name + ".yaml");
    const auto result = explore::rate(document, {});
    CHECK(result.claims.size() >= 12);
    std::set<std::string> contradicts, unchecked;
    for (const auto& claim : result.claims) {
      CAPTURE(claim.key);
      CHECK(claim.verdict != bids::Agreement::ask);
      if (claim.verdict == bids::Agreement::contradicts) contradicts.insert(claim.key);
      if (claim.verdict == bids::Agreement::not_checked) unchecked.insert(claim.key);
    }
    CHECK(contradicts == expected.contradicts);
    CHECK(unchecked == expected.unchecked);
  }
}

TEST_CASE("cases: a file with claims is among the sheets of this test") {
  std::size_t found = 0;
  for (const auto& entry : std::filesystem::directory_iterator(SOURCE_DIR "/cases"))
    if (entry.path().extension() == ".yaml" &&
        case_io::read_file(entry.path().string()).blocks.contains("claims")) {
      CHECK_MESSAGE(sheets.contains(entry.path().stem().string()), entry.path().string());
      ++found;
    }
  CHECK(found == sheets.size());
}
