#include "network.hpp"

#include <stdexcept>

namespace dutygauge::rating {
namespace {

using Feeds = std::vector<Feed>;

/// Adds one shell after another to a network.
class Builder {
 public:
  Builder(const geometry::Exchanger& exchanger, int slices)
      : shape_(exchanger.as_described),
        parallel_(exchanger.flow_direction == geometry::FlowDirection::parallel),
        first_pass_counter_(exchanger.first_tube_pass == geometry::FirstTubePass::against_shell_flow),
        area_(1.0 / exchanger.shells_in_series) {
    network_.slices = slices;
    network_.tube_end.resize(static_cast<std::size_t>(exchanger.shells_in_series));
    network_.shell_end.resize(static_cast<std::size_t>(exchanger.shells_in_series));
  }

  Network build(int shells) {
    // Lines first know where they run, then what feeds them: the tube stream meets
    // the shells in reverse order unless the whole train runs in parallel flow.
    for (shell_ = 0; shell_ < shells; ++shell_) add_shell();
    Feeds shell_stream, tube_stream;
    for (int k = 0; k < shells; ++k) {
      feed(entries_[index(k)].shell, shell_stream);
      shell_stream = network_.shell_end[index(k)];
      const int t = parallel_ ? k : shells - 1 - k;
      feed(entries_[index(t)].tube, tube_stream);
      tube_stream = network_.tube_end[index(t)];
    }
    network_.shell_outlet = shell_stream;
    network_.tube_outlet = tube_stream;
    return std::move(network_);
  }

 private:
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

  void zone(int shell_line, std::vector<Zone::Beside> tubes, double area) {
    network_.zones.push_back({shell_line, std::move(tubes), area_ * area});
  }

  void add_shell() {
    entries_.emplace_back();
    switch (shape_.shell_type) {
      case 'E':
        return add_run(shape_.tube_passes);
      case 'F':
        return add_two_runs();
      case 'G':
        return add_split(1);
      case 'H':
        return add_split(2);
      case 'J':
        return add_divided();
      case 'X':
        return add_crossflow();
      default:
        throw std::invalid_argument("rating: no connections are known for this shell type");
    }
  }

  /// E: one run, the passes beside it turn by turn with and against the shell stream.
  void add_run(int passes) {
    const int shell = line(false, 1.0, 1);
    std::vector<Zone::Beside> tubes = chain(passes, 1, first_counter(passes));
    entries_.back().shell = {shell};
    entries_.back().tube = {tubes.front().line};
    ends(tubes.back().line, {{shell, 1.0}});
    zone(shell, tubes, 1.0 / passes);
  }

  bool first_counter(int passes) const { return passes == 1 ? !parallel_ : first_pass_counter_; }

  /// `passes` tube lines, each fed by the one before, turning round after each.
  std::vector<Zone::Beside> chain(int passes, int first_pass, bool counter) {
    std::vector<Zone::Beside> tubes;
    for (int k = 0; k < passes; ++k) {
      Feeds feeds;
      if (k > 0) feeds = {{tubes.back().line, 1.0}};
      tubes.push_back({line(true, 1.0, first_pass + k, feeds), counter});
      counter = !counter;
    }
    return tubes;
  }

  /// F: two shell runs in series, half of the tube passes beside each; the tube
  /// stream meets the second run first.
  void add_two_runs() {
    const int half = shape_.tube_passes / 2;
    const int first = line(false, 1.0, 1);
    const int second = line(false, 1.0, 2, {{first, 1.0}});
    auto beside_second = chain(half, 1, half == 1 || first_pass_counter_);
    auto beside_first = chain(half, half + 1, half == 1 || first_pass_counter_);
    network_.lines[index(beside_first.front().line)].feeds = {{beside_second.back().line, 1.0}};
    entries_.back().shell = {first};
    entries_.back().tube = {beside_second.front().line};
    ends(beside_first.back().line, {{second, 1.0}});
    zone(first, beside_first, 0.5 / half);
    zone(second, beside_second, 0.5 / half);
  }

  /// A tube pass through `shells` zones one after another; with or against each in turn.
  struct Leg {
    std::vector<int> lines;
    bool forward;  ///< from left to right
  };

  /// J: the shell stream enters in the middle and leaves at both ends.
  void add_divided() {
    const int left = line(false, 0.5, 1), right = line(false, 0.5, 1);
    std::vector<Zone::Beside> beside_left, beside_right;
    int last = -1;
    for (int pass = 1; pass <= shape_.tube_passes; ++pass) {
      const bool forward = pass % 2 == 1;
      const int first_half = pass_line(pass, last, 1.0);
      const int second_half = line(true, 1.0, pass, {{first_half, 1.0}});
      // The shell halves run outwards from the middle.
      beside_left.push_back({forward ? first_half : second_half, forward});
      beside_right.push_back({forward ? second_half : first_half, !forward});
      last = second_half;
    }
    entries_.back().shell = {left, right};
    ends(last, {{left, 0.5}, {right, 0.5}});
    zone(left, beside_left, 0.5 / shape_.tube_passes);
    zone(right, beside_right, 0.5 / shape_.tube_passes);
  }

  /// A line of a pass: fed by the line before, or by what enters the shell.
  int pass_line(int pass, int before, double flow) {
    if (before >= 0) return line(true, flow, pass, {{before, 1.0}});
    const int first = line(true, flow, pass);
    entries_.back().tube.push_back(first);
    return first;
  }

  /// G and H: `patterns` split-flow patterns side by side. In each the shell stream
  /// runs outwards above the longitudinal baffle and back below it; the first half
  /// of the tube passes lies below, by the shell outlet. One pass: half of the tubes
  /// above and half below, in the same direction.
  void add_split(int patterns) {
    const double flow = 0.5 / patterns;
    const int columns = 2 * patterns;
    std::vector<int> above, below;
    Feeds shell_leaves;
    for (int c = 0; c < columns; ++c) {
      above.push_back(line(false, flow, 1));
      below.push_back(line(false, flow, 2, {{above.back(), 1.0}}));
      entries_.back().shell.push_back(above.back());
      shell_leaves.push_back({below.back(), flow});
    }
    std::vector<std::vector<Zone::Beside>> beside_above(index(columns)), beside_below(index(columns));
    const int passes = shape_.tube_passes;
    Feeds tubes_leave;
    if (passes == 1) {
      tubes_leave = {{traverse(1, -1, 0.5, true, false, beside_below), 0.5},
                     {traverse(1, -1, 0.5, true, true, beside_above), 0.5}};
    } else {
      int last = -1;
      for (int pass = 1; pass <= passes; ++pass) {
        const bool upper = pass > passes / 2;
        last = traverse(pass, last, 1.0, pass % 2 == 1, upper, upper ? beside_above : beside_below);
      }
      tubes_leave = {{last, 1.0}};
    }
    network_.tube_end[index(shell_)] = tubes_leave;
    network_.shell_end[index(shell_)] = shell_leaves;
    const double area = 1.0 / (columns * (passes == 1 ? 2 : passes));
    for (int c = 0; c < columns; ++c) {
      zone(above[index(c)], beside_above[index(c)], area);
      zone(below[index(c)], beside_below[index(c)], area);
    }
  }

  /// One tube pass along all columns; returns its last line. Above the baffle the shell
  /// stream runs outwards (left in even columns), below it inwards.
  int traverse(int pass, int before, double flow, bool forward, bool upper,
               std::vector<std::vector<Zone::Beside>>& beside) {
    const int columns = static_cast<int>(beside.size());
    for (int k = 0; k < columns; ++k) {
      const int column = forward ? k : columns - 1 - k;
      const bool shell_runs_left = (column % 2 == 0) == upper;
      before = pass_line(pass, before, flow);
      beside[index(column)].push_back({before, shell_runs_left == forward});
    }
    return before;
  }

  /// X: each pass is a field of tube rows crossed by the whole shell stream, which is
  /// mixed between fields; the shell stream meets the last pass first.
  void add_crossflow() {
    const int passes = shape_.tube_passes, points = network_.points();
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
    static_cast<void>(points);
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

  void ends(int tube_line, Feeds shell) {
    network_.tube_end[index(shell_)] = {{tube_line, 1.0}};
    network_.shell_end[index(shell_)] = std::move(shell);
  }

  const geometry::Description& shape_;
  bool parallel_, first_pass_counter_;
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
  return Builder(exchanger, slices).build(exchanger.shells_in_series);
}

}  // namespace dutygauge::rating
