#pragma once
#include <vector>

#include "dutygauge/geometry.hpp"

/// Internal to rating: the exchanger as lines of flow and the places where they meet.
/// A shell type or a pass order is a list of connections here, not a solver.
namespace dutygauge::rating {

/// Part of what enters a line: the end of another line, and its share of the flow.
struct Feed {
  int line;
  double share;  ///< shares of one line's feeds add up to 1
};

/// A stretch of a stream from 0 to 1 along its own flow.
struct Line {
  bool tube_side;
  double flow;              ///< share of the bank's flow of that side
  std::vector<Feed> feeds;  ///< empty: the stream's inlet
  int shell = 0;            ///< counted along the shell stream, train by train
  int pass = 0;             ///< tube pass, or run of the shell stream
};

/// A shell-side run with the tube lines beside it: they exchange heat at equal places.
struct Zone {
  struct Beside {
    int line;
    bool counter;  ///< runs against the shell line
    double area;   ///< of the tube line in the zone, share of one bank's surface
  };
  int shell_line;
  std::vector<Beside> tubes;
};

/// A crossflow field: tube rows side by side, the shell stream crossing all of them.
/// Each member of a bundle of lines carries its weight of the flow.
struct Field {
  int first_tube_line, first_shell_line;  ///< as many of each as there are points
  double area;                            ///< share of one bank's surface
};

/// One bank of shells in series; several, where the tube stream passes them in turn.
struct Network {
  int slices = 0;  ///< of each line; a line has 2 slices + 1 points
  std::vector<Line> lines;
  std::vector<Zone> zones;
  std::vector<Field> fields;
  std::vector<Feed> tube_outlet, shell_outlet;         ///< what leaves the bank
  std::vector<std::vector<Feed>> tube_end, shell_end;  ///< what leaves each shell, along the shell stream

  int points() const { return 2 * slices + 1; }
};

/// The connections of a bank, each line cut into `slices`.
Network connect(const geometry::Exchanger& exchanger, int slices);

/// Weight of point i of n = 2 slices + 1 in an integral over 0 to 1 (Simpson).
double point_weight(int i, int slices);

}  // namespace dutygauge::rating
