#pragma once
#include <random>
#include <vector>

#include "dutygauge/rating.hpp"

/// Random exchangers and streams that can be built and rated.
namespace random_cases {

class Generator {
 public:
  explicit Generator(unsigned seed) : engine_(seed) {}

  /// A problem of an E shell whose drawing nobody objects to.
  dutygauge::rating::Problem next() { return next({'E'}); }

  dutygauge::rating::Problem next_of_any_shell() { return next({'E', 'F', 'G', 'H', 'J', 'X'}); }

  double between(double low, double high) { return std::uniform_real_distribution(low, high)(engine_); }
  int whole(int low, int high) { return std::uniform_int_distribution(low, high)(engine_); }
  template <class T>
  T one_of(std::vector<T> choices) {
    return choices[static_cast<std::size_t>(whole(0, static_cast<int>(choices.size()) - 1))];
  }

 private:
  dutygauge::rating::Problem next(const std::vector<char>& shells) {
    for (;;) {
      auto drawing = description();
      drawing.shell_type = one_of<char>(shells);
      if (drawing.shell_type != 'E') drawing.flow_direction.reset();
      if (!dutygauge::geometry::objections(drawing).empty()) continue;
      if (!dutygauge::arrangement::objections(
               {.shell_type = drawing.shell_type, .tube_passes = drawing.tube_passes})
               .empty())
        continue;
      dutygauge::rating::Problem problem;
      problem.exchanger = dutygauge::geometry::derive(drawing).value;
      problem.methods.shell_side = one_of<dutygauge::shellside::Method>(
          {dutygauge::shellside::Method::bell_delaware, dutygauge::shellside::Method::kern});
      if (drawing.shell_type == 'X') problem.methods.shell_side = dutygauge::shellside::Method::bell_delaware;
      problem.shell_side = stream(problem.exchanger.shells_in_parallel * between(0.5, 60.0));
      problem.tube_side = stream(problem.exchanger.shells_in_parallel * between(0.5, 60.0));
      // Streams that enter equally warm exchange nothing.
      if (std::abs(problem.shell_side.inlet_temperature - problem.tube_side.inlet_temperature) < 2.0)
        continue;
      return problem;
    }
  }

  dutygauge::geometry::Description description() {
    dutygauge::geometry::Description d;
    d.shells_in_series = whole(1, 3);
    d.shells_in_parallel = whole(1, 2);
    d.tube_passes = one_of<int>({1, 1, 2, 2, 4, 6, 8});
    d.rear_head = one_of<char>({'M', 'S', 'U', 'T', 'L'});
    if (d.tube_passes == 1 && whole(0, 3) == 0)
      d.flow_direction = dutygauge::geometry::FlowDirection::parallel;
    d.shell_inside_diameter = between(0.2, 1.4);
    d.tube_outside_diameter = one_of<double>({0.01588, 0.01905, 0.0254});
    d.tube_wall = between(0.0009, 0.0028);
    d.tube_pitch = d.tube_outside_diameter * between(1.22, 1.6);
    d.layout = one_of<int>({30, 45, 60, 90});
    const double per_pitch = d.shell_inside_diameter / d.tube_pitch;
    d.tube_count = d.tube_passes *
                   std::max(1, static_cast<int>(between(0.3, 0.75) * per_pitch * per_pitch / d.tube_passes));
    d.tube_length = between(1.5, 8.0);
    d.tube_conductivity = between(12.0, 120.0);
    d.baffle_cut = between(0.15, 0.45);
    d.baffle_spacing = d.shell_inside_diameter * between(0.2, 0.9);
    if (whole(0, 1)) d.shell_nozzle_in = d.shell_nozzle_out = 0.25 * d.shell_inside_diameter;
    if (whole(0, 1)) d.tube_nozzle_in = d.tube_nozzle_out = 0.25 * d.shell_inside_diameter;
    return d;
  }

  dutygauge::rating::Stream stream(double mass_flow) {
    namespace fl = dutygauge::fluids;
    dutygauge::rating::Stream s;
    s.name = "stream";
    s.mass_flow = mass_flow;
    s.inlet_pressure = between(4e5, 12e5);
    s.fouling_resistance = one_of<double>({0.0, 0.0001, 0.0003, 0.0008});
    s.inlet_temperature = between(283.0, 400.0);
    switch (whole(0, 3)) {
      case 0:
        s.fluid = fl::make_constant({.density = between(600, 1100),
                                     .heat_capacity = between(1600, 4200),
                                     .conductivity = between(0.1, 0.6),
                                     .viscosity = std::pow(10.0, between(-3.7, -0.5))},
                                    fl::Phase::liquid)
                      .fluid;
        break;
      case 1:
        s.fluid = fl::make_constant({.density = between(2, 20),
                                     .heat_capacity = between(950, 2200),
                                     .conductivity = between(0.02, 0.06),
                                     .viscosity = between(1e-5, 3e-5)},
                                    fl::Phase::gas)
                      .fluid;
        s.mass_flow *= 0.1;
        break;
      case 2:
        s.fluid = viscous_oil();
        break;
      default:
        s.fluid = fl::make_water(s.inlet_temperature, s.inlet_pressure).fluid;
    }
    return s;
  }

  dutygauge::fluids::Fluid viscous_oil() {
    const double thick = between(0.01, 0.4);
    return dutygauge::fluids::make_table({{.temperature = 283.0,
                                           .density = 890,
                                           .heat_capacity = 1850,
                                           .conductivity = 0.135,
                                           .viscosity = thick},
                                          {.temperature = 330.0,
                                           .density = 860,
                                           .heat_capacity = 2030,
                                           .conductivity = 0.130,
                                           .viscosity = thick / 9.0},
                                          {.temperature = 400.0,
                                           .density = 815,
                                           .heat_capacity = 2300,
                                           .conductivity = 0.124,
                                           .viscosity = thick / 45.0}},
                                         dutygauge::fluids::Phase::liquid)
        .fluid;
  }

  std::mt19937 engine_;
};

}  // namespace random_cases
