#include <fmt/format.h>
#include <fmt/ostream.h>
#include <unistd.h>

#include <algorithm>
#include <csignal>
#include <filesystem>
#include <memory>
#include <ostream>

#include "command.hpp"
#include "dutygauge/case_io.hpp"
#include "dutygauge/cli.hpp"
#include "dutygauge/field/diagnosis.hpp"
#include "dutygauge/field/evidence.hpp"
#include "dutygauge/report/field.hpp"
#include "dutygauge/report/series.hpp"
#include "result_file.hpp"
#include "vary.hpp"

namespace dutygauge::cli {
namespace {

constexpr std::size_t flushed_at = 1 << 16;  ///< [B]
constexpr std::uint64_t megabyte = 1'000'000;

volatile std::sig_atomic_t stop_asked_for = 0;

/// While it lives an interrupt ends the reading between two blocks, so that files on their
/// way can be removed. A read that waits is woken.
class Interrupts {
 public:
  Interrupts() {
    stop_asked_for = 0;
    struct sigaction action {};
    action.sa_handler = [](int) { stop_asked_for = 1; };
    sigaction(SIGINT, &action, &interrupt_);
    sigaction(SIGTERM, &action, &terminate_);
  }
  ~Interrupts() {
    sigaction(SIGINT, &interrupt_, nullptr);
    sigaction(SIGTERM, &terminate_, nullptr);
  }
  Interrupts(const Interrupts&) = delete;
  Interrupts& operator=(const Interrupts&) = delete;

 private:
  struct sigaction interrupt_ {
  }, terminate_{};
};

/// Rows of the series to a file, or to standard output.
class SeriesWriter {
 public:
  SeriesWriter(const std::string& target, std::ostream& out)
      : file_(target == "-" ? nullptr : std::make_unique<ResultFile>(target)), out_(out) {
    text_ = report::series_header();
  }
  void write(const field::SeriesRow& row) {
    report::append_series_row(row, text_);
    if (text_.size() >= flushed_at) flush();
  }
  void commit() {
    flush();
    if (file_) file_->commit();
  }

 private:
  void flush() {
    if (file_)
      file_->write(text_);
    else
      out_ << text_;
    text_.clear();
  }

  std::unique_ptr<ResultFile> file_;
  std::ostream& out_;
  std::string text_;
};

/// How far the reading is, where a person looks on.
class ProgressLine {
 public:
  explicit ProgressLine(std::ostream& err) : err_(err), shown_(isatty(STDERR_FILENO) == 1) {}
  ~ProgressLine() {
    if (said_) err_ << "\r                    \r" << std::flush;
  }
  void say(std::uint64_t bytes) {
    if (!shown_ || bytes / megabyte == last_) return;
    last_ = bytes / megabyte;
    said_ = true;
    fmt::print(err_, "\r{} MB read", last_);
    err_.flush();
  }

 private:
  std::ostream& err_;
  bool shown_, said_ = false;
  std::uint64_t last_ = 0;
};

[[noreturn]] void refuse(const field::FileError& error) {
  const auto& text = error.text();
  throw case_io::InputError(
      error.file(),
      {{{static_cast<int>(error.line()), error.column()}, "", text.what, text.expected, text.remedy}});
}

void check_arguments(const Call& call) {
  if (call.arguments.size() < 2)
    throw CallError("field takes a case and its readings: field CASE.yaml READINGS.csv");
  if (std::ranges::count(call.arguments, "-") > 1)
    throw CallError("standard input (-) can be read only once");
  for (std::size_t i = 1; i < call.arguments.size(); ++i)
    if (call.arguments[i] == "-" && call.arguments.size() > 2)
      throw CallError("readings on standard input (-) stand alone; name one file, or none beside it");
}

field::History history_of(const Call& call, const case_io::Case& a_case, Streams streams) {
  const std::vector<std::string> files(call.arguments.begin() + 1, call.arguments.end());
  const Interrupts interrupts;
  ProgressLine progress(streams.err);
  std::optional<SeriesWriter> series;
  if (const auto target = call.value("csv")) series.emplace(*target, streams.out);
  field::Wishes wishes;
  wishes.keep_on = [&](std::uint64_t bytes) {
    progress.say(bytes);
    return stop_asked_for == 0;
  };
  if (series) wishes.row = [&](const field::SeriesRow& row) { series->write(row); };
  field::History history;
  try {
    history = field::history(a_case.problem, a_case.readings, files, wishes);
  } catch (const field::FileError& error) {
    refuse(error);
  }
  if (series) series->commit();
  return history;
}

field::Evidence evidence_of(const case_io::Case& a_case, const field::History& history) {
  field::Evidence evidence = field::evidence_of(a_case.problem, a_case.readings, history);
  const field::Plant plant(a_case.problem, history.calibration);
  field::diagnose(evidence, plant, a_case.readings.instruments);
  field::ask(evidence, plant, a_case.service, a_case.plan);
  return evidence;
}

int status_of(const field::FieldResult& result) {
  if (result.days.empty()) return no_result;
  const auto& forecast = result.used().forecast;
  return forecast && forecast->lost_already ? not_met : done;
}

report::CaseName name_of(const case_io::Case& a_case) {
  return {.file = std::filesystem::path(a_case.file).filename().string(),
          .title = a_case.title,
          .tag = a_case.tag,
          .input_sha256 = a_case.sha256,
          .display = a_case.display,
          .shell_side = a_case.problem.shell_side.name,
          .tube_side = a_case.problem.tube_side.name};
}

}  // namespace

int run_field(const Call& call, Streams streams) {
  check_arguments(call);
  case_io::Document document = case_io::read_file(call.arguments.front());
  case_io::build_all(document);  // a case at fault is said before what is wrong with the options
  case_io::Case a_case = case_io::build(operating_case(call, document));
  if (const auto display = units_asked_for(call)) a_case.display = *display;
  try {
    const field::History history = history_of(call, a_case, streams);
    if (call.value("csv") == "-") return history.days.empty() ? no_result : done;
    const auto result = field::analyse(evidence_of(a_case, history));
    const auto about = name_of(a_case);
    if (call.has("html")) deliver_to("html", call, report::html(about, result), streams.out);
    if (call.value("html") != "-")
      deliver(call,
              call.has("json") ? report::json(about, result, &history) + "\n"
                               : report::text(about, result, &history),
              streams.out);
    return status_of(result);
  } catch (const field::Interrupted&) {
    streams.err << "dutygauge: interrupted; nothing was written\n";
    return interrupted;
  }
}

}  // namespace dutygauge::cli
