#include <fmt/format.h>

#include <algorithm>
#include <nlohmann/json.hpp>

#include "command.hpp"
#include "dutygauge/case_io.hpp"
#include "dutygauge/case_io/keys.hpp"
#include "dutygauge/cli.hpp"
#include "dutygauge/report/finding_help.hpp"
#include "dutygauge/sources.hpp"

namespace dutygauge::cli {
namespace {

using Json = nlohmann::ordered_json;
using report::FindingHelp;

std::string page_of(const FindingHelp& finding) {
  std::string text = fmt::format("{}\n", finding.id) + wrapped("  ", finding.meaning);
  const auto part = [&text](std::string_view lead, std::string_view what) {
    if (!what.empty()) text += wrapped(fmt::format("  {:<9}", lead), what);
  };
  part("when:", finding.criterion);
  part("matters:", finding.matters);
  part("do:", finding.remedy);
  part("source:", sources::citation(finding.source));
  return text;
}

Json json_of(const FindingHelp& finding) {
  return {{"id", finding.id},
          {"meaning", finding.meaning},
          {"criterion", finding.criterion},
          {"matters", finding.matters},
          {"remedy", finding.remedy},
          {"source", sources::citation(finding.source)}};
}

/// Names of the keys directly below a block.
std::vector<std::string> below(std::string_view block) {
  std::vector<std::string> names;
  const std::string start = std::string(block) + ".";
  for (const std::string& key : case_io::all_keys()) {
    if (!key.starts_with(start)) continue;
    std::string name = key.substr(start.size());
    if (name.starts_with("#.")) name.erase(0, 2);
    if (name != "#" && name.find('.') == std::string::npos) names.push_back(std::move(name));
  }
  return names;
}

std::string page_of(const case_io::FieldHelp& key) {
  std::string page =
      fmt::format("{}\n  {}\n  kind: {}\n  expected: {}\n", key.key, key.help, key.kind, key.expected);
  if (const auto names = below(key.key); !names.empty())
    page += wrapped("  keys: ", fmt::format("{}", fmt::join(names, ", ")));
  return page;
}

Json json_of(const case_io::FieldHelp& key) {
  return {{"key", key.key}, {"kind", key.kind}, {"expected", key.expected}, {"help", key.help}};
}

/// Ids of findings, then keys, whose last part was asked for.
std::vector<std::string> names_ending_in(std::string_view end) {
  std::vector<std::string> names;
  for (const FindingHelp& finding : report::all_finding_help())
    if (finding.id.ends_with("." + std::string(end))) names.emplace_back(finding.id);
  const auto keys = case_io::keys_ending_in(end);
  names.insert(names.end(), keys.begin(), keys.end());
  return names;
}

/// Full names and last parts: a misspelling may be of either.
CallError unknown(std::string_view asked) {
  std::vector<std::string> names = case_io::all_keys();
  for (const FindingHelp& finding : report::all_finding_help()) names.emplace_back(finding.id);
  std::vector<std::string_view> known(names.begin(), names.end());
  for (const std::string& name : names)
    known.push_back(std::string_view(name).substr(name.find_last_of('.') + 1));
  return CallError(
      fmt::format("no finding and no key of a case file is called '{}'{}; 'dutygauge new' shows the keys",
                  asked, did_you_mean(asked, known)));
}

void deliver_either(const Call& call, const std::string& page, const Json& json, std::ostream& out) {
  deliver(call, call.has("json") ? json.dump() + "\n" : page, out);
}

void deliver_list(const Call& call, const std::vector<std::string>& names, std::ostream& out) {
  std::string page = fmt::format("'{}' is the end of:\n", call.arguments.front());
  for (const std::string& name : names) page += fmt::format("  {}\n", name);
  deliver_either(call, page, Json{{"names", names}}, out);
}

}  // namespace

int run_explain(const Call& call, Streams streams) {
  if (call.arguments.size() != 1)
    throw CallError(
        "explain takes the id of one finding or one key of the case file, such as exchanger.baffles.cut");
  const std::string& asked = call.arguments.front();
  auto key = case_io::explain(asked);
  const FindingHelp* finding = report::find_finding_help(asked);
  const bool by_end = !finding && (!key || key->key.size() > asked.size());
  if (const auto names = by_end ? names_ending_in(asked) : std::vector<std::string>(); names.size() > 1) {
    deliver_list(call, names, streams.out);
    return done;
  } else if (names.size() == 1) {
    finding = report::find_finding_help(names.front());
    key = case_io::explain(names.front());
  }
  if (finding)
    deliver_either(call, page_of(*finding), json_of(*finding), streams.out);
  else if (key)
    deliver_either(call, page_of(*key), json_of(*key), streams.out);
  else
    throw unknown(asked);
  return done;
}

}  // namespace dutygauge::cli
