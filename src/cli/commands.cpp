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

constexpr Option units_option = {"units", "", "SYSTEM", "units of the page: si, metric or us"};
constexpr Option one_json_option = {"json", "", "", "one JSON object, in SI"};
constexpr Option case_option = {"case", "", "NAME", "which operating case; without it, the first"};
constexpr Option points_at_a_time = {"jobs", "", "N",
                                     "rate N points at a time; the result is the same for any N"};

constexpr std::string_view sweep_examples[] = {
    "dutygauge sweep cooler.yaml --vary 'streams.tube_side.inlet.temperature=26..34 degC:9'",
    "dutygauge sweep cooler.yaml --vary streams.shell_side.flow=x0.8..x1.2:5 --csv flows.csv"};
constexpr Option sweep_options[] = {
    {"vary", "", "KEY=RANGE", "FROM..TO:STEPS with a unit, or factors; once or twice", true},
    one_json_option,
    {"csv", "", "FILE", "the table as CSV in SI; - is standard output, instead of the page"},
    case_option,
    units_option,
    points_at_a_time,
    out_option,
    force_option};

constexpr std::string_view reach_examples[] = {
    "dutygauge reach cooler.yaml --push streams.shell_side.flow",
    "dutygauge reach cooler.yaml --push streams.shell_side.flow --over streams.tube_side.flow=x1..x2:3"};
constexpr Option reach_options[] = {
    {"push", "", "KEY", "the input that is pushed; KEY=RANGE to look through a range of your own"},
    {"over", "", "KEY=RANGE", "a second input: FROM..TO:STEPS with a unit, or factors"},
    one_json_option,
    case_option,
    units_option,
    points_at_a_time,
    out_option,
    force_option};

constexpr std::string_view compare_examples[] = {
    "dutygauge compare before.yaml after.yaml          what changed going in, and coming out",
    "dutygauge compare before.json after.yaml          what rate --json once wrote, against a case"};
constexpr Option compare_options[] = {case_option, one_json_option, units_option, out_option, force_option};

constexpr std::string_view field_examples[] = {
    "dutygauge field cooler.yaml readings.csv                              a year of readings",
    "dutygauge field --json cooler.yaml readings.csv --csv hours.csv       every row to a file, too"};
constexpr Option field_options[] = {
    one_json_option,
    {"csv", "", "FILE", "what every row says as CSV in SI; - is standard output, instead of the page"},
    {"html", "", "FILE", "a page with the trend for a browser, too; - is standard output, instead"},
    case_option,
    units_option,
    out_option,
    force_option};

constexpr std::string_view explain_examples[] = {
    "dutygauge explain rating.mean_misleads    what a finding means, when it is made, what to do",
    "dutygauge explain spacing                 the keys that end so; a full key says how it is written"};
constexpr Option explain_options[] = {{"json", "", "", "one JSON object"}, out_option, force_option};

constexpr std::string_view new_examples[] = {
    "dutygauge new > cooler.yaml                   a case to start from, with every key explained",
    "dutygauge new --from us | dutygauge rate -    for a sheet in US units; it rates as it stands"};
constexpr Option new_options[] = {
    {"from", "", "SYSTEM", "units of the sheet you copy from: metric or us"}, out_option, force_option};

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
    {"csv", "", "FILE", "- is standard output: a line of names, then one line a state, in SI and degC"},
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
    {"sweep", "rate a case over one or two inputs, as a table", "[OPTION]... CASE --vary KEY=RANGE...",
     sweep_examples, sweep_options,
     "A range is FROM..TO UNIT:STEPS, or factors on what the case says, x0.8..x1.2:5; both ends are rated. A "
     "point without a result says why. The status is 0 where any point has a result, whether or not the "
     "service is met there.",
     run_sweep},
    {"reach", "say how far an input can go, and what stops it", "[OPTION]... CASE --push KEY", reach_examples,
     reach_options,
     "Looks both ways from the case's own value, from a fifth to five times it (temperatures: 60 K either "
     "way), for the lines of the service, the allowable pressure drops, the tube velocity, the ranges of the "
     "fluids and what can be built. A limit that is met and left again within one step of the search (4 %, "
     "1.5 K) can be missed: a range of your own makes finer steps.",
     run_reach},
    {"compare", "say what changed between two cases or results, going in and coming out", "[OPTION]... A B",
     compare_examples, compare_options, "", run_compare},
    {"field", "say what a plant's readings tell of a unit in service", "[OPTION]... CASE READINGS...",
     field_examples, field_options,
     "READINGS are CSV files of flows and temperatures, in any order but with the oldest row first in each, "
     "or - for standard input. Headers such as hot_in[degC] are read as they stand; others are named in the "
     "case, under 'readings'. Each row is screened, balanced and held against the clean unit: the page says "
     "what was read, what was left out and why.",
     run_field},
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
    {"explain", "say what a finding or a key of the case file means", "[OPTION]... ID|KEY", explain_examples,
     explain_options,
     "ID is what stands in brackets behind a finding. Of a KEY or an ID the last part will do: where several "
     "end so, they are listed.",
     run_explain},
    {"new", "print a commented case to start from", "[OPTION]...", new_examples, new_options, "", run_new},
    {"schema", "print the JSON Schema of a case file", "[OPTION]...", schema_examples, result_options, "",
     run_schema}};

}  // namespace

std::span<const Command> commands() {
  return table;
}

}  // namespace dutygauge::cli
