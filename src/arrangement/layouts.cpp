#include <algorithm>
#include <cmath>
#include <vector>

#include "network.hpp"
#include "shells.hpp"

/// The flow paths of E, F, G, H and J shells. The shell is cut into segments along its
/// length; in each, the shell stream runs once (E, J) or on its way in and, beyond a
/// longitudinal baffle, on its way out (F, G, H), every tube stream beside one of the two.
namespace dutygauge::arrangement::shells {
namespace {

/// Tubes that run together: a pass, or the half of it on one side of the baffle.
struct TubeRun {
  int beside;            ///< 0 the shell stream's way in, 1 its way out
  bool forward;          ///< away from the left end
  double capacity_rate;  ///< share of the tube stream
  double area;           ///< share of the surface
};

struct Layout {
  int segments = 1;
  int ways = 1;  ///< of the shell stream in each segment
  std::vector<TubeRun> runs;

  int width() const { return ways + static_cast<int>(runs.size()); }
  int way(int segment, int which) const { return segment * width() + which; }
  int run(int segment, int which) const { return segment * width() + ways + which; }
};

int segments_of(char shell_type) {
  switch (shell_type) {
    case 'G':
    case 'J':
      return 2;
    case 'H':
      return 4;
    default:
      return 1;
  }
}

double area_share(const Arrangement& shell, int pass) {
  double sum = 0.0;
  for (double area : shell.pass_areas) sum += area;
  return sum > 0.0 ? shell.pass_areas[static_cast<std::size_t>(pass)] / sum : 1.0 / shell.tube_passes;
}

Layout layout_of(const Arrangement& shell) {
  const char type = shell.shell_type;
  const bool against = shell.first_tube_pass == FirstTubePass::against_shell_flow;
  Layout layout{.segments = segments_of(type), .ways = type == 'E' || type == 'J' ? 1 : 2, .runs = {}};
  if (layout.ways == 2 && shell.tube_passes == 1) {
    layout.runs = {{.beside = 0, .forward = true, .capacity_rate = 0.5, .area = 0.5},
                   {.beside = 1, .forward = true, .capacity_rate = 0.5, .area = 0.5}};
    return layout;
  }
  for (int pass = 0; pass < shell.tube_passes; ++pass) {
    const bool first_half = pass < shell.tube_passes / 2;
    const bool starts_forward = type != 'E' || !against;
    layout.runs.push_back({.beside = layout.ways == 2 && first_half == against ? 1 : 0,
                           .forward = (pass % 2 == 0) == starts_forward,
                           .capacity_rate = 1.0,
                           .area = area_share(shell, pass)});
  }
  return layout;
}

/// Whether the shell stream runs forward in a segment: nozzles between two segments send
/// it to both sides.
bool shell_forward(const Layout& layout, int segment, int way) {
  const bool inwards = layout.segments == 1 || segment % 2 == 1;
  return (way == 0) == inwards;
}

double shell_share(const Arrangement& shell, const Layout& layout, int segment) {
  if (shell.shell_type == 'J') return segment == 0 ? shell.tube_inlet_share : 1.0 - shell.tube_inlet_share;
  return 1.0 / layout.segments;
}

network::Matrix segment_of(const Arrangement& shell, const Layout& layout, int segment, double r,
                           double ntu) {
  std::vector<network::Stream> streams;
  std::vector<network::Contact> contacts;
  const double part = ntu / layout.segments;
  for (int way = 0; way < layout.ways; ++way)
    streams.push_back({.inverse_capacity_rate = r / shell_share(shell, layout, segment),
                       .forward = shell_forward(layout, segment, way)});
  for (const TubeRun& run : layout.runs) {
    contacts.push_back(
        {.one = run.beside, .other = static_cast<int>(streams.size()), .conductance = run.area * part});
    streams.push_back({.inverse_capacity_rate = 1.0 / run.capacity_rate, .forward = run.forward});
  }
  if (shell.baffle_conductance > 0.0)
    contacts.push_back({.one = 0, .other = 1, .conductance = shell.baffle_conductance * part});
  return network::stretch(streams, contacts);
}

void join_tubes(const Layout& layout, network::Network& network) {
  const int count = static_cast<int>(layout.runs.size()), last = layout.segments - 1;
  for (int i = 0; i < count; ++i) {
    const TubeRun& run = layout.runs[static_cast<std::size_t>(i)];
    for (int segment = 0; segment < last; ++segment)
      network.links.push_back({.from = layout.run(run.forward ? segment : segment + 1, i),
                               .to = layout.run(run.forward ? segment + 1 : segment, i),
                               .weight = 1.0});
    const int exit = layout.run(run.forward ? last : 0, i);
    if (run.capacity_rate < 1.0 || i == count - 1)
      network.tube_outlets.push_back({.stream = exit, .weight = run.capacity_rate});
    else
      network.links.push_back({.from = exit, .to = layout.run(run.forward ? last : 0, i + 1), .weight = 1.0});
  }
}

void join_shell(const Arrangement& shell, const Layout& layout, network::Network& network) {
  const bool meet = shell.shell_type == 'H' && shell.mixing == Mixing::shell_stream;
  for (int segment = 0; segment < layout.segments; ++segment) {
    network.shell_inlets.push_back(layout.way(segment, 0));
    network.shell_outlets.push_back(
        {.stream = layout.way(segment, layout.ways - 1), .weight = shell_share(shell, layout, segment)});
    if (layout.ways == 1) continue;
    const bool mixed = meet && (segment == 1 || segment == 2);
    for (int from = 0; from < layout.segments; ++from)
      if (from == segment || (mixed && from == 3 - segment))
        network.links.push_back(
            {.from = layout.way(from, 0), .to = layout.way(segment, 1), .weight = mixed ? 0.5 : 1.0});
  }
}

}  // namespace

double by_network(const Arrangement& shell, double r, double ntu) {
  const Layout layout = layout_of(shell);
  network::Network network;
  for (int segment = 0; segment < layout.segments; ++segment)
    network.stretches.push_back(segment < 2 ? segment_of(shell, layout, segment, r, ntu)
                                            : network.stretches[static_cast<std::size_t>(segment - 2)]);
  join_tubes(layout, network);
  join_shell(shell, layout, network);
  return network::effectiveness(network, r);
}

}  // namespace dutygauge::arrangement::shells
