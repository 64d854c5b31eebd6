#pragma once
#include "dutygauge/arrangement.hpp"

/// A train of equal shells and one of them.
namespace dutygauge::arrangement::train {

/// Throws std::invalid_argument for what is not built and for a negative R. NaN passes.
void require(const Arrangement& arrangement, double r);

/// The same flow as the fewest and simplest shells: F as E shells, one-pass E as one.
/// `whole` shells of the result have the NTU of the train.
Arrangement simplest(const Arrangement& arrangement);

/// One of the trains that the tube stream passes in turn. All P and NTU of the unit and of one of
/// its N trains: P = 1 - (1 - P1)^N, NTU = N NTU1, at R1 = N R, since each train meets the shell
/// stream as it enters.
Arrangement one_train_of(const Arrangement& arrangement);
double in_turn(double one_train, int trains);
double one_in_turn(double p, int trains);

Arrangement one_shell_of(const Arrangement& arrangement);

/// P [-] of the train whose shells each have `one_shell`.
double effectiveness(const Arrangement& arrangement, double r, double one_shell);

/// The smallest P [-] of each shell that gives the train its own; may be out of reach,
/// and is NaN where no train gives it. Needs 0 <= p < min(1, 1/R).
double share_of(const Arrangement& arrangement, double r, double p);

}  // namespace dutygauge::arrangement::train
