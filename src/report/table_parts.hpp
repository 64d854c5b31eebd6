#pragma once
#include <nlohmann/json.hpp>
#include <string>

#include "dutygauge/report/explored.hpp"
#include "page.hpp"

/// Internal to report: what the pages and objects of varied cases share.
namespace dutygauge::report {

void heading(Page& page, const CaseName& about);
void table_closing(Page& page);

/// What every object of a varied case begins with.
nlohmann::ordered_json start_of(const CaseName& about);
nlohmann::ordered_json running_json(const Running& running);

/// SI as JSON has it: temperatures in degC.
double in_json(double si, units::Kind kind);

/// One line; throws std::logic_error on a number that is not finite.
std::string one_line(const nlohmann::ordered_json& json);

}  // namespace dutygauge::report
