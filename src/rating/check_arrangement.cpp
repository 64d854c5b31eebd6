#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "outcome.hpp"

namespace dutygauge::rating {
namespace {

using arrangement::Arrangement;

/// What a single shell of the train sees.
struct OneShell {
  Arrangement arrangement;
  double r, ntu, p, largest;
};

OneShell one_shell(const Unit& unit, const Outcome& outcome) {
  OneShell one{unit.arrangement, outcome.r_tube, outcome.ntu_tube, outcome.p_tube, 0};
  one.r *= one.arrangement.trains_in_turn;
  one.ntu /= one.arrangement.trains_in_turn;
  one.arrangement.trains_in_turn = 1;
  if (unit.arrangement.flow == arrangement::Flow::counter) {
    one.arrangement.shells_in_series = 1;
    one.ntu /= unit.arrangement.shells_in_series;
  }
  one.p = arrangement::effectiveness(one.arrangement, one.r, one.ntu);
  one.largest = arrangement::largest_effectiveness(one.arrangement, one.r);
  return one;
}

void check_correction(const Outcome& outcome, Findings& findings) {
  if (outcome.f_correction >= 0.8) return;
  const bool low = outcome.f_correction < 0.75;
  findings.push_back(
      {.id = "arrangement.f_low",
       .severity = Severity::should,
       .text = fmt::format(
           "the LMTD correction F is {{value}}, below {{limit}}: {}part of the surface works against "
           "a reversed temperature difference, and small changes of temperature or flow cost "
           "much duty. More shells in series would mend it",
           low ? "a good " : ""),
       .ground = Ground::judgement,
       .value = outcome.f_correction,
       .limit = low ? 0.75 : 0.8,
       .source = "common_practice"});
}

/// Ahmad, Linnhoff & Smith (1988): a shell should stay below 0.9 of the most it can reach.
void check_slope(const OneShell& one, Findings& findings) {
  constexpr double most_of_largest = 0.9;
  const double share = one.p / one.largest;
  if (share <= most_of_largest) return;
  // Counterflow has no limit short of the streams' own.
  if (one.arrangement.tube_passes == 1 && one.arrangement.shell_type == 'E') return;
  findings.push_back(
      {.id = "arrangement.near_limit",
       .severity = Severity::should,
       .text = "each shell works at {value} of the most its arrangement can reach with endless surface "
               "(keep below {limit}): the duty hardly follows the surface any more, and what fouling "
               "or cleaning does is hidden. Another shell in series would give it room",
       .ground = Ground::judgement,
       .value = share,
       .limit = most_of_largest,
       .source = "ahmad_1988"});
}

void check_past_largest(const Unit& unit, const OneShell& one, Findings& findings) {
  const double ntu_most = arrangement::ntu_at_largest(one.arrangement, one.r);
  if (!(one.ntu > ntu_most)) return;
  findings.push_back(
      {.id = "arrangement.past_largest",
       .severity = Severity::should,
       .text = fmt::format("NTU per shell is {{value}}, past {{limit}}, where this arrangement of {} tube "
                           "passes does most: more surface, or cleaning, lowers the duty. Fewer "
                           "passes or shells in series would use the surface",
                           unit.arrangement.tube_passes),
       .ground = Ground::method,
       .value = one.ntu,
       .limit = ntu_most,
       .source = "bowman_1940"});
}

void check_cross(const OneShell& one, Findings& findings) {
  const bool crosses = one.p * (1.0 + one.r) > 1.0 + 1e-9;
  const bool made_for_it = one.arrangement.tube_passes == 1 || one.arrangement.shell_type == 'F' ||
                           one.arrangement.shell_type == 'X' || one.arrangement.tube_passes % 2 == 1;
  if (!crosses || made_for_it) return;
  findings.push_back(
      {.id = "arrangement.temperature_cross",
       .severity = Severity::should,
       .text = "inside one shell the stream being heated leaves warmer than the one being cooled: P is "
               "{value} and the outlets meet at {limit}. With passes both ways part of the heat "
               "then flows back; two shells in series are the usual answer",
       .ground = Ground::method,
       .value = one.p,
       .limit = 1.0 / (1.0 + one.r),
       .source = "common_practice"});
}

constexpr double worth_saying = 0.01;

/// Heat that takes the short way through the longitudinal baffle of an F shell.
void check_longitudinal_baffle(const OneShell& one, Findings& findings) {
  if (one.arrangement.shell_type != 'F') return;
  constexpr double usual_conductance = 0.05;
  Arrangement leaky = one.arrangement;
  leaky.baffle_conductance = usual_conductance;
  const double loss = 1.0 - arrangement::effectiveness(leaky, one.r, one.ntu) / one.p;
  findings.push_back(
      {.id = "arrangement.longitudinal_baffle",
       .severity = loss > 0.05 ? Severity::should : Severity::note,
       .text =
           fmt::format("an F shell is rated with a tight, insulating longitudinal baffle. If it conducts or "
                       "leaks as much as {:.0f} % of the tubes' UA, {:.1f} % of the duty is lost; suspect it "
                       "first when the unit falls short in the field",
                       100.0 * usual_conductance, 100.0 * loss),
       .ground = Ground::method,
       .value = loss,
       .limit = usual_conductance});
}

/// Banks side by side never share the flows quite evenly.
void check_split(const Unit& unit, const Outcome& outcome, Findings& findings) {
  const int banks = unit.problem->exchanger.tube_banks();
  if (banks < 2) return;
  std::vector<arrangement::BankShare> shares(static_cast<std::size_t>(banks),
                                             {1.0 / banks, 1.0 / banks, 1.0 / banks});
  constexpr double uneven = 0.2;  // one bank takes a fifth more of the tube stream, another a fifth less
  shares.front().tube_flow *= 1.0 + uneven;
  shares.back().tube_flow *= 1.0 - uneven;
  const double p =
      arrangement::effectiveness_of_bank(unit.arrangement, shares, outcome.r_tube, outcome.ntu_tube);
  const double loss = 1.0 - p / outcome.p_tube;
  if (loss <= 0.5 * worth_saying) return;
  findings.push_back(
      {.id = "arrangement.uneven_split",
       .severity = Severity::note,
       .text = fmt::format(
           "the banks are rated with even flows. Were one to take {:.0f} % more of the tube-side "
           "flow and another as much less, {:.1f} % of the duty would be lost; compare the banks' "
           "outlet temperatures",
           100.0 * uneven, 100.0 * loss),
       .ground = Ground::method,
       .value = loss,
       .limit = uneven});
}

}  // namespace

void check_arrangement(const Unit& unit, const Outcome& outcome, Findings& findings) {
  const OneShell one = one_shell(unit, outcome);
  check_correction(outcome, findings);
  check_slope(one, findings);
  check_past_largest(unit, one, findings);
  check_cross(one, findings);
  check_longitudinal_baffle(one, findings);
  check_split(unit, outcome, findings);
}

/// The closed forms and the march take the shell stream as continuous: few baffles cost duty.
/// The answer takes a network of compartments, so it is asked for once a case.
void check_few_baffles(const Unit& unit, const Outcome& outcome, Findings& findings) {
  const OneShell one = one_shell(unit, outcome);
  const int baffles = unit.problem->exchanger.shell_side.baffles;
  if (one.arrangement.shell_type != 'E' || baffles < 1 || baffles > 10) return;
  const double p = arrangement::effectiveness_with_baffles(one.arrangement, one.r, one.ntu, baffles);
  const double loss = 1.0 - p / one.p;
  if (loss <= worth_saying) return;
  findings.push_back(
      {.id = "arrangement.few_baffles",
       .severity = Severity::should,
       .text = fmt::format("with {} baffle(s) the shell stream is not the continuous stream the calculation "
                           "assumes: about {:.1f} % of the duty is lost; "
                           "take it off the margin",
                           baffles, 100.0 * loss),
       .ground = Ground::method,
       .value = loss,
       .limit = worth_saying,
       .source = "gardner_1977"});
}

}  // namespace dutygauge::rating
