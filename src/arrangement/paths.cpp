#include "dutygauge/arrangement/paths.hpp"

namespace dutygauge::arrangement {
namespace {

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

}  // namespace

FlowPaths flow_paths(const Arrangement& shell) {
  const char type = shell.shell_type;
  const bool against = type == 'E' && shell.tube_passes == 1
                           ? shell.flow == Flow::counter
                           : shell.first_tube_pass == FirstTubePass::against_shell_flow;
  FlowPaths paths{.segments = segments_of(type), .ways = type == 'E' || type == 'J' ? 1 : 2, .runs = {}};
  if (paths.ways == 2 && shell.tube_passes == 1) {
    paths.runs = {{.beside = 0, .forward = true, .capacity_rate = 0.5, .area = 0.5},
                  {.beside = 1, .forward = true, .capacity_rate = 0.5, .area = 0.5}};
    return paths;
  }
  for (int pass = 0; pass < shell.tube_passes; ++pass) {
    const bool first_half = pass < shell.tube_passes / 2;
    const bool starts_forward = type != 'E' || !against;
    paths.runs.push_back({.beside = paths.ways == 2 && first_half == against ? 1 : 0,
                          .forward = (pass % 2 == 0) == starts_forward,
                          .capacity_rate = 1.0,
                          .area = area_share(shell, pass)});
  }
  return paths;
}

double shell_share(const Arrangement& shell, const FlowPaths& paths, int segment) {
  if (shell.shell_type == 'J') return segment == 0 ? shell.tube_inlet_share : 1.0 - shell.tube_inlet_share;
  return 1.0 / paths.segments;
}

}  // namespace dutygauge::arrangement
