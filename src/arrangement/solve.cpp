#include <fmt/format.h>

#include <stdexcept>
#include <string>

#include "train.hpp"

/// The arrangement's answers as one asks for them by hand.
namespace dutygauge::arrangement {
namespace {

constexpr int most_shells_tried = 8;

/// What would reach P: more of the same shells, or another arrangement.
std::string cure(Arrangement arrangement, double r, double p) {
  const int now = arrangement.shells_in_series;
  arrangement.shells_order = Flow::counter;
  for (int shells = now; shells <= now + most_shells_tried; ++shells) {
    arrangement.shells_in_series = shells;
    if (arrangement.flow == Flow::counter && ntu_for(arrangement, r, p))
      return fmt::format(
          "{} such shells in series in counterflow would reach it with enough surface, "
          "and so would one tube pass in pure counterflow",
          shells);
  }
  return "an arrangement nearer to pure counterflow would reach it with enough surface";
}

Finding infeasible(const Arrangement& arrangement, double r, double p, double largest) {
  const double limit = r > 1.0 ? 1.0 / r : 1.0;
  const std::string why =
      p < limit
          ? fmt::format("this arrangement does not pass {{limit}} at any surface: {}",
                        cure(arrangement, r, p))
          : std::string{
                "{limit} is where one stream reaches the other's inlet temperature: no exchanger can do it. "
                "Only "
                "other flows or inlet temperatures change that; with measured temperatures, look for a wrong "
                "reading or flow"};
  return {.id = "arrangement.infeasible",
          .severity = Severity::must,
          .text = fmt::format("P of {{value}} is asked for at R = {:.4g} (tube side), but {}", r, why),
          .ground = Ground::arithmetic,
          .value = p,
          .limit = p < limit ? largest : limit,
          .source = "bowman_1940"};
}

Finding past_largest(double ntu, const Solved& solved) {
  return {.id = "arrangement.past_largest",
          .severity = Severity::should,
          .text = fmt::format(
              "NTU {{value}} lies beyond {{limit}}, where this arrangement does most, P = {:.4g}: more "
              "surface lowers the duty. Fewer tube passes or a flow nearer to counterflow would use it",
              solved.p_max),
          .ground = Ground::arithmetic,
          .value = ntu,
          .limit = solved.ntu_at_max};
}

Solved solved_at(const Arrangement& arrangement, double r, double ntu, double p) {
  return {.p = p,
          .f = lmtd_correction(arrangement, r, ntu),
          .ntu = ntu,
          .p_max = largest_effectiveness(arrangement, r),
          .ntu_at_max = ntu_at_largest(arrangement, r)};
}

}  // namespace

Checked<std::optional<Solved>> solve_for_p(const Arrangement& arrangement, double capacity_ratio,
                                           double ntu) {
  const Solved solved =
      solved_at(arrangement, capacity_ratio, ntu, effectiveness(arrangement, capacity_ratio, ntu));
  Findings findings;
  if (ntu > solved.ntu_at_max && solved.p < solved.p_max) findings.push_back(past_largest(ntu, solved));
  return {solved, findings, {}};
}

Checked<std::optional<Solved>> solve_for_ntu(const Arrangement& arrangement, double capacity_ratio,
                                             double temperature_effectiveness) {
  const double r = capacity_ratio, p = temperature_effectiveness;
  if (!(r >= 0.0 && p >= 0.0)) throw std::invalid_argument("arrangement: negative R or P");
  const auto ntu = ntu_for(arrangement, r, p);
  if (!ntu) return {{}, {infeasible(arrangement, r, p, largest_effectiveness(arrangement, r))}, {}};
  return {solved_at(arrangement, r, *ntu, p), {}, {}};
}

}  // namespace dutygauge::arrangement
