#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numeric>

#include "dutygauge/arrangement.hpp"
#include "excuses.hpp"
#include "parts.hpp"
#include "wording.hpp"

namespace dutygauge::case_io {
namespace {

using geometry::Description;
using geometry::FlowDirection;

/// Lengths and the like that go from a key into the description as they are.
struct Required {
  const char* key;
  double Description::*member;
};
constexpr Required required_values[] = {
    {"exchanger.shell.inside_diameter", &Description::shell_inside_diameter},
    {"exchanger.tubes.outside_diameter", &Description::tube_outside_diameter},
    {"exchanger.tubes.wall", &Description::tube_wall},
    {"exchanger.tubes.length", &Description::tube_length},
    {"exchanger.tubes.pitch", &Description::tube_pitch},
    {"exchanger.baffles.cut", &Description::baffle_cut},
};

struct Optional {
  const char* key;
  std::optional<double> Description::*member;
};
constexpr Optional optional_values[] = {
    {"exchanger.shell.nozzle_in", &Description::shell_nozzle_in},
    {"exchanger.shell.nozzle_out", &Description::shell_nozzle_out},
    {"exchanger.tubes.tubesheet_thickness", &Description::tubesheet_thickness},
    {"exchanger.tubes.conductivity", &Description::tube_conductivity},
    {"exchanger.tubes.roughness", &Description::tube_roughness},
    {"exchanger.tubes.nozzle_in", &Description::tube_nozzle_in},
    {"exchanger.tubes.nozzle_out", &Description::tube_nozzle_out},
    {"exchanger.baffles.spacing", &Description::baffle_spacing},
    {"exchanger.baffles.inlet_spacing", &Description::inlet_spacing},
    {"exchanger.baffles.outlet_spacing", &Description::outlet_spacing},
    {"exchanger.baffles.thickness", &Description::baffle_thickness},
    {"exchanger.clearances.tube_to_baffle", &Description::tube_to_baffle},
    {"exchanger.clearances.shell_to_baffle", &Description::shell_to_baffle},
    {"exchanger.clearances.bundle_to_shell", &Description::bundle_to_shell},
    {"exchanger.pass_lanes.width", &Description::pass_lane_width},
};

/// Keys the description cannot do without, beside `required_values`.
constexpr const char* required_words[] = {"exchanger.tema", "exchanger.tubes.count", "exchanger.tubes.passes",
                                          "exchanger.tubes.layout"};

void describe_letters_and_shells(const Entries& entries, Description& d) {
  const auto letters = word(entries, "exchanger.tema").value_or("AES");
  d.front_head = letters[0];
  d.shell_type = letters[1];
  d.rear_head = letters[2];
  d.vertical = word(entries, "exchanger.orientation") == "vertical";
  d.shells_in_series = whole(entries, "exchanger.shells.in_series").value_or(1);
  d.shells_in_parallel = whole(entries, "exchanger.shells.in_parallel").value_or(1);
  d.tube_side_in_series = word(entries, "exchanger.shells.tube_side") == "in_series";
  if (const auto flow = word(entries, "exchanger.flow_direction"))
    d.flow_direction = *flow == "parallel" ? FlowDirection::parallel : FlowDirection::counter;
  if (word(entries, "exchanger.first_tube_pass") == "with_shell_flow")
    d.first_tube_pass = geometry::FirstTubePass::with_shell_flow;
  d.impingement_plate = word(entries, "exchanger.shell.impingement_plate") == "true";
}

void describe_plugging(const Entries& entries, Description& d) {
  const auto list = [&](const std::string& key) {
    std::vector<int> all;
    while (const auto next = whole(entries, joined(key, std::to_string(all.size())))) all.push_back(*next);
    return all;
  };
  d.plugged_per_pass = list("exchanger.tubes.plugged");
  d.plugged = std::accumulate(d.plugged_per_pass.begin(), d.plugged_per_pass.end(),
                              whole(entries, "exchanger.tubes.plugged").value_or(0));
  d.plugged_per_shell = list("exchanger.tubes.plugged_per_shell");
  d.plugged_in_unit = whole(entries, "exchanger.tubes.plugged_in_unit");
}

void describe_layers_and_fins(const Entries& entries, Description& d) {
  for (std::size_t i = 0;; ++i) {
    const std::string key = joined("exchanger.tubes.layers", std::to_string(i));
    const auto on = word(entries, key + ".on");
    if (!on) break;
    d.layers.push_back({.inside = *on == "inside",
                        .thickness = si(entries, key + ".thickness").value_or(0.0),
                        .conductivity = si(entries, key + ".conductivity").value_or(0.0)});
  }
  const std::string fins = "exchanger.tubes.fins";
  const auto value = [&](const char* name) { return si(entries, joined(fins, name)).value_or(0.0); };
  if (si(entries, joined(fins, "per_length")))
    d.fins = {.per_length = value("per_length"),
              .tip_diameter = value("tip_diameter"),
              .root_diameter = value("root_diameter"),
              .thickness = value("thickness")};
}

Description description_of(const Entries& entries) {
  Description d;
  describe_letters_and_shells(entries, d);
  for (const Required& value : required_values) d.*value.member = si(entries, value.key).value_or(0.0);
  for (const Optional& value : optional_values) d.*value.member = si(entries, value.key);
  d.tube_count = whole(entries, "exchanger.tubes.count")
                     .value_or(2 * whole(entries, "exchanger.tubes.u_tubes").value_or(0));
  d.tube_passes = whole(entries, "exchanger.tubes.passes").value_or(1);
  d.layout = whole(entries, "exchanger.tubes.layout").value_or(30);
  describe_plugging(entries, d);
  // A conductivity beside a name is a mistake of its own, noted with the keys.
  d.tube_material = word(entries, "exchanger.tubes.material").value_or("");
  d.baffles_known = !is_scaled(entries);
  d.baffle_count = whole(entries, "exchanger.baffles.count");
  if (const auto compartments = whole(entries, "exchanger.baffles.compartments"))
    d.baffle_count = *compartments - 1;
  d.sealing_strip_pairs = whole(entries, "exchanger.sealing_strip_pairs");
  d.pass_lanes_along_flow = whole(entries, "exchanger.pass_lanes.along_flow");
  d.area = si(entries, "exchanger.area");
  d.wall_resistance = si(entries, "exchanger.wall_resistance");
  describe_layers_and_fins(entries, d);
  return d;
}

Objections objections_of(const Description& d) {
  Objections all = geometry::objections(d);
  const auto more = arrangement::objections({.shell_type = d.shell_type,
                                             .tube_passes = d.tube_passes,
                                             .shells_in_series = d.shells_in_series,
                                             .flow = d.flow_direction == FlowDirection::parallel
                                                         ? arrangement::Flow::parallel
                                                         : arrangement::Flow::counter});
  all.insert(all.end(), more.begin(), more.end());
  return all;
}

bool has_count(const Entries& entries, std::string_view key) {
  return entries.contains(key) ||
         (key == "exchanger.tubes.count" && entries.contains("exchanger.tubes.u_tubes"));
}

std::vector<std::string> missing_keys(const Reading& reading) {
  const Entries& entries = reading.entries();
  std::vector<std::string> missing;
  for (const Required& value : required_values)
    if (!entries.contains(value.key) && !is_excused(reading, value.key)) missing.emplace_back(value.key);
  for (const char* key : required_words)
    if (!has_count(entries, key)) missing.emplace_back(key);
  return missing;
}

/// The entries with `missing` filled from the table's examples, times `factor`.
Entries completed(const Reading& reading, const std::vector<std::string>& missing, double factor) {
  Entries entries = reading.entries();
  for (const std::string& key : missing) {
    const Field* field = reading.table().find(key);
    Entry entry{.field = field, .text = field->example};
    if (auto read = units::read(field->example, field->kind); std::holds_alternative<units::Value>(read))
      entry.value.si = std::get<units::Value>(read).si * (field->form == Form::angle ? 1.0 : factor);
    entries.emplace(key, std::move(entry));
  }
  return entries;
}

/// With values missing, objections are those that hold whatever the missing values may be:
/// asked for with two sets of stand-ins, only what is said both times counts.
Objections objections_despite(const Reading& reading, const std::vector<std::string>& missing) {
  const auto first = objections_of(description_of(completed(reading, missing, 1.0)));
  auto second = objections_of(description_of(completed(reading, missing, 2.0)));
  std::erase_if(second, [&](const Objection& objection) {
    return std::ranges::find(missing, objection.key) != missing.end() ||
           std::ranges::none_of(first, [&](const Objection& other) {
             return other.key == objection.key && other.what == objection.what;
           });
  });
  return second;
}

/// Three ways to say what is plugged: one of them.
void check_plugging_doubles(Reading& reading) {
  const char* first = nullptr;
  for (const char* key :
       {"exchanger.tubes.plugged", "exchanger.tubes.plugged_per_shell", "exchanger.tubes.plugged_in_unit"}) {
    if (!reading.has(key)) continue;
    if (first != nullptr)
      reading.note(key, fmt::format("stands beside {}", last_segment(first)), "one of them",
                   "leave the other out");
    first = key;
  }
}

/// Pairs of keys of which one is enough.
void check_doubles(Reading& reading) {
  const Entries& entries = reading.entries();
  if (reading.has("exchanger.tubes.material") && reading.has("exchanger.tubes.conductivity"))
    reading.note("exchanger.tubes.conductivity", "stands beside a material", "a material or a conductivity",
                 "leave one of them out");
  const auto count = whole(entries, "exchanger.tubes.count"),
             u_tubes = whole(entries, "exchanger.tubes.u_tubes");
  if (count && u_tubes && *count != 2 * *u_tubes)
    reading.note("exchanger.tubes.u_tubes",
                 fmt::format("{} U-tubes have {} holes, but count is {}", *u_tubes, 2 * *u_tubes, *count),
                 "a count of twice the U-tubes", "correct one, or leave it out");
  check_plugging_doubles(reading);
  const auto tema = word(entries, "exchanger.tema");
  if (u_tubes && tema && tema->back() != 'U')
    reading.note("exchanger.tubes.u_tubes", fmt::format("rear head {} has no U-tubes", tema->back()),
                 "rear head U, or count", "check the rear head, or give the count of holes");
  const auto baffles = whole(entries, "exchanger.baffles.count"),
             rooms = whole(entries, "exchanger.baffles.compartments");
  if (baffles && rooms && *rooms != *baffles + 1)
    reading.note("exchanger.baffles.compartments",
                 fmt::format("{} baffles make {} compartments, not {}", *baffles, *baffles + 1, *rooms),
                 "one more than count", "correct one, or leave it out");
}

/// The unit without dimensions; what is given of them beside an area contradicts it.
std::optional<Description> known_by_area(Reading& reading) {
  for (const char* key :
       {"exchanger.shell", "exchanger.baffles", "exchanger.clearances", "exchanger.tubes.count",
        "exchanger.tubes.length", "exchanger.tubes.layers", "exchanger.tubes.fins"})
    if (reading.has(key))
      reading.note(key, "dimensions stand beside exchanger.area, which takes the place of all of them",
                   "either dimensions or an area", "leave one of them out");
  const Entries& entries = reading.entries();
  for (const char* key : {"exchanger.area", "exchanger.tema", "exchanger.tubes.passes"})
    if (!entries.contains(key)) return {};
  Description description = description_of(entries);
  reading.note_all(objections_of(description));
  return description;
}

}  // namespace

std::optional<Description> exchanger_of(Reading& reading) {
  check_doubles(reading);
  if (reading.has("exchanger.area")) return known_by_area(reading);
  if (reading.has("exchanger.wall_resistance"))
    reading.note("exchanger.wall_resistance", "stands without exchanger.area, and the drawing gives the wall",
                 "a wall resistance only beside an area",
                 "leave it out, or give the area instead of dimensions");
  if (!reading.has("exchanger.tubes") || !reading.has("exchanger.shell")) return {};
  const auto missing = missing_keys(reading);
  if (!missing.empty()) {
    reading.note_all(objections_despite(reading, missing));
    return {};
  }
  Description description = description_of(reading.entries());
  reading.note_all(objections_of(description));
  return description;
}

}  // namespace dutygauge::case_io
