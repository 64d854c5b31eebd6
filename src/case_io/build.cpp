#include <fmt/format.h>

#include <algorithm>
#include <cmath>

#include "parts.hpp"
#include "wording.hpp"

namespace dutygauge::case_io {
namespace {

using units::Kind;

service::Service service_of(const Entries& entries, units::System words) {
  using service::Quantity;
  const std::pair<const char*, Quantity> lines[] = {
      {"service.shell_side_outlet", Quantity::shell_side_outlet},
      {"service.tube_side_outlet", Quantity::tube_side_outlet},
      {"service.duty", Quantity::duty}};
  service::Service result;
  result.words = words;
  for (const auto& [key, quantity] : lines)
    for (const bool at_least : {true, false})
      if (const auto limit = si(entries, joined(key, at_least ? "at_least" : "at_most")))
        result.demands.push_back({quantity, at_least, *limit});
  result.shell_side_allowable_drop = si(entries, "streams.shell_side.allowable_pressure_drop");
  result.tube_side_allowable_drop = si(entries, "streams.tube_side.allowable_pressure_drop");
  result.confidence = si(entries, "service.confidence");
  return result;
}

std::optional<service::Control> control_of(const Entries& entries) {
  const auto typed = word(entries, "service.control");
  if (!typed) return {};
  return *typed == "bypass_shell_side" ? service::Control::bypass_shell_side
                                       : service::Control::throttle_tube_side;
}

rating::Methods methods_of(Reading& reading) {
  const auto shell_side = word(reading.entries(), "methods.shell_side");
  const auto tema = word(reading.entries(), "exchanger.tema");
  if (shell_side == "kern" && tema && tema->size() == 3 && (*tema)[1] == 'X')
    reading.note("methods.shell_side", "Kern's method has no crossflow shell (X)", "bell_delaware",
                 "write bell_delaware, or leave the key out");
  if (shell_side == "kern" && reading.has("exchanger.tubes.fins"))
    reading.note("methods.shell_side", "Kern's method has no finned tubes", "bell_delaware",
                 "write bell_delaware, or leave the key out");
  const auto solution = word(reading.entries(), "methods.solution");
  return {.shell_side = shell_side == "kern" ? shellside::Method::kern : shellside::Method::bell_delaware,
          .solution = solution == "mean" ? rating::Solution::mean : rating::Solution::march};
}

void check_inlets(Reading& reading) {
  const auto shell = si(reading.entries(), "streams.shell_side.inlet.temperature");
  const auto tube = si(reading.entries(), "streams.tube_side.inlet.temperature");
  constexpr double least_difference = 1e-3;  // what no thermometer tells apart [K]
  if (shell && tube && std::abs(*shell - *tube) < least_difference)
    reading.note("streams.tube_side.inlet.temperature",
                 fmt::format("the shell side enters at {} too: nothing can be exchanged",
                             units::typed(*shell, Kind::temperature)),
                 "two different inlet temperatures", "correct one of them");
}

units::System display_of(const Entries& entries) {
  const auto typed = word(entries, "display").value_or("metric");
  return typed == "si" ? units::System::si : typed == "us" ? units::System::us : units::System::metric;
}

Inputs inputs_of(const Entries& entries, const Assumptions& assumed, units::System display) {
  Inputs inputs;
  for (const auto& [key, entry] : entries)
    inputs.push_back({key, entry.text, entry.is_word() ? 0.0 : entry.value.si, entry.kind(), entry.is_word(),
                      entry.line, "typed"});
  for (const Assumption& a : assumed) {
    if (entries.contains(a.key)) continue;  // about the reading of a typed value
    const bool is_word = !a.word.empty();
    inputs.push_back({a.key, is_word ? a.word : units::typed(a.value, a.kind, display),
                      is_word ? 0.0 : a.value, a.kind, is_word, 0, "assumed"});
  }
  return inputs;
}

template <class List>
void append(List& list, const List& more) {
  list.insert(list.end(), more.begin(), more.end());
}

/// What was looked for and not found is as if left out, and said.
void show_unknown(const Reading& reading, Assumptions& assumed) {
  for (const std::string& key : reading.unknown()) {
    const auto found = std::ranges::find(assumed, key, &Assumption::key);
    if (found != assumed.end())
      found->why += "; looked for and not found";
    else
      assumed.push_back({.key = key,
                         .word = "unknown",
                         .why = "looked for and not found: rated as if left out",
                         .look_in = "datasheet"});
  }
}

std::string text_of(const Entries& entries, std::string_view key) {
  return std::string(word(entries, key).value_or(""));
}

std::vector<Accepted> accepted_of(const Reading& reading) {
  std::vector<Accepted> accepted;
  for (int i = 0;; ++i) {
    const std::string item = fmt::format("accepted.{}", i);
    if (!reading.has(item)) return accepted;
    const auto& entries = reading.entries();
    accepted.push_back({text_of(entries, item + ".id"), text_of(entries, item + ".because"),
                        text_of(entries, item + ".by")});
  }
}

/// The case as the document has it; a shell side to be scaled has no film yet.
Case read_case(const Document& document, Reading& reading) {
  const auto description = exchanger_of(reading);
  auto shell_side = stream_of(reading, "shell_side"), tube_side = stream_of(reading, "tube_side");
  find_flows(reading, shell_side, tube_side);
  const GivenFilm films[] = {given_film_of(reading, "shell_side"), given_film_of(reading, "tube_side")};
  check_inlets(reading);
  const rating::Methods methods = methods_of(reading);
  check_scaled(reading);
  bids::Claims claims = claims_of(reading);
  field::Mapping readings = mapping_of(reading);
  field::Planned plan = plan_of(reading, readings.clock.offset);
  std::optional<AnchorReading> anchor;
  if (shell_side && tube_side) anchor = anchor_of(reading, shell_side->stream, tube_side->stream);
  if (!reading.mistakes().empty()) throw InputError(document.file, reading.mistakes());
  if (!description || !shell_side || !tube_side)
    throw std::logic_error("a case without a mistake could not be built");

  Case result;
  const auto derived = geometry::derive(*description);
  const Entries& entries = reading.entries();
  result.file = document.file;
  result.title = text_of(entries, "title");
  result.tag = text_of(entries, "tag");
  result.sha256 = document.sha256;
  result.accepted = accepted_of(reading);
  result.display = display_of(entries);
  result.problem = {.exchanger = derived.value,
                    .shell_side = shell_side->stream,
                    .tube_side = tube_side->stream,
                    .methods = methods};
  for (const bool is_shell_side : {true, false})
    put_film(films[is_shell_side ? 0 : 1], is_shell_side, result.problem);
  result.anchor = std::move(anchor);
  result.service = service_of(entries, result.display);
  result.control = control_of(entries);
  take_bypasses(reading, result);
  result.claims = std::move(claims);
  result.readings = std::move(readings);
  result.plan = std::move(plan);
  append(result.assumed, reading.assumed());
  append(result.assumed, derived.assumed);
  append(result.findings, derived.findings);
  for (const auto* stream : {&*shell_side, &*tube_side}) {
    append(result.assumed, stream->assumed);
    append(result.findings, stream->findings);
  }
  for (const GivenFilm& film : films) append(result.findings, film.findings);
  show_unknown(reading, result.assumed);
  return result;
}

/// The case the sheet speaks of, where another document holds it.
Case stated_case_of(const Document& document, const Case& read) {
  if (!document.sheet) return read;
  Reading reading(*document.sheet, case_fields());
  return read_case(*document.sheet, reading);
}

}  // namespace

Case build_plain(const Document& document) {
  Reading reading(document, case_fields());
  Case result = read_case(document, reading);
  if (is_scaled(reading.entries())) scale_shell_side(document, stated_case_of(document, result), result);
  if (result.anchor) result.anchor->unit = result.problem;
  result.inputs = inputs_of(reading.entries(), result.assumed, result.display);
  return result;
}

}  // namespace dutygauge::case_io
