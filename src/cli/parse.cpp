#include <fmt/core.h>

#include <algorithm>
#include <boost/program_options.hpp>

#include "command.hpp"

namespace dutygauge::cli {
namespace {

namespace po = boost::program_options;

constexpr Option help_option = {"help", "h", "", "this text"};

std::string see_help(const Command& command) {
  return fmt::format("; see 'dutygauge {} --help'", command.name);
}

void describe(const Option& option, po::options_description& description) {
  std::string names(option.name);
  if (!option.letter.empty()) names += fmt::format(",{}", option.letter);
  if (option.value.empty())
    description.add_options()(names.c_str(), "");
  else
    description.add_options()(names.c_str(), po::value<std::string>(), "");
}

std::vector<std::string_view> spellings(const Command& command) {
  std::vector<std::string_view> names = {help_option.name};
  for (const auto& option : command.options) names.push_back(option.name);
  return names;
}

[[noreturn]] void refuse_unknown(const Command& command, std::string typed) {
  const std::string bare = typed.substr(std::min(typed.find_first_not_of('-'), typed.size()));
  const auto near = nearest(bare, spellings(command));
  const std::string hint = near.empty() ? "" : fmt::format(" (did you mean '--{}'?)", near);
  throw CallError(fmt::format("unknown option '{}'{}{}", typed, hint, see_help(command)));
}

bool repeats(const Command& command, std::string_view name) {
  const auto found = std::ranges::find(command.options, name, &Option::name);
  return found != command.options.end() && found->repeats;
}

po::parsed_options parsed(const Command& command, const std::vector<std::string>& words) {
  po::options_description description;
  describe(help_option, description);
  for (const auto& option : command.options) describe(option, description);
  const int style = po::command_line_style::unix_style & ~po::command_line_style::allow_guessing;
  try {
    return po::command_line_parser(words).options(description).style(style).run();
  } catch (const po::unknown_option& error) {
    refuse_unknown(command, error.get_option_name());
  } catch (const po::error& error) {
    throw CallError(error.what() + see_help(command));
  }
}

}  // namespace

std::optional<std::string> Call::value(std::string_view option) const {
  const auto found = options.find(option);
  return found == options.end() ? std::nullopt : std::optional(found->second);
}

std::vector<std::string> Call::all(std::string_view option) const {
  const auto found = repeated.find(option);
  return found == repeated.end() ? std::vector<std::string>{} : found->second;
}

// Options are read from the parser's own list: a case named like an option, or
// several words behind one option, cannot get in by way of its variables map.
Call parse(const Command& command, const std::vector<std::string>& words) {
  Call call;
  for (const auto& option : parsed(command, words).options) {
    if (option.string_key.empty()) {
      call.arguments.insert(call.arguments.end(), option.value.begin(), option.value.end());
      continue;
    }
    if (repeats(command, option.string_key)) {
      call.repeated[option.string_key].push_back(option.value.front());
      continue;
    }
    const bool added =
        call.options.emplace(option.string_key, option.value.empty() ? "" : option.value.front()).second;
    if (!added) throw CallError(fmt::format("option '--{}' is given twice; give it once", option.string_key));
  }
  return call;
}

std::size_t jobs_asked_for(const Call& call) {
  const auto typed = call.value("jobs");
  if (!typed) return 1;
  const auto number = units::number(*typed);
  if (!number || *number < 1.0 || *number > 1024.0 ||
      *number != static_cast<double>(static_cast<int>(*number)))
    throw CallError(
        fmt::format("--jobs: '{}' is not a number of jobs; expected a whole number from 1 to 1024", *typed));
  return static_cast<std::size_t>(*number);
}

std::optional<units::System> units_asked_for(const Call& call) {
  const auto typed = call.value("units");
  if (!typed) return {};
  if (*typed == "si") return units::System::si;
  if (*typed == "metric") return units::System::metric;
  if (*typed == "us") return units::System::us;
  throw CallError(fmt::format("--units: '{}' is no system of units; expected si, metric or us", *typed));
}

}  // namespace dutygauge::cli
