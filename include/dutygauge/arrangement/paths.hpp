#pragma once
#include <vector>

#include "dutygauge/arrangement.hpp"

/// The flow paths of E, F, G, H and J shells: the one list of which stretch of a stream
/// runs beside which, and which feeds which. The numerical P-NTU route and the march
/// both follow it.
namespace dutygauge::arrangement {

/// Tubes that run together: a pass, or the half of it on one side of the baffle.
struct TubeRun {
  int beside;            ///< 0 the shell stream's way in, 1 its way out
  bool forward;          ///< away from the left end
  double capacity_rate;  ///< share of the tube stream
  double area;           ///< share of the surface
};

/// A shell cut into segments along its length; in each, the shell stream runs once (E, J)
/// or on its way in and, beyond a longitudinal baffle, on its way out (F, G, H), every
/// run of tubes beside one of the two. A run passes all segments one after another; runs
/// follow one another in order, except where they carry only a part of the tube stream.
struct FlowPaths {
  int segments = 1;
  int ways = 1;  ///< of the shell stream in each segment
  std::vector<TubeRun> runs;

  /// Whether the shell stream runs away from the left end: nozzles between two segments
  /// send it to both sides.
  bool shell_forward(int segment, int way) const {
    const bool inwards = segments == 1 || segment % 2 == 1;
    return (way == 0) == inwards;
  }
};

/// Needs: is_built(shell), and a shell type of the five above.
FlowPaths flow_paths(const Arrangement& shell);

/// Share of the shell stream in a segment.
double shell_share(const Arrangement& shell, const FlowPaths& paths, int segment);

}  // namespace dutygauge::arrangement
