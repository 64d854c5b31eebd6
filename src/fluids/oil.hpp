#pragma once
#include <array>
#include <optional>
#include <string>
#include <vector>

#include "equations.hpp"

/// The correlations of petroleum fractions and mineral oils.
namespace dutygauge::fluids {

/// Groups of the density tables of API MPMS 11.1.
enum class OilGroup { crude, product, lubricating };

struct Basis {
  double specific_gravity, watson_k;  ///< 60/60 degF; K = Tb[degR]^(1/3)/SG
};

/// Thermal expansion at 15 degC [1/K]; the product groups follow from the density.
double expansion_15c(OilGroup group, double density_15c);

/// Polynomials in T [K]: heat capacity [J/kg.K], conductivity [W/m.K].
std::array<double, 3> kesler_lee_heat_capacity(const Basis& basis);
std::array<double, 3> cragoe_heat_capacity(double specific_gravity);
std::array<double, 2> cragoe_conductivity(double specific_gravity);
std::array<double, 2> petroleum_conductivity(double specific_gravity);

/// Mean boiling point [K].
double boiling_point(const Basis& basis);

/// Kinematic viscosity [m2/s] at 100 and 210 degF by Twu (1985).
struct BoilingCut {
  double boiling_point, specific_gravity;  ///< [K], [-]
};
std::array<ViscosityPoint, 2> twu_viscosities(const BoilingCut& cut);

/// Sets a and b of ASTM D341 from two kinematic points.
void fit_walther(const ViscosityPoint& one, const ViscosityPoint& other, OilModel& model);

/// Kinematic viscosity [m2/s] and density [kg/m3].
double walther_viscosity(const OilModel& model, double temperature);
double oil_density(const OilModel& model, double temperature);

/// Objections to viscosity points under `key`.
Objections object_to_points(const std::vector<ViscosityPoint>& points, const std::string& key);

/// A point with its kinematic viscosity, using the model's density for a dynamic one.
ViscosityPoint kinematic(const ViscosityPoint& point, const OilModel& model);

}  // namespace dutygauge::fluids
