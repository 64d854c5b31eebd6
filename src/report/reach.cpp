#include <fmt/core.h>

#include <algorithm>
#include <cmath>

#include "table_parts.hpp"
#include "words.hpp"

namespace dutygauge::report {
namespace {

using Json = nlohmann::ordered_json;
using units::Kind;

/// Factors of the own value mean something but for temperatures.
std::string share_of_own(const Axis& axis, double value) {
  if (!axis.own || *axis.own == 0.0 || axis.kind == Kind::temperature) return "";
  return fmt::format("{:.0f} %", 100.0 * value / *axis.own);
}

std::string with_share(const Axis& axis, double value, units::System display) {
  const std::string share = share_of_own(axis, value);
  return units::typed(value, axis.kind, display, 4) + (share.empty() ? "" : " (" + share + ")");
}

std::string end_of(const Reach& reach, const Limit& limit) {
  return fmt::format("{} ({})", with_share(reach.pushed, limit.value, reach.about.display), limit.what);
}

std::string answer(const Reach& reach) {
  if (!reach.room)
    return reach.broken.empty() ? "No value in the range holds everything."
                                : fmt::format(
                                      "Nowhere in the range does everything hold; as it is, what "
                                      "stands in the way is: {}.",
                                      listed(reach.broken));
  const auto& room = *reach.room;
  if (!room.below && !room.above) return "Nothing stops it in the range looked through.";
  std::string text = reach.broken.empty() ? "Everything holds" : "As it is, not everything holds. It would";
  if (room.below) text += " from " + end_of(reach, *room.below);
  if (room.above) text += " up to " + end_of(reach, *room.above);
  if (!room.below) text += "; nothing stops it downwards";
  if (!room.above) text += "; nothing stops it upwards";
  return text + ".";
}

std::string first_clause(std::string text) {
  text = text.substr(0, text.find(". "));
  return text.substr(0, text.find(':'));
}

std::string remark(const Limit& limit) {
  std::string words = first_clause(limit.what);
  if (words.find('{') != std::string::npos) words = limit.name;
  return words;
}

std::vector<std::string> limit_row(const Reach& reach, const Limit& limit) {
  const auto& axis = reach.pushed;
  const bool outward = !axis.own || (limit.value >= *axis.own) == limit.fails_above;
  const std::string name = limit.stops ? limit.what : remark(limit);
  return {units::typed(limit.value, axis.kind, reach.about.display, 5), share_of_own(axis, limit.value),
          limit.stops ? (outward ? "stops" : "holds from here") : (outward ? "remark" : "remark ends"),
          limit.relieved_by.empty() ? name : name + "; relieved most by: " + limit.relieved_by};
}

void limits(Page& page, const Reach& reach) {
  for (const bool up : {true, false}) {
    std::vector<std::vector<std::string>> rows = {
        {up ? "GOING UP" : "GOING DOWN", up ? "of now" : "", "", "in the order met"}};
    for (const Limit& limit : reach.limits)
      if ((limit.value >= reach.pushed.own.value_or(0.0)) == up) {
        auto row = limit_row(reach, limit);
        row.front() = "  " + row.front();
        rows.push_back(std::move(row));
      }
    if (rows.size() == 1) {
      page.section(up ? "GOING UP" : "GOING DOWN",
                   fmt::format("nothing is met up to {}",
                               with_share(reach.pushed, up ? reach.to : reach.from, reach.about.display)));
      continue;
    }
    page.table(rows, {Align::left, Align::right, Align::left, Align::left}, 0);
  }
}

std::string name_of_end(const std::optional<Limit>& limit) {
  return limit ? limit->name : "nothing met";
}

void map(Page& page, const Reach& reach) {
  if (!reach.over) return;
  const Axis& axis = reach.pushed;
  const auto display = reach.about.display;
  page.blank();
  page.section("MAP", fmt::format("where everything holds, for {} over {}", axis.key, reach.over->key));
  std::vector<std::vector<std::string>> rows = {{fmt::format("  {}", plain_words(reach.over->key)), "least",
                                                 "of now", "set by", "most", "of now", "stops at"}};
  for (const ReachRow& row : reach.map) {
    std::vector<std::string> cells = {"  " + units::typed(row.over, reach.over->kind, display, 5)};
    if (!row.room) {
      cells.insert(cells.end(), {"none", "", "", "none", "", row.no_room});
    } else {
      for (const auto* end : {&row.room->below, &row.room->above}) {
        cells.push_back(*end ? units::typed((*end)->value, axis.kind, display, 4) : "");
        cells.push_back(*end ? share_of_own(axis, (*end)->value) : "");
        cells.push_back(name_of_end(*end));
      }
    }
    rows.push_back(std::move(cells));
  }
  page.table(rows,
             {Align::left, Align::right, Align::right, Align::left, Align::right, Align::right, Align::left},
             0);
}

Json number_of(const Axis& axis, double value) {
  return in_json(value, axis.kind);
}

Json limit_json(const Reach& reach, const Limit& limit) {
  const auto& axis = reach.pushed;
  const bool has_factor = axis.own && *axis.own != 0.0;
  return {{"name", limit.name},
          {"value", number_of(axis, limit.value)},
          {"factor", has_factor ? Json(limit.value / *axis.own) : Json(nullptr)},
          {"relieved_by", limit.relieved_by.empty() ? Json(nullptr) : Json(limit.relieved_by)},
          {"fails", limit.fails_above ? "above" : "below"},
          {"stops", limit.stops},
          {"text", limit.stops ? limit.what : remark(limit)}};
}

Json room_json(const Reach& reach, const std::optional<Room>& room) {
  if (!room) return nullptr;
  const auto end = [&reach](const std::optional<Limit>& limit) {
    return limit ? limit_json(reach, *limit) : Json(nullptr);
  };
  return {{"below", end(room->below)}, {"above", end(room->above)}};
}

}  // namespace

std::string text(const Reach& reach) {
  Page page;
  heading(page, reach.about);
  const auto display = reach.about.display;
  page.section("PUSHED",
               fmt::format("{}, now {}; looked through from {} to {}", reach.pushed.key,
                           units::typed(reach.pushed.own.value_or(0.0), reach.pushed.kind, display, 5),
                           with_share(reach.pushed, reach.from, display),
                           with_share(reach.pushed, reach.to, display)));
  page.section("ANSWER", answer(reach));
  page.blank();
  limits(page, reach);
  if (reach.room && !reach.broken.empty())
    page.section("BROKEN", "as it is, this does not hold: " + listed(reach.broken));
  if (reach.unsettled > 0)
    page.section("LEFT OUT",
                 fmt::format("{} points, where the calculation does not settle", reach.unsettled));
  map(page, reach);
  page.blank();
  std::vector<std::string> held;
  for (const Input& input : reach.held) held.push_back(plain_words(input.key) + " " + input.as_typed);
  page.paragraph("Held constant: ", listed(held) + ".");
  table_closing(page);
  return page.text();
}

std::string json(const Reach& reach) {
  Json result = start_of(reach.about);
  const auto& axis = reach.pushed;
  result["pushed"] = {{"key", axis.key},
                      {"own", axis.own ? number_of(axis, *axis.own) : Json(nullptr)},
                      {"unit", units::json_unit(axis.kind)},
                      {"from", number_of(axis, reach.from)},
                      {"to", number_of(axis, reach.to)}};
  result["broken"] = reach.broken;
  result["room"] = room_json(reach, reach.room);
  result["limits"] = Json::array();
  for (const Limit& limit : reach.limits) result["limits"].push_back(limit_json(reach, limit));
  result["held"] = Json::array();
  for (const Input& input : reach.held)
    result["held"].push_back({{"key", input.key},
                              {"as_typed", input.as_typed},
                              {"si", in_json(input.si, input.kind)},
                              {"unit", units::json_unit(input.kind)}});
  result["unsettled"] = reach.unsettled;
  if (!reach.over) return one_line(result);
  result["over"] = {{"key", reach.over->key}, {"unit", units::json_unit(reach.over->kind)}};
  result["map"] = Json::array();
  for (const ReachRow& row : reach.map)
    result["map"].push_back({{"over", number_of(*reach.over, row.over)},
                             {"room", room_json(reach, row.room)},
                             {"no_room", row.room ? Json(nullptr) : Json(row.no_room)}});
  return one_line(result);
}

}  // namespace dutygauge::report
