#pragma once
#include "network.hpp"

/// Functions over [0, 1] by their values at Gauss points, for streams that change across
/// the tubes or along them.
namespace dutygauge::arrangement::network {

struct Nodes {
  Vector weight;    ///< of the integral over [0, 1]
  Matrix integral;  ///< of the integrals from 0 to each node
};

/// Gauss-Legendre points.
Nodes gauss_nodes(int count);

/// One value for the whole length: what is stirred leaves as it is.
Nodes stirred();

}  // namespace dutygauge::arrangement::network
