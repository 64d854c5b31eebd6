#include <fmt/format.h>

#include <cmath>
#include <nlohmann/json.hpp>
#include <ostream>

#include "command.hpp"
#include "dutygauge/arrangement.hpp"
#include "dutygauge/cli.hpp"
#include "dutygauge/report.hpp"

namespace dutygauge::cli {
namespace {

using arrangement::Arrangement;
using Json = nlohmann::ordered_json;

constexpr int most_passes = 32, most_shells = 100;

/// One of two words, or nothing where the option is left out.
std::optional<bool> is_first(const Call& call, std::string_view option, std::string_view first,
                             std::string_view second) {
  const auto typed = call.value(option);
  if (!typed) return {};
  if (*typed == first) return true;
  if (*typed == second) return false;
  throw CallError(
      fmt::format("--{}: '{}' is not known here; expected {} or {}", option, *typed, first, second));
}

int whole(const Call& call, std::string_view option, int most) {
  const auto typed = call.value(option);
  if (!typed) return 1;
  const auto number = units::number(*typed);
  if (!number || *number < 1.0 || *number > most || *number != std::floor(*number))
    throw CallError(
        fmt::format("--{}: '{}' is not a whole number from 1 to {}; correct it", option, *typed, most));
  return static_cast<int>(*number);
}

/// A plain number from zero upwards.
std::optional<double> amount(const Call& call, std::string_view option) {
  const auto typed = call.value(option);
  if (!typed) return {};
  constexpr double most = 1e6;  // beyond, nothing is told apart any more
  const auto number = units::number(*typed);
  if (!number || !(*number >= 0.0) || *number > most)
    throw CallError(
        fmt::format("--{}: '{}' is not a number from 0 to {:g}; correct it", option, *typed, most));
  return number;
}

char shell_type(const Call& call) {
  const auto typed = call.value("arrangement");
  if (!typed) throw CallError("ntu needs --arrangement: the TEMA letter of the shell, E, F, G, H, J, K or X");
  if (typed->size() != 1)
    throw CallError(fmt::format(
        "--arrangement: '{}' is not one letter; expected the TEMA letter of the shell, E, F, G, H, J, K or X",
        *typed));
  return typed->front();
}

/// The option behind a key of the objections.
std::string_view option_of(std::string_view key, const Call& call) {
  if (key == "exchanger.tubes.passes") return "passes";
  if (key == "exchanger.shells.in_series") return "shells";
  if (key == "exchanger.flow_direction") return call.has("cross") ? "cross" : "flow-direction";
  return call.has("mixing") ? "mixing" : "arrangement";
}

void refuse_unused(const Call& call, const Arrangement& a) {
  const bool two_ways = a.shell_type == 'X' && a.tube_passes > 1;
  if (call.has("cross") && !two_ways)
    throw CallError(
        "--cross says in what order the streams of an X shell with several passes meet; leave it out here");
  if (call.has("flow-direction") && a.shell_type == 'X')
    throw CallError("--flow-direction is for E shells with one tube pass; an X shell takes --cross");
  const bool has_first = a.shell_type != 'X' && a.shell_type != 'K' && a.tube_passes > 1;
  if (call.has("first-tube-pass") && !has_first)
    throw CallError(
        "--first-tube-pass needs a shell of type E, F, G, H or J with several passes; leave it out");
}

Arrangement arrangement_of(const Call& call) {
  Arrangement a;
  a.shell_type = shell_type(call);
  a.tube_passes = whole(call, "passes", most_passes);
  a.shells_in_series = whole(call, "shells", most_shells);
  const bool counter = is_first(call, "flow-direction", "counter", "parallel")
                           .value_or(is_first(call, "cross", "counter", "parallel").value_or(true));
  a.flow = counter ? arrangement::Flow::counter : arrangement::Flow::parallel;
  if (!is_first(call, "first-tube-pass", "against_shell_flow", "with_shell_flow").value_or(true))
    a.first_tube_pass = arrangement::FirstTubePass::with_shell_flow;
  if (const auto mixed = is_first(call, "mixing", "shell_mixed", "unmixed"))
    a.mixing = *mixed ? arrangement::Mixing::shell_stream : arrangement::Mixing::nowhere;
  const auto objections = arrangement::objections(a);
  if (!objections.empty()) {
    const Objection& one = objections.front();
    throw CallError(fmt::format("--{}: {}; expected {}", option_of(one.key, call), one.what, one.expected));
  }
  refuse_unused(call, a);
  return a;
}

/// What was asked and what came of it; without `solved` there is no surface that does it.
struct Answer {
  double r;
  std::optional<double> p_asked;
  std::optional<arrangement::Solved> solved;
  double p_max;
  Findings findings;
};

Answer answer_of(const Call& call, const Arrangement& a) {
  const auto r = amount(call, "r"), ntu = amount(call, "ntu"), p = amount(call, "p");
  if (!r) throw CallError("ntu needs --r: the capacity ratio C_tube/C_shell");
  if (ntu.has_value() == p.has_value())
    throw CallError(ntu ? "--ntu and --p are both given; give one of them, the other is the answer"
                        : "ntu needs --ntu or --p; the other is the answer");
  const auto solved = ntu ? arrangement::solve_for_p(a, *r, *ntu) : arrangement::solve_for_ntu(a, *r, *p);
  const double p_max = solved.value ? solved.value->p_max : arrangement::largest_effectiveness(a, *r);
  return {*r, p, solved.value, p_max, solved.findings};
}

Json json_of(const Answer& answer) {
  const auto or_null = [](const std::optional<double>& value) {
    return value && std::isfinite(*value) ? Json(*value) : Json(nullptr);
  };
  Json json{{"p", or_null(answer.solved ? answer.solved->p : answer.p_asked)},
            {"f", or_null(answer.solved ? answer.solved->f : std::nullopt)},
            {"ntu", or_null(answer.solved ? std::optional(answer.solved->ntu) : std::nullopt)},
            {"p_max", answer.p_max}};
  for (const Finding& one : answer.findings)
    json["findings"].push_back({{"id", one.id},
                                {"severity", report::word(one.severity)},
                                {"text", report::sentence(one, units::System::metric)}});
  return json;
}

std::string page_of(const Answer& answer, const Arrangement& a) {
  std::string text = fmt::format(
      "{} shell{}, {} tube pass{} each; all on the tube side: R = C_tube/C_shell, NTU = UA/C_tube\n\n",
      a.shells_in_series == 1 ? fmt::format("{}", a.shell_type)
                              : fmt::format("{} {}", a.shells_in_series, a.shell_type),
      a.shells_in_series == 1 ? "" : "s in series", a.tube_passes, a.tube_passes == 1 ? "" : "es");
  text += fmt::format("  R      {:.6g}\n", answer.r);
  if (answer.solved) {
    const arrangement::Solved& s = *answer.solved;
    text += fmt::format("  P      {:.6g}\n  NTU    {:.6g}\n  F      {}\n", s.p, s.ntu,
                        s.f ? fmt::format("{:.6g}", *s.f) : "not defined");
    text += fmt::format(
        "  P max  {:.6g}, {}\n", s.p_max,
        std::isfinite(s.ntu_at_max) ? fmt::format("at NTU {:.6g}", s.ntu_at_max) : "with endless surface");
  } else
    text += fmt::format("  P      {:.6g} is not reached\n  P max  {:.6g}\n", answer.p_asked.value_or(0.0),
                        answer.p_max);
  for (const Finding& one : answer.findings)
    text += "\n" + wrapped("", report::sentence(one, units::System::metric));
  return text;
}

}  // namespace

int run_ntu(const Call& call, Streams streams) {
  if (!call.arguments.empty())
    throw CallError(fmt::format("'{}' is one word too many; ntu takes options only", call.arguments.front()));
  const Arrangement a = arrangement_of(call);
  const Answer answer = answer_of(call, a);
  deliver(call, call.has("json") ? json_of(answer).dump() + "\n" : page_of(answer, a), streams.out);
  return answer.solved ? done : not_met;
}

}  // namespace dutygauge::cli
