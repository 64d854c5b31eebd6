#include <algorithm>

#include "command.hpp"
#include "dutygauge/cli.hpp"
#include "dutygauge/explore.hpp"
#include "vary.hpp"

namespace dutygauge::cli {
namespace {

/// A case, or the recorded result of one.
struct Given {
  std::optional<case_io::Document> document;
  std::optional<report::Compared> recorded;
};

Given given(const std::string& path) {
  const std::string text = case_io::read_text(path);
  try {
    if (auto recorded = report::recorded(text)) return {{}, std::move(recorded)};
  } catch (const std::invalid_argument& error) {
    throw case_io::InputError(
        path, {{{}, "", error.what(), "a case, or what rate --json wrote of one file", "rate it again"}});
  }
  return {case_io::read_document(text, path), {}};
}

/// The case asked for; beside a recorded result the one that was recorded, where the file has it.
void take_operating_case(const Call& call, Given& one, const Given& other) {
  if (!one.document) return;
  const auto names = case_io::operating_cases(*one.document);
  const bool as_recorded = !call.value("case") && other.recorded &&
                           std::ranges::find(names, other.recorded->operating_case) != names.end();
  one.document = as_recorded ? case_io::overlaid(*one.document, other.recorded->operating_case)
                             : operating_case(call, *one.document);
}

}  // namespace

int run_compare(const Call& call, Streams streams) {
  if (call.arguments.size() != 2)
    throw CallError("compare takes two cases or results: compare A.yaml B.yaml");
  if (std::ranges::count(call.arguments, "-") > 1)
    throw CallError("standard input (-) can be read only once");
  Given a = given(call.arguments.front()), b = given(call.arguments.back());
  take_operating_case(call, a, b);
  take_operating_case(call, b, a);
  const auto side = [](const Given& one) {
    return one.recorded ? *one.recorded : explore::compared(*one.document);
  };
  report::Comparison comparison = a.document && b.document ? explore::compare(*a.document, *b.document)
                                                           : explore::compare(side(a), side(b));
  if (const auto display = units_asked_for(call)) comparison.before.about.display = *display;
  deliver(call, call.has("json") ? report::json(comparison) + "\n" : report::text(comparison), streams.out);
  return comparison.before.running && comparison.after.running ? done : no_result;
}

}  // namespace dutygauge::cli
