#include <fmt/format.h>
#include <tbb/parallel_for.h>

#include <cmath>

#include "vary.hpp"

namespace dutygauge::explore {
namespace {

using units::Misread;

constexpr double fewest_steps = 2, most_steps = 10'000;

std::string expected_form(const Dial& dial) {
  const std::string unit(units::shown_unit(dial.kind, units::System::metric));
  const std::string place = dial.kind == units::Kind::volume_flow ? " at inlet" : "";
  return fmt::format("FROM..TO{}{}:STEPS, or factors x0.8..x1.2:5", unit.empty() ? "" : " " + unit, place);
}

Misread misread(const Dial& dial, std::string what, std::string remedy) {
  return {std::move(what), expected_form(dial), std::move(remedy)};
}

/// Reads the two ends as the key's own grammar has them.
units::Read<units::Value> read_ends(Dial& dial, std::string_view text) {
  if (!dial.is_flow) return units::read(text, dial.is_whole ? units::Kind::ratio : dial.kind);
  auto read = units::read_flow(text);
  if (auto* wrong = std::get_if<Misread>(&read)) return *wrong;
  const auto& flow = std::get<units::Flow>(read);
  dial.basis = flow.basis;
  dial.basis_temperature = flow.basis_temperature;
  dial.kind = flow.basis == units::FlowBasis::mass ? units::Kind::mass_flow : units::Kind::volume_flow;
  return flow.amount;
}

units::Read<units::Value> read_factors(const Dial& dial, std::string_view text) {
  const auto dots = text.find("..");
  if (dots == std::string_view::npos) return misread(dial, "one end is missing", "write x0.8..x1.2:5");
  std::string_view second = text.substr(dots + 2);
  if (second.starts_with("x")) second.remove_prefix(1);
  const auto from = units::number(text.substr(1, dots - 1)), to = units::number(second);
  if (!from || !to || !(*from > 0.0))
    return misread(dial, fmt::format("'{}' are not two factors above 0", text), "write x0.8..x1.2:5");
  if (dial.kind == units::Kind::temperature)
    return misread(dial, "a temperature has no factor", "give its ends with a unit");
  if (!dial.own || *dial.own == 0.0)
    return misread(dial, "there is no value in the case for a factor to act on", "give its ends with a unit");
  units::Value ends;
  ends.low = *from * *dial.own;
  ends.high = *to * *dial.own;
  return ends;
}

units::Read<Variation> spread(const Dial& dial, double from, double to, int steps) {
  Variation variation{.dial = dial};
  for (int i = 0; i < steps; ++i) {
    double value = from + (to - from) * i / (steps - 1);
    if (dial.is_whole) {
      const double whole = std::round(value);
      if (std::abs(value - whole) > 1e-9 * std::max(1.0, std::abs(whole)))
        return misread(dial,
                       fmt::format("step {} would be {:.6g}, and only whole numbers can be", i + 1, value),
                       "choose STEPS so that every step is a whole number");
      value = whole;
    }
    variation.values.push_back(value);
  }
  return variation;
}

}  // namespace

units::Read<Variation> read_variation(const Dial& dial, std::string_view text) {
  const auto colon = text.rfind(':');
  if (colon == std::string_view::npos)
    return misread(dial, fmt::format("'{}' does not say in how many steps", text), "put :STEPS behind it");
  const auto steps = units::number(text.substr(colon + 1));
  if (!steps || *steps != std::floor(*steps) || *steps < fewest_steps || *steps > most_steps)
    return misread(dial, fmt::format("'{}' is no number of steps", text.substr(colon + 1)),
                   "give a whole number of steps from 2 to 10000");
  text = text.substr(0, colon);
  Dial wanted = dial;
  const auto ends = text.starts_with("x") ? read_factors(dial, text) : read_ends(wanted, text);
  if (const auto* wrong = std::get_if<Misread>(&ends)) return misread(dial, wrong->what, wrong->remedy);
  const auto& value = std::get<units::Value>(ends);
  if (!value.low || !value.high || value.standard_deviation)
    return misread(dial, fmt::format("'{}' is no range", text), "write its two ends with .. between them");
  if (!(*value.low < *value.high))
    return misread(dial, fmt::format("the range '{}' is empty: it does not rise", text),
                   "write the smaller end first");
  return spread(wanted, *value.low, *value.high, static_cast<int>(*steps));
}

report::Sweep sweep(const case_io::Document& document, const std::vector<Variation>& variations) {
  report::Sweep sweep{.about = name_of(case_io::build(document)), .axes = {}, .rows = {}};
  std::size_t count = 1;
  for (const auto& one : variations) {
    sweep.axes.push_back({one.dial.key, one.dial.kind, one.dial.own});
    count *= one.values.size();
  }
  sweep.rows.resize(count);
  tbb::parallel_for(std::size_t{0}, count, [&](std::size_t i) {
    report::SweepRow& row = sweep.rows[i];
    std::vector<std::pair<Dial, double>> turns;
    std::size_t group = count, rest = i;
    for (const auto& one : variations) {
      group /= one.values.size();
      row.at.push_back(one.values[rest / group]);
      rest %= group;
      turns.emplace_back(one.dial, row.at.back());
    }
    const Point point = rated(document, turns);
    if (point.assessment)
      row.running = running(*point.assessment);
    else
      row.no_result = point.why;
  });
  return sweep;
}

}  // namespace dutygauge::explore
