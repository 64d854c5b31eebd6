#include <fmt/core.h>
#include <tbb/global_control.h>
#include <tbb/parallel_for.h>
#include <unistd.h>

#include <algorithm>
#include <filesystem>
#include <ostream>

#include "command.hpp"
#include "dutygauge/case_io.hpp"
#include "dutygauge/cli.hpp"
#include "dutygauge/explore.hpp"
#include "dutygauge/report.hpp"
#include "log.hpp"

namespace dutygauge::cli {
namespace {

// What one case came to.
struct Rated {
  int status = done;
  std::string result;                 // page or JSON, with its line end
  std::vector<std::string> messages;  // errors, a line each
};

struct Wishes {
  bool json = false, strict = false, all = false;
  std::optional<units::System> display;
};

std::string base_name(const std::string& file) {
  return std::filesystem::path(file).filename().string();
}

std::vector<std::string> cases_of_folder(const std::string& folder) {
  std::error_code fault;
  std::vector<std::string> files;
  for (const auto& entry : std::filesystem::directory_iterator(folder, fault))
    if (entry.path().extension() == ".yaml" && !entry.is_directory()) files.push_back(entry.path().string());
  if (fault) throw CallError(fmt::format("cannot read the folder {}: {}", folder, fault.message()));
  if (files.empty())
    throw CallError(fmt::format("{} is a folder without a case; expected files *.yaml in it", folder));
  std::ranges::sort(files);
  return files;
}

std::vector<std::string> files_named(const std::vector<std::string>& arguments) {
  if (arguments.empty()) throw CallError("rate needs a case: a file, a folder or - for standard input");
  if (std::ranges::count(arguments, "-") > 1) throw CallError("standard input (-) can be read only once");
  std::vector<std::string> files;
  for (const auto& argument : arguments) {
    std::error_code ignored;
    if (!std::filesystem::is_directory(argument, ignored)) {
      files.push_back(argument);
      continue;
    }
    const auto found = cases_of_folder(argument);
    files.insert(files.end(), found.begin(), found.end());
  }
  return files;
}

// Under --strict every assumption is an error, with what the file would have to say.
std::vector<std::string> refusals(const report::Result& result, const std::string& file) {
  std::vector<std::string> lines;
  for (const auto& one : result.assumed)
    lines.push_back(fmt::format(
        "{}: error: {}: left open, and --strict takes no assumption; it would be {} ({}); write it down",
        file, one.key, one.word.empty() ? units::typed(one.value, one.kind) : one.word,
        report::reason(one, units::System::metric)));
  return lines;
}

int status_of(const report::Result& result) {
  if (!result.assessment.rating.outcome) return no_result;  // the governing case is the worst
  const bool broken =
      std::ranges::find(result.findings, Severity::must, &Finding::severity) != result.findings.end();
  const bool missed = std::ranges::any_of(result.cases, [](const report::RatedCase& one) {
    const bool today = !one.today || one.today->assessment.verdict.met.value_or(true);
    return !one.design_fouling.verdict.met.value_or(true) || !today;
  });
  return broken || missed ? not_met : done;
}

Rated without_result(int status, const std::string& file, std::vector<std::string> messages, bool json) {
  Rated rated{.status = status, .result = "", .messages = std::move(messages)};
  if (!json) return rated;
  // Results name files without their folder, so that they are the same from anywhere.
  std::vector<std::string> lines = rated.messages;
  for (auto& line : lines)
    if (line.starts_with(file)) line.replace(0, file.size(), base_name(file));
  rated.result = report::error_json(base_name(file), lines) + "\n";
  return rated;
}

Rated rate_case(const std::string& file, const Wishes& wishes) {
  const case_io::Document document = case_io::read_file(file);
  // --units is for the page: the words of a JSON result are the same whatever is asked for.
  const auto display = wishes.json ? std::optional(units::System::metric) : wishes.display;
  report::Result result = explore::rate(document, display);
  explore::weigh(case_io::overlaid(document, result.cases[result.governing].name), result);
  if (wishes.strict && !result.assumed.empty())
    return without_result(input_at_fault, file, refusals(result, file), wishes.json);
  return {.status = status_of(result),
          .result = wishes.json ? report::json(result) + "\n" : report::text(result, {.all = wishes.all}),
          .messages = {}};
}

// One case at fault, or one that uncovers a bug, does not stop the others.
Rated rate_file(const std::string& file, const Wishes& wishes) {
  try {
    return rate_case(file, wishes);
  } catch (const case_io::InputError& error) {
    return without_result(input_at_fault, file, error.lines(), wishes.json);
  } catch (const std::exception& error) {
    return without_result(bug, file, {fmt::format("{}: a bug in dutygauge: {}", file, error.what())},
                          wishes.json);
  }
}

std::vector<Rated> rate_all(const std::vector<std::string>& files, const Wishes& wishes, std::size_t jobs) {
  const tbb::global_control limit(tbb::global_control::max_allowed_parallelism, jobs);
  std::vector<Rated> all(files.size());
  tbb::parallel_for(std::size_t{0}, files.size(),
                    [&](std::size_t i) { all[i] = rate_file(files[i], wishes); });
  return all;
}

// One status for all: the gravest thing that a script must know of.
int status_of(const std::vector<Rated>& all) {
  const auto is = [](int status) { return [status](const Rated& rated) { return rated.status == status; }; };
  if (std::ranges::any_of(all, is(bug))) return bug;
  if (std::ranges::all_of(all, is(input_at_fault))) return input_at_fault;
  if (std::ranges::any_of(all, is(input_at_fault)) || std::ranges::any_of(all, is(no_result)))
    return no_result;
  return std::ranges::any_of(all, is(not_met)) ? not_met : done;
}

Detail detail_of(const Call& call) {
  if (call.has("quiet") && call.has("verbose"))
    throw CallError("--quiet and --verbose contradict each other; give one of them");
  return call.has("quiet") ? Detail::quiet : call.has("verbose") ? Detail::all : Detail::usual;
}

std::string joined(const std::vector<Rated>& all, bool json) {
  std::string text;
  for (const auto& rated : all) {
    if (!json && !text.empty() && !rated.result.empty()) text += "\n\n";
    text += rated.result;
  }
  return text;
}

}  // namespace

int run_rate(const Call& call, Streams streams) {
  const Log log(streams.err, detail_of(call));
  const Wishes wishes{.json = call.has("json"),
                      .strict = call.has("strict"),
                      .all = call.has("verbose"),
                      .display = units_asked_for(call)};
  const std::size_t at_a_time = jobs_asked_for(call);
  const auto files = files_named(call.arguments);
  if (std::ranges::find(files, "-") != files.end() && isatty(STDIN_FILENO) == 1)
    log.note("waiting for a case on standard input; end it with Ctrl-D");
  const auto all = rate_all(files, wishes, at_a_time);
  for (std::size_t i = 0; i < files.size(); ++i) {
    for (const auto& message : all[i].messages) streams.err << message << '\n';
    log.progress(fmt::format("{}: status {}", files[i], all[i].status));
  }
  // Without any result a file named by --out is left as it was.
  if (const auto text = joined(all, wishes.json); !text.empty()) deliver(call, text, streams.out);
  return status_of(all);
}

}  // namespace dutygauge::cli
