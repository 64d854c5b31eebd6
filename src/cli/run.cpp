#include <fmt/core.h>
#include <fmt/ostream.h>

#include <algorithm>
#include <exception>
#include <ostream>

#include "command.hpp"
#include "dutygauge/case_io.hpp"
#include "dutygauge/cli.hpp"

namespace dutygauge::cli {
namespace {

constexpr std::string_view own_options[] = {"--help", "--version"};

const Command& command_named(const std::string& name) {
  if (name.starts_with("-"))
    throw CallError(
        fmt::format("unknown option '{}'{}; the options of a command stand behind it; see "
                    "'dutygauge --help'",
                    name, did_you_mean(name, own_options)));
  const auto all = commands();
  const auto found = std::ranges::find(all, name, &Command::name);
  if (found != all.end()) return *found;
  std::vector<std::string_view> names;
  for (const auto& command : all) names.push_back(command.name);
  throw CallError(
      fmt::format("unknown command '{}'{}; see 'dutygauge --help'", name, did_you_mean(name, names)));
}

int dispatch(const std::vector<std::string>& arguments, Streams streams) {
  const std::string& first = arguments.front();
  if (first == "--help" || first == "-h") {
    streams.out << program_help();
    return done;
  }
  if (first == "--version") {
    streams.out << version();
    return done;
  }
  const Command& command = command_named(first);
  const Call call = parse(command, {arguments.begin() + 1, arguments.end()});
  if (call.has("help")) {
    streams.out << command_help(command);
    return done;
  }
  check_target(call);
  return command.run(call, streams);
}

// Every exception of the program ends here.
int guarded(const std::vector<std::string>& arguments, Streams streams) {
  try {
    return dispatch(arguments, streams);
  } catch (const CallError& error) {
    fmt::print(streams.err, "dutygauge: error: {}\n", error.what());
    return input_at_fault;
  } catch (const case_io::InputError& error) {
    for (const auto& line : error.lines()) streams.err << line << '\n';
    return input_at_fault;
  } catch (const WriteError& error) {
    fmt::print(streams.err, "dutygauge: error: {}\n", error.what());
    return cannot_write;
  } catch (const std::exception& error) {
    fmt::print(streams.err, "a bug in dutygauge: {}\n", error.what());
    return bug;
  }
}

}  // namespace

int run(const std::vector<std::string>& arguments, std::ostream& out, std::ostream& err) {
  if (arguments.empty()) {
    err << short_usage();
    return input_at_fault;
  }
  const int status = guarded(arguments, {out, err});
  out.flush();
  if (out) return status;
  err << "dutygauge: error: cannot write to standard output\n";
  return cannot_write;
}

}  // namespace dutygauge::cli
