#pragma once
#include <string>

#include "dutygauge/case_io.hpp"
#include "dutygauge/explore.hpp"

/// Internal to explore: a case file changed, and one point of it rated.
namespace dutygauge::explore {

/// One point: judged, or why it cannot be.
struct Point {
  std::optional<service::Assessment> assessment;  ///< with an outcome
  bool unsettled = false;  ///< the calculation did not settle: nothing is known of this point
  std::string stopper;     ///< else what stands in the way: "tube_side.fluid_range", or a key of the file
  std::string why;         ///< a sentence
};
Point rated(const case_io::Document& document);
/// The same with dials turned to values.
Point rated(const case_io::Document& document, const std::vector<std::pair<Dial, double>>& turns);

/// The same where a value of the file may be another one, of the sheet's own case too.
Point read_as(const case_io::Document& document, const Dial& dial, double value);

report::Running running(const service::Assessment& assessment);
report::CaseName name_of(const case_io::Case& a_case);

/// The line of the service with the least room; null without a service. Needs an outcome.
const service::Demand* tightest(const service::Assessment& assessment);

/// A lever: the case with it pulled.
struct Pull {
  std::string what;
  std::string key;  ///< of the input that is changed; empty for several
  case_io::Document document;
};
/// All that can be pulled on a case.
std::vector<Pull> pulls(const case_io::Document& document);

}  // namespace dutygauge::explore
