#include <fmt/format.h>

#include "dutygauge/arrangement.hpp"

namespace dutygauge::arrangement {

bool is_built(const Arrangement& arrangement) {
  const int passes = arrangement.tube_passes;
  return arrangement.shell_type == 'E' && arrangement.shells_in_series >= 1 && passes >= 1 &&
         (passes == 1 || (passes % 2 == 0 && arrangement.flow == Flow::counter));
}

Objections objections(const Arrangement& arrangement) {
  Objections result;
  const int passes = arrangement.tube_passes;
  if (arrangement.shell_type != 'E')
    result.push_back({"exchanger.tema", fmt::format("shell type {} is not rated yet", arrangement.shell_type),
                      "an E shell", "rate it as an E shell only if the flow paths are those of one"});
  if (arrangement.shells_in_series < 1)
    result.push_back({"exchanger.shells.in_series",
                      fmt::format("{} shells in series", arrangement.shells_in_series), "1 or more",
                      "give the number of shells one stream passes after another"});
  if (passes < 1)
    result.push_back({"exchanger.tubes.passes", fmt::format("{} tube passes", passes), "1 or more",
                      "give the number of tube passes of one shell"});
  else if (passes > 1 && passes % 2 != 0)
    result.push_back({"exchanger.tubes.passes", fmt::format("{} tube passes are not rated yet", passes),
                      "1, or an even number", "check the number of passes on the drawing"});
  if (passes > 1 && arrangement.flow == Flow::parallel)
    result.push_back({"exchanger.flow_direction", fmt::format("parallel flow with {} tube passes", passes),
                      "parallel only with one tube pass",
                      "leave flow_direction out: with several passes the tubes run both ways"});
  return result;
}

}  // namespace dutygauge::arrangement
