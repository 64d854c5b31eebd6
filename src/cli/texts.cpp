#include <fmt/core.h>

#include "command.hpp"
#include "dutygauge/case_io.hpp"
#include "dutygauge/cli.hpp"

namespace dutygauge::cli {
namespace {

void expect_no_argument(const Call& call) {
  if (!call.arguments.empty())
    throw CallError(
        fmt::format("'{}' is one word too many; this command takes none", call.arguments.front()));
}

}  // namespace

int run_new(const Call& call, Streams streams) {
  expect_no_argument(call);
  const std::string from = call.value("from").value_or("metric");
  if (from != "us" && from != "metric")
    throw CallError(fmt::format("--from: '{}' is no system of units; expected us or metric", from));
  deliver(call, case_io::starter_case(from == "us" ? units::System::us : units::System::metric), streams.out);
  return done;
}

int run_schema(const Call& call, Streams streams) {
  expect_no_argument(call);
  deliver(call, case_io::schema(), streams.out);
  return done;
}

}  // namespace dutygauge::cli
