#include <cmath>

#include "dutygauge/rating/scaled.hpp"
#include "dutygauge/uncertainty.hpp"

namespace dutygauge::uncertainty {
namespace {

/// One standard deviation as a fraction of the value, and where it is from. The published
/// statements are ranges of the data around the method; turning them into one figure is our choice.
struct Scatter {
  double sigma;
  const char* source;
};

// "+-10 to 20 % of most data points" where turbulent; entrance and history in the transition;
// natural convection and entrance where laminar.
constexpr Scatter tube_film_turbulent{0.10, "gnielinski_1976"};      // Re > 1e4
constexpr Scatter tube_film_low_turbulent{0.15, "gnielinski_1976"};  // 4000 to 1e4
constexpr Scatter tube_film_transition{0.30, "gnielinski_2013"};     // 2300 to 4000
constexpr Scatter tube_film_laminar{0.20, "gnielinski_2013"};
constexpr Scatter tube_friction{0.10, "common_practice"};  // commercial tubes; 5 % where smooth
constexpr Scatter nozzles{0.25, "common_practice"};        // and turns, on their part of a drop

// Films from 50 % low to 100 % high, drops from 50 % low to 200 % high against test units.
constexpr Scatter shell_film{0.20, "palen_taborek_1969"};
constexpr Scatter shell_film_assumed_gaps{0.25,
                                          "palen_taborek_1969"};  // leakage moves 10-20 % in the tolerances
constexpr Scatter shell_film_slow{0.35, "palen_taborek_1969"};    // Re < 100
constexpr Scatter shell_film_kern{0.35, "kern_1950"};
constexpr Scatter shell_drop{0.30, "palen_taborek_1969"};             // Re > 1000, gaps known
constexpr Scatter shell_drop_less_known{0.40, "palen_taborek_1969"};  // slower, F shell, gaps assumed
constexpr Scatter shell_drop_kern{0.50, "kern_1950"};

// Backed out of a sheet's U and drop: another's methods for gaps we do not know, less our own tube
// film, and the exponents of the flow, each unknown by some 0.1 and 0.2. Our own choice.
constexpr Scatter shell_film_scaled{0.30, "common_practice"};
constexpr Scatter shell_drop_scaled{0.45, "common_practice"};
constexpr double film_exponent_doubt = 0.10, drop_exponent_doubt = 0.20;

constexpr Scatter wall{0.05, "common_practice"};     // alloys
constexpr Scatter fouling{0.40, "common_practice"};  // chosen from a table: 0.35 to 0.5

// Of the exponent with which a film follows its flow: what a tied film may be wrong by, for
// each unit of ln(flow/flow read). Methods differ by some 0.05 in it.
constexpr Scatter flow_exponent{0.05, "common_practice"};

/// For values somebody typed without saying how good they are: a liquid of known grade.
constexpr double density_as_typed = 0.01, heat_capacity_as_typed = 0.03, conductivity_as_typed = 0.07,
                 viscosity_as_typed = 0.15;

bool gaps_are_known(const geometry::Description& drawing) {
  return drawing.tube_to_baffle && drawing.shell_to_baffle && drawing.bundle_to_shell;
}

Scatter of_tube_film(double reynolds) {
  if (reynolds > 1e4) return tube_film_turbulent;
  if (reynolds > 4000.0) return tube_film_low_turbulent;
  return reynolds > 2300.0 ? tube_film_transition : tube_film_laminar;
}

/// Grown with the distance in flow from where the sheet's numbers hold.
Scatter farther(const Scatter& there, double exponent_doubt, double flow_ratio) {
  return {std::hypot(there.sigma, exponent_doubt * std::log(flow_ratio)), there.source};
}

Scatter of_shell_film(const rating::Problem& problem, double reynolds) {
  if (rating::is_scaled(problem))
    return farther(shell_film_scaled, film_exponent_doubt,
                   problem.shell_side.mass_flow / problem.shell_side.film_law->at_flow);
  if (problem.methods.shell_side == shellside::Method::kern) return shell_film_kern;
  if (reynolds < 100.0) return shell_film_slow;
  return gaps_are_known(problem.exchanger.as_described) ? shell_film : shell_film_assumed_gaps;
}

Scatter of_shell_drop(const rating::Problem& problem, double reynolds) {
  if (const auto& law = problem.shell_side.drop_law; law && law->at_state)
    return farther(shell_drop_scaled, drop_exponent_doubt, problem.shell_side.mass_flow / law->at_flow);
  if (problem.methods.shell_side == shellside::Method::kern) return shell_drop_kern;
  const bool known = reynolds > 1000.0 && problem.exchanger.shell_side.shell_type != 'F' &&
                     gaps_are_known(problem.exchanger.as_described);
  return known ? shell_drop : shell_drop_less_known;
}

/// Of a sum of two parts that are wrong independently.
Scatter of_parts(double first, const Scatter& of_first, double second, const Scatter& of_second) {
  const double total = first + second;
  if (total <= 0.0) return of_first;
  return {std::hypot(first * of_first.sigma, second * of_second.sigma) / total, of_first.source};
}

std::string on_side(Side side, const char* what) {
  return std::string(side == Side::shell ? "the shell-side " : "the tube-side ") + what;
}

Source source(Varied varied, Side side, const char* what, const Scatter& scatter) {
  std::string key = (side == Side::shell ? "shell_side." : "tube_side.") + std::string(what);
  for (char& c : key)
    if (c == ' ') c = '_';
  return {.name = on_side(side, what),
          .key = std::move(key),
          .varied = varied,
          .side = side,
          .sigma = scatter.sigma,
          .source = scatter.source};
}

void add_properties(const rating::Stream& stream, Side side, std::vector<Source>& sources) {
  struct Property {
    std::string_view key;
    Varied varied;
    const char* what;
    double as_typed;
  };
  constexpr Property properties[] = {
      {"density", Varied::density, "density", density_as_typed},
      {"heat_capacity", Varied::heat_capacity, "heat capacity", heat_capacity_as_typed},
      {"conductivity", Varied::conductivity, "conductivity", conductivity_as_typed},
      {"viscosity", Varied::viscosity, "viscosity", viscosity_as_typed},
  };
  for (const fluids::PropertyNote& note : fluids::notes(stream.fluid))
    for (const Property& property : properties) {
      if (property.key != note.property) continue;
      // A band of 95 % is two standard deviations.
      const bool stated = note.uncertainty > 0.0;
      Source added = source(property.varied, side, property.what,
                            {stated ? 0.5 * note.uncertainty : property.as_typed, "common_practice"});
      if (stated) added.source = std::string(note.source);
      sources.push_back(std::move(added));
    }
}

}  // namespace

std::vector<Source> sources_of(const rating::Problem& problem, const rating::Outcome& outcome) {
  const double tube_reynolds = outcome.local.tube_film.reynolds;
  const double shell_reynolds = outcome.local.shell_film.reynolds;
  const tubeside::PressureDrop& tube = outcome.tube_drop;
  const double shell_nozzles = outcome.shell_drop.nozzles;
  std::vector<Source> sources{
      source(Varied::film, Side::shell, "film", of_shell_film(problem, shell_reynolds)),
      source(Varied::film, Side::tube, "film", of_tube_film(tube_reynolds)),
      source(Varied::drop, Side::shell, "pressure drop",
             of_parts(outcome.shell_drop.total() - shell_nozzles, of_shell_drop(problem, shell_reynolds),
                      shell_nozzles, nozzles)),
      source(Varied::drop, Side::tube, "pressure drop",
             of_parts(tube.friction, tube_friction, tube.turns + tube.nozzles, nozzles)),
  };
  if (problem.shell_side.fouling_resistance > 0.0)
    sources.push_back(source(Varied::fouling, Side::shell, "fouling", fouling));
  if (problem.tube_side.fouling_resistance > 0.0)
    sources.push_back(source(Varied::fouling, Side::tube, "fouling", fouling));
  add_properties(problem.shell_side, Side::shell, sources);
  add_properties(problem.tube_side, Side::tube, sources);
  sources.push_back({.name = "the tube metal's conductivity",
                     .key = "wall_conductivity",
                     .varied = Varied::wall_conductivity,
                     .sigma = wall.sigma,
                     .source = wall.source});
  return sources;
}

std::vector<Source> sources_of_today(const Anchor& anchor, const rating::Problem& problem,
                                     const rating::Outcome& outcome) {
  auto sources = sources_of(problem, outcome);
  std::erase_if(sources, [](const Source& s) { return s.varied == Varied::fouling; });
  const SteadyReading& reading = anchor.reading;
  for (const Side side : {Side::shell, Side::tube}) {
    const bool shell = side == Side::shell;
    const auto stream = [shell](const rating::Problem& of) -> const rating::Stream& {
      return shell ? of.shell_side : of.tube_side;
    };
    const double steps = std::abs(std::log(stream(problem).mass_flow / stream(anchor.at_reading).mass_flow));
    sources.push_back(source(Varied::film_with_flow, side, "film away from the flow read",
                             {flow_exponent.sigma * steps, flow_exponent.source}));
    const auto of_reading = [&](Varied varied, const char* what, double sigma) {
      Source made = source(varied, side, what, {sigma, "common_practice"});
      made.distribution = Distribution::normal;
      sources.push_back(std::move(made));
    };
    if (anchor.resistance_sigma > 0.0) continue;
    if ((shell ? reading.shell_side : reading.tube_side).mass_flow)
      of_reading(Varied::read_flow, "flow as read", reading.flow_sigma);
    of_reading(Varied::read_inlet, "inlet as read", reading.temperature_sigma);
    of_reading(Varied::read_outlet, "outlet as read", reading.temperature_sigma);
  }
  if (anchor.resistance_sigma > 0.0)
    sources.push_back({.name = "the fouling found",
                       .key = "found_fouling",
                       .varied = Varied::found_fouling,
                       .sigma = anchor.resistance_sigma,
                       .distribution = Distribution::normal,
                       .source = "common_practice"});
  return sources;
}

}  // namespace dutygauge::uncertainty
