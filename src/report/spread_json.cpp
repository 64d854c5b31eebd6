#include "spread_json.hpp"

#include "dutygauge/units.hpp"

namespace dutygauge::report {
namespace {

using Json = nlohmann::ordered_json;
using uncertainty::Output;

Json plain(const uncertainty::Spread& of) {
  return {{"sigma", of.sigma}, {"low", of.low}, {"high", of.high}};
}

Json temperature(const uncertainty::Spread& of) {
  const auto celsius = [](double kelvin) { return units::from_si(kelvin, "degC", units::Kind::temperature); };
  return {{"sigma_K", of.sigma}, {"low", celsius(of.low)}, {"high", celsius(of.high)}};
}

Json sources(const std::vector<uncertainty::Share>& shares) {
  Json list = Json::array();
  for (const auto& share : shares)
    list.push_back(
        {{"key", share.key}, {"name", share.name}, {"share_of_duty_variance", share[Output::duty]}});
  return list;
}

}  // namespace

Json spread_json(const std::optional<uncertainty::Result>& spread) {
  if (!spread) return nullptr;
  return {{"duty_W", plain((*spread)[Output::duty])},
          {"shell_side_outlet_degC", temperature((*spread)[Output::shell_outlet])},
          {"tube_side_outlet_degC", temperature((*spread)[Output::tube_outlet])},
          {"shell_side_pressure_drop_Pa", plain((*spread)[Output::shell_drop])},
          {"tube_side_pressure_drop_Pa", plain((*spread)[Output::tube_drop])},
          {"sources", sources(spread->shares)},
          {"samples", spread->samples},
          {"without_result", spread->failed}};
}

}  // namespace dutygauge::report
