#pragma once
#include <cstdint>
#include <functional>
#include <vector>

#include "dutygauge/field/readings.hpp"

/// Which readings show the unit as it runs: windows of a few readings, in order of time.
namespace dutygauge::field {

/// What a record is like as a whole; the screen needs it beforehand.
struct Survey {
  double hot_flow = 0, cold_flow = 0;  ///< medians of what is not zero [kg/s]; 0: not measured
  /// Median change from reading to reading: flows as a share [-], inlets [K].
  double hot_flow_change = 0, cold_flow_change = 0, hot_in_change = 0, cold_in_change = 0;
  double interval = 0;     ///< between readings, median [s]
  std::int64_t start = 0;  ///< first reading
  std::uint64_t rows = 0;  ///< it was made from
  bool whole = true;       ///< of the whole record; else of its beginning
};

/// Evenly thinned values of a stream, so that its median needs bounded memory: beyond
/// `most` values every second is left out, and so on.
class Thinned {
 public:
  explicit Thinned(std::size_t most = 1 << 15) : most_(most) {}
  void add(double value);
  double median() const;  ///< 0 without values
  bool empty() const { return values_.empty(); }

 private:
  std::size_t most_;
  std::uint64_t stride_ = 1, to_skip_ = 0;
  std::vector<double> values_;
};

/// Looks through the next rows, at most `most`; calls `keep` with each.
Survey survey_of(Record& record, std::uint64_t most, const std::function<void(const Reading&)>& keep);

/// Where a reading stops being one of the running, steady unit.
/// Source: F. R. Hampel's identifier for spikes; the others are practice.
struct Limits {
  double off_line_flow = 0.2;             ///< of the median flow [-]
  double least_difference = 5.0;          ///< of the inlets [K]
  double spike = 5.0 * 1.4826;            ///< distance from the median of 13 in median deviations [-]
  double steady_flow = 0.05;              ///< from reading to reading [-]
  double steady_inlet = 1.0;              ///< [K], or
  double steady_share = 0.05;             ///< of the inlets' difference [-]
  double steady_habit = 3.0 * 1.4826;     ///< times the median change counts as the unit's habit [-]
  std::int64_t after_step = 3600;         ///< [s]
  std::int64_t after_restart = 6 * 3600;  ///< [s]
  int frozen = 12;                        ///< readings alike to the last digit
  int straight = 4;                       ///< readings on a line between two others
};

/// From which change on a reading follows a step: flows as a share [-], inlets [K]. A flow that
/// a controller moves all the time is steady while it moves as it uses to.
struct Steady {
  double hot_flow = 0, cold_flow = 0, hot_in = 0, cold_in = 0;
};
Steady steady_limits(const Survey& survey, const Limits& limits = {});

/// A screened row: what was frozen, or a spike of a pressure drop, is missing in it.
struct Screened {
  Reading reading;
  Drop drop = Drop::none;
};

/// Rows in, rows out, some twenty later.
class Screen {
 public:
  using Sink = std::function<void(const Screened&)>;
  /// `resolution` may still become finer while the record is read.
  Screen(const Mapping& mapping, const Survey& survey, const Channels& resolution, Tally& tally, Sink sink,
         const Limits& limits = {});

  void push(const Reading& reading);
  /// The last rows.
  void finish();

 private:
  static constexpr std::size_t ring = 64;
  static constexpr std::int64_t reach = 6;  ///< either side of the median of 13

  struct Slot {
    Reading raw;
    Channels value{};  ///< without what is frozen
    std::array<bool, channel_count> spike{};
    bool filled = false;
  };

  struct Window {
    std::int64_t first, last;  ///< rows, both included
  };

  Slot& slot(std::int64_t row) { return slots_[static_cast<std::size_t>(row) % ring]; }
  void find_frozen(std::int64_t row);
  void find_straight(std::int64_t row);
  bool is_straight(std::int64_t row);
  bool is_near_median(std::size_t channel, std::int64_t row, const Window& window);
  void find_spikes(std::int64_t row);
  void emit(std::int64_t row);
  Drop judge(std::int64_t row);
  bool is_off_line(std::int64_t row);
  bool is_low(const Slot& at, bool with_spikes) const;
  bool is_in_outage(std::int64_t time) const;
  bool is_unphysical(const Channels& value) const;
  bool is_unsteady(std::int64_t row);
  bool has_moved(std::int64_t row, std::int64_t other);
  double random_of(std::size_t channel, double value) const;

  const Mapping& mapping_;
  const Survey survey_;
  const Channels& resolution_;
  Tally& tally_;
  const Sink sink_;
  const Limits limits_;
  const Steady steady_;
  std::vector<Slot> slots_;
  std::int64_t in_ = 0, spiked_ = 0, out_ = 0;  ///< rows pushed, tested for spikes, emitted
  std::array<int, channel_count> alike_{};      ///< readings without a change, so far
  int straight_ = 0;
  bool was_off_line_ = false;
  std::int64_t restart_, step_;
};

}  // namespace dutygauge::field
