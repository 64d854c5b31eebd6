#pragma once
#include <string>
#include <string_view>

#include "dutygauge/report/field.hpp"

/// Internal to report: the trend as a drawing.
namespace dutygauge::report {

/// Text for an element or an attribute of HTML, whatever is in it.
std::string escaped(std::string_view text);

/// The trend as an SVG that needs no script: range and median of each day, the law, what is
/// allowed, events by their numbers.
std::string trend_svg(const CaseName& about, const field::FieldResult& result);

/// The same for the script, as JSON that may stand in HTML.
std::string trend_data(const CaseName& about, const field::FieldResult& result);

/// Draws `trend_data` into the element "trend" and lets it be zoomed; no network, no library.
extern const std::string_view trend_script;

}  // namespace dutygauge::report
