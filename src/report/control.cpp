#include <fmt/core.h>

#include "along_json.hpp"
#include "sections.hpp"
#include "words.hpp"

// A unit held at its duty: in words and as JSON.

namespace dutygauge::report {
namespace {

using service::Control;
using units::Kind;

std::string balance(const service::Controlled& held, const rating::Problem& problem, const Figures& figures) {
  const bool throttled = held.by == Control::throttle_tube_side;
  const Side side = throttled ? Side::tube : Side::shell;
  std::string text = fmt::format(
      "{} of {} through the {} ({:.0f} %) gives {}: {} in the tubes, outlets {} {} and {} {}",
      figures.with_unit(held.flow, Kind::mass_flow), stream_name(problem, side),
      throttled ? "tubes" : "shell", 100.0 * held.share, figures.with_unit(held.outcome.duty, Kind::power),
      figures.with_unit(held.outcome.local.tube_film.velocity, Kind::velocity),
      stream_name(problem, Side::shell), figures.with_unit(held.outcome.shell_outlet, Kind::temperature),
      stream_name(problem, Side::tube), figures.with_unit(held.outcome.tube_outlet, Kind::temperature));
  if (!throttled)
    text += fmt::format(", {} once mixed", figures.with_unit(held.mixed_outlet, Kind::temperature));
  return text + ".";
}

void add(std::string& text, const char* state, const std::optional<service::Holding>& holding,
         const rating::Problem& problem, const Figures& figures) {
  if (!holding) return;
  if (!text.empty()) text += ' ';
  text += holding->controlled ? fmt::format("{}: {}", state, balance(*holding->controlled, problem, figures))
                              : fmt::format("{}: not held: {}.", state, holding->no_result);
}

}  // namespace

void control(Page& page, const Result& result) {
  const Figures figures(result.display);
  const bool several = result.cases.size() > 1;
  bool is_first = true;
  for (const RatedCase& one : result.cases) {
    std::string text;
    const auto& problem = one.design_fouling.problem;
    add(text, "at design fouling", one.held, problem, figures);
    add(text, "clean", one.held_clean, problem, figures);
    if (text.empty()) continue;
    page.section(is_first ? "CONTROL" : "", several ? fmt::format("{}, {}", ascii(one.name), text) : text);
    is_first = false;
  }
}

Json control_json(const std::optional<service::Holding>& holding) {
  if (!holding) return nullptr;
  if (!holding->controlled) return {{"held", false}, {"why", holding->no_result}};
  const auto& held = *holding->controlled;
  const auto celsius = [](double temperature) { return in_json_unit(temperature, Kind::temperature); };
  return {{"held", true},
          {"by", held.by == Control::throttle_tube_side ? "throttle_tube_side" : "bypass_shell_side"},
          {"share", held.share},
          {"flow_kg_s", held.flow},
          {"duty_W", held.outcome.duty},
          {"shell_side_outlet_degC", celsius(held.outcome.shell_outlet)},
          {"tube_side_outlet_degC", celsius(held.outcome.tube_outlet)},
          {"mixed_outlet_degC", celsius(held.mixed_outlet)},
          {"tube_side_velocity_m_s", held.outcome.local.tube_film.velocity},
          {"shell_side_pressure_drop_Pa", held.outcome.shell_drop.total()},
          {"tube_side_pressure_drop_Pa", held.outcome.tube_drop.total()}};
}

}  // namespace dutygauge::report
