#pragma once
#include <functional>
#include <iosfwd>
#include <map>
#include <optional>
#include <span>
#include <stdexcept>
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/units.hpp"

/// What every command is made of: its options, its help and the call that reaches it.
namespace dutygauge::cli {

/// A call that cannot be followed: what is wrong, what was expected, what to do.
struct CallError : std::runtime_error {
  using std::runtime_error::runtime_error;
};

/// A result that could not be written.
struct WriteError : std::runtime_error {
  using std::runtime_error::runtime_error;
};

/// One option. Flags have no `value`.
struct Option {
  std::string_view name;    ///< without the dashes
  std::string_view letter;  ///< one letter, or empty
  std::string_view value;   ///< what stands for its value in the help, or empty
  std::string_view help;
  bool repeats = false;  ///< may be given more than once
};

/// A command as typed, its options checked against its table.
struct Call {
  std::map<std::string, std::string, std::less<>> options;                ///< flags with an empty text
  std::map<std::string, std::vector<std::string>, std::less<>> repeated;  ///< of options that repeat
  std::vector<std::string> arguments;                                     ///< everything else, in order

  bool has(std::string_view option) const { return options.contains(option); }
  std::optional<std::string> value(std::string_view option) const;
  /// All values of an option that repeats, in order.
  std::vector<std::string> all(std::string_view option) const;
};

struct Streams {
  std::ostream& out;
  std::ostream& err;
};

struct Command {
  std::string_view name;
  std::string_view purpose;                    ///< one line
  std::string_view usage;                      ///< what follows the name
  std::span<const std::string_view> examples;  ///< two whole lines
  std::span<const Option> options;             ///< --help goes without saying
  std::string_view remarks;                    ///< wrapped below the options; may be empty
  int (*run)(const Call& call, Streams streams);
};

/// All commands, in the order in which the help names them.
std::span<const Command> commands();

/// Reads the words behind a command's name. Throws CallError.
Call parse(const Command& command, const std::vector<std::string>& words);

std::string program_help();
std::string command_help(const Command& command);
std::string short_usage();
std::string version();

/// The known word that a misspelling most likely means; empty if none is near.
std::string_view nearest(std::string_view typed, std::span<const std::string_view> known);

/// " (did you mean 'X'?)" or nothing.
std::string did_you_mean(std::string_view typed, std::span<const std::string_view> known);

/// Words wrapped at the page's width behind `lead`; the following lines are indented by its width.
std::string wrapped(std::string_view lead, std::string_view text);

/// The system of units asked for with --units. Throws CallError.
std::optional<units::System> units_asked_for(const Call& call);

/// How many at a time, by --jobs; 1 without. Throws CallError.
std::size_t jobs_asked_for(const Call& call);

/// Refuses, before any work is done, a target of --out or --csv that exists without --force. Throws
/// CallError.
void check_target(const Call& call);

/// Writes a result to where --out says, else to `out`. Throws WriteError.
void deliver(const Call& call, const std::string& result, std::ostream& out);

/// The same for the option that names the file.
void deliver_to(std::string_view option, const Call& call, const std::string& result, std::ostream& out);

inline constexpr Option out_option = {"out", "o", "FILE", "write the result to FILE; - is standard output"};
inline constexpr Option force_option = {"force", "", "", "let --out replace a file that exists"};

int run_rate(const Call& call, Streams streams);
int run_sweep(const Call& call, Streams streams);
int run_reach(const Call& call, Streams streams);
int run_compare(const Call& call, Streams streams);
int run_explain(const Call& call, Streams streams);
int run_new(const Call& call, Streams streams);
int run_schema(const Call& call, Streams streams);
int run_fluid(const Call& call, Streams streams);
int run_ntu(const Call& call, Streams streams);
int run_field(const Call& call, Streams streams);

}  // namespace dutygauge::cli
