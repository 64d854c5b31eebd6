#include <doctest/doctest.h>

#include <cmath>

#include "dutygauge/fluids.hpp"
#include "fluids_laws.hpp"
#include "support.hpp"

using namespace dutygauge;
using namespace dutygauge::fluids;
using fluids_laws::found;
using fluids_laws::objects;

namespace {

const std::vector<ViscosityPoint> thinning = {{313.15, 12e-6}, {373.15, 3.1e-6}};

Made named(std::string_view name) {
  return make_named(name, {300.0, 3e5});
}

}  // namespace

TEST_CASE("fluids: an unknown name is refused with the nearest one") {
  CHECK(nearest_name("tolune") == "toluene");
  CHECK(nearest_name("watre") == "water");
  CHECK(nearest_name("Etylene glycol water") == "ethylene_glycol_water");
  CHECK(nearest_name("zzzzzzzzzzzz").empty());
  const Made made = named("tolune");
  REQUIRE(objects(made, ""));
  CHECK(made.objections[0].expected.find("toluene") != std::string::npos);
  CHECK(objects(named("ethylene_glycol"), ""));
  CHECK(named("ethylene_glycol").objections[0].what.find("no verified conductivity") != std::string::npos);
  CHECK(named("petroleum").objections[0].what == "petroleum needs its data");
  CHECK(objects(make_gas("water"), ""));
  CHECK(objects(make_solution("sugar_water", 0.2), ""));
}

TEST_CASE("fluids: an inlet that boils, is frozen or cannot be is refused") {
  CHECK(objects(make_named("methanol", {350.0, 1e5}), ""));
  CHECK(objects(make_named("propane", {280.0, 1e6}), ""));
  CHECK(objects(make_named("steam", {300.0, 1e5}), ""));
  CHECK(objects(make_named("ammonia", {300.0, 1.0617e6}), ""));
  CHECK(objects(make_named("air", {300.0, -1.0}), ""));
  CHECK(objects(make_named("air", {double(NAN), 1e5}), ""));
  CHECK(!object_to_inlet(make_solution("ethylene_glycol_water", 0.3).fluid, {255.0, 3e5}).empty());
  CHECK(object_to_inlet(make_solution("ethylene_glycol_water", 0.3).fluid, {263.0, 3e5}).empty());
  CHECK(!object_to_inlet(make_seawater(0.035).fluid, {271.0, 3e5}).empty());
}

TEST_CASE("fluids: compositions outside the data are refused at their key") {
  CHECK(objects(make_seawater(35.0), "seawater.salinity"));
  CHECK(objects(make_seawater(-0.01), "seawater.salinity"));
  CHECK(objects(make_solution("ethylene_glycol_water", 0.65), "ethylene_glycol_water.mass_fraction"));
  CHECK(objects(make_solution("ethylene_glycol_water", 40.0), "ethylene_glycol_water.mass_fraction"));
  CHECK(objects(make_solution("calcium_chloride_brine", 0.0), "calcium_chloride_brine.mass_fraction"));
  CHECK(make_solution("calcium_chloride_brine", 0.30).objections.empty());
}

TEST_CASE("fluids: mole fractions must be of known gases and add up") {
  CHECK(objects(make_gas_mixture({{"N2", 0.7}, {"CO2", 0.2}}), "gas_mixture.mole_fractions"));
  CHECK(objects(make_gas_mixture({}), "gas_mixture.mole_fractions"));
  CHECK(objects(make_gas_mixture({{"N2", 0.7}, {"neon", 0.3}}), "gas_mixture.mole_fractions.neon"));
  CHECK(objects(make_gas_mixture({{"N2", 1.2}, {"CO2", -0.2}}), "gas_mixture.mole_fractions.CO2"));
  CHECK(objects(make_gas_mixture({{"N2", 0.5}, {"nitrogen", 0.5}}), "gas_mixture.mole_fractions.nitrogen"));
  const Made rounded = make_gas_mixture({{"N2", 0.72}, {"CO2", 0.10}, {"O2", 0.175}});
  CHECK(rounded.objections.empty());
  CHECK(found(rounded.findings, "fluids.fractions_scaled"));
}

TEST_CASE("fluids: petroleum asks for a gravity and for two viscosities or a Watson factor") {
  CHECK(objects(make_petroleum({.api = 200.0, .watson_k = 11.8}), "petroleum.api"));
  CHECK(objects(make_petroleum({.specific_gravity = 0.3, .watson_k = 11.8}), "petroleum.specific_gravity"));
  CHECK(objects(make_petroleum({.watson_k = 11.8}), "petroleum"));
  CHECK(objects(make_petroleum({.api = 35.0, .specific_gravity = 0.9, .watson_k = 11.8}),
                "petroleum.specific_gravity"));
  CHECK(make_petroleum({.api = 35.0, .specific_gravity = 0.85, .watson_k = 11.8}).objections.empty());
  CHECK(objects(make_petroleum({.api = 35.0, .watson_k = 18.0}), "petroleum.watson_k"));
  CHECK(objects(make_petroleum({.api = 35.0}), "petroleum.viscosity"));
  CHECK(found(make_petroleum({.api = 35.0, .watson_k = 11.8}).findings, "fluids.viscosity_estimated"));
  const Made measured = make_petroleum({.api = 28.0, .viscosity = thinning});
  CHECK(measured.objections.empty());
  CHECK(!found(measured.findings, "fluids.viscosity_estimated"));
  REQUIRE(measured.assumed.size() == 1);
  CHECK(measured.assumed[0].key == "petroleum.kind");
  CHECK(make_petroleum({.api = 28.0, .viscosity = thinning, .kind = PetroleumKind::crude}).assumed.empty());
}

TEST_CASE("fluids: viscosity points that cannot be are refused") {
  const auto refused = [](std::vector<ViscosityPoint> points) {
    return objects(make_oil({.viscosity = std::move(points), .density_15c = 880.0}), "oil.viscosity");
  };
  CHECK(refused({{313.15, 3e-6}, {373.15, 12e-6}}));   // exchanged
  CHECK(refused({{313.15, 12e-6}, {373.15, 12e-6}}));  // equal
  CHECK(refused({{313.15, 12e-6}, {323.15, 9e-6}}));   // too near
  CHECK(refused({{313.15, 12e-6}}));
  CHECK(refused({{313.15, 12e-6}, {343.15, 6e-6}, {373.15, 3e-6}}));
  CHECK(refused({{313.15, 0.0}, {373.15, 3e-6}}));
  CHECK(refused({{313.15, 46.0}, {373.15, 6.8e-6}}));  // 46 m2/s
  CHECK(refused({{313.15, 46e-6}, {-5.0, 6.8e-6}}));
  CHECK(!refused({{373.15, 6.8e-6}, {313.15, 46e-6}}));  // the order does not matter
}

TEST_CASE("fluids: a dynamic viscosity stands for the kinematic one times the density") {
  const Made nu = make_petroleum({.api = 28.0, .viscosity = thinning});
  const State cold = state(nu.fluid, 313.15, 1e6), hot = state(nu.fluid, 373.15, 1e6);
  CHECK(support::relative(cold.viscosity, 12e-6 * cold.density) < 1e-12);
  const Made mu = make_petroleum(
      {.api = 28.0, .viscosity = {{313.15, cold.viscosity, true}, {373.15, hot.viscosity, true}}});
  // The two equations of ASTM D341 are each other's inverse to about 1e-6 only.
  CHECK(support::relative(state(mu.fluid, 340.0, 1e6).viscosity, state(nu.fluid, 340.0, 1e6).viscosity) <
        1e-5);
}

TEST_CASE("fluids: an oil grade brings what it assumes") {
  const Made made = make_oil({.iso_vg = 46.0});
  REQUIRE(made.assumed.size() == 2);
  CHECK(made.assumed[0].key == "oil.density_15c");
  CHECK(made.assumed[1].key == "oil.viscosity_index");
  const Made full = make_oil({.iso_vg = 46.0, .density_15c = 870.0, .viscosity_index = 95.0});
  CHECK(full.assumed.empty());
  CHECK(state(full.fluid, 313.15, 1e5).viscosity ==
        doctest::Approx(46e-6 * state(full.fluid, 313.15, 1e5).density).epsilon(1e-9));
  const auto refused = [](OilData data, const char* key) { return objects(make_oil(data), key); };
  CHECK(refused({.iso_vg = 47.0, .density_15c = 870.0}, "oil.iso_vg"));
  CHECK(refused({.iso_vg = 3.0, .density_15c = 870.0}, "oil.iso_vg"));
  CHECK(refused({.iso_vg = 46.0, .density_15c = 870.0, .viscosity_index = 250.0}, "oil.viscosity_index"));
  CHECK(refused({.iso_vg = 46.0, .viscosity = thinning, .density_15c = 870.0}, "oil.iso_vg"));
  CHECK(refused({.density_15c = 870.0}, "oil"));
  CHECK(refused({.iso_vg = 46.0, .density_15c = 1.2}, "oil.density_15c"));
}

TEST_CASE("fluids: a given property is met at its temperature and scales the whole curve") {
  const Made base = make_petroleum({.api = 35.0, .watson_k = 11.8, .kind = PetroleumKind::product});
  const Made made =
      with_given(base, "petroleum", {{"heat_capacity", 2300.0, 330.0}, {"viscosity", 2e-3, 350.0}}, 1e6);
  REQUIRE(made.objections.empty());
  CHECK(state(made.fluid, 330.0, 1e6).heat_capacity == doctest::Approx(2300.0).epsilon(1e-12));
  CHECK(state(made.fluid, 350.0, 1e6).viscosity == doctest::Approx(2e-3).epsilon(1e-12));
  CHECK(state(made.fluid, 400.0, 1e6).density == state(base.fluid, 400.0, 1e6).density);
  const double ratio =
      state(made.fluid, 400.0, 1e6).heat_capacity / state(base.fluid, 400.0, 1e6).heat_capacity;
  CHECK(ratio == doctest::Approx(2300.0 / state(base.fluid, 330.0, 1e6).heat_capacity).epsilon(1e-12));
  fluids_laws::check_laws(made.fluid, 1e6);
  CHECK(made.assumed.empty());
}

TEST_CASE("fluids: a given property that cannot be is refused at its key") {
  const Made base = make_oil({.iso_vg = 46.0, .density_15c = 870.0, .viscosity_index = 95.0});
  const auto key = [&](GivenProperty given) {
    const Made made = with_given(base, "oil", {given}, 1e6);
    return made.objections.empty() ? std::string() : made.objections[0].key;
  };
  CHECK(key({"heat_capacity", 2.0, 330.0}) == "oil.given.heat_capacity");
  CHECK(key({"heat_capacity", -2000.0, 330.0}) == "oil.given.heat_capacity");
  CHECK(key({"viscosity", 0.02, 800.0}) == "oil.given.viscosity");
  CHECK(key({"colour", 1.0, 330.0}) == "oil.given.colour");
  CHECK(key({"density", 840.0, 330.0}).empty());
  CHECK(objects(with_given(base, "", {{"density", 840.0, 330.0}, {"density", 830.0, 340.0}}, 1e6),
                "given.density"));
  CHECK(found(with_given(base, "oil", {{"density", 600.0, 330.0}}, 1e6).findings,
              "fluids.given_far_from_model"));
}
