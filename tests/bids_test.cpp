#include <doctest/doctest.h>

#include <cmath>
#include <filesystem>

#include "claims_support.hpp"
#include "dutygauge/rating/scaled.hpp"
#include "dutygauge/units/mention.hpp"

using namespace dutygauge;
using namespace claims_support;
using bids::Agreement;

TEST_CASE("bids: a sheet that agrees with itself raises no question and no contradiction") {
  const auto verdicts = audited(sound_sheet());
  CHECK(keys_with(verdicts, Agreement::contradicts) == "");
  CHECK(keys_with(verdicts, Agreement::ask) == "");
  CHECK(keys_with(verdicts, Agreement::not_checked) == "");
  CHECK(bids::findings_of(verdicts).empty());
}

TEST_CASE("bids: the audit computes a consistent sheet's numbers to their printed digits") {
  const auto verdicts = audited(sound_sheet());
  struct Row {
    const char* key;
    double value, half_digit;
  };
  // Worked out independently by closed forms; the last digit of each is what they were rounded to.
  const Row rows[] = {{"duty", 2.0900e6, 50.0},        {"area.effective", 114.596, 5e-4},
                      {"area.gross", 116.750, 5e-4},   {"lmtd", 42.757, 5e-4},
                      {"f_correction", 0.97784, 5e-6}, {"tube_side_velocity", 1.4561, 5e-5},
                      {"nozzle_rho_v2", 2415.0, 0.5}};
  for (const Row& row : rows) {
    CAPTURE(row.key);
    CHECK(std::abs(of(verdicts, row.key).computed.value() - row.value) <= row.half_digit);
  }
  // Against what the sheet prints to four digits: 436.22 and 582.63 with all digits.
  CHECK(std::abs(of(verdicts, "u_service").computed.value() - 436.22) <= 0.1);
  CHECK(std::abs(of(verdicts, "u_clean").computed.value() - 582.63) <= 0.1);
}

TEST_CASE("bids: eight slips in one sheet are all named with their cause, and nothing else is blamed") {
  const auto verdicts = audited(support::read_text(TEST_DATA "/claims/eight-slips.yaml"));
  CHECK(keys_with(verdicts, Agreement::contradicts) ==
        "duty area.effective u_clean mtd tube_side_velocity tube_count nozzle_rho_v2 surface_margin");
  CHECK(keys_with(verdicts, Agreement::ask) == "");
  const std::pair<const char*, const char*> causes[] = {
      {"duty", "duty of another operating case"},
      {"area.effective", "area is gross, not effective"},
      {"u_clean", "tube-side fouling is not referred to the outside"},
      {"mtd", "LMTD without F"},
      {"tube_side_velocity", "thicker wall (minimum wall)"},
      {"tube_count", "U-tubes given as tubes"},
      {"nozzle_rho_v2", "half of rho v2"},
      {"surface_margin", "margin is on the clean coefficient"}};
  for (const auto& [key, cause] : causes) {
    CAPTURE(key);
    CHECK_MESSAGE(of(verdicts, key).likely.find(cause) != std::string::npos, of(verdicts, key).likely);
    CHECK((of(verdicts, key).ground == Ground::arithmetic || of(verdicts, key).ground == Ground::geometry));
  }
  CHECK(bids::findings_of(verdicts).size() == 8);
}

TEST_CASE("bids: each single slip is blamed where it is, with its cause, and nowhere else") {
  struct Row {
    const char *from, *to, *blamed, *cause;
  };
  const Row rows[] = {
      {"duty: 2090 kW", "duty: 2300 kW", "duty", "another operating case"},
      {"duty: 2090 kW", "duty: 1797 kW", "duty", "kcal/h"},
      {"let: 66.25 degC", "let: 76.25 degC", "shell_side_outlet", "10.0 K"},
      {"let: 40.0 degC", "let: 45.0 degC", "tube_side_outlet", "another operating case"},
      {"let: 40.0 degC", "let: 20.0 degC", "tube_side_outlet", "wrong side"},
      {"effective: 114.6", "effective: 116.75", "area.effective", "gross, not effective"},
      {"effective: 114.6", "effective: 229.2", "area.effective", "twice the surface"},
      {"effective: 114.6", "effective: 89.2", "area.effective", "inside surface"},
      {"gross: 116.75", "gross: 114.6", "area.gross", "effective, not gross"},
      {"u_service: 436.2", "u_service: 428.1", "u_service", "gross area"},
      {"u_service: 436.2", "u_service: 560", "u_service", "inside surface"},
      {"u_clean: 582.6", "u_clean: 566", "u_clean", "not referred to the outside"},
      {"u_clean: 582.6", "u_clean: 515", "u_clean", "tube-side fouling is left out"},
      {"u_clean: 582.6", "u_clean: 488", "u_clean", "shell-side fouling is left out"},
      {"u_clean: 582.6", "u_clean: 436.2", "u_clean", "U dirty printed as U clean"},
      {"u_dirty: 436.2", "u_dirty: 582.6", "u_dirty", "U clean printed as U dirty"},
      {"lmtd: 42.76", "lmtd: 43.13", "lmtd", ""},
      {"lmtd: 42.76", "lmtd: 41.8", "lmtd", "F is already in it"},
      {"f_correction: 0.978", "f_correction: 1", "f_correction", "no correction"},
      {"f_correction: 0.978", "f_correction: 0.9", "f_correction", "another arrangement"},
      {"mtd: 41.81", "mtd: 42.76", "mtd", "LMTD without F"},
      {"mtd: 41.81", "mtd: 40.89", "mtd", "F applied twice"},
      {"locity: 1.456", "locity: 2.912", "tube_side_velocity", "4 passes"},
      {"locity: 1.456", "locity: 1.75", "tube_side_velocity", "12 BWG"},
      {"tube_count: 400", "tube_count: 200", "tube_count", "U-tubes are counted"},
      {"tube_count: 400", "tube_count: 399", "tube_count", "another count"},
      {"v2: 2415", "v2: 5000", "nozzle_rho_v2", "another flow or bore"},
      {"value: 0.0 %", "value: 33.6 %", "surface_margin", "on the clean coefficient"},
      {"0.0 %, basis: design_fouling", "0.0 %, basis: clean", "surface_margin", "at design fouling"},
      {"value: 0.0 %", "value: 15 %", "surface_margin", "other coefficients"},
  };
  for (const Row& row : rows) {
    CAPTURE(row.to);
    const auto verdicts = audited(with(row.from, row.to));
    if (std::string_view(row.to) == "lmtd: 43.13") {  // 0.9 %: the arithmetic tolerance is 1 %
      CHECK(keys_with(verdicts, Agreement::contradicts) == "");
      continue;
    }
    CHECK(keys_with(verdicts, Agreement::contradicts) == row.blamed);
    CHECK(keys_with(verdicts, Agreement::ask) == "");
    const auto likely = units::spoken(of(verdicts, row.blamed).likely, units::System::metric);
    CHECK_MESSAGE(likely.find(row.cause) != std::string::npos, likely);
  }
}

TEST_CASE("bids: a small gap in the heat balance is a question, a rounded digit is none") {
  const auto ask = audited(with("duty: 2090 kW", "duty: 2150 kW"));  // 2.9 %
  CHECK(of(ask, "duty").verdict == Agreement::ask);
  CHECK(of(ask, "duty").likely.find("heat capacity") != std::string::npos);
  // 40.4 is 4 % of the water's heat away; printed as 40 it may have been rounded from it.
  CHECK(of(audited(with("let: 40.0 degC", "let: 40.4 degC")), "tube_side_outlet").verdict == Agreement::ask);
  CHECK(keys_with(audited(with("let: 40.0 degC", "let: 40 degC", with("let: 66.25", "let: 66"))),
                  Agreement::contradicts) == "");
}

TEST_CASE("bids: by two outlets without a duty, and a duty with one outlet, the balance is still held") {
  const auto two = audited(with("  duty: 2090 kW\n", "", with("let: 40.0", "let: 43.0")));
  CHECK(of(two, "tube_side_outlet").verdict == Agreement::contradicts);
  const auto with_duty = audited(with("  tube_side_outlet: 40.0 degC\n", "", with("2090 kW", "2300 kW")));
  CHECK(of(with_duty, "duty").verdict == Agreement::contradicts);
  const auto alone =
      audited(with("  tube_side_outlet: 40.0 degC\n", "", with("  shell_side_outlet: 66.25 degC\n", "")));
  CHECK(of(alone, "duty").verdict == Agreement::not_checked);
  CHECK(of(alone, "lmtd").verdict == Agreement::agrees);  // both outlets follow from the duty
  CHECK(of(alone, "u_service").verdict == Agreement::agrees);
}

TEST_CASE("bids: an F for outlets no surface can reach contradicts, whatever it is") {
  auto text = with("flow: 50 kg/s", "flow: 10.5 kg/s");  // 30 to 77.6 degC
  text = with("let: 40.0 degC", "let: 77.62 degC", text);
  const auto verdicts = audited(text);
  const auto& f = of(verdicts, "f_correction");
  CHECK(f.verdict == Agreement::contradicts);
  CHECK(!f.computed.has_value());
  CHECK(f.likely.find("cannot reach") != std::string::npos);
}

TEST_CASE("bids: of several shells, areas, flows and U of one shell are recognised") {
  auto text = with("  tema: AES\n", "  tema: AES\n  shells: {in_series: 1, in_parallel: 2}\n");
  text = with("flow: 40 kg/s", "flow: 80 kg/s", text);
  text = with("flow: 50 kg/s", "flow: 100 kg/s", text);
  text = with("duty: 2090 kW", "duty: 4180 kW", text);
  const auto verdicts = audited(text);
  CHECK(keys_with(verdicts, Agreement::contradicts) == "area.effective area.gross");
  CHECK(of(verdicts, "area.effective").likely == "area is per shell");
  const auto right = audited(with("per: unit", "per: shell", text));
  CHECK(keys_with(right, Agreement::contradicts) == "");
  const auto halved = audited(with("4180 kW", "2090 kW", with("per: unit", "per: shell", text)));
  CHECK(keys_with(halved, Agreement::contradicts) == "duty");
  CHECK(of(halved, "duty").likely == "duty is that of one shell of several");
  const auto all_flow = audited(with("1.456 m/s", "2.912 m/s", with("per: unit", "per: shell", text)));
  CHECK(of(all_flow, "tube_side_velocity").verdict == Agreement::contradicts);
}

TEST_CASE("bids: a sheet may count plugged tubes or not") {
  const auto plugged = with("    passes: 2\n", "    plugged: 20\n    passes: 2\n");
  CHECK(keys_with(audited(plugged), Agreement::contradicts) == "");
  auto less = with("effective: 114.6", "effective: 108.87", with("gross: 116.75", "gross: 110.9", plugged));
  less = with("u_service: 436.2", "u_service: 459.1", with("1.456 m/s", "1.533 m/s", less));
  less = with("u_dirty: 436.2", "u_dirty: 459.1", with("u_clean: 582.6", "u_clean: 624.2", less));
  CHECK(keys_with(audited(less), Agreement::contradicts) == "");
}

TEST_CASE("bids: a margin without a basis is asked about when it is that of the clean coefficient") {
  CHECK(of(audited(with("0.0 %, basis: design_fouling", "33.6 %, basis: unstated")), "surface_margin")
            .verdict == Agreement::ask);
  CHECK(of(audited(with("0.0 %, basis: design_fouling", "0 %")), "surface_margin").verdict ==
        Agreement::agrees);
}

TEST_CASE("bids: U in service above U dirty contradicts: the surface would fall short") {
  auto text = with("u_dirty: 436.2", "u_dirty: 400", with("u_clean: 582.6", "u_clean: 519.8"));
  text = with("  surface_margin: {value: 0.0 %, basis: design_fouling}\n", "", text);
  const auto verdicts = audited(text);
  CHECK(keys_with(verdicts, Agreement::contradicts) == "u_dirty");
  CHECK(of(verdicts, "u_dirty").likely.find("falls short") != std::string::npos);
}

TEST_CASE("bids: films, drops and U beside ours are at most a question") {
  const auto a_case = built(sound_sheet());
  const auto ours = service::assess(a_case.problem, a_case.service);
  const auto& outcome = ours.rating.outcome.value();
  const auto audit_times = [&](double factor) {
    bids::Claims claims;
    claims.tube_side_film = {outcome.local.tube_film.coefficient * factor, 0.0};
    claims.shell_side_film = {outcome.local.shell_film.coefficient * factor, 0.0};
    claims.shell_side_pressure_drop = {outcome.shell_drop.total() * factor, 0.0};
    claims.tube_side_pressure_drop = {outcome.tube_drop.total() * factor, 0.0};
    claims.weight = {3000.0, 50.0};
    return bids::audit(claims, ours);
  };
  CHECK(keys_with(audit_times(1.19), Agreement::ask) == "");
  CHECK(keys_with(audit_times(1.24), Agreement::ask) == "tube_side_pressure_drop");
  CHECK(keys_with(audit_times(0.74), Agreement::ask) ==
        "tube_side_pressure_drop tube_side_film_coefficient shell_side_film_coefficient");
  for (const double factor : {0.1, 10.0}) {
    const auto far = audit_times(factor);
    CHECK(keys_with(far, Agreement::contradicts) == "");
    CHECK(keys_with(far, Agreement::not_checked) == "weight");
    CHECK(of(far, "shell_side_film_coefficient").ground == Ground::method);
  }
}

namespace {

/// A number rounded to three digits, as a sheet would print it.
bids::Stated printed(double value) {
  const double unit = std::pow(10.0, std::floor(std::log10(std::abs(value))) - 2.0);
  return {std::round(value / unit) * unit, 0.5 * unit};
}

bids::Claims claims_from(const service::Assessment& ours) {
  const auto& outcome = *ours.rating.outcome;
  const auto& exchanger = ours.problem.exchanger;
  bids::Claims claims;
  claims.duty = printed(outcome.duty);
  claims.shell_side_outlet = bids::Stated{std::round(10.0 * outcome.shell_outlet) / 10.0, 0.05};
  claims.tube_side_outlet = bids::Stated{std::round(10.0 * outcome.tube_outlet) / 10.0, 0.05};
  claims.area_effective = printed(exchanger.area);
  claims.area_gross =
      printed(exchanger.area * exchanger.as_described.tube_length / exchanger.effective_length);
  claims.lmtd = printed(outcome.log_mean);
  claims.f_correction = printed(outcome.f_correction);
  claims.mtd = printed(outcome.mean_difference);
  claims.u_service = claims.u_dirty = printed(outcome.local.u_dirty);
  claims.u_clean = printed(outcome.local.u_clean);
  claims.surface_margin = bids::Stated{0.0, 0.005};
  claims.surface_margin_basis = bids::MarginBasis::design_fouling;
  claims.tube_side_velocity = printed(outcome.local.tube_film.velocity);
  claims.tube_count = bids::Stated{static_cast<double>(exchanger.as_described.tube_count), 0.0};
  claims.shell_side_pressure_drop = printed(outcome.shell_drop.total());
  claims.tube_side_pressure_drop = printed(outcome.tube_drop.total());
  claims.shell_side_film = printed(outcome.local.shell_film.coefficient);
  claims.tube_side_film = printed(outcome.local.tube_film.coefficient);
  return claims;
}

}  // namespace

TEST_CASE("bids: our own rating of every case, printed to three digits, is a sound sheet") {
  for (const auto& entry : std::filesystem::directory_iterator(SOURCE_DIR "/cases")) {
    if (entry.path().extension() != ".yaml") continue;
    CAPTURE(entry.path().filename().string());
    const auto a_case = case_io::build(case_io::read_file(entry.path().string()));
    const auto ours = service::assess(a_case.problem, a_case.service);
    if (!ours.rating.outcome) continue;
    const auto verdicts = bids::audit(claims_from(ours), ours);
    CHECK(keys_with(verdicts, Agreement::contradicts) == "");
    CHECK(keys_with(verdicts, Agreement::ask) == "");
    // A drop our own is scaled from says nothing against itself.
    const bool scaled = rating::is_scaled(a_case.problem);
    const bool drawn = a_case.problem.exchanger.tubes_drawn;
    CHECK(keys_with(verdicts, Agreement::not_checked) == (scaled ? "shell_side_pressure_drop"
                                                          : !drawn
                                                              ? "area.gross tube_side_velocity tube_count"
                                                              : ""));
  }
}

TEST_CASE("bids: every claim stated gets one verdict, in the order of the keys, without claims none") {
  bids::Claims claims;
  for (const auto& key : bids::claim_keys()) claims.*key.place = bids::Stated{300.0, 0.5};
  const auto a_case = built(sound_sheet());
  const auto ours = service::assess(a_case.problem, a_case.service);
  const auto verdicts = bids::audit(claims, ours);
  REQUIRE(verdicts.size() == bids::claim_keys().size());
  for (std::size_t i = 0; i < verdicts.size(); ++i) {
    CHECK(verdicts[i].key == bids::claim_keys()[i].key);
    CHECK(std::isfinite(verdicts[i].computed.value_or(0.0)));
    CHECK(std::isfinite(verdicts[i].ratio.value_or(0.0)));
    if (verdicts[i].verdict != Agreement::agrees) CHECK(!verdicts[i].likely.empty());
  }
  CHECK(bids::audit({}, ours).empty());
}

TEST_CASE("bids: without a rating of ours, arithmetic is still held and methods are left unchecked") {
  const auto a_case = built(support::read_text(TEST_DATA "/claims/eight-slips.yaml"));
  auto ours = service::assess(a_case.problem, a_case.service);
  ours.rating.outcome.reset();
  ours.second_opinion.reset();
  bids::Claims claims = a_case.claims;
  claims.tube_side_film = bids::Stated{5000.0, 0.0};
  const auto verdicts = bids::audit(claims, ours);
  CHECK(of(verdicts, "duty").verdict == Agreement::contradicts);
  CHECK(of(verdicts, "tube_side_film_coefficient").verdict == Agreement::not_checked);
}
