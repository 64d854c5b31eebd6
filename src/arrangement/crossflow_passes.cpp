#include <algorithm>
#include <cmath>

#include "nodes.hpp"
#include "shells.hpp"

namespace dutygauge::arrangement::shells {
namespace {

using network::Matrix, network::Vector;

struct Decay {
  Matrix end;   ///< exp(-m)
  Matrix mean;  ///< (1 - exp(-m))/m
};

/// Of a matrix, by halving it until a series does and doubling back.
Decay decay(const Matrix& m) {
  const double norm = m.cwiseAbs().rowwise().sum().maxCoeff();
  const int halvings = std::max(0, static_cast<int>(std::ceil(std::log2(2.0 * norm + 1e-300))));
  const Matrix one = Matrix::Identity(m.rows(), m.cols()), part = std::ldexp(1.0, -halvings) * m;
  Decay result{{}, one};
  for (int term = 16; term >= 2; --term) result.mean = one - part * result.mean / static_cast<double>(term);
  result.end = one - part * result.mean;
  for (int i = 0; i < halvings; ++i) {
    result.mean = 0.5 * (result.mean + result.end * result.mean);
    result.end *= result.end;
  }
  return result;
}

/// One pass of tubes along x, crossed by the shell stream, whose temperatures at the
/// nodes of x stay apart. Both act on what the shell stream brings above the tube inlet.
struct CrossedPass {
  Matrix kept;   ///< of the shell stream's excess, when the tubes run forward
  Vector taken;  ///< rise of the tube stream, mixed in the header
};

CrossedPass crossed_pass(const network::Nodes& nodes, double r, double ntu) {
  const auto count = nodes.weight.size();
  const Matrix one = Matrix::Identity(count, count);
  const Matrix driving = (one + ntu * nodes.integral).inverse();  // shell above tubes, per excess
  const Decay excess = decay(r * ntu * driving);
  return {excess.end, ntu * (nodes.weight.transpose() * driving * excess.mean).transpose()};
}

}  // namespace

double crossflow_passes_unmixed(const Arrangement& shell, double r, double ntu) {
  // Longer passes would need ever more nodes for a surface that is long used up.
  constexpr double longest_pass = 150.0;
  const int passes = shell.tube_passes;
  const double pass_ntu = std::min(ntu / passes, longest_pass);
  const network::Nodes nodes = network::gauss_nodes(static_cast<int>(8.0 + 5.0 * std::sqrt(pass_ntu)));
  const CrossedPass forward = crossed_pass(nodes, r, pass_ntu);
  const CrossedPass backward{forward.kept.reverse(), forward.taken.reverse()};

  // The shell stream's profile and each tube outlet, per temperature at the inlets: column
  // 0 of the shell stream (1), the others of each later pass, still unknown.
  Matrix profile = Matrix::Zero(nodes.weight.size(), passes);
  profile.col(0).setOnes();
  Matrix outlet(passes, passes);
  for (int step = 0; step < passes; ++step) {
    const int pass = shell.flow == Flow::counter ? passes - 1 - step : step;
    const CrossedPass& crossed = pass % 2 == 0 ? forward : backward;
    if (pass > 0) profile.col(pass).array() -= 1.0;
    outlet.row(pass) = crossed.taken.transpose() * profile;
    profile = (crossed.kept * profile).eval();
    if (pass == 0) continue;
    outlet(pass, pass) += 1.0;
    profile.col(pass).array() += 1.0;
  }
  Matrix system = Matrix::Identity(passes, passes);
  system.bottomRows(passes - 1) -= outlet.topRows(passes - 1);
  const Vector inlet = system.partialPivLu().solve(Vector::Unit(passes, 0));
  return outlet.row(passes - 1).dot(inlet);
}

}  // namespace dutygauge::arrangement::shells
