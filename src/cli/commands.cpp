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

constexpr std::string_view fluid_examples[] = {
    "dutygauge fluid water --at 'temperature=300 K, pressure=1 bara'",
    "dutygauge fluid '{oil: {iso_vg: 46}}' --at 'temperature=20..80 degC, pressure=4 bara' --steps 7"};
constexpr Option fluid_options[] = {
    {"at", "", "STATE", "'temperature=..., pressure=...' with units; one of them may be a range a..b"},
    {"steps", "", "N", "rows of a range; without it, 7"},
    {"list", "", "", "name all built-in fluids with their ranges and sources"},
    {"json", "", "", "one JSON object, in SI; a range: {\"rows\": [...]}"},
    {"csv", "", "", "a line of names, then one line a state, in SI and degC"},
    {"units", "", "SYSTEM", "units of the page: si, metric or us"},
    out_option,
    force_option};

constexpr std::string_view ntu_examples[] = {
    "dutygauge ntu --arrangement E --passes 2 --r 0.8 --ntu 1.3            what P and F at this NTU?",
    "dutygauge ntu --arrangement E --passes 2 --shells 2 --r 1 --p 0.7     what NTU for this P?"};
constexpr Option ntu_options[] = {
    {"arrangement", "", "LETTER", "TEMA letter of the shell: E, F, G, H, J, K or X"},
    {"passes", "", "N", "tube passes of one shell; without it, 1"},
    {"shells", "", "N", "shells in series; without it, 1"},
    {"r", "", "R", "capacity ratio C_tube/C_shell"},
    {"ntu", "", "NTU", "UA/C_tube of all shells; P and F are the answer"},
    {"p", "", "P", "temperature effectiveness of the tube side; NTU and F are the answer"},
    {"flow-direction", "", "WORD", "counter or parallel: E shells with one tube pass"},
    {"first-tube-pass", "", "WORD", "against_shell_flow or with_shell_flow"},
    {"mixing", "", "WORD", "shell_mixed or unmixed: X; shell_mixed: H"},
    {"cross", "", "WORD", "counter or parallel: X shells with several passes"},
    {"json", "", "", "one JSON object: p, f, ntu, p_max"},
    out_option,
    force_option};

constexpr Option result_options[] = {out_option, force_option};

constexpr Command table[] = {
    {"rate", "rate exchangers and judge them against their service", "[OPTION]... CASE...", rate_examples,
     rate_options,
     "CASE is a case file, a folder (all its *.yaml, by name) or - for standard input. A case at fault does "
     "not stop the others. Scripts should read --json: the page is for people and may change.",
     run_rate},
    {"fluid", "show a fluid's properties", "[OPTION]... SPEC", fluid_examples, fluid_options,
     "SPEC is what stands under 'fluid:' in a case, in YAML flow style; in quotes where it holds blanks. "
     "JSON "
     "holds density_kg_m3, heat_capacity_J_kgK, conductivity_W_mK, viscosity_Pa_s, enthalpy_J_kg and "
     "prandtl, "
     "and findings where there are any; the rows of a range have their temperature_degC and pressure_Pa "
     "before them. Enthalpies have a zero of their own in each fluid: only differences mean anything.",
     run_fluid},
    {"ntu", "relate P, F and NTU of a flow arrangement", "[OPTION]...", ntu_examples, ntu_options,
     "P = (t_out - t_in)/(T_in - t_in), R and NTU are all referred to the tube side. A P that no surface "
     "reaches is answered with the limit and status 1.",
     run_ntu},
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
