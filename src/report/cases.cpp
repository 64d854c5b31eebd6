#include <fmt/core.h>

#include <algorithm>
#include <cctype>
#include <functional>

#include "sections.hpp"
#include "words.hpp"

// Several operating cases on one page: what each comes to, a row a case and state.

namespace dutygauge::report {
namespace {

using service::Assessment;
using service::Quantity;
using units::Kind;

constexpr std::size_t longest_case = 10, longest_stream = 9;

std::string spoken(std::string name) {
  std::ranges::replace(name, '_', ' ');
  return ascii(name);
}

std::string capitalised(std::string text) {
  if (!text.empty()) text.front() = static_cast<char>(std::toupper(static_cast<unsigned char>(text.front())));
  return text;
}

bool is_too_unsure(const RatedCase& one) {
  const auto& confidence = one.design_fouling.service.confidence;
  return confidence && one.spread && one.spread->probability.value_or(1.0) < *confidence;
}

std::string answer_today(const RatedCase& one, bool fouled) {
  const bool today = *one.today->assessment.verdict.met;
  if (today && fouled) return "yes, today and at design fouling";
  if (today) return "yes as it is today, no at design fouling";
  return fouled ? "no as it is today, yes at design fouling" : "no, neither today nor at design fouling";
}

std::string answer_of(const RatedCase& one) {
  if (!one.design_fouling.rating.outcome) return "no result";
  if (!one.design_fouling.verdict.met) return "no service is stated";
  const bool fouled = *one.design_fouling.verdict.met;
  if (one.today && one.today->assessment.verdict.met) return answer_today(one, fouled);
  const bool clean = one.clean.verdict.met.value_or(false);
  if (fouled && is_too_unsure(one)) return "not sure enough for a yes";
  if (fouled) return clean ? "yes" : "yes at design fouling, no clean";
  return clean ? "yes clean, no at design fouling" : "no, not even clean";
}

// The verdict's sentence without its first word, which the answer has given.
std::string reason(const Assessment& assessment) {
  const std::string& text = assessment.verdict.text;
  const auto colon = text.find(": ");
  return colon == std::string::npos ? text : text.substr(colon + 2);
}

const service::Demand* same_line(const Assessment& assessment, const service::Demand& demand) {
  const auto& all = assessment.service.demands;
  const auto found = std::ranges::find_if(all, [&](const service::Demand& other) {
    return other.quantity == demand.quantity && other.at_least == demand.at_least;
  });
  return found == all.end() ? nullptr : &*found;
}

double to_limit(const service::Demand& demand, const rating::Outcome& outcome) {
  const double value = service::actual(demand, outcome);
  return demand.at_least ? value - demand.limit : demand.limit - value;
}

// The outlet whose room is smallest where it matters most, in the governing case.
const service::Demand* tightest_outlet(const Assessment& assessment) {
  const service::Demand* tightest = nullptr;
  for (const auto& demand : assessment.service.demands) {
    if (demand.quantity == Quantity::duty) continue;
    const auto room = [&](const service::Demand& d) { return to_limit(d, *assessment.rating.outcome); };
    if (tightest == nullptr || room(demand) < room(*tightest)) tightest = &demand;
  }
  return tightest;
}

// Three lines of heading and a cell for each case and state.
struct Column {
  std::string first, second, unit, limit;
  std::function<std::string(const Assessment&)> cell;
};

// A limit that differs between cases has no place in the heading.
template <class Limit>
std::string limit_of_all(const Result& result, std::string_view sign, Limit limit) {
  std::string common;
  for (const auto& one : result.cases) {
    const auto text = limit(one.design_fouling);
    if (text.empty() || (!common.empty() && text != common)) return "varies";
    common = text;
  }
  return fmt::format("{} {}", sign, common);
}

void add_outlet(const Result& result, const Figures& figures, std::vector<Column>& columns) {
  const auto* found = tightest_outlet(result.assessment);
  if (found == nullptr) return;
  const service::Demand line = *found;
  const Side side = line.quantity == Quantity::shell_side_outlet ? Side::shell : Side::tube;
  const auto limit = limit_of_all(result, line.at_least ? ">=" : "<=", [&](const Assessment& assessment) {
    const auto* same = same_line(assessment, line);
    return same == nullptr ? std::string() : figures.number(same->limit, Kind::temperature);
  });
  columns.push_back({clipped(stream_name(result.assessment.problem, side), longest_stream), "outlet",
                     figures.unit(Kind::temperature), limit, [=](const Assessment& assessment) {
                       return figures.number(service::actual(line, *assessment.rating.outcome),
                                             Kind::temperature);
                     }});
  columns.push_back(
      {"", "room", figures.unit(Kind::temperature_difference), ">= 0", [=](const Assessment& assessment) {
         const auto* same = same_line(assessment, line);
         if (same == nullptr) return std::string("-");
         const auto text = figures.difference(to_limit(*same, *assessment.rating.outcome));
         return text.substr(0, text.find(' '));
       }});
}

void add_duty(const Result& result, const Figures& figures, std::vector<Column>& columns) {
  columns.push_back({"", "duty", figures.unit(Kind::power), "", [=](const Assessment& assessment) {
                       return figures.number(assessment.rating.outcome->duty, Kind::power);
                     }});
  if (!result.assessment.margins.required_duty) return;
  const auto per_cent = [](const std::optional<double>& fraction) {
    return fraction ? fmt::format("{:+.1f}", 100.0 * *fraction) : std::string("-");
  };
  columns.push_back({"duty", "margin", "%", ">= 0",
                     [=](const Assessment& assessment) { return per_cent(assessment.margins.duty); }});
  columns.push_back({"surface", "margin", "%", ">= 0",
                     [=](const Assessment& assessment) { return per_cent(assessment.margins.surface); }});
}

void add_drop(const Result& result, const Figures& figures, Side side, std::vector<Column>& columns) {
  constexpr auto kind = Kind::pressure_difference;
  const auto allowable = [side](const Assessment& assessment) {
    const auto& service = assessment.service;
    return side == Side::shell ? service.shell_side_allowable_drop : service.tube_side_allowable_drop;
  };
  if (!allowable(result.assessment)) return;
  const auto limit = limit_of_all(result, "<=", [&](const Assessment& assessment) {
    const auto allowed = allowable(assessment);
    return allowed ? figures.number(*allowed, kind, 3) : std::string();
  });
  columns.push_back({side == Side::shell ? "shell" : "tube", "drop", figures.unit(kind), limit,
                     [=](const Assessment& assessment) {
                       const auto& outcome = *assessment.rating.outcome;
                       return figures.number(
                           (side == Side::shell ? outcome.shell_drop.total() : outcome.tube_drop.total()),
                           kind, 3);
                     }});
}

// The word for the whole row: a line missed, a pressure drop over, little left, or ok.
std::string word_of(const Assessment& assessment) {
  const auto& service = assessment.service;
  const auto& outcome = *assessment.rating.outcome;
  if (!assessment.verdict.met.value_or(true)) return "missed";
  const auto over = [](double drop, const std::optional<double>& allowed) {
    return allowed && drop > *allowed;
  };
  if (over(outcome.shell_drop.total(), service.shell_side_allowable_drop) ||
      over(outcome.tube_drop.total(), service.tube_side_allowable_drop))
    return "over";
  if (!assessment.verdict.met) return "";
  return std::string(limit_word(std::max(0.0, assessment.margins.duty.value_or(1.0)), ""));
}

std::string probability_of(const std::optional<uncertainty::Result>& spread) {
  return spread && spread->probability ? uncertainty::in_words(*spread->probability) : "-";
}

/// An assessment with what is known of its spread.
struct State {
  const char* name;
  const Assessment& assessment;
  const std::optional<uncertainty::Result>& spread;
};

std::vector<std::string> row_of(const std::string& name, const State& state,
                                const std::vector<Column>& columns) {
  const auto& [state_name, assessment, spread] = state;
  std::vector<std::string> row = {name, state_name};
  for (const auto& column : columns) row.push_back(assessment.rating.outcome ? column.cell(assessment) : "-");
  row.push_back(probability_of(spread));
  row.push_back(assessment.rating.outcome ? word_of(assessment) : "none");
  return row;
}

}  // namespace

void answer_of_cases(Page& page, const Result& result) {
  std::vector<std::pair<std::string, std::vector<std::string>>> groups;  // what is answered, of which cases
  for (const auto& one : result.cases) {
    const auto answer = answer_of(one);
    auto found = std::ranges::find(groups, answer, &decltype(groups)::value_type::first);
    if (found == groups.end()) found = groups.insert(groups.end(), {answer, {}});
    found->second.push_back(spoken(one.name));
  }
  std::string text;
  for (const auto& [answer, names] : groups)
    text += result.cases.size() == 1 ? capitalised(answer) + ". "
                                     : fmt::format("{}: {}. ", capitalised(listed(names)), answer);
  page.section("ANSWER", text);
  const auto& governing = result.cases[result.governing];
  const std::string which =
      result.cases.size() == 1 ? "At design fouling" : "The worst is " + spoken(governing.name);
  page.section("", fmt::format("{}: {}", which,
                               governing.design_fouling.rating.outcome
                                   ? reason(governing.design_fouling)
                                   : governing.design_fouling.rating.no_result + "."));
}

namespace {

using Rows = std::vector<std::vector<std::string>>;

Rows rows_of(const Result& result, const std::vector<Column>& columns) {
  Rows rows = {{"HOW MUCH", ""}, {"running free", ""}, {"", ""}, {"", "limit:"}};
  for (const auto& column : columns) {
    const std::string* lines[] = {&column.first, &column.second, &column.unit, &column.limit};
    for (std::size_t i = 0; i < rows.size(); ++i) rows[i].push_back(*lines[i]);
  }
  const char* const heading[] = {"proba-", "bility", "", ""};
  for (std::size_t i = 0; i < rows.size(); ++i) rows[i].insert(rows[i].end(), {heading[i], ""});
  for (const auto& one : result.cases) {
    const State other = one.today ? State{"today", one.today->assessment, one.today->spread}
                                  : State{"clean", one.clean, one.spread_clean};
    rows.push_back(row_of("  " + clipped(spoken(one.name), longest_case), other, columns));
    rows.push_back(row_of("", {"design fouling", one.design_fouling, one.spread}, columns));
  }
  return rows;
}

/// Characters a table takes with two blanks between its columns.
std::size_t width_of(const Rows& rows) {
  std::size_t sum = 0;
  for (std::size_t column = 0; column < rows.front().size(); ++column) {
    std::size_t widest = 0;
    for (const auto& row : rows) widest = std::max(widest, row[column].size());
    sum += widest + 2;
  }
  return sum - 2;
}

}  // namespace

void how_much_of_cases(Page& page, const Result& result) {
  const Figures figures(result.display);
  std::vector<Column> columns;
  add_outlet(result, figures, columns);
  add_duty(result, figures, columns);
  for (const Side side : {Side::shell, Side::tube}) add_drop(result, figures, side, columns);
  Rows rows = rows_of(result, columns);
  // Long names and units take the room of the duty itself; its margin stays.
  if (width_of(rows) > page_width) {
    std::erase_if(columns, [](const Column& column) { return column.second == "duty"; });
    rows = rows_of(result, columns);
  }
  std::vector<Align> alignment(columns.size() + 3, Align::right);
  alignment[0] = alignment[1] = Align::left;
  alignment.push_back(Align::left);
  page.table(rows, alignment, 0);
}

}  // namespace dutygauge::report
