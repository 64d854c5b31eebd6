#include <algorithm>
#include <cmath>
#include <stdexcept>

#include "blocks.hpp"
#include "dutygauge/arrangement.hpp"
#include "nodes.hpp"

/// E shells cut into compartments by segmental baffles.
namespace dutygauge::arrangement {
namespace {

using network::Matrix, network::Passage, network::Vector;

bool runs_forward(const Arrangement& shell, int pass) {
  const bool first = shell.tube_passes == 1 ? shell.flow == Flow::parallel
                                            : shell.first_tube_pass == FirstTubePass::with_shell_flow;
  return (pass % 2 == 0) == first;
}

/// The shell stream's temperatures at the rows, and where it leaves, for its inlet and
/// for the mean of the tubes entering each row.
struct Crossing {
  Vector rows_of_inlet;
  Matrix rows_of_tubes;
  double outlet_of_inlet;
  Vector outlet_of_tubes;
};

Crossing crossing(const network::Nodes& nodes, double ntu) {
  const auto count = nodes.weight.size();
  const Matrix row = (Matrix::Identity(count, count) + ntu * nodes.integral).inverse();
  Crossing c{row.rowwise().sum(), ntu * row * nodes.integral, 1.0, {}};
  c.outlet_of_inlet -= ntu * nodes.weight.dot(c.rows_of_inlet);
  c.outlet_of_tubes = ntu * (nodes.weight - c.rows_of_tubes.transpose() * nodes.weight);
  return c;
}

/// One compartment. Streams: the shell stream, then every pass row by row; all rows are
/// crossed at once by passes that lie side by side.
Matrix compartment(const Arrangement& shell, const Crossing& c, double tube_ntu) {
  const auto rows = c.rows_of_inlet.size(), passes = static_cast<Eigen::Index>(shell.tube_passes);
  const double e = -std::expm1(-tube_ntu);
  Matrix map = Matrix::Zero(1 + passes * rows, 1 + passes * rows);
  map(0, 0) = c.outlet_of_inlet;
  for (Eigen::Index pass = 0; pass < passes; ++pass) {
    const auto at = 1 + pass * rows;
    const double share = 1.0 / static_cast<double>(passes);
    map.block(0, at, 1, rows) = share * c.outlet_of_tubes.transpose();
    map.block(at, 0, rows, 1) = e * c.rows_of_inlet;
    for (Eigen::Index from = 0; from < passes; ++from)
      map.block(at, 1 + from * rows, rows, rows) = share * e * c.rows_of_tubes;
    map.block(at, at, rows, rows).diagonal().array() += 1.0 - e;
  }
  return map;
}

Passage passage_of(const Matrix& map, const std::vector<int>& f, const std::vector<int>& b) {
  return {map(f, f), map(f, b), map(b, f), map(b, b)};
}

/// Rows of each pass mixed at both ends, as in the headers.
Matrix mixed_at_ends(const Matrix& map, const Vector& weight, int passes) {
  const auto rows = weight.size();
  Matrix collect = Matrix::Zero(passes + 1, map.rows()), spread = Matrix::Zero(map.rows(), passes + 1);
  collect(0, 0) = spread(0, 0) = 1.0;
  for (int pass = 0; pass < passes; ++pass) {
    collect.block(1 + pass, 1 + pass * rows, 1, rows) = weight.transpose();
    spread.block(1 + pass * rows, 1 + pass, rows, 1).setOnes();
  }
  return collect * map * spread;
}

/// The whole run of compartments, the shell stream crossing up in one and down in the next.
Matrix compartments(const Arrangement& shell, const network::Nodes& nodes, double r, double ntu, int count) {
  const int passes = shell.tube_passes;
  const auto rows = static_cast<int>(nodes.weight.size());
  const double tube_ntu = ntu / count / passes;
  const Crossing up = crossing(nodes, r * ntu / count * blocks::phi(tube_ntu));
  const Crossing down{up.rows_of_inlet.reverse(), up.rows_of_tubes.reverse(), up.outlet_of_inlet,
                      up.outlet_of_tubes.reverse()};
  std::vector<bool> forward{true};
  for (int pass = 0; pass < passes; ++pass)
    forward.insert(forward.end(), static_cast<std::size_t>(rows), runs_forward(shell, pass));
  std::vector<int> f, b;
  for (int i = 0; i < static_cast<int>(forward.size()); ++i)
    (forward[static_cast<std::size_t>(i)] ? f : b).push_back(i);
  const Passage first = passage_of(compartment(shell, up, tube_ntu), f, b);
  const Passage second = passage_of(compartment(shell, down, tube_ntu), f, b);
  Passage whole = first;
  for (int i = 1; i < count; ++i) whole = network::in_series(whole, i % 2 == 1 ? second : first);
  return mixed_at_ends(network::in_stream_order(whole, forward), nodes.weight, passes);
}

double shell_with_baffles(const Arrangement& shell, double r, double ntu, int count,
                          const network::Nodes& nodes) {
  network::Network network;
  network.stretches = {compartments(shell, nodes, r, ntu, count)};
  network.shell_inlets = {0};
  network.shell_outlets = {{.stream = 0, .weight = 1.0}};
  for (int pass = 1; pass < shell.tube_passes; ++pass)
    network.links.push_back({.from = pass, .to = pass + 1, .weight = 1.0});
  network.tube_outlets = {{.stream = shell.tube_passes, .weight = 1.0}};
  return network::effectiveness(network, r);
}

}  // namespace

double effectiveness_with_baffles(const Arrangement& arrangement, double capacity_ratio, double ntu,
                                  int baffles, Compartment compartment) {
  const bool equal = arrangement.pass_areas == decltype(arrangement.pass_areas){};
  if (!is_built(arrangement) || arrangement.shell_type != 'E' || !equal || baffles < 0)
    throw std::invalid_argument("arrangement: baffles are counted in E shells with equal passes");
  if (!(capacity_ratio >= 0.0 && ntu >= 0.0))
    throw std::invalid_argument("arrangement: R and NTU are not negative");
  const int count = baffles + 1, shells = arrangement.shells_in_series;
  const double share = ntu / shells, across = capacity_ratio * share / count;
  const auto nodes =
      compartment == Compartment::stirred
          ? network::stirred()
          : network::gauss_nodes(static_cast<int>(std::min(64.0, 8.0 + 3.0 * std::sqrt(across))));
  const double one = shell_with_baffles(arrangement, capacity_ratio, share, count, nodes);
  return arrangement.flow == Flow::parallel || arrangement.shells_order == Flow::parallel
             ? blocks::parallel_chain(capacity_ratio, one, shells)
             : blocks::counterflow_chain(capacity_ratio, one, shells);
}

}  // namespace dutygauge::arrangement
