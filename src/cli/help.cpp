#include <fmt/core.h>

#include <algorithm>

#include "command.hpp"

namespace dutygauge::cli {
namespace {

constexpr std::string_view statuses =
    "Exit status:\n"
    "  0   done, and the service (if stated) is met\n"
    "  1   done, but the service is not met or a must finding stands\n"
    "  2   the call or an input is at fault\n"
    "  3   the calculation could not be completed\n"
    "  4   a result could not be written\n"
    "  70  a bug in dutygauge\n"
    "  130 interrupted\n";

constexpr std::string_view example_calls[] = {
    "dutygauge new > cooler.yaml     a commented case to start from",
    "dutygauge rate cooler.yaml      does it do the duty, by how much, and what limits it?"};

constexpr std::size_t width = 100;

std::string option_line(const Option& option) {
  const std::string letter = option.letter.empty() ? "    " : fmt::format("-{}, ", option.letter);
  const std::string value = option.value.empty() ? "" : fmt::format(" {}", option.value);
  return fmt::format("  {}{:<16} {}\n", letter, fmt::format("--{}{}", option.name, value), option.help);
}

std::string examples_of(std::span<const std::string_view> examples) {
  std::string text = "Examples:\n";
  for (const auto& example : examples) text += fmt::format("  {}\n", example);
  return text;
}

}  // namespace

std::string wrapped(std::string_view lead, std::string_view text) {
  std::string lines, line(lead);
  while (!text.empty()) {
    const auto blank = text.find(' ');
    const auto next = text.substr(0, blank);
    text = blank == std::string_view::npos ? std::string_view{} : text.substr(blank + 1);
    if (line.size() > lead.size() && line.size() + 1 + next.size() > width) {
      lines += line + "\n";
      line = std::string(lead.size(), ' ');
    }
    if (line.size() > lead.size()) line += ' ';
    line += next;
  }
  return lines + line + "\n";
}

std::string short_usage() {
  std::string names;
  for (const auto& command : commands())
    names += fmt::format("{}{}", names.empty() ? "" : ", ", command.name);
  return fmt::format("usage: dutygauge COMMAND [OPTION]... [FILE]...\ncommands: {}\nsee 'dutygauge --help'\n",
                     names);
}

std::string program_help() {
  std::string text =
      "Rates a shell-and-tube heat exchanger: will it do this duty, by how much, and if not, why not?\n\n"
      "usage: dutygauge COMMAND [OPTION]... [FILE]...\n\n";
  text += examples_of(example_calls) + "\nCommands:\n";
  for (const auto& command : commands()) text += fmt::format("  {:<10} {}\n", command.name, command.purpose);
  text += "\nOptions:\n";
  text += option_line({"help", "h", "", "this text; 'dutygauge COMMAND --help' for one command"});
  text += option_line({"version", "", "", "name, version and build"});
  return text + "\n" + std::string(statuses);
}

std::string command_help(const Command& command) {
  std::string text = fmt::format("dutygauge {}: {}\n\nusage: dutygauge {} {}\n\n", command.name,
                                 command.purpose, command.name, command.usage);
  text += examples_of(command.examples) + "\nOptions:\n";
  for (const auto& option : command.options) text += option_line(option);
  text += option_line({"help", "h", "", "this text"});
  if (!command.remarks.empty()) text += "\n" + wrapped("", command.remarks);
  return text + "\n" + std::string(statuses);
}

}  // namespace dutygauge::cli
