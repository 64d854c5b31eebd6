#include <doctest/doctest.h>

#include <cmath>
#include <filesystem>
#include <random>

#include "claims_support.hpp"

using namespace dutygauge;
using bids::Agreement;

namespace {

/// Claims drawn at random around plausible values, some far off, some left out.
bids::Claims random_claims(std::mt19937& random) {
  std::uniform_real_distribution<double> unit(0.0, 1.0);
  bids::Claims claims;
  for (const auto& key : bids::claim_keys()) {
    if (unit(random) < 0.3) continue;
    double value = std::pow(10.0, 8.0 * unit(random) - 2.0);
    if (key.kind == units::Kind::temperature) value = 250.0 + 250.0 * unit(random);
    if (key.kind == units::Kind::ratio) value = unit(random) < 0.2 ? 1.0 : unit(random);
    claims.*key.place = bids::Stated{value, unit(random) < 0.5 ? 0.0 : 0.01 * value};
  }
  claims.area_per = unit(random) < 0.5 ? bids::Per::unit : bids::Per::shell;
  claims.surface_margin_basis = static_cast<bids::MarginBasis>(static_cast<int>(3.0 * unit(random)));
  return claims;
}

std::size_t stated_in(const bids::Claims& claims) {
  std::size_t count = 0;
  for (const auto& key : bids::claim_keys()) count += (claims.*key.place).has_value() ? 1 : 0;
  return count;
}

}  // namespace

TEST_CASE("bids: whatever is claimed, every claim gets one finite verdict with a reason") {
  std::mt19937 random(20261201);
  for (const auto& entry : std::filesystem::directory_iterator(SOURCE_DIR "/cases")) {
    if (entry.path().extension() != ".yaml") continue;
    CAPTURE(entry.path().filename().string());
    const auto a_case = case_io::build(case_io::read_file(entry.path().string()));
    const auto ours = service::assess(a_case.problem, a_case.service);
    for (int i = 0; i < 200; ++i) {
      const auto claims = random_claims(random);
      const auto verdicts = bids::audit(claims, ours);
      REQUIRE(verdicts.size() == stated_in(claims));
      for (const auto& one : verdicts) {
        CAPTURE(one.key);
        CHECK(std::isfinite(one.stated));
        CHECK(std::isfinite(one.computed.value_or(0.0)));
        CHECK(std::isfinite(one.ratio.value_or(0.0)));
        const bool explained = one.verdict == Agreement::agrees || !one.likely.empty();
        CHECK(explained);
        if (one.verdict == Agreement::contradicts) CHECK(one.ground != Ground::method);
      }
    }
  }
}
