#include <fmt/core.h>
#include <algorithm>
#include <cmath>

#include <nlohmann/json.hpp>
#include <optional>
#include <stdexcept>
#include <string>

#include "along_json.hpp"
#include "anchor_json.hpp"
#include "dutygauge/report.hpp"
#include "dutygauge/sources.hpp"
#include "dutygauge/units/mention.hpp"
#include "spread_json.hpp"
#include "words.hpp"

namespace dutygauge::report {
namespace {

using units::Kind;

constexpr int schema_version = 1;

double celsius(double kelvin) {
  return units::from_si(kelvin, "degC", Kind::temperature);
}

Json or_null(const std::optional<double>& value) {
  return value ? Json(*value) : Json(nullptr);
}

// How many streams a shell divides its flow into, each with a crossflow area of its own.
int shell_streams(char shell_type) {
  switch (shell_type) {
    case 'G':
    case 'J':
      return 2;
    case 'H':
      return 4;
    default:
      return 1;
  }
}

using MaybeSpread = std::optional<uncertainty::Result>;

Json verdict(const service::Assessment& assessment, const MaybeSpread& spread) {
  const auto& said = assessment.verdict;
  const auto probability = spread ? spread->probability : std::nullopt;
  return {
      {"service_met", said.met ? Json(*said.met) : Json(nullptr)},
      {"grade", probability ? Json(uncertainty::word(uncertainty::grade_of(*probability))) : Json(nullptr)},
      {"probability", or_null(probability)},
      {"limited_by", said.limited_by},
      {"text", assessment.rating.outcome ? said.text : assessment.rating.no_result}};
}

Json thermal(const service::Assessment& assessment) {
  if (!assessment.rating.outcome) return nullptr;
  const auto& outcome = *assessment.rating.outcome;
  const double area = assessment.problem.exchanger.area;
  return {{"duty_W", outcome.duty},
          {"duty_ntu_W", outcome.duty_ntu},
          {"duty_lmtd_W", outcome.duty_lmtd},
          {"shell_side_outlet_degC", celsius(outcome.shell_outlet)},
          {"tube_side_outlet_degC", celsius(outcome.tube_outlet)},
          {"effectiveness", outcome.effectiveness},
          {"ntu", outcome.ntu},
          {"capacity_ratio", outcome.capacity_ratio},
          {"lmtd_K", outcome.log_mean},
          {"f_correction", outcome.f_correction},
          {"mtd_K", outcome.mean_difference},
          {"area_m2", area},
          {"u_clean_W_m2K", outcome.local.u_clean},
          {"u_dirty_W_m2K", outcome.local.u_dirty},
          {"u_required_W_m2K", or_null(assessment.margins.u_required)},
          {"ua_W_K", outcome.local.u_dirty * area},
          {"balance_error", outcome.balance_error}};
}

Json resistances(const service::Assessment& assessment) {
  if (!assessment.rating.outcome) return nullptr;
  const auto& r = assessment.rating.outcome->local.resistances;
  return {{"tube_film", r.tube_film},
          {"tube_fouling", r.tube_fouling},
          {"wall", r.wall},
          {"shell_fouling", r.shell_fouling},
          {"shell_film", r.shell_film}};
}

Json tube_side(const service::Assessment& assessment) {
  if (!assessment.rating.outcome) return nullptr;
  const auto& outcome = *assessment.rating.outcome;
  const auto& film = outcome.local.tube_film;
  const auto& drop = outcome.tube_drop;
  const bool drawn = assessment.problem.exchanger.tubes_drawn;
  const auto known = [drawn](auto value) { return drawn ? Json(value) : Json(nullptr); };
  const bool by_law = assessment.problem.tube_side.drop_law.has_value();
  const auto part = [&](double value) { return by_law || !drawn ? Json(nullptr) : Json(value); };
  return {
      {"film_W_m2K", film.coefficient},
      {"reynolds", known(film.reynolds)},
      {"prandtl", known(film.prandtl)},
      {"nusselt", known(film.nusselt)},
      {"regime", known(word(film.regime))},
      {"velocity_m_s", known(film.velocity)},
      {"wall_degC", celsius(outcome.local.walls.tube_wetted)},
      {"pressure_drop_Pa", drawn || by_law ? Json(drop.total()) : Json(nullptr)},
      {"pressure_drop_parts_Pa",
       {{"friction", part(drop.friction)}, {"turns", part(drop.turns)}, {"nozzles", part(drop.nozzles)}}}};
}

Json second_opinion(const service::Assessment& assessment) {
  if (!assessment.second_opinion) return nullptr;
  const auto& other = *assessment.second_opinion;
  return {{"method", "kern"},
          {"film_W_m2K", other.local.shell_film.coefficient},
          {"pressure_drop_Pa", other.shell_drop.total()},
          {"duty_W", other.duty}};
}

double crossflow_area(const rating::Problem& problem, const shellside::Film& film) {
  const auto& exchanger = problem.exchanger;
  const double one_bank = problem.shell_side.mass_flow / exchanger.shells_in_parallel;
  return one_bank / shell_streams(exchanger.shell_side.shell_type) / film.mass_flux;
}

Json shell_side(const service::Assessment& assessment) {
  if (!assessment.rating.outcome) return nullptr;
  const auto& outcome = *assessment.rating.outcome;
  const auto& film = outcome.local.shell_film;
  const auto& drop = outcome.shell_drop;
  const bool drawn = assessment.problem.exchanger.shell_drawn;
  const bool factors = drawn && assessment.problem.methods.shell_side == shellside::Method::bell_delaware;
  const auto known = [drawn](double value) { return drawn ? Json(value) : Json(nullptr); };
  const bool by_law = assessment.problem.shell_side.drop_law.has_value();
  const auto part = [&](double value) { return by_law || !drawn ? Json(nullptr) : Json(value); };
  const auto factor = [factors](double value) { return factors ? Json(value) : Json(nullptr); };
  return {{"film_W_m2K", film.coefficient},
          {"ideal_film_W_m2K", factor(film.ideal)},
          {"reynolds", known(film.reynolds)},
          {"prandtl", known(film.prandtl)},
          {"j_cut", factor(film.j_cut)},
          {"j_leakage", factor(film.j_leakage)},
          {"j_bypass", factor(film.j_bypass)},
          {"j_spacing", factor(film.j_spacing)},
          {"j_laminar", factor(film.j_laminar)},
          {"crossflow_area_m2", drawn ? Json(crossflow_area(assessment.problem, film)) : Json(nullptr)},
          {"velocity_m_s", known(film.velocity)},
          {"wall_degC", celsius(outcome.local.walls.shell_wetted)},
          {"pressure_drop_Pa", drawn || by_law ? Json(drop.total()) : Json(nullptr)},
          {"pressure_drop_parts_Pa",
           {{"crossflow", part(drop.crossflow)},
            {"window", part(drop.window)},
            {"ends", part(drop.ends)},
            {"nozzles", part(drop.nozzles)}}},
          {"second_opinion", second_opinion(assessment)}};
}

Json margins(const service::Margins& margins) {
  return {{"duty", or_null(margins.duty)},
          {"surface", or_null(margins.surface)},
          {"surface_clean", or_null(margins.surface_clean)},
          {"fouling_spare_m2K_W", or_null(margins.fouling_spare)},
          {"temperature_K", or_null(margins.temperature)}};
}

// What each state and each operating case says.
Json state(const service::Assessment& assessment, const MaybeSpread& spread,
           const std::optional<service::Holding>& held) {
  return {{"verdict", verdict(assessment, spread)}, {"thermal", thermal(assessment)},
          {"tube_side", tube_side(assessment)},     {"shell_side", shell_side(assessment)},
          {"margins", margins(assessment.margins)}, {"spread", spread_json(spread)},
          {"control", control_json(held)}};
}

// One case with its states. Results made of a single assessment have no case list.
Json operating_case(const RatedCase& one) {
  Json json = state(one.design_fouling, one.spread, one.held);
  const Json fouled = json;
  json["states"] = {{"clean", state(one.clean, one.spread_clean, one.held_clean)},
                    {"design_fouling", fouled}};
  if (one.today) {
    json["states"]["today"] = state(one.today->assessment, one.today->spread, one.today->held);
    json["states"]["today"]["change_since_reading"] = change_json(one.today->change);
  }
  return json;
}

Json operating_cases(const Result& result) {
  Json json = Json::object();
  for (const auto& one : result.cases) json[one.name] = operating_case(one);
  if (result.cases.empty()) json["base"] = state(result.assessment, result.spread, {});
  return json;
}

Json states(const Result& result) {
  if (result.cases.empty()) return {{"design_fouling", state(result.assessment, result.spread, {})}};
  return operating_case(result.cases[result.governing])["states"];
}

std::string name_of_case(const Result& result) {
  return result.cases.empty() ? "base" : result.cases[result.governing].name;
}

Json solutions(const service::Assessment& assessment) {
  const auto one = [](const std::optional<double>& duty) {
    return duty ? Json{{"duty_W", *duty}} : Json(nullptr);
  };
  return {{"mean", one(assessment.rating.mean_duty)}, {"march", one(assessment.rating.march_duty)}};
}

std::string_view margin_word(Effect::Margin margin) {
  switch (margin) {
    case Effect::Margin::duty:
      return "duty";
    case Effect::Margin::temperature:
      return "temperature_K";
    case Effect::Margin::pressure_drop:
      return "pressure_drop";
  }
  throw std::invalid_argument("report::json: no such margin");
}

Json effect(const Result& result, std::size_t assumption) {
  if (assumption >= result.effects.size() || !result.effects[assumption]) return nullptr;
  const Effect& one = *result.effects[assumption];
  return {{"margin", margin_word(one.margin)},
          {"at_low", or_null(one.at_low)},
          {"at_high", or_null(one.at_high)},
          {"changes_answer", one.changes_answer}};
}

Json levers(const std::vector<Lever>& all) {
  Json list = Json::array();
  for (const Lever& one : all)
    list.push_back({{"what", one.what},
                    {"key", one.key.empty() ? Json(nullptr) : Json(one.key)},
                    {"margin", one.in_kelvin ? "temperature_K" : "duty"},
                    {"gain", one.gain},
                    {"shell_side_pressure_drop_Pa", one.shell_drop},
                    {"tube_side_pressure_drop_Pa", one.tube_drop}});
  return list;
}

Json assumed(const Result& result) {
  Json list = Json::array();
  for (std::size_t i = 0; i < result.assumed.size(); ++i) {
    const Assumption& one = result.assumed[i];
    const auto end = [&one](const std::optional<double>& value) {
      return value ? Json(units::typed(*value, one.kind)) : Json(nullptr);
    };
    list.push_back({{"key", one.key},
                    {"value", as_typed(one, units::System::metric, 5)},
                    {"why", reason(one, units::System::metric)},
                    {"low", end(one.low)},
                    {"high", end(one.high)},
                    {"effect", effect(result, i)},
                    {"look_in", one.look_in}});
  }
  return list;
}

// Whether a finding is one of the exchanger in its first case, or came with another.
std::string since(const Finding& finding, const Result& result) {
  if (result.cases.empty() || finding.id.starts_with("claims.")) return "base";
  const auto& first = result.cases.front().findings;
  return std::ranges::find(first, finding.id, &Finding::id) == first.end() ? "this_case" : "base";
}

Json finding(const Finding& one, const Result& result, const AcceptedFinding* decision) {
  const auto citation = sources::citation(one.source);
  return {{"id", one.id},
          {"severity", word(one.severity)},
          {"ground", word(one.ground)},
          {"since", since(one, result)},
          {"text", sentence(one, units::System::metric)},
          {"value", in_json_unit(one.value, one.kind)},
          {"limit", in_json_unit(one.limit, one.kind)},
          {"unit", units::json_unit(one.kind)},
          {"source", citation.empty() ? one.source : std::string(citation)},
          {"accepted",
           decision == nullptr ? Json(nullptr) : Json{{"because", decision->because}, {"by", decision->by}}}};
}

Json findings(const Result& result) {
  Json list = Json::array();
  for (const auto& one : result.findings) list.push_back(finding(one, result, nullptr));
  for (const auto& one : result.accepted) list.push_back(finding(one.finding, result, &one));
  return list;
}

Json claims(const std::vector<bids::ClaimVerdict>& all) {
  Json list = Json::array();
  for (const auto& one : all) {
    const auto computed = one.computed ? std::optional(in_json_unit(*one.computed, one.kind)) : std::nullopt;
    list.push_back({{"key", one.key},
                    {"stated", in_json_unit(one.stated, one.kind)},
                    {"computed", or_null(computed)},
                    {"unit", units::json_unit(one.kind)},
                    {"ratio", or_null(one.ratio)},
                    {"ground", word(one.ground)},
                    {"verdict", word(one.verdict)},
                    {"against", one.against},
                    {"likely", units::spoken(one.likely, units::System::metric)}});
  }
  return list;
}

Json inputs(const Inputs& all) {
  Json list = Json::array();
  for (const auto& one : all) {
    list.push_back({{"key", one.key},
                    {"as_typed", one.as_typed},
                    {"si", one.is_word ? Json(nullptr) : Json(in_json_unit(one.si, one.kind))},
                    {"unit", one.is_word ? std::string_view{} : units::json_unit(one.kind)},
                    {"line", one.line},
                    {"origin", one.origin}});
  }
  return list;
}

// The library would print null for a NaN or an infinity, which means "not
// defined" here. A number that got this far and is neither is a bug.
void require_finite(const Json& json, const std::string& path) {
  if (json.is_number_float() && !std::isfinite(json.get<double>()))
    throw std::logic_error("the result holds a number that is not finite: " + path);
  if (json.is_structured())
    for (const auto& [key, value] : json.items()) require_finite(value, path + "/" + key);
}

std::string one_line(const Json& json) {
  require_finite(json, "");
  return json.dump(-1, ' ', false, Json::error_handler_t::replace);
}

}  // namespace

std::string json(const Result& result) {
  const auto& assessment = result.assessment;
  return one_line(
      {{"dutygauge", DUTYGAUGE_VERSION},
       {"schema_version", schema_version},
       {"input_sha256", result.input_sha256},
       {"case", {{"file", result.file}, {"title", result.title}, {"tag", result.tag}}},
       {"operating_case", name_of_case(result)},
       {"present_since", result.present_since.empty() ? Json(nullptr) : Json(result.present_since)},
       {"verdict", verdict(assessment, result.spread)},
       {"thermal", thermal(assessment)},
       {"resistances_m2K_W", resistances(assessment)},
       {"tube_side", tube_side(assessment)},
       {"shell_side", shell_side(assessment)},
       {"margins", margins(assessment.margins)},
       {"spread", spread_json(result.spread)},
       {"control", result.cases.empty() ? Json(nullptr) : control_json(result.cases[result.governing].held)},
       {"solutions", solutions(assessment)},
       {"states", states(result)},
       {"operating_cases", operating_cases(result)},
       {"anchor", anchor_json(result.anchored)},
       {"assumed", assumed(result)},
       {"levers", levers(result.levers)},
       {"findings", findings(result)},
       {"claims", claims(result.claims)},
       {"inputs", inputs(result.inputs)},
       {"between_shells", between_shells_json(assessment)},
       {"profile", profile_json(assessment)}});
}

std::string error_json(const std::string& file, const std::vector<std::string>& lines) {
  return one_line({{"dutygauge", DUTYGAUGE_VERSION},
                   {"schema_version", schema_version},
                   {"case", {{"file", file}}},
                   {"error", lines}});
}

}  // namespace dutygauge::report
