#include "quantities.hpp"

#include <cmath>
#include <stdexcept>

namespace dutygauge::field {
namespace {

double log_or_nan(double value) {
  return value > 0.0 ? std::log(value) : std::nan("");
}

double value_of(Quantity quantity, const Day& day, const DropLaws& laws) {
  const auto at = [&day](Channel channel) { return day.value[index_of(channel)]; };
  const Channel tube_flow = laws.hot_in_tubes ? Channel::hot_flow : Channel::cold_flow;
  const Channel shell_flow = laws.hot_in_tubes ? Channel::cold_flow : Channel::hot_flow;
  switch (quantity) {
    case Quantity::fouling:
      return day.apparent.fouling;
    case Quantity::closure:
      return day.apparent.closure;
    case Quantity::tube_drop:
      return log_or_nan(at(Channel::tube_dp)) - laws.tube_exponent * log_or_nan(at(tube_flow));
    case Quantity::shell_drop:
      return log_or_nan(at(Channel::shell_dp)) - laws.shell_exponent * log_or_nan(at(shell_flow));
    case Quantity::hot_flow:
      return log_or_nan(at(Channel::hot_flow));
    case Quantity::cold_flow:
      return log_or_nan(at(Channel::cold_flow));
    case Quantity::hot_in:
      return at(Channel::hot_in);
    case Quantity::hot_out:
      return at(Channel::hot_out);
    case Quantity::cold_in:
      return at(Channel::cold_in);
    case Quantity::cold_out:
      return at(Channel::cold_out);
  }
  throw std::logic_error("field: a quantity without a value");
}

}  // namespace

std::optional<Channel> channel_of(Quantity quantity) {
  switch (quantity) {
    case Quantity::hot_flow:
      return Channel::hot_flow;
    case Quantity::cold_flow:
      return Channel::cold_flow;
    case Quantity::hot_in:
      return Channel::hot_in;
    case Quantity::hot_out:
      return Channel::hot_out;
    case Quantity::cold_in:
      return Channel::cold_in;
    case Quantity::cold_out:
      return Channel::cold_out;
    case Quantity::tube_drop:
      return Channel::tube_dp;
    case Quantity::shell_drop:
      return Channel::shell_dp;
    default:
      return {};
  }
}

std::map<Quantity, Trend> series_of(const Days& days, const DropLaws& laws) {
  std::map<Quantity, Trend> series;
  for (const Quantity quantity :
       {Quantity::fouling, Quantity::closure, Quantity::tube_drop, Quantity::shell_drop, Quantity::hot_flow,
        Quantity::cold_flow, Quantity::hot_in, Quantity::hot_out, Quantity::cold_in, Quantity::cold_out}) {
    Trend trend;
    for (const Day& day : days)
      if (const double value = value_of(quantity, day, laws); std::isfinite(value))
        trend.push_back({.time = day.day, .value = value});
    if (!trend.empty()) series.emplace(quantity, std::move(trend));
  }
  return series;
}

}  // namespace dutygauge::field
