#include "field_words.hpp"

#include <fmt/core.h>

#include <algorithm>
#include <array>
#include <chrono>
#include <cmath>

#include "page.hpp"
#include "words.hpp"

namespace dutygauge::report {
namespace {

using field::Advice;
using field::FieldResult;
using units::Kind;

std::chrono::year_month_day date_of(std::int64_t start, double day) {
  const auto seconds = start + static_cast<std::int64_t>(std::floor(day * 86400.0));
  return std::chrono::floor<std::chrono::days>(std::chrono::sys_seconds(std::chrono::seconds(seconds)));
}

std::string probability(double p) {
  if (p < 0.01) return "< 0.01";
  return p > 0.99 ? "> 0.99" : fmt::format("{:.2f}", p);
}

std::string per_cent(double fraction) {
  return fmt::format("{:.1f} %", 100.0 * fraction);
}

std::string answer(const FieldResult& result) {
  const auto date = [&result](double day) { return spoken_date(result.start, day); };
  const auto& forecast = result.used().forecast;
  std::string text;
  if (forecast && forecast->lost_already)
    text = fmt::format("The service is lost since {}. ", date(*forecast->lost.middle));
  switch (result.advice) {
    case Advice::stop_now:
      return text + fmt::format("Clean now: {}.", result.why);
    case Advice::next_stop:
      text += result.plan.next_stop
                  ? fmt::format("Do not stop now. Clean at the stop of {}.", date(*result.plan.next_stop))
                  : "Do not stop now. Arrange a stop for cleaning.";
      if (forecast && forecast->lost.early && *forecast->lost.early > forecast->as_of)
        text += fmt::format(" Not later than {}.", date(*forecast->lost.early));
      return text;
    case Advice::not_needed:
      return text + fmt::format("No cleaning is needed: {}.", result.why);
    case Advice::settle_first:
      return text + fmt::format("Settle first: {}.", result.why);
  }
  return text;
}

std::string against(double level, const field::Allowed& allowed, units::System display) {
  return fmt::format("fouling {} of {} {} allowed: {}", resistance(level, display),
                     resistance(allowed.fouling, display), resistance_unit(display),
                     level < allowed.fouling ? "yes" : "no");
}

std::vector<std::string> duty(const CaseName& about, const FieldResult& result) {
  std::vector<std::string> parts;
  for (const field::Margin& margin : result.margins)
    parts.push_back(margin.margin >= 0.0
                        ? fmt::format("{}: yes, +{}", margin.where, per_cent(margin.margin))
                        : fmt::format("{}: no, short by {}", margin.where, per_cent(-margin.margin)));
  if (result.allowed && result.used().fouling)
    parts.push_back(against(result.used().fouling->now, *result.allowed, about.display));
  std::string line;
  for (const std::string& part : parts) line += part + ".   ";
  return line.empty() ? std::vector<std::string>{} : std::vector{line};
}

std::string rate_in_words(const field::FoulingNow& fouling, units::System display) {
  const auto& choice = fouling.choice;
  const auto& fit = choice.best();
  if (!choice.trend)
    return fmt::format("no trend found; anything above {} {} per month would have been seen",
                       resistance(30.4 * choice.detectable_rate, display), resistance_unit(display));
  std::string text =
      fmt::format("{}, now {} a day ({} to {})", name_of(fit.law.kind), resistance(fouling.rate, display),
                  resistance(fouling.rate_low, display), resistance(fouling.rate_high, display));
  if (fouling.asymptote_known)
    text += fmt::format("; ends at {} +-{}, time constant {:.0f} +-{:.0f} days",
                        resistance(fit.law.r0 + fit.law.rise, display),
                        resistance(fit.standard_error[1], display), fit.law.shape, fit.standard_error[2]);
  std::vector<std::string> rivals;
  for (std::size_t i = 0; i < choice.undecided; ++i)
    if (i != choice.chosen) rivals.emplace_back(name_of(choice.fits[i].law.kind));
  if (!rivals.empty()) text += fmt::format("; cannot be told from {}", listed(rivals));
  return text;
}

std::vector<std::string> dirt(const CaseName& about, const FieldResult& result) {
  if (!result.used().fouling) return {};
  const auto& fouling = *result.used().fouling;
  const auto display = about.display;
  std::string first =
      fmt::format("{} {} today (level +-{}; since {} {}{} +-{})", resistance(fouling.now, display),
                  resistance_unit(display), resistance(fouling.u95_level, display),
                  spoken_date(result.start, fouling.since), fouling.change >= 0.0 ? "+" : "",
                  resistance(fouling.change, display), resistance(fouling.u95_change, display));
  if (fouling.duty_lost)
    first += fmt::format(", {} lost", Figures(display).with_unit(*fouling.duty_lost, Kind::power, 3));
  return {first, rate_in_words(fouling, display)};
}

std::string band(const FieldResult& result, const field::LossDays& lost) {
  const auto date = [&result](const std::optional<double>& day) {
    return day ? spoken_date(result.start, *day) : std::string("never");
  };
  if (!lost.early) return "not lost, with 95 %, while things stay as they are";
  if (!lost.middle)
    return fmt::format("more likely never lost than lost; not before {}, with 95 %", date(lost.early));
  return fmt::format("lost {} ({} to {})", date(lost.middle), date(lost.early), date(lost.late));
}

std::vector<std::string> until(const FieldResult& result) {
  const auto& forecast = result.used().forecast;
  if (!forecast) return {};
  std::string first = band(result, forecast->lost);
  if (result.plan.next_stop && !forecast->lost_already)
    first += fmt::format("; before {}: {}", spoken_date(result.start, *result.plan.next_stop),
                         probability(forecast->lost_by(*result.plan.next_stop)));
  std::vector<std::string> lines = {first};
  if (forecast->beyond_record)
    lines.push_back(
        fmt::format("That is further ahead than the {:.0f} days it is read from.", forecast->record));
  return lines;
}

std::vector<std::string> instruments(const FieldResult& result) {
  std::vector<std::string> lines;
  if (result.closure.median)
    lines.push_back(fmt::format("heat balance off by {} (+-{}): {}",
                                signed_percent(std::round(1e3 * *result.closure.median) / 1e3 + 0.0),
                                per_cent(*result.closure.u95), result.closure.verdict));
  else
    lines.push_back("heat balance " + result.closure.verdict);
  for (const field::Doubt& suspect : result.suspects)
    lines.push_back(fmt::format("since {}: {}", spoken_date(result.start, suspect.since), suspect.text));
  return lines;
}

std::vector<std::string> causes(const FieldResult& result) {
  if (result.causes.empty()) return {};
  std::vector<std::string> words;
  for (const field::WeighedCause& cause : result.causes)
    if (cause.weight >= 0.01) words.push_back(fmt::format("{} {:.2f}", cause.name, cause.weight));
  std::string line;
  for (const std::string& word : words) line += (line.empty() ? "" : ", ") + word;
  std::vector<std::string> lines = {line};
  if (result.causes.front().weight <= 0.9) lines.emplace_back("No single cause above 0.9.");
  return lines;
}

std::vector<std::string> data(const FieldResult& result) {
  if (result.rows.dropped.empty()) return {};
  auto dropped = result.rows.dropped;
  std::ranges::stable_sort(dropped, std::ranges::greater{}, &std::pair<std::string, std::uint64_t>::second);
  std::string line = "not used: ";
  for (std::size_t i = 0; i < dropped.size(); ++i)
    line += fmt::format("{}{} {}", i == 0 ? "" : ", ", dropped[i].second, dropped[i].first);
  return {line};
}

bool reads_drops(const FieldResult& result) {
  const auto read = [](const field::Day& day) {
    return std::isfinite(day.value[field::index_of(field::Channel::tube_dp)]) &&
           std::isfinite(day.value[field::index_of(field::Channel::shell_dp)]);
  };
  return std::ranges::any_of(result.days, read);
}

void add(std::vector<Fact>& facts, std::string name, std::vector<std::string> lines) {
  if (!lines.empty()) facts.push_back({std::move(name), std::move(lines)});
}

}  // namespace

std::string iso_date(std::int64_t start, double day) {
  const auto date = date_of(start, day);
  return fmt::format("{:04d}-{:02d}-{:02d}", static_cast<int>(date.year()),
                     static_cast<unsigned>(date.month()), static_cast<unsigned>(date.day()));
}

std::string spoken_date(std::int64_t start, double day) {
  constexpr std::array<std::string_view, 12> months = {"January",   "February", "March",    "April",
                                                       "May",       "June",     "July",     "August",
                                                       "September", "October",  "November", "December"};
  const auto date = date_of(start, day);
  return fmt::format("{} {} {}", static_cast<unsigned>(date.day()),
                     months.at(static_cast<unsigned>(date.month()) - 1), static_cast<int>(date.year()));
}

std::string resistance_unit(units::System display) {
  return std::string(units::shown_unit(Kind::fouling_resistance, display));
}

std::string resistance(double si, units::System display) {
  const double shown = units::from_si(si, resistance_unit(display), Kind::fouling_resistance);
  const std::string text = fmt::format("{:.1e}", shown);
  const auto e = text.find('e');
  const int exponent = std::stoi(text.substr(e + 1));
  const std::string mantissa = text.substr(0, e);
  return shown == 0.0 ? "0" : exponent == 0 ? mantissa : fmt::format("{}e{}", mantissa, exponent);
}

std::vector<Fact> facts_of(const CaseName& about, const FieldResult& result) {
  std::vector<Fact> facts;
  add(facts, "ANSWER", {answer(result)});
  add(facts, "DOES IT STILL DO THE DUTY", duty(about, result));
  add(facts, "HOW DIRTY", dirt(about, result));
  add(facts, "UNTIL WHEN", until(result));
  add(facts, "INSTRUMENTS", instruments(result));
  add(facts, "WHAT IT IS", causes(result));
  add(facts, "EVENTS", events_in_words(about, result));
  add(facts, "DATA", data(result));
  return facts;
}

std::vector<std::string> events_in_words(const CaseName& about, const FieldResult& result) {
  std::vector<std::string> lines;
  for (const field::Event& event : result.events) {
    std::string line = fmt::format("{} {}", spoken_date(result.start, event.at), name_of(event.what));
    if (event.channel) line += fmt::format(", {}", field::name(*event.channel));
    if (event.fouling)
      line += fmt::format(", fouling {}{}", *event.fouling > 0.0 ? "+" : "",
                          resistance(*event.fouling, about.display));
    if (event.closure) line += fmt::format(", balance {}", signed_percent(*event.closure));
    if (event.logged) line += event.seen ? " (written down)" : " (written down, not seen)";
    lines.push_back(std::move(line));
  }
  return lines;
}

/// What to look at where most rows could not be used; empty elsewhere.
std::string most_dropped(const FieldResult& result) {
  const auto& dropped = result.rows.dropped;
  const auto most = std::ranges::max_element(dropped, {}, [](const auto& reason) { return reason.second; });
  if (most == dropped.end() || 2 * most->second < result.rows.read) return "";
  const std::string_view reason = most->first;
  const std::string look =
      reason == "backward"   ? "sort the file by time, the oldest row first"
      : reason == "off_line" ? "see that flows and inlets have their own columns and units: hot and cold are "
                               "by inlet temperature"
      : reason == "impossible"
          ? "see that no column is swapped and every unit is right: these readings cannot "
            "be of this unit"
      : reason == "incomplete" ? "a column that is needed is mostly empty"
                               : "look at the rows with --csv: the reason stands beside each";
  return fmt::format("{} of {} rows are {}: {}", most->second, result.rows.read, reason, look);
}

std::vector<std::string> next_of(const FieldResult& result) {
  std::vector<std::string> tasks;
  for (const field::Doubt& suspect : result.suspects) {
    std::vector<std::string> names;
    for (const field::Channel channel : suspect.channels) names.emplace_back(field::name(channel));
    if (!names.empty()) tasks.push_back(fmt::format("check {} against another instrument", listed(names)));
  }
  if (result.plan.stop_has_passed)
    tasks.emplace_back("state the next stop in plan: the one given lies before the last reading");
  if (const auto most = most_dropped(result); !most.empty()) tasks.push_back(most);
  const auto& closure = result.closure;
  if (!closure.median && !result.days.empty())
    tasks.emplace_back("read the missing flow for a day: it tests the heat balance");
  if (!result.causes.empty() && result.causes.front().weight <= 0.9)
    tasks.emplace_back(reads_drops(result)
                           ? "look inside at the next stop: the readings do not part the causes"
                           : "read both pressure drops: they part the causes");
  if (!result.allowed) tasks.emplace_back("state the service, for a date by which it is lost");
  const auto& forecast = result.used().forecast;
  if (!forecast || forecast->lost_already || result.days.empty()) return tasks;
  const double wait =
      forecast->lost.early ? std::clamp(0.5 * (*forecast->lost.early - forecast->as_of), 7.0, 90.0) : 90.0;
  tasks.push_back(fmt::format("rerun on {}", spoken_date(result.start, forecast->as_of + wait)));
  return tasks;
}

Rows hypotheses_table(const CaseName& about, const FieldResult& result) {
  if (result.outcomes.size() < 2) return {};
  Rows rows = {{"", "deposit today", "service lost", "advice"}};
  for (const field::Outcome& outcome : result.outcomes) {
    const bool used = &outcome == &result.outcomes.front();
    const auto& forecast = outcome.forecast;
    rows.push_back({fmt::format("if {}{}", outcome.name, used ? " (used above)" : ""),
                    outcome.fouling ? fmt::format("{} {}", resistance(outcome.fouling->now, about.display),
                                                  resistance_unit(about.display))
                                    : std::string("not known"),
                    !forecast               ? "not known"
                    : forecast->lost.middle ? spoken_date(result.start, *forecast->lost.middle)
                                            : "not at all",
                    plain_words(name_of(outcome.decision.advice))});
  }
  rows.push_back({result.same_either_way.value_or(false) ? "-> SAME" : "-> NOT THE SAME", "", "", ""});
  return rows;
}

Rows options_table(const FieldResult& result) {
  const auto& options = result.used().decision.options;
  if (options.empty()) return {};
  const bool money = options.front().bill.has_value();
  const double scale = 1e-3;
  Rows rows = {{"cleaning", "risk of losing the service"}};
  if (money)
    rows[0] = {"cleaning",
               "cleaning",
               "lost duty",
               "outage",
               "sum, k" + result.plan.economics->currency,
               "risk of losing the service"};
  for (const field::Option& option : options) {
    std::vector<std::string> row = {std::string(name_of(option.way))};
    if (option.way == field::Way::next_stop) row[0] += ", " + spoken_date(result.start, *option.at);
    if (option.bill)
      for (const double amount :
           {option.bill->cleaning, option.bill->lost_duty, option.bill->outage, option.bill->sum()})
        row.push_back(fmt::format("{:.1f}", scale * amount));
    row.push_back(probability(option.risk) + (option.recommended ? "   <- recommended" : ""));
    rows.push_back(std::move(row));
  }
  return rows;
}

}  // namespace dutygauge::report
