#include "command.hpp"

namespace dutygauge::cli {
namespace {

constexpr std::string_view rate_examples[] = {
    "dutygauge rate cooler.yaml                   does it do the duty, and by how much?",
    "dutygauge rate --json --out all.jsonl cases  every case of a folder, one line each"};
constexpr Option rate_options[] = {
    {"json", "", "", "one JSON object a case, on a line of its own, in SI"},
    {"units", "", "SYSTEM", "units of the page: si, metric or us; without it, what the case says"},
    {"strict", "", "", "take no assumption: a case that needs one is at fault"},
    {"jobs", "", "N", "rate N cases at a time; the result is the same for any N"},
    out_option,
    force_option,
    {"verbose", "v", "", "all findings and assumptions, with sources; what was done, on stderr"},
    {"quiet", "q", "", "no notes on stderr, errors only"}};

constexpr std::string_view explain_examples[] = {
    "dutygauge explain exchanger.baffles.cut            what a key of the case file means",
    "dutygauge explain streams.shell_side.fouling       and how it may be written"};

constexpr std::string_view new_examples[] = {
    "dutygauge new > cooler.yaml         a case to start from, with every key explained",
    "dutygauge new | dutygauge rate -    it rates as it stands"};

constexpr std::string_view schema_examples[] = {
    "dutygauge schema > case.schema.json     for an editor that checks YAML while you type",
    "dutygauge schema --out case.schema.json"};

constexpr Option result_options[] = {out_option, force_option};

constexpr Command table[] = {
    {"rate", "rate exchangers and judge them against their service", "[OPTION]... CASE...", rate_examples,
     rate_options,
     "CASE is a case file, a folder (all its *.yaml, by name) or - for standard input. A case at fault does "
     "not stop the others. Scripts should read --json: the page is for people and may change.",
     run_rate},
    {"explain", "say what a key of the case file means", "KEY", explain_examples, result_options, "",
     run_explain},
    {"new", "print a commented case to start from", "[OPTION]...", new_examples, result_options, "", run_new},
    {"schema", "print the JSON Schema of a case file", "[OPTION]...", schema_examples, result_options, "",
     run_schema}};

}  // namespace

std::span<const Command> commands() {
  return table;
}

}  // namespace dutygauge::cli
