#include "along_json.hpp"

#include <fmt/core.h>

namespace dutygauge::report {

double in_json_unit(double si, units::Kind kind) {
  return kind == units::Kind::temperature ? units::from_si(si, "degC", kind) : si;
}

Json between_shells_json(const service::Assessment& assessment) {
  Json list = Json::array();
  if (!assessment.rating.outcome) return list;
  for (const auto& shell : assessment.rating.outcome->between_shells)
    for (int bank = 0; bank < assessment.problem.exchanger.tube_banks(); ++bank)
      list.push_back({{"shell", fmt::format("{}.{}", shell.bank + bank, shell.position)},
                      {"shell_side_outlet_degC", in_json_unit(shell.shell_outlet, units::Kind::temperature)},
                      {"tube_side_outlet_degC", in_json_unit(shell.tube_outlet, units::Kind::temperature)}});
  return list;
}

Json profile_json(const service::Assessment& assessment) {
  Json list = Json::array();
  if (!assessment.rating.outcome) return list;
  for (const auto& at : assessment.rating.outcome->profile)
    list.push_back({{"shell", at.shell},
                    {"pass", at.pass},
                    {"position", at.position},
                    {"tube_side_degC", in_json_unit(at.tube, units::Kind::temperature)},
                    {"shell_side_degC", in_json_unit(at.shell_side, units::Kind::temperature)},
                    {"wall_degC", in_json_unit(at.wall, units::Kind::temperature)},
                    {"u_W_m2K", at.u},
                    {"flux_W_m2", at.flux}});
  return list;
}

}  // namespace dutygauge::report
