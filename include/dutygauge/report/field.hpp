#pragma once
#include <string>

#include "dutygauge/field.hpp"
#include "dutygauge/field/history.hpp"
#include "dutygauge/report/explored.hpp"

/// What the readings of a unit say, as a page, an object and a file for a browser.
namespace dutygauge::report {

/// The text page: at most 100 columns, ASCII. What is not known is absent.
/// With the record it says how that was understood, too.
std::string text(const CaseName& about, const field::FieldResult& result,
                 const field::History* record = nullptr);

/// One JSON object on one line; SI, dates ISO 8601. In `lost_on` null stands for "not at all", for
/// all three or for one of them.
/// With the record there is an object `record`: how it was understood.
std::string json(const CaseName& about, const field::FieldResult& result,
                 const field::History* record = nullptr);

/// One HTML file that needs nothing else: the page's facts, the trend, and its days as a table.
std::string html(const CaseName& about, const field::FieldResult& result);

}  // namespace dutygauge::report
