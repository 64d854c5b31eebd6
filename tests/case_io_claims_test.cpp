#include <doctest/doctest.h>

#include <cmath>
#include <nlohmann/json.hpp>

#include "case_io_good.hpp"
#include "case_io_refused.hpp"

using namespace dutygauge;
using good::and_also;
using refused::check;

namespace {

bids::Claims claims_of(const std::string& block) {
  return case_io::build(case_io::read_document(and_also("claims: " + block), "x")).claims;
}

}  // namespace

TEST_CASE("case_io: every claim is read in SI") {
  const auto c = claims_of(
      "{duty: 580 kW, shell_side_outlet: 56 degC, tube_side_outlet: 98.6 degF, "
      "area: {effective: 59.6 m2, gross: 60.7 m2, per: shell}, u_service: 353 W/m2.K, u_dirty: 400 W/m2.K, "
      "u_clean: 500 W/m2.K, lmtd: 29.1 K, f_correction: 0.96, mtd: 27.9 K, tube_side_velocity: 1.6 m/s, "
      "shell_side_pressure_drop: 60 kPa, tube_side_pressure_drop: 35 kPa, tube_side_film_coefficient: 5200 "
      "W/m2.K, shell_side_film_coefficient: 700 W/m2.K, tube_count: 208, nozzle_rho_v2: 1500 kg/m.s2, "
      "surface_margin: {value: 24 %, basis: clean}, weight: 2400 kg}");
  const double values[] = {580e3, 329.15, 310.15, 59.6, 60.7,  353.0, 400.0, 500.0,  29.1, 0.96,
                           27.9,  1.6,    60e3,   35e3, 5200., 700.0, 208.0, 1500.0, 0.24, 2400.0};
  const auto keys = bids::claim_keys();
  REQUIRE(keys.size() == std::size(values));
  for (std::size_t i = 0; i < keys.size(); ++i) {
    CAPTURE(std::string(keys[i].key));
    const auto& claim = c.*keys[i].place;
    REQUIRE(claim.has_value());
    CHECK(claim->value == doctest::Approx(values[i]).epsilon(1e-12));
  }
  CHECK(c.area_per == bids::Per::shell);
  CHECK(c.surface_margin_basis == bids::MarginBasis::clean);
}

TEST_CASE("case_io: the rounding of a claim is half a unit of its last digit") {
  const auto c = claims_of(
      "{duty: 580 kW, shell_side_outlet: 56.0 degC, tube_side_outlet: 98.6 degF, f_correction: 0.96, lmtd: "
      "1.2e1 K, u_service: 62 Btu/h.ft2.degF, tube_count: 208, surface_margin: {value: 24 %}}");
  const auto near = [](const std::optional<bids::Stated>& claim, double rounding) {
    return std::abs(claim->rounding - rounding) <= 1e-9 * (1.0 + rounding);
  };
  CHECK(near(c.duty, 500.0));
  CHECK(near(c.shell_side_outlet, 0.05));
  CHECK(near(c.tube_side_outlet, 0.05 / 1.8));
  CHECK(near(c.f_correction, 0.005));
  CHECK(near(c.lmtd, 0.5));
  CHECK(near(c.u_service, units::to_si(0.5, "Btu/h.ft2.degF", units::Kind::film_coefficient)));
  CHECK(near(c.tube_count, 0.0));
  CHECK(near(c.surface_margin, 0.005));
  CHECK(c.surface_margin_basis == bids::MarginBasis::unstated);
}

TEST_CASE("case_io: a case without claims claims nothing") {
  const auto c = case_io::build(case_io::read_document(good::oil_cooler, "x")).claims;
  for (const auto& key : bids::claim_keys()) CHECK(!(c.*key.place).has_value());
  CHECK(c.operating_case.empty());
  CHECK(claims_of("{for: base, duty: 580 kW}").operating_case == "base");
}

TEST_CASE("case_io: a claim that cannot be read is refused where it stands") {
  check({
      {"a case that is not there",
       and_also("claims: {for: bse, duty: 5 kW}"),
       {"x:49:", "claims.for", "write base"}},
      {"another case", and_also("claims: {for: design}"), {"claims.for", "'design' is no operating case"}},
      {"a key misspelt", and_also("claims: {u_servise: 353 W/m2.K}"), {"claims.u_servise", "u_service"}},
      {"a wrong unit", and_also("claims: {duty: 580 kg}"), {"claims.duty", "a power"}},
      {"a number without unit", and_also("claims: {lmtd: 20}"), {"claims.lmtd"}},
      {"F above one", and_also("claims: {f_correction: 1.2}"), {"claims.f_correction", "above"}},
      {"a margin without value",
       and_also("claims: {surface_margin: {basis: clean}}"),
       {"claims.surface_margin.value", "is missing"}},
      {"an unknown basis",
       and_also("claims: {surface_margin: {value: 5 %, basis: dirty}}"),
       {"claims.surface_margin.basis", "clean, design_fouling or unstated"}},
      {"per what",
       and_also("claims: {area: {effective: 5 m2, per: bank}}"),
       {"claims.area.per", "unit or shell"}},
      {"an empty block", and_also("claims: {}"), {"claims", "the block is empty"}},
  });
}

TEST_CASE("case_io: schema, starter case and help know the claims") {
  const auto schema = nlohmann::json::parse(case_io::schema());
  const auto& claims = schema.at("properties").at("claims").at("properties");
  for (const auto& key : bids::claim_keys()) {
    const std::string first(key.key.substr(0, key.key.find('.')));
    CHECK(claims.contains(first));
  }
  CHECK(case_io::starter_case().find("# claims:") != std::string::npos);
  CHECK(case_io::explain("claims.u_service")->help.find("never compared with ours") != std::string::npos);
}
