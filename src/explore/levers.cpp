#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "vary.hpp"

namespace dutygauge::explore {
namespace {

constexpr double more = 1.10, one_kelvin = 1.0, worth_a_word = 0.01;

/// What the levers are measured by: room to the tightest line, or the duty without one.
struct Gauge {
  bool in_kelvin = false;
  double value = 0;
};

Gauge gauge(const service::Assessment& assessment) {
  const auto* line = tightest(assessment);
  const double duty = assessment.rating.outcome->duty;
  if (line == nullptr || line->quantity == service::Quantity::duty) return {false, duty};
  return {true, service::distance(*line, *assessment.rating.outcome)};
}

/// The same line, also where another one has become the tightest.
double gain(const service::Assessment& before, const service::Assessment& after) {
  const Gauge from = gauge(before);
  if (!from.in_kelvin) return after.rating.outcome->duty / from.value - 1.0;
  return service::distance(*tightest(before), *after.rating.outcome) - from.value;
}

std::string name(const case_io::Case& a_case, bool shell) {
  const report::CaseName names = name_of(a_case);
  return shell ? names.shell_side : names.tube_side;
}

class Puller {
 public:
  explicit Puller(const case_io::Document& document) : document_(document), case_(case_io::build(document)) {}

  std::vector<Pull> all() {
    for (const bool shell : {true, false}) flow(shell);
    for (const bool shell : {true, false})
      for (const double step : {-one_kelvin, one_kelvin}) inlet(shell, step);
    clean();
    unplug();
    return std::move(pulls_);
  }

 private:
  static std::string side(bool shell) { return shell ? "streams.shell_side" : "streams.tube_side"; }

  void turn(const std::string& key, std::string what, double factor, double step) {
    const auto found = dial(document_, key);
    if (!found || !found->own) return;
    pulls_.push_back({std::move(what), key, turned(document_, *found, *found->own * factor + step)});
  }

  void flow(bool shell) {
    turn(side(shell) + ".flow", fmt::format("10 % more {}", name(case_, shell)), more, 0.0);
  }

  void inlet(bool shell, double step) {
    const auto degree = case_.display == units::System::us ? "1.8 degF" : "1 K";
    turn(side(shell) + ".inlet.temperature",
         fmt::format("{} {} {}", name(case_, shell), degree, step < 0.0 ? "colder" : "warmer"), 1.0, step);
  }

  void clean() {
    const std::string in = side(false) + ".fouling", on = side(true) + ".fouling";
    const bool inside = case_.problem.tube_side.fouling_resistance > 0.0;
    const bool outside = case_.problem.shell_side.fouling_resistance > 0.0;
    if (inside) turn(in, "tubes cleaned inside", 0.0, 0.0);
    if (outside) turn(on, "tubes cleaned outside", 0.0, 0.0);
    if (!inside || !outside) return;
    const auto other = dial(document_, on);
    case_io::Document both = turned(document_, *dial(document_, in), 0.0);
    pulls_.push_back({"cleaned on both sides", "", turned(both, *other, 0.0)});
  }

  void unplug() {
    const std::string key = "exchanger.tubes.plugged";  // and _per_shell, _in_unit
    case_io::Document renewed = document_;
    bool is_given = false;
    for (const auto& [given, leaf] : document_.leaves) {
      if (!given.starts_with(key)) continue;
      renewed = case_io::with_value(renewed, given, "0");
      is_given = true;
    }
    if (is_given) pulls_.push_back({"plugged tubes renewed", key, std::move(renewed)});
  }

  const case_io::Document& document_;
  case_io::Case case_;
  std::vector<Pull> pulls_;
};

}  // namespace

std::vector<Pull> pulls(const case_io::Document& document) {
  return Puller(document).all();
}

std::vector<report::Lever> levers(const case_io::Document& document) {
  const Point here = rated(document);
  if (!here.assessment) return {};
  const auto& now = *here.assessment->rating.outcome;
  std::vector<report::Lever> found;
  for (const Pull& pull : pulls(document)) {
    const Point there = rated(pull.document);
    if (!there.assessment) continue;
    const auto& then = *there.assessment->rating.outcome;
    const double shell = then.shell_drop.total(), tube = then.tube_drop.total();
    found.push_back({.what = pull.what,
                     .key = pull.key,
                     .in_kelvin = gauge(*here.assessment).in_kelvin,
                     .gain = gain(*here.assessment, *there.assessment),
                     .shell_drop = shell,
                     .tube_drop = tube,
                     .costs_shell = shell > (1.0 + worth_a_word) * now.shell_drop.total(),
                     .costs_tube = tube > (1.0 + worth_a_word) * now.tube_drop.total()});
  }
  // Of the two ways to move an inlet the one that helps.
  std::erase_if(found, [](const report::Lever& lever) {
    return lever.key.ends_with(".inlet.temperature") && !(lever.gain > 0.0);
  });
  std::ranges::stable_sort(found, std::ranges::greater{},
                           [](const auto& lever) { return std::abs(lever.gain); });
  return found;
}

}  // namespace dutygauge::explore
