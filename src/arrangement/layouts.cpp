#include <algorithm>
#include <cmath>
#include <vector>

#include "dutygauge/arrangement/paths.hpp"
#include "network.hpp"
#include "shells.hpp"

namespace dutygauge::arrangement::shells {
namespace {

/// The same with the streams of all segments numbered through.
struct Layout : FlowPaths {
  int width() const { return ways + static_cast<int>(runs.size()); }
  int way(int segment, int which) const { return segment * width() + which; }
  int run(int segment, int which) const { return segment * width() + ways + which; }
};

network::Matrix segment_of(const Arrangement& shell, const Layout& layout, int segment, double r,
                           double ntu) {
  std::vector<network::Stream> streams;
  std::vector<network::Contact> contacts;
  const double part = ntu / layout.segments;
  for (int way = 0; way < layout.ways; ++way)
    streams.push_back({.inverse_capacity_rate = r / shell_share(shell, layout, segment),
                       .forward = layout.shell_forward(segment, way)});
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
  const Layout layout{flow_paths(shell)};
  network::Network network;
  for (int segment = 0; segment < layout.segments; ++segment)
    network.stretches.push_back(segment < 2 ? segment_of(shell, layout, segment, r, ntu)
                                            : network.stretches[static_cast<std::size_t>(segment - 2)]);
  join_tubes(layout, network);
  join_shell(shell, layout, network);
  return network::effectiveness(network, r);
}

}  // namespace dutygauge::arrangement::shells
