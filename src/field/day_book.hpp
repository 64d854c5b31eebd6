#pragma once
#include <cstdint>
#include <vector>

#include "dutygauge/field/series.hpp"

/// Readings of a day to its medians.
namespace dutygauge::field {

/// Collects the used readings of one day after the other. Of a day with more readings than
/// medians need, every second is left out, and so on: memory stays bounded.
class DayBook {
 public:
  DayBook(std::int64_t start, Days& days) : start_(start), days_(days) {}
  void add(const Reading& reading, const Apparent& apparent);
  void close();

 private:
  struct Used {
    Channels value;
    Apparent apparent;
  };
  static constexpr std::size_t most = 1024;

  std::int64_t start_, day_ = 0;
  Days& days_;
  std::vector<Used> used_;
  std::uint64_t stride_ = 1, seen_ = 0;
};

}  // namespace dutygauge::field
