#include <fmt/core.h>
#include <tbb/global_control.h>

#include <algorithm>

#include "command.hpp"
#include "dutygauge/cli.hpp"
#include "vary.hpp"

namespace dutygauge::cli {
namespace {

constexpr std::size_t most_points = 10'000;

std::vector<explore::Variation> variations(const Call& call, const case_io::Document& document) {
  if (call.all("vary").empty() || call.all("vary").size() > 2)
    throw CallError("sweep varies one or two inputs; give --vary KEY=FROM..TO:STEPS once or twice");
  std::vector<explore::Variation> all;
  std::size_t points = 1;
  for (const auto& typed : call.all("vary")) {
    all.push_back(variation("vary", document, typed));
    points *= all.back().values.size();
  }
  if (all.size() == 2 && all.front().dial.key == all.back().dial.key)
    throw CallError(fmt::format("--vary: {} is given twice; vary two different keys", all.front().dial.key));
  if (points > most_points)
    throw CallError(fmt::format(
        "--vary: {} points are too many; expected at most {} in all; take fewer steps", points, most_points));
  return all;
}

}  // namespace

int run_sweep(const Call& call, Streams streams) {
  const case_io::Document document = case_given(call, "sweep");
  const auto all = variations(call, document);
  const tbb::global_control limit(tbb::global_control::max_allowed_parallelism, jobs_asked_for(call));
  const report::Sweep sweep = explore::sweep(document, all);
  const bool csv_only = call.value("csv") == "-";
  if (call.has("csv")) deliver_to("csv", call, report::csv(sweep), streams.out);
  if (!csv_only)
    deliver(call, call.has("json") ? report::json(sweep) + "\n" : report::text(sweep), streams.out);
  const bool any = std::ranges::any_of(sweep.rows, [](const auto& row) { return row.running.has_value(); });
  return any ? done : no_result;
}

}  // namespace dutygauge::cli
