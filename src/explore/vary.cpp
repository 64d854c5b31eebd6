#include "vary.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <filesystem>

namespace dutygauge::explore {
namespace {

using units::Kind;

constexpr int exact = 16;  // significant digits that bring a value back

/// The kind whose name in words the field table gives; empty for words, texts and blocks.
std::optional<Kind> kind_named(const std::string& name) {
  if (name == "whole number") return Kind::count;
  if (name == "flow") return Kind::mass_flow;
  for (int i = static_cast<int>(Kind::ratio); i <= static_cast<int>(Kind::angle); ++i)
    if (units::name(static_cast<Kind>(i)) == name) return static_cast<Kind>(i);
  return {};
}

void take_basis(Dial& dial, const std::string& text) {
  const auto read = units::read_flow(text);
  if (const auto* flow = std::get_if<units::Flow>(&read)) {
    dial.basis = flow->basis;
    dial.basis_temperature = flow->basis_temperature;
  }
}

/// A value as it would be typed for that dial, exact.
std::string typed(const Dial& dial, double value) {
  std::string text = units::typed(value, dial.kind, units::System::si, exact);
  if (dial.kind != Kind::volume_flow) return text;
  if (dial.basis != units::FlowBasis::temperature) return text + " at inlet";
  return fmt::format("{} at {}", text,
                     units::typed(dial.basis_temperature, Kind::temperature, units::System::si, exact));
}

/// Of the rating's sentence: whether it only says that the iteration found no rest.
bool did_not_settle(const rating::Rating& rating) {
  return rating.no_result.find("do not settle") != std::string::npos;
}

std::string range_that_ends(const rating::Rating& rating) {
  const auto names = [&rating](std::string_view side) {
    return rating.no_result.find(side) != std::string::npos;
  };
  return names("tube-side")    ? "tube_side.fluid_range"
         : names("shell-side") ? "shell_side.fluid_range"
                               : "no_result";
}

/// What is said against a fluid at an inlet is where its range ends.
std::string stopper_of(const std::string& key) {
  if (key.starts_with("streams.shell_side.fluid")) return "shell_side.fluid_range";
  if (key.starts_with("streams.tube_side.fluid")) return "tube_side.fluid_range";
  return key.empty() ? "case" : key;
}

Point refused(const case_io::InputError& error) {
  const case_io::Mistake& first = error.mistakes().front();
  return {.assessment = {},
          .stopper = stopper_of(first.key),
          .why = fmt::format("{}: {}", first.key, first.what)};
}

}  // namespace

std::optional<Dial> dial(const case_io::Document& document, std::string_view key) {
  const case_io::Case a_case = case_io::build(document);
  Dial dial{.key = std::string(key)};
  const auto help = case_io::explain(key);
  dial.is_flow = help && help->kind == "flow";
  dial.is_whole = help && help->kind == "whole number";
  const auto found = std::ranges::find(a_case.inputs, key, &Input::key);
  if (found != a_case.inputs.end()) {
    if (found->is_word) return {};
    dial.kind = found->kind;
    dial.own = found->si;
    if (const auto leaf = document.leaves.find(dial.key); dial.is_flow && leaf != document.leaves.end())
      take_basis(dial, leaf->second.text);
    return dial;
  }
  if (!help || help->key != key) return {};
  const auto kind = kind_named(help->kind);
  if (!kind) return {};
  dial.kind = *kind;
  return dial;
}

case_io::Document turned(const case_io::Document& document, const Dial& dial, double value) {
  return case_io::with_value(document, dial.key, typed(dial, value));
}

Point rated(const case_io::Document& document) {
  Point point;
  try {
    const case_io::Case a_case = case_io::build(document);
    service::Service service = a_case.service;
    service.words = a_case.display;
    auto assessment = service::judge(a_case.problem, service);
    const rating::Rating& rating = assessment.rating;
    if (rating.outcome) {
      point.assessment = std::move(assessment);
      return point;
    }
    point.unsettled = did_not_settle(rating);
    if (!point.unsettled) point.stopper = range_that_ends(rating);
    point.why = rating.no_result;
  } catch (const case_io::InputError& error) {
    point = refused(error);
  }
  return point;
}

Point rated(const case_io::Document& document, const std::vector<std::pair<Dial, double>>& turns) {
  case_io::Document changed = document;
  try {
    for (const auto& [dial, value] : turns) changed = turned(changed, dial, value);
  } catch (const case_io::InputError& error) {
    return refused(error);
  }
  return rated(changed);
}

Point read_as(const case_io::Document& document, const Dial& dial, double value) {
  try {
    return rated(case_io::with_other_reading(document, dial.key, typed(dial, value)));
  } catch (const case_io::InputError& error) {
    return refused(error);
  }
}

report::Running running(const service::Assessment& assessment) {
  const auto& outcome = *assessment.rating.outcome;
  return {.duty = outcome.duty,
          .shell_outlet = outcome.shell_outlet,
          .tube_outlet = outcome.tube_outlet,
          .shell_drop = outcome.shell_drop.total(),
          .tube_drop = outcome.tube_drop.total(),
          .u_dirty = outcome.local.u_dirty,
          .duty_margin = assessment.margins.duty,
          .temperature_margin = assessment.margins.temperature,
          .met = assessment.verdict.met,
          .limited_by = assessment.verdict.limited_by};
}

report::CaseName name_of(const case_io::Case& a_case) {
  const auto& shell = a_case.problem.shell_side;
  const auto& tube = a_case.problem.tube_side;
  const auto known = [](const rating::Stream& stream) {
    return stream.name.empty() ? stream.fluid.name : stream.name;
  };
  report::CaseName name{.file = std::filesystem::path(a_case.file).filename().string(),
                        .title = a_case.title,
                        .tag = a_case.tag,
                        .input_sha256 = a_case.sha256,
                        .display = a_case.display};
  if (known(shell) == known(tube)) return name;
  if (!known(shell).empty()) name.shell_side = known(shell);
  if (!known(tube).empty()) name.tube_side = known(tube);
  return name;
}

const service::Demand* tightest(const service::Assessment& assessment) {
  const auto& demands = assessment.service.demands;
  const auto found = std::ranges::find_if(demands, [&](const service::Demand& demand) {
    return service::key_of(demand.quantity) == assessment.verdict.limited_by;
  });
  if (found == demands.end()) return nullptr;
  // Of two lines on one quantity the one with less room.
  const service::Demand* least = &*found;
  for (const auto& demand : demands)
    if (demand.quantity == found->quantity && service::distance(demand, *assessment.rating.outcome) <
                                                  service::distance(*least, *assessment.rating.outcome))
      least = &demand;
  return least;
}

}  // namespace dutygauge::explore
