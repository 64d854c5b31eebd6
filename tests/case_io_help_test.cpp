#include <doctest/doctest.h>

#include <nlohmann/json.hpp>
#include <sstream>

#include "../src/case_io/fields.hpp"
#include "dutygauge/case_io.hpp"

namespace units = dutygauge::units;
using dutygauge::case_io::Case;

namespace {

Case built(std::string_view text) {
  return dutygauge::case_io::build(dutygauge::case_io::read_document(text, "starter"));
}

}  // namespace

TEST_CASE("case_io: every row's example can be read as that row") {
  for (const auto& field : dutygauge::case_io::case_fields().all()) {
    CAPTURE(field.key);
    using dutygauge::case_io::Form;
    CHECK(!field.help.empty());
    if (field.form == Form::quantity)
      CHECK(std::holds_alternative<units::Value>(units::read(field.example, field.kind)));
    else if (field.form == Form::pair)
      CHECK(std::holds_alternative<units::Pair>(units::read_pair(field.example, field.kind)));
    else if (field.form == Form::flow)
      CHECK(std::holds_alternative<units::Flow>(units::read_flow(field.example)));
    else if (field.form != Form::block && field.form != Form::list)
      CHECK(!field.example.empty());
  }
}

TEST_CASE("case_io: the starter case builds, assumes nothing and holds every key once uncommented") {
  const Case starter = built(dutygauge::case_io::starter_case());
  CHECK(starter.assumed.empty());
  std::string all;
  std::istringstream lines(dutygauge::case_io::starter_case());
  for (std::string line; std::getline(lines, line);) {
    const auto first = line.find_first_not_of(' ');
    const bool is_key = line.compare(first, 2, "# ") == 0 && line.find(':') < 44 && first + 2 < line.size();
    all += (is_key && line[first + 2] >= 'a' && line[first + 2] <= 'z'
                ? line.substr(0, first) + line.substr(first + 2)
                : line) +
           "\n";
  }
  // Alternatives exclude each other; everything else may stand together.
  for (const char* alternative :
       {"    u_tubes:", "  area:", "  wall_resistance:", "    film_coefficient:", "    film_coefficient:",
        "    conductivity:", "    compartments:", "    count: 27",
        "    plugged_per_shell:", "    plugged_in_unit:", "  fouling: 0.00029 +- "}) {
    const auto at = all.find(alternative);
    REQUIRE(at != std::string::npos);
    all.erase(at, all.find('\n', at) - at + 1);
  }
  CHECK_NOTHROW(built(all));
}

TEST_CASE("case_io: the schema is draft-07 and closed") {
  const auto schema = nlohmann::json::parse(dutygauge::case_io::schema());
  CHECK(schema.at("$schema") == "http://json-schema.org/draft-07/schema#");
  CHECK(schema.at("additionalProperties") == false);
  CHECK(schema.at("required") == nlohmann::json({"dutygauge", "exchanger", "streams"}));
  const auto& tubes = schema.at("properties").at("exchanger").at("properties").at("tubes");
  CHECK(tubes.at("additionalProperties") == false);
  CHECK(tubes.at("properties").at("layout").at("enum").size() ==
        9);  // four angles, each as text and number, or unknown
  CHECK(schema.at("properties")
            .at("streams")
            .at("properties")
            .at("tube_side")
            .at("properties")
            .contains("fluid"));
}

TEST_CASE("case_io: a key is explained by its full name, its end, or as not read yet") {
  using dutygauge::case_io::explain;
  CHECK(explain("exchanger.tubes.length")->kind == "a length");
  CHECK(explain("tubes.length")->key == "exchanger.tubes.length");
  CHECK(explain("streams.tube_side.fluid.table.rows.3.density").has_value());
  CHECK(explain("fluid.table.rows.3.density").has_value());
  CHECK(explain("inquiry")->kind == "not read yet by this version");
  CHECK(explain("readings.columns.hot_flow.tag")->kind == "text");
  CHECK(!explain("exchanger.tubes.lenght").has_value());
  CHECK(!explain("").has_value());
}

TEST_CASE("case_io: the starter case in US units is the metric one, to the digits it is typed with") {
  const Case metric = built(dutygauge::case_io::starter_case());
  const Case us = built(dutygauge::case_io::starter_case(dutygauge::units::System::us));
  CHECK(us.display == dutygauge::units::System::us);
  const auto text = dutygauge::case_io::starter_case(dutygauge::units::System::us);
  CHECK(text.find("outside_diameter: 0.75 in") != std::string::npos);
  CHECK(text.find("\"Fluid quantity, total\"") != std::string::npos);
  const auto near = [](double a, double b) { return std::abs(a / b - 1.0) < 1e-3; };
  CHECK(near(us.problem.shell_side.mass_flow, metric.problem.shell_side.mass_flow));
  CHECK(near(us.problem.tube_side.mass_flow, metric.problem.tube_side.mass_flow));
  CHECK(near(us.problem.exchanger.area, metric.problem.exchanger.area));
  CHECK(near(us.problem.shell_side.inlet_temperature, metric.problem.shell_side.inlet_temperature));
}
