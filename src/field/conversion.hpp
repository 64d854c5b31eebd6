#pragma once
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/field/readings.hpp"

/// From the number in a column to SI: its unit, and for a flow the density at its meter.
namespace dutygauge::field {

/// A function of a temperature, tabulated: a fluid's state costs more than a row may.
class OfTemperature {
 public:
  OfTemperature() = default;
  /// `at_rest` stands where no temperature was read.
  OfTemperature(double low, double high, std::vector<double> values, double at_rest);
  bool empty() const { return values_.empty(); }
  double operator()(double temperature) const;

 private:
  double low_ = 0, per_step_ = 0, at_rest_ = 1;
  std::vector<double> values_;
};

struct Conversion {
  double factor = 1, offset = 0;
  OfTemperature density_factor;  ///< of a flow, at the inlet temperature of its stream
  std::string density_in_words;

  double operator()(double amount) const { return amount * factor + offset; }
};

/// The conversion of a unit, or what is wrong with it (`what` empty: nothing).
struct Resolved {
  Conversion conversion;
  FileError::Text objection;
};
Resolved resolve(Channel channel, std::string_view unit, const Column& column, const Streams& streams);

}  // namespace dutygauge::field
