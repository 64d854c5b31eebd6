#include "march.hpp"

#define EIGEN_MPL2_ONLY
#include <Eigen/SparseCore>
#include <Eigen/SparseLU>
#include <algorithm>
#include <cmath>

namespace dutygauge::rating {
namespace {

constexpr int most_iterations = 80;
constexpr int wall_passes = 2;  ///< of the walls between two solutions of the temperatures

std::size_t index(int i) {
  return static_cast<std::size_t>(i);
}

/// One stream seen by the march: enthalpies are counted from its inlet.
struct Side {
  const Stream& stream;
  double bank_flow;
  double inlet_enthalpy;
  fluids::TemperatureRange usable;
  double lowest, highest;  ///< enthalpies at the ends of the usable range, from the inlet

  Side(const Stream& s, double flow) : stream(s), bank_flow(flow) {
    inlet_enthalpy = fluids::enthalpy(s.fluid, s.inlet_temperature, s.inlet_pressure);
    usable = fluids::usable_temperatures(s.fluid, s.inlet_pressure);
    // An endless range still needs a number to hold an iterate that wanders.
    usable.low = std::max(usable.low, 1.0);
    usable.high = std::min(usable.high, 1e4);
    lowest = fluids::enthalpy(s.fluid, usable.low, s.inlet_pressure) - inlet_enthalpy;
    highest = fluids::enthalpy(s.fluid, usable.high, s.inlet_pressure) - inlet_enthalpy;
  }

  double temperature(double enthalpy) const {
    if (enthalpy <= lowest) return usable.low;
    if (enthalpy >= highest) return usable.high;
    return fluids::temperature_at(stream.fluid, enthalpy + inlet_enthalpy, stream.inlet_pressure);
  }
};

/// Collocation at the ends and the middle of a slice (Lobatto IIIA, order 4 at the
/// ends): rows give the middle and the end in terms of the heat at the three points.
constexpr double middle_weights[3] = {5.0 / 24.0, 8.0 / 24.0, -1.0 / 24.0};
constexpr double end_weights[3] = {1.0 / 6.0, 4.0 / 6.0, 1.0 / 6.0};

}  // namespace

March::March(const Unit& unit, int slices) : unit_(unit), network_(connect(unit.problem->exchanger, slices)) {
  const int points = network_.points();
  enthalpy_.resize(network_.lines.size() * index(points), 0.0);
  states_.resize(enthalpy_.size());
  meetings_at_.resize(enthalpy_.size());
  for (const Zone& zone : network_.zones)
    for (const Zone::Beside& beside : zone.tubes)
      for (int i = 0; i < points; ++i)
        meet(beside.line, beside.counter ? points - 1 - i : i, zone.shell_line, i, beside.area,
             beside.area * point_weight(i, slices));
  for (const Field& field : network_.fields)
    for (int row = 0; row < points; ++row)
      for (int i = 0; i < points; ++i)
        meet(field.first_tube_line + row, i, field.first_shell_line + i, row, field.area,
             field.area * point_weight(i, slices) * point_weight(row, slices));
}

void March::meet(int tube_line, int tube_point, int shell_line, int shell_point, double area, double weight) {
  const int tube = tube_line * network_.points() + tube_point;
  const int shell = shell_line * network_.points() + shell_point;
  meetings_at_[index(tube)].push_back(static_cast<int>(meetings_.size()));
  meetings_at_[index(shell)].push_back(static_cast<int>(meetings_.size()));
  meetings_.push_back({.tube_unknown = tube, .shell_unknown = shell, .area = area, .weight = weight});
}

/// Temperatures and properties of both streams at every point, from the enthalpies.
void March::update_states() {
  const Side tube(unit_.problem->tube_side, unit_.tube_flow),
      shell(unit_.problem->shell_side, unit_.shell_flow);
  inside_range_ = true;
  for (std::size_t i = 0; i < enthalpy_.size(); ++i) {
    const bool tube_side = network_.lines[i / index(network_.points())].tube_side;
    const Side& side = tube_side ? tube : shell;
    states_[i] = fluids::state(side.stream.fluid, side.temperature(enthalpy_[i]), side.stream.inlet_pressure);
    states_[i].enthalpy -= side.inlet_enthalpy;
    const double slack = 1e-9 * std::abs(side.highest - side.lowest);
    if (enthalpy_[i] < side.lowest - slack || enthalpy_[i] > side.highest + slack) {
      inside_range_ = false;
      outside_ = {tube_side, enthalpy_[i] > side.highest};
    }
  }
}

/// Films and walls where the streams meet; returns the largest step of a wall [K].
double March::update_films() {
  double largest = 0;
  for (Meeting& meeting : meetings_) {
    Local& at = meeting.at;
    const bool first = at.u_dirty == 0.0;
    at.tube_bulk = states_[index(meeting.tube_unknown)];
    at.shell_bulk = states_[index(meeting.shell_unknown)];
    const Bulk bulk{at.tube_bulk.temperature, at.shell_bulk.temperature};
    if (first) start_walls(at, bulk);
    largest = std::max(largest, settle(unit_, bulk, {}, first ? 3 * wall_passes : wall_passes, at));
  }
  return largest;
}

/// Enthalpies everywhere for the present U: linear, with T(h) linearised at each point.
bool March::solve_enthalpies(std::vector<double>& solution) const {
  using Matrix = Eigen::SparseMatrix<double>;
  const int points = network_.points(), slices = network_.slices;
  const auto size = static_cast<Eigen::Index>(enthalpy_.size());
  std::vector<Eigen::Triplet<double>> entries;
  entries.reserve(enthalpy_.size() * 10);
  Eigen::VectorXd right = Eigen::VectorXd::Zero(size);
  for (std::size_t l = 0; l < network_.lines.size(); ++l) {
    const Line& line = network_.lines[l];
    const int first = static_cast<int>(l) * points;
    const double flow = line.flow * (line.tube_side ? unit_.tube_flow : unit_.shell_flow);
    entries.emplace_back(first, first, 1.0);
    for (const Feed& feed : line.feeds)
      entries.emplace_back(first, feed.line * points + points - 1, -feed.share);
    for (int s = 0; s < slices; ++s) {
      const int start = first + 2 * s;
      for (int k = 1; k <= 2; ++k) {
        const double* weights = k == 1 ? middle_weights : end_weights;
        entries.emplace_back(start + k, start + k, 1.0);
        entries.emplace_back(start + k, start, -1.0);
        for (int i = 0; i < 3; ++i)
          add_heat(start + k, start + i, line.tube_side, weights[i] / (slices * flow), entries, right);
      }
    }
  }
  Matrix matrix(size, size);
  matrix.setFromTriplets(entries.begin(), entries.end());
  Eigen::SparseLU<Matrix> lu;
  lu.compute(matrix);
  if (lu.info() != Eigen::Success) return false;
  const Eigen::VectorXd x = lu.solve(right);
  solution.assign(x.data(), x.data() + x.size());
  return x.allFinite();
}

/// Puts minus `factor` times the heat gained at unknown `at` into the equation `row`.
void March::add_heat(int row, int at, bool tube_side, double factor, Triplets& entries,
                     Eigen::VectorXd& right) const {
  const double bank_area = unit_.problem->exchanger.area / unit_.problem->exchanger.tube_banks();
  for (int m : meetings_at_[index(at)]) {
    const Meeting& meeting = meetings_[index(m)];
    const fluids::State& t = states_[index(meeting.tube_unknown)];
    const fluids::State& s = states_[index(meeting.shell_unknown)];
    const double conductance =
        (tube_side ? 1.0 : -1.0) * factor * meeting.at.u_dirty * meeting.area * bank_area;
    entries.emplace_back(row, meeting.shell_unknown, -conductance / s.heat_capacity);
    entries.emplace_back(row, meeting.tube_unknown, conductance / t.heat_capacity);
    right[row] += conductance * ((s.temperature - s.enthalpy / s.heat_capacity) -
                                 (t.temperature - t.enthalpy / t.heat_capacity));
  }
}

bool March::run(const Local& start) {
  // First temperatures: constant U and the properties at the inlets' mean.
  for (Meeting& meeting : meetings_) meeting.at.u_dirty = start.u_dirty;
  update_states();
  if (!solve_enthalpies(enthalpy_)) return false;
  for (Meeting& meeting : meetings_) meeting.at.u_dirty = 0.0;

  const double inlet_difference =
      std::abs(unit_.problem->shell_side.inlet_temperature - unit_.problem->tube_side.inlet_temperature);
  double relaxation = 1.0, last_change = HUGE_VAL;
  std::vector<double> next;
  for (iterations_ = 1; iterations_ <= most_iterations; ++iterations_) {
    update_states();
    const double wall_step = update_films();
    if (!solve_enthalpies(next)) return false;
    double change = 0;
    for (std::size_t i = 0; i < next.size(); ++i)
      change = std::max(change, std::abs(next[i] - enthalpy_[i]) / states_[i].heat_capacity);
    if (change >= last_change) relaxation = std::max(0.2, 0.7 * relaxation);
    last_change = change;
    const bool done = change < 1e-10 * inlet_difference && wall_step < 1e-6 * inlet_difference;
    const double step = done ? 1.0 : relaxation;
    for (std::size_t i = 0; i < next.size(); ++i) enthalpy_[i] += step * (next[i] - enthalpy_[i]);
    if (done) {
      update_states();
      return true;
    }
  }
  return false;
}

double March::mixed_enthalpy(const std::vector<Feed>& feeds) const {
  double sum = 0;
  for (const Feed& feed : feeds)
    sum += feed.share * enthalpy_[index(feed.line * network_.points() + network_.points() - 1)];
  return sum;
}

}  // namespace dutygauge::rating
