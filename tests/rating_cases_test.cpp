#include <doctest/doctest.h>
#include <fmt/core.h>

#include <algorithm>
#include <cmath>
#include <filesystem>
#include <nlohmann/json.hpp>
#include <string>
#include <vector>

#include "dutygauge/case_io.hpp"
#include "dutygauge/explore.hpp"
#include "support.hpp"

namespace {

using nlohmann::json;

/// What two programs may differ by in a quantity: relative, absolute, or the larger of both.
struct Tolerance {
  const char* pointer;
  double relative, absolute;
};

// Decided by what the equations' free choices move: films and U 1 %, areas and Re 0.1 %
// (0.5 % with fluid models), outlets 0.05 K, drops 2 %.
constexpr Tolerance tolerances[] = {
    {"/thermal/duty_W", 0.003, 0},
    {"/thermal/duty_ntu_W", 0.003, 0},
    {"/thermal/duty_lmtd_W", 0.003, 0},
    {"/thermal/shell_side_outlet_degC", 0, 0.05},
    {"/thermal/tube_side_outlet_degC", 0, 0.05},
    {"/thermal/effectiveness", 0.003, 0},
    {"/thermal/ntu", 0.01, 0},
    {"/thermal/capacity_ratio", 0.003, 0},
    {"/thermal/lmtd_K", 0.005, 0},
    {"/thermal/f_correction", 0, 0.004},
    {"/thermal/mtd_K", 0.005, 0},
    {"/thermal/area_m2", 0.001, 0},
    {"/thermal/u_clean_W_m2K", 0.01, 0},
    {"/thermal/u_dirty_W_m2K", 0.01, 0},
    {"/thermal/u_required_W_m2K", 0.01, 0},
    {"/thermal/ua_W_K", 0.01, 0},
    {"/resistances_m2K_W/tube_film", 0.01, 0},
    {"/resistances_m2K_W/tube_fouling", 0.001, 0},
    {"/resistances_m2K_W/wall", 0.01, 0},
    {"/resistances_m2K_W/shell_fouling", 0.001, 0},
    {"/resistances_m2K_W/shell_film", 0.01, 0},
    {"/tube_side/film_W_m2K", 0.01, 0},
    {"/tube_side/reynolds", 0.005, 0},
    {"/tube_side/prandtl", 0.005, 0},
    {"/tube_side/nusselt", 0.01, 0},
    {"/tube_side/velocity_m_s", 0.003, 0},
    {"/tube_side/wall_degC", 0, 0.3},
    {"/tube_side/pressure_drop_Pa", 0.02, 0},
    {"/shell_side/film_W_m2K", 0.01, 0},
    {"/shell_side/ideal_film_W_m2K", 0.01, 0},
    {"/shell_side/reynolds", 0.005, 0},
    {"/shell_side/prandtl", 0.005, 0},
    {"/shell_side/j_cut", 0.003, 0},
    {"/shell_side/j_leakage", 0.003, 0},
    {"/shell_side/j_bypass", 0.003, 0},
    {"/shell_side/j_spacing", 0.003, 0},
    {"/shell_side/j_laminar", 0.003, 0},
    {"/shell_side/crossflow_area_m2", 0.001, 0},
    {"/shell_side/velocity_m_s", 0.003, 0},
    {"/shell_side/wall_degC", 0, 0.3},
    {"/shell_side/pressure_drop_Pa", 0.02, 0},
    {"/margins/duty", 0, 0.006},
    {"/margins/surface", 0, 0.015},
    {"/margins/surface_clean", 0, 0.015},
    {"/margins/temperature_K", 0, 0.15},
};

void compare_parts(const json& ours, const json& theirs, const char* side) {
  const auto at = json::json_pointer(fmt::format("/{}/pressure_drop_parts_Pa", side));
  const double total = theirs[json::json_pointer(fmt::format("/{}/pressure_drop_Pa", side))];
  for (const auto& [part, value] : theirs[at].items()) {
    CAPTURE(part);
    const double expected = value, found = ours[at][part];
    CHECK(std::abs(found - expected) <= std::max(0.02 * std::abs(expected), 0.01 * total));
  }
}

void compare(const json& ours, const json& theirs) {
  for (const Tolerance& t : tolerances) {
    CAPTURE(t.pointer);
    const json::json_pointer at(t.pointer);
    REQUIRE(ours.contains(at));
    const json expected = theirs.value(at, json()), found = ours[at];
    CHECK(expected.is_null() == found.is_null());
    if (expected.is_null() || found.is_null()) continue;
    CAPTURE(expected.get<double>());
    CAPTURE(found.get<double>());
    CHECK(std::abs(found.get<double>() - expected.get<double>()) <=
          std::max(t.absolute, t.relative * std::abs(expected.get<double>())));
  }
  CHECK(ours["tube_side"]["regime"] == theirs["tube_side"]["regime"]);
  CHECK(ours["verdict"]["service_met"] == theirs["verdict"]["service_met"]);
  compare_parts(ours, theirs, "tube_side");
  compare_parts(ours, theirs, "shell_side");
  const json fouling = theirs["margins"]["fouling_spare_m2K_W"];
  CHECK(fouling.is_null() == ours["margins"]["fouling_spare_m2K_W"].is_null());
  if (!fouling.is_null())
    CHECK(std::abs(ours["margins"]["fouling_spare_m2K_W"].get<double>() - fouling.get<double>()) <=
          0.015 / theirs["thermal"]["u_dirty_W_m2K"].get<double>());
}

}  // namespace

TEST_CASE("rating: whole cases agree with an independent program") {
  int compared = 0;
  for (const auto& entry : std::filesystem::directory_iterator(TEST_DATA "/rating-cases")) {
    const std::string path = entry.path().string();
    if (!path.ends_with(".yaml")) continue;
    CAPTURE(path);
    const auto a_case = dutygauge::case_io::build(dutygauge::case_io::read_file(path));
    const json ours = json::parse(dutygauge::report::json(dutygauge::explore::rate(a_case)));
    compare(ours, json::parse(support::read_text(path.substr(0, path.size() - 5) + ".expected.json")));
    ++compared;
  }
  CHECK(compared == 13);
}
