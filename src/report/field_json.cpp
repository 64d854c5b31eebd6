#include <algorithm>

#include "field_words.hpp"
#include "record.hpp"
#include "table_parts.hpp"

namespace dutygauge::report {
namespace {

using Json = nlohmann::ordered_json;
using field::FieldResult;

Json or_null(const std::optional<double>& value) {
  return value ? Json(*value) : Json(nullptr);
}

Json date_or_null(const FieldResult& result, const std::optional<double>& day) {
  return day ? Json(iso_date(result.start, *day)) : Json(nullptr);
}

Json lost_on(const FieldResult& result, const std::optional<field::Forecast>& forecast) {
  if (!forecast || !forecast->lost.early) return nullptr;
  const auto& lost = forecast->lost;
  return {date_or_null(result, lost.early), date_or_null(result, lost.middle),
          date_or_null(result, lost.late)};
}

Json fouling_json(const std::optional<field::FoulingNow>& fouling) {
  if (!fouling) return nullptr;
  return {{"now_m2K_W", fouling->now},
          {"u95_level_m2K_W", fouling->u95_level},
          {"u95_change_m2K_W", fouling->u95_change},
          {"rate_m2K_W_per_day", fouling->rate},
          {"law", name_of(fouling->choice.best().law.kind)}};
}

Json events_json(const FieldResult& result) {
  Json events = Json::array();
  for (const field::Event& event : result.events)
    events.push_back({{"at", iso_date(result.start, event.at)},
                      {"what", name_of(event.what)},
                      {"channel", event.channel ? Json(field::name(*event.channel)) : Json(nullptr)},
                      {"fouling_m2K_W", or_null(event.fouling)},
                      {"closure", or_null(event.closure)},
                      {"logged", event.logged},
                      {"seen", event.seen}});
  return events;
}

Json suspects_json(const FieldResult& result) {
  Json suspects = Json::array();
  for (const field::Doubt& suspect : result.suspects) {
    Json channels = Json::array();
    for (const field::Channel channel : suspect.channels) channels.push_back(field::name(channel));
    suspects.push_back(
        {{"channels", channels}, {"since", iso_date(result.start, suspect.since)}, {"text", suspect.text}});
  }
  return suspects;
}

Json hypotheses_json(const FieldResult& result) {
  Json hypotheses = Json::array();
  for (const field::Outcome& outcome : result.outcomes)
    hypotheses.push_back({{"name", outcome.name},
                          {"used", &outcome == &result.outcomes.front()},
                          {"fouling", fouling_json(outcome.fouling)},
                          {"lost_on", lost_on(result, outcome.forecast)},
                          {"advice", name_of(outcome.decision.advice)}});
  return hypotheses;
}

Json options_json(const FieldResult& result) {
  Json options = Json::array();
  for (const field::Option& option : result.used().decision.options) {
    Json cost = nullptr;
    if (option.bill)
      cost = {{"cleaning", option.bill->cleaning},
              {"lost_duty", option.bill->lost_duty},
              {"outage", option.bill->outage},
              {"sum", option.bill->sum()},
              {"currency", result.plan.economics->currency}};
    options.push_back({{"way", name_of(option.way)},
                       {"at", date_or_null(result, option.at)},
                       {"risk", option.risk},
                       {"cost", cost},
                       {"recommended", option.recommended}});
  }
  return options;
}

}  // namespace

std::string json(const CaseName& about, const FieldResult& result, const field::History* record) {
  Json object = start_of(about);
  Json dropped = Json::object();
  for (const auto& [reason, count] : result.rows.dropped) dropped[reason] = count;
  object["rows"] = {{"read", result.rows.read}, {"used", result.rows.used}, {"dropped", dropped}};
  object["closure"] = {{"median", or_null(result.closure.median)},
                       {"u95", or_null(result.closure.u95)},
                       {"verdict", result.closure.verdict}};
  object["fouling"] = fouling_json(result.used().fouling);
  object["lost_on"] = lost_on(result, result.used().forecast);
  object["events"] = events_json(result);
  object["suspects"] = suspects_json(result);
  object["causes"] = Json::array();
  for (const field::WeighedCause& cause : result.causes)
    object["causes"].push_back({{"name", cause.name}, {"weight", cause.weight}});
  object["hypotheses"] = hypotheses_json(result);
  object["options"] = options_json(result);
  object["advice"] = name_of(result.advice);
  object["same_either_way"] = result.same_either_way ? Json(*result.same_either_way) : Json(nullptr);
  object["why"] = result.why;
  if (record != nullptr) object["record"] = record_json(*record);
  return one_line(object);
}

}  // namespace dutygauge::report
