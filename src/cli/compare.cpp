#include <algorithm>

#include "command.hpp"
#include "dutygauge/cli.hpp"
#include "dutygauge/explore.hpp"
#include "vary.hpp"

namespace dutygauge::cli {

int run_compare(const Call& call, Streams streams) {
  if (call.arguments.size() != 2) throw CallError("compare takes two cases: compare A.yaml B.yaml");
  if (std::ranges::count(call.arguments, "-") > 1)
    throw CallError("standard input (-) can be read only once");
  const auto a = operating_case(call, case_io::read_file(call.arguments.front()));
  const auto b = operating_case(call, case_io::read_file(call.arguments.back()));
  report::Comparison comparison = explore::compare(a, b);
  if (const auto display = units_asked_for(call)) comparison.a.display = *display;
  deliver(call, call.has("json") ? report::json(comparison) + "\n" : report::text(comparison), streams.out);
  return comparison.before && comparison.after ? done : no_result;
}

}  // namespace dutygauge::cli
