#pragma once
#include "dutygauge/service.hpp"

/// Internal to service: the steps of `assess`.
namespace dutygauge::service {

/// How far a line is from its limit [K or W]; negative when it does not hold.
double distance(const Demand& demand, const rating::Outcome& outcome);

Margins margins_of(const rating::Problem& problem, const Service& service, const rating::Outcome& outcome,
                   Findings& findings);

Verdict verdict_of(const Service& service, const rating::Problem& problem, const rating::Rating& rating,
                   const Margins& margins);

}  // namespace dutygauge::service
