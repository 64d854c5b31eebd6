#include "parse.hpp"

#include <fmt/core.h>

#include <algorithm>
#include <optional>
#include <utility>

#include "kinds.hpp"

namespace dutygauge::units {
namespace {

constexpr std::size_t most_terms = 8;
constexpr auto npos = std::string_view::npos;

struct Word {
  std::string_view word, what, expected, remedy;
};

// Words that look like units but have more than one meaning, or none here.
constexpr Word refused[] = {
    {"ton", "\"ton\" may be 1000 kg, 2000 lb, 2240 lb or a ton of refrigeration", "one meaning was expected",
     "write t for 1000 kg, lb, or TR for refrigeration"},
    {"tons", "\"tons\" may be 1000 kg, 2000 lb, 2240 lb or tons of refrigeration", "one meaning was expected",
     "write t for 1000 kg, lb, or TR for refrigeration"},
    {"C", "\"C\" does not say whether it is a temperature or a difference", "degC or K was expected",
     "write degC for a temperature, K for a difference"},
    {"F", "\"F\" is not a unit here", "degF was expected", "write degF"},
    {"R", "\"R\" is not a unit here", "degR was expected", "write degR"},
    {"degK", "\"degK\" is not a unit", "K was expected", "write K"},
    {"M", "\"M\" is a thousand in one trade and a million in another", "one meaning was expected",
     "write klb or kBtu for thousands, MMBtu for millions"},
    {"MBtu", "\"MBtu\" may be a thousand or a million Btu", "one meaning was expected",
     "write kBtu for thousands, MMBtu for millions"},
    {"MBTU", "\"MBTU\" may be a thousand or a million Btu", "one meaning was expected",
     "write kBtu for thousands, MMBtu for millions"},
    {"Mlb", "\"Mlb\" may be a thousand or a million pounds", "one meaning was expected", "write klb or lb"},
    {"Mscfd", "\"Mscfd\" may be a thousand or a million cubic feet a day", "one meaning was expected",
     "write scfd or MMscfd"},
    {"to", "\"to\" is not a unit", "a range was expected to have two dots",
     "write for example \"10..14 in\""},
    {"at", "nothing stands behind \"at\"", "a temperature or \"inlet\" was expected",
     "complete it or leave \"at\" out"},
    {"BWG", "a gauge is only read for a tube wall", "a value with a unit was expected", "write a length"},
    {"NPS", "a pipe size is only read for a nozzle or a shell", "a value with a unit was expected",
     "write a length"},
    {"sch", "a pipe schedule belongs to a nominal size", "a value with a unit was expected",
     "write for example \"NPS 8 sch 40\" for a nozzle or a shell"},
    {"\"", "the inch mark is not a unit", "in was expected", "write in"},
    {"'", "the foot mark is not a unit", "ft was expected", "write ft"},
    {"@", "\"@\" is not a unit", "\"at\" was expected", "write for example \"62 m3/h at 60 degF\""},
};

bool is_separator(char c) {
  return std::string_view(" .*/()").find(c) != npos;
}

// A listed name, with or without an exponent: "m3", "ft^2".
std::optional<Term> known(std::string_view token) {
  if (const Unit* unit = find_unit(token)) return Term{unit, 1};
  if (token.size() < 2 || token.back() < '2' || token.back() > '4') return {};
  const int power = token.back() - '0';
  token.remove_suffix(1);
  if (token.back() == '^') token.remove_suffix(1);
  const Unit* unit = find_unit(token);
  // A unit with a zero point or without a dimension has no square.
  if (unit == nullptr || unit->use != Use::anywhere) return {};
  return Term{unit, power};
}

// "Btu/h.ft2.degF" for "Btu/hr-ft2-F".
std::string with_dots(std::string_view text) {
  std::string result, token;
  const auto flush = [&] {
    result += token == "F"    ? "degF"
              : token == "C"  ? "degC"
              : token == "R"  ? "degR"
              : token == "hr" ? "h"
                              : token;
    token.clear();
  };
  for (const char c : text) {
    if (c != '-' && !is_separator(c)) {
      token += c;
      continue;
    }
    flush();
    result += c == '-' ? '.' : c;
  }
  flush();
  return result;
}

std::string suggestion(std::string_view token, std::string_view text) {
  const auto near = nearest_unit(token);
  if (lower(near) == lower(token)) return std::string(near);
  if (token.size() > 2 && token.back() == 's' && known(token.substr(0, token.size() - 1)))
    return std::string(token.substr(0, token.size() - 1));
  // "W/mK" has lost a dot and "kgh" a slash more often than they are misspellings.
  const char lost = text.find('/') == npos ? '/' : '.';
  for (std::size_t cut = 1; cut < token.size(); ++cut)
    if (known(token.substr(0, cut)) && known(token.substr(cut)))
      return fmt::format("{}{}{}", token.substr(0, cut), lost, token.substr(cut));
  return std::string(near);
}

[[noreturn]] void refuse_unknown(std::string_view token, std::string_view text, Kind kind) {
  const auto* word = std::ranges::find(refused, token, &Word::word);
  if (word == std::end(refused))
    word = std::ranges::find_if(refused, [&](const Word& mark) {
      return std::string_view("\"'@").find(mark.word) != npos && token.find(mark.word) != npos;
    });
  if (word != std::end(refused))
    throw Refusal{{std::string(word->what), std::string(word->expected), std::string(word->remedy)}};
  if (token.find("^-") != npos)
    throw Refusal{{fmt::format("{} has a negative exponent", quoted(text)), expectation(kind),
                   "write a slash instead, for example \"W/m2.K\""}};
  if (token.find('-') != npos && token.front() != '-')
    throw Refusal{{fmt::format("{} has a dash between units", quoted(text)), expectation(kind),
                   fmt::format("write \"{}\"", with_dots(text))}};
  const std::string meant = suggestion(token, text);
  throw Refusal{{fmt::format("{} is not a known unit", quoted(token)), expectation(kind),
                 meant.empty() ? example_remedy(kind) : fmt::format("write \"{}\" if that is meant", meant)}};
}

// "bar(g)", "bar g" are "barg"; "deg C" is "degC".
std::string joined(std::string_view text) {
  std::string plain;
  for (std::size_t i = 0; i < text.size(); ++i) {
    const bool degree = text[i] == ' ' && plain.ends_with("deg") && i + 1 < text.size() &&
                        std::string_view("CFRK").find(text[i + 1]) != npos;
    if (!degree) plain += text[i];
  }
  for (const std::string_view datum : {"(g)", "(a)", " g", " a"}) {
    if (!plain.ends_with(datum)) continue;
    const std::string_view stem = trimmed(std::string_view(plain).substr(0, plain.size() - datum.size()));
    std::string whole = fmt::format("{}{}", stem, datum[1]);
    const Unit* unit = find_unit(whole);
    if (unit != nullptr && (unit->use == Use::absolute || unit->use == Use::gauge)) return whole;
  }
  return plain;
}

class Parser {
 public:
  Parser(std::string_view text, Kind kind) : text_(text), kind_(kind) { result_.text = text; }

  Expression run() {
    while (at_ < text_.size()) step();
    if (!complete_ || open_) incomplete();
    return std::move(result_);
  }

 private:
  void step() {
    const char c = text_[at_];
    if (!is_separator(c)) return token();
    ++at_;
    if (c == '.' || c == '*' || c == '/') {
      if (!complete_) incomplete();
      complete_ = false;
      divides_ = c == '/';
      if (divides_) ++result_.slashes;
    } else if (c == '(') {
      if (open_) incomplete();
      open_ = result_.parentheses = true;
      group_divides_ = divides_;
      complete_ = divides_ = false;
    } else if (c == ')') {
      if (!open_ || !complete_) incomplete();
      open_ = group_divides_ = false;
    }
  }

  void token() {
    std::size_t end = at_;
    while (end < text_.size() && !is_separator(text_[end])) ++end;
    const std::string_view word = text_.substr(at_, end - at_);
    auto term = known(word);
    if (!term) refuse_unknown(word, text_, kind_);
    if (divides_ != group_divides_) term->power = -term->power;
    term->behind_slash = result_.slashes > 0;
    result_.terms.push_back(*term);
    if (result_.terms.size() > most_terms)
      throw Refusal{
          {fmt::format("{} has too many parts", quoted(text_)), expectation(kind_), example_remedy(kind_)}};
    complete_ = true;
    divides_ = false;
    at_ = end;
  }

  [[noreturn]] void incomplete() const {
    throw Refusal{{fmt::format("the unit {} is not complete", quoted(text_)), expectation(kind_),
                   text_.back() == '.' ? "leave out the full stop" : example_remedy(kind_)}};
  }

  std::string_view text_;
  Kind kind_;
  Expression result_;
  std::size_t at_ = 0;
  bool complete_ = false;  ///< a unit stands last, so that an operator may follow
  bool divides_ = false;   ///< the next unit is divided by
  bool open_ = false;      ///< inside parentheses
  bool group_divides_ = false;
};

}  // namespace

bool Expression::is_mass_ratio() const {
  return terms.size() > 1 && std::ranges::all_of(terms, [](const Term& term) {
           return term.unit->dimension == Dimension{.mass = 1};
         });
}

Dimension Expression::dimension(bool below_line) const {
  Dimension result;
  for (const Term& term : terms)
    result.multiply(term.unit->dimension, below_line ? term.power_below_line() : term.power);
  return result;
}

Expression parse_expression(std::string_view text, Kind kind) {
  const std::string plain = joined(text);
  if (const Unit* whole = find_unit(plain)) return {.text = plain, .terms = {Term{whole, 1}}};
  return Parser(plain, kind).run();
}

}  // namespace dutygauge::units
