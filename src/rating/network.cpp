#include "network.hpp"

#include <utility>

#include "dutygauge/arrangement/paths.hpp"
#include "dutygauge/rating.hpp"

namespace dutygauge::rating {
namespace {

using Feeds = std::vector<Feed>;

/// Adds one shell after another to a network.
class Builder {
 public:
  Builder(const geometry::Exchanger& exchanger, int slices)
      : shell_type_(arrangement_of(exchanger)),
        parallel_(shell_type_.flow == arrangement::Flow::parallel),
        in_series_(exchanger.shells_in_series),
        trains_(shell_type_.trains_in_turn),
        area_(1.0 / (in_series_ * trains_)) {
    shell_type_.shells_in_series = shell_type_.trains_in_turn = 1;
    network_.slices = slices;
    network_.tube_end.resize(index(in_series_ * trains_));
    network_.shell_end.resize(index(in_series_ * trains_));
  }

  Network build() {
    // Lines first know where they run, then what feeds them.
    for (shell_ = 0; shell_ < in_series_ * trains_; ++shell_) add_shell();
    for (int train = 0; train < trains_; ++train) join_train(train * in_series_);
    return std::move(network_);
  }

 private:
  /// The tube stream meets the shells of a train in reverse order unless the whole train runs in
  /// parallel flow; it goes on to the next train, and each train has its share of the shell stream.
  void join_train(int first) {
    Feeds shell_stream;
    for (int k = 0; k < in_series_; ++k) {
      feed(entries_[index(first + k)].shell, shell_stream);
      shell_stream = network_.shell_end[index(first + k)];
      const int t = first + (parallel_ ? k : in_series_ - 1 - k);
      feed(entries_[index(t)].tube, network_.tube_outlet);
      network_.tube_outlet = network_.tube_end[index(t)];
    }
    for (const Feed& leaving : shell_stream)
      network_.shell_outlet.push_back({leaving.line, leaving.share / trains_});
  }

  struct Entries {
    std::vector<int> shell, tube;  ///< lines that take what enters the shell
  };

  static std::size_t index(int i) { return static_cast<std::size_t>(i); }

  int line(bool tube_side, double flow, int pass, Feeds feeds = {}) {
    network_.lines.push_back({tube_side, flow, std::move(feeds), shell_, pass});
    return static_cast<int>(network_.lines.size()) - 1;
  }

  void feed(const std::vector<int>& lines, const Feeds& feeds) {
    for (int i : lines) network_.lines[index(i)].feeds = feeds;
  }

  void add_shell() {
    entries_.emplace_back();
    if (shell_type_.shell_type == 'X') return add_crossflow();
    add_along(arrangement::flow_paths(shell_type_));
  }

  /// Every shell whose streams run along it: lines for the ways of the shell stream and
  /// the runs of the tubes in each segment, zones where they lie side by side.
  void add_along(const arrangement::FlowPaths& paths) {
    const int runs = static_cast<int>(paths.runs.size());
    std::vector<std::vector<int>> way(index(paths.segments)), run(index(paths.segments));
    Feeds shell_leaves;
    for (int segment = 0; segment < paths.segments; ++segment) {
      const double share = arrangement::shell_share(shell_type_, paths, segment);
      for (int w = 0; w < paths.ways; ++w)
        way[index(segment)].push_back(
            line(false, share, w + 1, w == 0 ? Feeds{} : Feeds{{way[index(segment)][0], 1.0}}));
      entries_.back().shell.push_back(way[index(segment)].front());
      shell_leaves.push_back({way[index(segment)].back(), share});
      for (int r = 0; r < runs; ++r) {
        const double flow = paths.runs[index(r)].capacity_rate;
        run[index(segment)].push_back(line(true, flow, flow < 1.0 ? 1 : r + 1));
      }
    }
    network_.shell_end[index(shell_)] = shell_leaves;
    join_tubes(paths, run);
    for (int segment = 0; segment < paths.segments; ++segment)
      for (int w = 0; w < paths.ways; ++w) add_zone(paths, segment, w, way, run);
  }

  /// Feeds the runs of tubes: segment by segment in their direction, one run after another.
  void join_tubes(const arrangement::FlowPaths& paths, const std::vector<std::vector<int>>& run) {
    Feeds leaves;
    int before = -1;
    for (std::size_t r = 0; r < paths.runs.size(); ++r) {
      const arrangement::TubeRun& tubes = paths.runs[r];
      if (tubes.capacity_rate < 1.0) before = -1;  // side by side with the others
      for (int k = 0; k < paths.segments; ++k) {
        const int at = run[index(tubes.forward ? k : paths.segments - 1 - k)][r];
        if (before >= 0)
          network_.lines[index(at)].feeds = {{before, 1.0}};
        else
          entries_.back().tube.push_back(at);
        before = at;
      }
      if (tubes.capacity_rate < 1.0) leaves.push_back({before, tubes.capacity_rate});
    }
    network_.tube_end[index(shell_)] = leaves.empty() ? Feeds{{before, 1.0}} : leaves;
  }

  void add_zone(const arrangement::FlowPaths& paths, int segment, int way_number,
                const std::vector<std::vector<int>>& way, const std::vector<std::vector<int>>& run) {
    std::vector<Zone::Beside> tubes;
    for (std::size_t r = 0; r < paths.runs.size(); ++r)
      if (paths.runs[r].beside == way_number)
        tubes.push_back({run[index(segment)][r],
                         paths.runs[r].forward != paths.shell_forward(segment, way_number),
                         area_ * paths.runs[r].area / paths.segments});
    network_.zones.push_back({way[index(segment)][index(way_number)], std::move(tubes)});
  }

  /// X: each pass is a field of tube rows crossed by the whole shell stream, which is
  /// mixed between fields; the shell stream meets the last pass first.
  void add_crossflow() {
    const int passes = shell_type_.tube_passes;
    Feeds tubes_before, shell_before;
    std::vector<int> first_tube(index(passes)), first_shell(index(passes));
    for (int pass = 1; pass <= passes; ++pass) {
      first_tube[index(pass - 1)] = bundle(true, pass, tubes_before);
      if (pass == 1) entries_.back().tube = members(first_tube[0]);
      tubes_before = mixed(first_tube[index(pass - 1)]);
    }
    for (int pass = passes; pass >= 1; --pass) {
      first_shell[index(pass - 1)] = bundle(false, passes + 1 - pass, shell_before);
      if (pass == passes) entries_.back().shell = members(first_shell[index(pass - 1)]);
      shell_before = mixed(first_shell[index(pass - 1)]);
      network_.fields.push_back({first_tube[index(pass - 1)], first_shell[index(pass - 1)], area_ / passes});
    }
    network_.tube_end[index(shell_)] = tubes_before;
    network_.shell_end[index(shell_)] = shell_before;
  }

  int bundle(bool tube_side, int pass, const Feeds& feeds) {
    const int first = static_cast<int>(network_.lines.size());
    for (int i = 0; i < network_.points(); ++i) line(tube_side, 1.0, pass, feeds);
    return first;
  }

  std::vector<int> members(int first) const {
    std::vector<int> lines;
    for (int i = 0; i < network_.points(); ++i) lines.push_back(first + i);
    return lines;
  }

  Feeds mixed(int first) const {
    Feeds feeds;
    for (int i = 0; i < network_.points(); ++i)
      feeds.push_back({first + i, point_weight(i, network_.slices)});
    return feeds;
  }

  arrangement::Arrangement shell_type_;  ///< of one shell
  bool parallel_;
  int in_series_, trains_;
  double area_;  ///< of one shell, share of the bank
  int shell_ = 0;
  std::vector<Entries> entries_;
  Network network_;
};

}  // namespace

double point_weight(int i, int slices) {
  if (i == 0 || i == 2 * slices) return 1.0 / (6.0 * slices);
  return (i % 2 == 1 ? 4.0 : 2.0) / (6.0 * slices);
}

Network connect(const geometry::Exchanger& exchanger, int slices) {
  return Builder(exchanger, slices).build();
}

}  // namespace dutygauge::rating
