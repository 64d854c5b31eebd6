#pragma once
#include "dutygauge/service.hpp"

/// Internal to service: the steps of `assess`.
namespace dutygauge::service {

/// Duty and temperature margins alone.
Margins running_margins(const rating::Problem& problem, const Service& service,
                        const rating::Outcome& outcome, Findings& findings);

/// All margins.
Margins margins_of(const rating::Problem& problem, const Service& service, const rating::Outcome& outcome,
                   Findings& findings);

Verdict verdict_of(const Service& service, const rating::Problem& problem, const rating::Rating& rating,
                   const Margins& margins);

}  // namespace dutygauge::service
