#include <fmt/core.h>
#include <tbb/global_control.h>

#include "command.hpp"
#include "dutygauge/cli.hpp"
#include "vary.hpp"

namespace dutygauge::cli {
namespace {

struct Pushed {
  explore::Dial dial;
  std::optional<explore::Variation> range;
};

/// "KEY", or "KEY=FROM..TO:STEPS" where the usual range does not serve.
Pushed pushed(const Call& call, const case_io::Document& document) {
  const auto typed = call.value("push");
  if (!typed)
    throw CallError("reach needs an input to push; give --push KEY, such as streams.shell_side.flow");
  const bool with_range = typed->find('=') != std::string::npos;
  Pushed result;
  if (with_range) result.range = variation("push", document, *typed);
  result.dial = with_range ? result.range->dial : dial_named("push", document, *typed);
  if (!result.dial.own)
    throw CallError(fmt::format("--push: {} is not in the case; write it there first", result.dial.key));
  if (!with_range && *result.dial.own == 0.0)
    throw CallError(
        fmt::format("--push: {} is 0 in the case, and no factor moves that; give its range as "
                    "KEY=FROM..TO:STEPS",
                    result.dial.key));
  return result;
}

}  // namespace

int run_reach(const Call& call, Streams streams) {
  const case_io::Document document = case_given(call, "reach");
  const Pushed push = pushed(call, document);
  std::optional<explore::Variation> over;
  if (const auto typed = call.value("over")) over = variation("over", document, *typed);
  if (over && over->dial.key == push.dial.key)
    throw CallError(fmt::format("--over: {} is the key that is pushed; name another", over->dial.key));
  const tbb::global_control limit(tbb::global_control::max_allowed_parallelism, jobs_asked_for(call));
  const report::Reach reach = explore::reach(document, push.dial, push.range, over);
  deliver(call, call.has("json") ? report::json(reach) + "\n" : report::text(reach), streams.out);
  return done;
}

}  // namespace dutygauge::cli
