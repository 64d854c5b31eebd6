#pragma once
#include <cstdint>
#include <optional>
#include <span>
#include <vector>

#include "dutygauge/field/plant.hpp"

/// Which channel is at fault where the two duties part.
namespace dutygauge::field {

/// How an instrument shows wrong, by what its error does to the closure.
enum class FaultKind : std::uint8_t {
  bias,  ///< of a temperature: goes as 1/change of that stream
  gain,  ///< of a flow: the same at every flow
  zero,  ///< of a flow: goes as 1/flow
};

/// One channel wrong from a day on: at once, or more and more.
struct Fault {
  Channel channel = Channel::hot_flow;
  FaultKind kind = FaultKind::gain;
  bool drifts = false;
  double since = 0;                 ///< [d] since the first reading
  double magnitude = 0;             ///< bias [K], gain [-], zero [kg/s]; of a drift for 365 days
  double standard_uncertainty = 0;  ///< of the magnitude
};

/// What an instrument with the fault would have shown without it.
double truth_of(const Fault& fault, double reading, double day);

/// One channel held to be at fault, and what speaks against it: the closure's course, the
/// fouling's, and the drop of a flow's own side, each as a chi-square above the best.
struct Suspect {
  Fault fault;
  double against_closure = 0;  ///< the closure does not change as this fault would have it
  double against_fouling = 0;  ///< with the channel left out the fouling still steps there
  double against_drop = 0;     ///< drop/flow^1.8 does not change as this fault would have it
  double fouling_step = 0;     ///< that is left with the channel left out [m2.K/W]
  double chi_square() const { return against_closure + against_fouling + against_drop; }
};

/// All six flows and temperatures as suspects, the best first.
struct Accusation {
  double since = 0;  ///< [d]
  bool drifts = false;
  double closure_change = 0;  ///< at the step, or in 365 days of a drift [-]
  double standard_error = 0;  ///< of it
  std::vector<Suspect> suspects;
  std::size_t inseparable = 0;     ///< the first so many cannot be told apart; 1: that channel is named
  bool fouling_steps_too = false;  ///< whichever is left out: the fouling then accuses nobody
};

/// Who is at fault for a step of the closure near a day. Each channel in turn is left out and
/// inferred from the balance; under the right one the fouling goes on as before. The day is
/// refined within 5 days. Empty where the closure does not step there by more than 0.01 and
/// 4 standard errors, or fewer than 6 days lie on a side.
std::optional<Accusation> accuse_step(const Plant& plant, const Instruments& instruments, const Days& days,
                                      double near);

/// Who is at fault for a drift of the closure over the record, faults already known taken off
/// by their magnitudes. A drift of the fouling cannot accuse, as nobody knows the deposit's:
/// what parts the channels is the closure's course at changing loads and, for flow meters,
/// the drop of their side, less what goes with the deposit. Empty where no drift shows: less
/// than 0.01 over the record, or 4 standard errors.
std::optional<Accusation> accuse_drift(const Plant& plant, const Instruments& instruments, const Days& days,
                                       std::span<const Fault> known);

/// Everything that is at fault in a record, by date: a step of the closure near each of the
/// days given, in the order of time, then a drift beside the steps' best suspects. The first
/// suspect of each, `faults_of`, is what `without_faults` would take.
std::vector<Accusation> accuse(const Plant& plant, const Instruments& instruments, const Days& days,
                               std::span<const double> closure_steps);
std::vector<Fault> faults_of(std::span<const Accusation> accusations);

/// A reading on a day with its faulty channels left out, for the balance to infer. Where that
/// would leave two missing, a fault is taken off the reading by its magnitude instead, the
/// later ones of the list first.
Channels without_faults(const Channels& reading, double day, std::span<const Fault> faults);

/// The same of daily medians, with what they then say. Days that say nothing are dropped.
Days without_faults(const Plant& plant, const Instruments& instruments, const Days& days,
                    std::span<const Fault> faults);

}  // namespace dutygauge::field
