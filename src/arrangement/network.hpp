#pragma once
#define EIGEN_MPL2_ONLY
#include <Eigen/Dense>
#include <vector>

/// Streams side by side over stretches of length, joined end to end: the linear
/// boundary-value problem behind every arrangement without a closed form.
///
/// A stretch is kept as what leaves it for what enters it. These numbers lie between 0
/// and 1 and each row sums to 1, so that, unlike with products of matrix exponentials,
/// nothing grows with NTU.
namespace dutygauge::arrangement::network {

using Matrix = Eigen::MatrixXd;
using Vector = Eigen::VectorXd;

/// Temperatures leaving a stretch, per temperature entering it, in four blocks: the
/// first index is the way of the stream that leaves, the second of the one that enters.
struct Passage {
  Matrix forward_forward, forward_backward, backward_forward, backward_backward;
};

/// Two stretches one after the other, the first to the left.
Passage in_series(const Passage& left, const Passage& right);

struct Stream {
  double inverse_capacity_rate;  ///< of C_tube; 0 for an isothermal stream [-]
  bool forward;
};

struct Contact {
  int one, other;
  double conductance;  ///< UA/C_tube [-]
};

/// Outlet temperatures = matrix * inlet temperatures, in the order of `streams`.
Matrix stretch(const std::vector<Stream>& streams, const std::vector<Contact>& contacts);

/// The same from a passage, whose streams come in the order they have in `forward`.
Matrix in_stream_order(const Passage& passage, const std::vector<bool>& forward);

struct Link {
  int from, to;
  double weight;
};
struct End {
  int stream;
  double weight;
};

/// Stretches with their connections; streams are numbered through all of them. What no
/// link feeds enters at 0, as the tube stream does; the shell stream enters at 1.
struct Network {
  std::vector<Matrix> stretches;
  std::vector<Link> links;
  std::vector<int> shell_inlets;
  std::vector<End> tube_outlets, shell_outlets;
};

/// P [-]. Throws std::runtime_error where the two streams' heats differ by rounding.
double effectiveness(const Network& network, double capacity_ratio);

}  // namespace dutygauge::arrangement::network
