#include <fmt/format.h>

#include "dutygauge/rating/bypass.hpp"
#include "dutygauge/units/mention.hpp"
#include "parts.hpp"
#include "wording.hpp"

// A part of a stream that goes round the exchanger.

namespace dutygauge::case_io {
namespace {

using service::Quantity;
using units::Kind;

std::string in_words(double temperature, units::System system) {
  return units::typed(temperature, Kind::temperature, system, 4);
}

/// Limits on what is measured behind the mix, as limits on what leaves the exchanger.
std::string move_limits(const Reading& reading, const std::string& key, Quantity quantity,
                        const rating::Stream& stream, double share, Case& result) {
  std::string moved;
  for (service::Demand& demand : result.service.demands) {
    if (demand.quantity != quantity) continue;
    const auto at_exchanger = rating::before_mix(stream, demand.limit, share);
    if (!at_exchanger)
      throw InputError(
          result.file,
          {{reading.document().leaves.at(key).value_at, key,
            fmt::format("no outlet of the exchanger that is known of this fluid gives {} once mixed",
                        in_words(demand.limit, result.display)),
            "a share small enough for the limit of the service", "check the share and the limit"}});
    moved += fmt::format("; {} behind the mix asks for {} at the exchanger",
                         units::mention(demand.limit, Kind::temperature),
                         units::mention(*at_exchanger, Kind::temperature));
    demand.limit = *at_exchanger;
  }
  return moved;
}

void take_one(const Reading& reading, bool is_shell_side, Case& result) {
  const std::string block = is_shell_side ? "streams.shell_side.bypass" : "streams.tube_side.bypass";
  const std::string key = joined(block, "share");
  const double share = si(reading.entries(), key).value_or(0.0);
  if (share == 0.0) return;
  rating::Stream& stream = is_shell_side ? result.problem.shell_side : result.problem.tube_side;
  const auto quantity = is_shell_side ? Quantity::shell_side_outlet : Quantity::tube_side_outlet;
  const bool is_behind = word(reading.entries(), joined(block, "sensor")) == "after_mix";
  const std::string moved = is_behind
                                ? move_limits(reading, key, quantity, stream, share, result)
                                : "; the sensor stands before the mix, so that limits hold at the exchanger";
  result.findings.push_back(
      {.id = "case.bypass",
       .severity = Severity::note,
       .text = fmt::format("{{value}} of the {} goes round the exchanger ({}): flow, outlet and limits of "
                           "this result are those of the exchanger itself{}",
                           stream.name, last_segment(parent_of(block)), moved),
       .ground = Ground::arithmetic,
       .value = share,
       .limit = 0.0});
  stream.mass_flow *= 1.0 - share;
}

}  // namespace

void take_bypasses(const Reading& reading, Case& result) {
  for (const bool is_shell_side : {true, false}) take_one(reading, is_shell_side, result);
}

}  // namespace dutygauge::case_io
