#include "anchor_json.hpp"

#include <stdexcept>

#include "dutygauge/units.hpp"

namespace dutygauge::report {
namespace {

using Json = nlohmann::ordered_json;
using uncertainty::Closing;
using uncertainty::Output;

double celsius(double kelvin) {
  return units::from_si(kelvin, "degC", units::Kind::temperature);
}

std::string_view word_of(Closing closing) {
  switch (closing) {
    case Closing::untested:
      return "untested";
    case Closing::closes:
      return "closes";
    case Closing::within_uncertainty:
      return "closes_within_uncertainty";
    case Closing::doubtful:
      return "doubtful";
    case Closing::does_not_close:
      return "does_not_close";
  }
  throw std::invalid_argument("report::json: no such closing");
}

Json or_null(const std::optional<double>& value) {
  return value ? Json(*value) : Json(nullptr);
}

}  // namespace

Json anchor_json(const std::optional<Anchored>& anchored) {
  if (!anchored) return nullptr;
  const auto& anchor = anchored->anchor;
  const bool tested = anchor.closing != Closing::untested;
  const bool multiplied = anchor.film_factor > 1.0;
  return {{"taken", anchor.reading.taken},
          {"duty_W", anchor.duty},
          {"shell_side_duty_W", or_null(anchor.shell_duty)},
          {"tube_side_duty_W", or_null(anchor.tube_duty)},
          {"closure", tested ? Json(anchor.closure) : Json(nullptr)},
          {"closure_sigma", tested ? Json(anchor.closure_sigma) : Json(nullptr)},
          {"verdict", word_of(anchor.closing)},
          {"resistance_m2K_W", anchor.resistance},
          {"film_factor", anchor.film_factor},
          {"film_side", !multiplied                                    ? Json(nullptr)
                        : anchor.film_side == uncertainty::Side::shell ? Json("shell_side")
                                                                       : Json("tube_side")},
          {"shell_side_outlet_degC", celsius(anchored->outcome.shell_outlet)},
          {"tube_side_outlet_degC", celsius(anchored->outcome.tube_outlet)}};
}

Json change_json(const std::optional<uncertainty::Spreads>& change) {
  if (!change) return nullptr;
  const auto one = [&](Output output) {
    const auto& spread = (*change)[static_cast<std::size_t>(output)];
    return Json{{"mean", spread.mean}, {"sigma", spread.sigma}, {"low", spread.low}, {"high", spread.high}};
  };
  return {{"duty_W", one(Output::duty)},
          {"shell_side_outlet_K", one(Output::shell_outlet)},
          {"tube_side_outlet_K", one(Output::tube_outlet)}};
}

}  // namespace dutygauge::report
