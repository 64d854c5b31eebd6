#pragma once
#include "dutygauge/report.hpp"
#include "page.hpp"

/// The sections of the text page, in the order in which they stand.
namespace dutygauge::report {

void heading(Page& page, const Result& result);
/// One line where the sheet contradicts itself; nothing otherwise.
void sheet_contradicts(Page& page, const Result& result);
/// Claims beside what was found: contradictions and questions; all of them with -v.
void claims(Page& page, const Result& result, const TextOptions& options);
void answer(Page& page, const Result& result);
/// The same where several operating cases are rated: a word for each, and a row a case and state.
void answer_of_cases(Page& page, const Result& result);
void how_much_of_cases(Page& page, const Result& result);
void how_much(Page& page, const Result& result);
void how_sure(Page& page, const Result& result);
/// How a control holds exactly the required duty; nothing without one.
void control(Page& page, const Result& result);
void what_limits(Page& page, const Result& result);
void levers(Page& page, const Result& result);
/// The assumptions by what they are worth; page one, where effects are known.
void weighed_assumptions(Page& page, const Result& result);
void assumed(Page& page, const Result& result, const TextOptions& options);
void rules(Page& page, const Result& result, const TextOptions& options);
void next_steps(Page& page, const Result& result);

/// What the spread of the result says, sentence by sentence; empty without one.
std::vector<std::string> spread_in_words(const Result& result);

/// What the reading says of the unit, and what changes from there; empty without an anchor.
std::vector<std::string> today_in_words(const Result& result);

/// Films, resistances, factors and parts of the pressure drops in words; the inputs; the sources.
void details(Page& page, const Result& result);

}  // namespace dutygauge::report
