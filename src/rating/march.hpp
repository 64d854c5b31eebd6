#pragma once
#include <Eigen/Core>
#include <Eigen/SparseCore>
#include <vector>

#include "network.hpp"
#include "unit.hpp"

/// Internal to rating: one bank solved along its lines, with local films and walls.
namespace dutygauge::rating {

/// Where a tube line and a shell line exchange heat.
struct Meeting {
  int tube_unknown, shell_unknown;
  double area;    ///< per unit length of the lines, share of the bank's surface
  double weight;  ///< of this place in an integral over the surface; all weights add up to 1
  Local at{};
};

class March {
 public:
  March(const Unit& unit, int slices);

  /// Solves from a first U; false when it does not settle.
  bool run(const Local& start);

  const Network& network() const { return network_; }
  const std::vector<Meeting>& meetings() const { return meetings_; }
  const fluids::State& state(int line, int point) const {
    return states_[static_cast<std::size_t>(line * network_.points() + point)];
  }
  int iterations() const { return iterations_; }

  /// Enthalpy gained from the inlet [J/kg] of what these feeds mix to.
  double mixed_enthalpy(const std::vector<Feed>& feeds) const;

  /// Whether every point lies where its fluid has properties; if not, which side and end fails.
  struct Outside {
    bool tube_side, above;
  };
  bool inside_range() const { return inside_range_; }
  Outside outside() const { return outside_; }

 private:
  using Triplets = std::vector<Eigen::Triplet<double>>;
  void meet(int tube_line, int tube_point, int shell_line, int shell_point, double area, double weight);
  void update_states();
  double update_films();
  bool solve_enthalpies(std::vector<double>& solution) const;
  void add_heat(int row, int at, bool tube_side, double factor, Triplets& entries,
                Eigen::VectorXd& right) const;

  const Unit& unit_;
  Network network_;
  std::vector<double> enthalpy_;       ///< from the inlet of its side, by line and point [J/kg]
  std::vector<fluids::State> states_;  ///< enthalpies in them from the inlet too
  std::vector<Meeting> meetings_;
  std::vector<std::vector<int>> meetings_at_;  ///< by unknown
  int iterations_ = 0;
  bool inside_range_ = true;
  Outside outside_{};
};

}  // namespace dutygauge::rating
