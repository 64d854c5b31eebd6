#include "vary.hpp"

#include <fmt/core.h>

#include <algorithm>

namespace dutygauge::cli {
namespace {

/// What a key that the case does not have may have meant.
std::string hint(const case_io::Case& a_case, const std::string& key) {
  const auto help = case_io::explain(key);
  if (help && help->key != key) return fmt::format("; did you mean '{}'?", help->key);
  std::vector<std::string_view> known;
  for (const Input& input : a_case.inputs) known.push_back(input.key);
  return did_you_mean(key, known);
}

[[noreturn]] void refuse_key(std::string_view option, const case_io::Case& a_case, const std::string& key) {
  const auto help = case_io::explain(key);
  bool in_case = false;
  for (const Input& input : a_case.inputs) in_case = in_case || input.key == key;
  if (in_case || (help && help->key == key))
    throw CallError(fmt::format("--{}: {} is no number; expected a key whose value is a number with its unit",
                                option, key));
  throw CallError(fmt::format("--{}: no key '{}' in a case file{}", option, key, hint(a_case, key)));
}

}  // namespace

std::pair<std::string, std::string> key_and_range(std::string_view option, const std::string& typed) {
  const auto equals = typed.find('=');
  if (equals == std::string::npos || equals == 0 || equals + 1 == typed.size())
    throw CallError(
        fmt::format("--{}: '{}' is no KEY=FROM..TO:STEPS; expected such as "
                    "streams.tube_side.inlet.temperature=26..34 degC:9",
                    option, typed));
  return {typed.substr(0, equals), typed.substr(equals + 1)};
}

explore::Dial dial_named(std::string_view option, const case_io::Document& document, const std::string& key) {
  const auto found = explore::dial(document, key);
  if (!found) refuse_key(option, case_io::build(document), key);
  return *found;
}

explore::Variation variation(std::string_view option, const case_io::Document& document,
                             const std::string& typed) {
  const auto [key, range] = key_and_range(option, typed);
  const auto read = explore::read_variation(dial_named(option, document, key), range);
  if (const auto* wrong = std::get_if<units::Misread>(&read))
    throw CallError(fmt::format("--{}: {}: {}; expected {}; {}", option, key, wrong->what, wrong->expected,
                                wrong->remedy));
  return std::get<explore::Variation>(read);
}

case_io::Document operating_case(const Call& call, const case_io::Document& document) {
  const auto names = case_io::operating_cases(document);
  const std::string wanted = call.value("case").value_or(names.front());
  if (std::ranges::find(names, wanted) != names.end()) return case_io::overlaid(document, wanted);
  const std::vector<std::string_view> known(names.begin(), names.end());
  throw CallError(fmt::format("--case: {} has no operating case '{}'{}", document.file, wanted,
                              did_you_mean(wanted, known)));
}

case_io::Document case_given(const Call& call, std::string_view command) {
  if (call.arguments.size() != 1)
    throw CallError(fmt::format("{} takes one case: a file, or - for standard input", command));
  case_io::Document document = case_io::read_file(call.arguments.front());
  case_io::build_all(document);  // a case at fault is said before what is wrong with the options
  document = operating_case(call, document);
  if (const auto asked = call.value("units")) {
    units_asked_for(call);
    document.leaves["display"].text = *asked;
  }
  return document;
}

}  // namespace dutygauge::cli
