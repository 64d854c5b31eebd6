#include <doctest/doctest.h>

#include <filesystem>
#include <nlohmann/json.hpp>
#include <sstream>

#include "dutygauge/cli.hpp"
#include "field_support.hpp"
#include "support.hpp"

using field_support::Written;

namespace {

using dutygauge::cli::Status;

const std::string data = TEST_DATA "/field/";

struct Ran {
  int status;
  std::string out, err;
};

Ran field_of(std::vector<std::string> words) {
  words.insert(words.begin(), "field");
  std::ostringstream out, err;
  const int status = dutygauge::cli::run(words, out, err);
  return {status, out.str(), err.str()};
}

bool contains(const std::string& text, const std::string& part) {
  return text.find(part) != std::string::npos;
}

}  // namespace

TEST_CASE("cli: field says what was read, used and dropped") {
  const auto ran = field_of({"--json", data + "A.yaml", data + "A-readings.csv"});
  CHECK(ran.err.empty());
  CHECK(ran.status == Status::not_met);  // its service is lost since September
  const auto json = nlohmann::json::parse(ran.out);
  CHECK(json.at("rows").at("read") == 8760);
  CHECK(json.at("rows").at("dropped").at("off_line") == 96);
  int sum = json.at("rows").at("used").get<int>();
  for (const auto& [reason, count] : json.at("rows").at("dropped").items()) sum += count.get<int>();
  CHECK(sum == 8760);
  CHECK(json.at("closure").at("verdict") == "closes");
  // The truth of the last day: 3.26e-4 m2.K/W.
  CHECK(json.at("fouling").at("now_m2K_W").get<double>() == doctest::Approx(3.26e-4).epsilon(0.03));
  const auto& record = json.at("record");
  CHECK(record.at("files")[0].at("first").at("as_typed") ==
        "2021-01-01T00:00:00Z,81.05,101.25,53.78,35.01,15.91,30.71,32.48,45.40");
  CHECK(record.at("files")[0].at("first").at("hot_in_degC").get<double>() == doctest::Approx(53.78));
  CHECK(record.at("values").at("missing") == 568);
  CHECK(record.at("level").at("basis") == "films");
}

TEST_CASE("cli: field on a page fits it and says how the files were understood") {
  const auto ran = field_of({data + "G.yaml", data + "G-readings.csv"});
  CHECK(contains(ran.out, "READ         G-readings.csv: separator ','"));
  CHECK(contains(ran.out, "calibrated on"));
  std::istringstream lines(ran.out);
  for (std::string line; std::getline(lines, line);) CHECK(line.size() <= 100);
}

TEST_CASE("cli: field writes every row of the series, used or not") {
  const Written target("");
  const auto ran = field_of({data + "A.yaml", data + "A-readings.csv", "--csv", target.path, "--force"});
  CHECK(ran.status == Status::not_met);
  const auto rows = support::read_csv(target.path);
  REQUIRE(rows.size() == 8760);
  CHECK(rows[0].at("time") == "2021-01-01T00:00:00Z");
  CHECK(std::stod(rows[0].at("duty_W")) == doctest::Approx(6.335e6).epsilon(0.03));  // truth 6335.2 kW
  CHECK(rows[0].at("used") == "1");
  for (const auto& row : rows) {
    CHECK((row.at("used") == "1") == row.at("why").empty());
    if (row.at("used") == "1") CHECK_FALSE(row.at("fouling_u95_m2K_W").empty());
  }
  CHECK(field_of({data + "A.yaml", data + "A-readings.csv", "--csv", target.path}).status ==
        Status::input_at_fault);
}

TEST_CASE("cli: field writes a page for a browser beside its page, or instead of it") {
  const Written target("");
  const std::vector<std::string> words = {data + "B.yaml", data + "B-readings.csv"};
  auto to_file = words;
  to_file.insert(to_file.end(), {"--html", target.path, "--force"});
  const auto ran = field_of(to_file);
  CHECK(ran.status == Status::done);  // B still does its duty
  CHECK(contains(ran.out, "ANSWER"));
  const std::string html = support::read_text(target.path);
  CHECK(html.starts_with("<!doctype html>"));
  CHECK(contains(html, "Never open or isolate on this result alone."));
  to_file.pop_back();
  CHECK(field_of(to_file).status == Status::input_at_fault);  // it exists
  auto to_out = words;
  to_out.insert(to_out.end(), {"--html", "-"});
  CHECK(field_of(to_out).out == html);
}

TEST_CASE("cli: a file of readings at fault is status 2 with its place") {
  const Written bad("time,hot_flow\n2021-01-01T00:00:00Z,1\n");
  const auto ran = field_of({data + "A.yaml", bad.path});
  CHECK(ran.status == Status::input_at_fault);
  CHECK(ran.out.empty());
  CHECK(contains(ran.err, bad.path + ":1:6: error: the column 'hot_flow' has no unit; expected such as "
                                     "hot_flow[kg/s]; write it into the header"));
  const Written kept("kept");
  field_of({data + "A.yaml", bad.path, "--csv", kept.path, "--force"});
  CHECK(support::read_text(kept.path) == "kept");
}

TEST_CASE("cli: readings of which none can be used are no result") {
  std::string text =
      "time,hot_flow[kg/s],cold_flow[kg/s],hot_in[degC],hot_out[degC],cold_in[degC],cold_out[degC]\n";
  for (int hour = 10; hour < 20; ++hour)
    text += "2021-01-01T" + std::to_string(hour) + ":00:00Z,bad,bad,bad,bad,bad,bad\n";
  const Written file(text);
  for (const char* option : {"--json", "--units=us"}) {
    const auto ran = field_of({option, data + "A.yaml", file.path});
    CHECK(ran.status == Status::no_result);
    CHECK(contains(ran.out, "incomplete"));
  }
}

TEST_CASE("cli: a call of field that cannot be followed is refused") {
  CHECK(field_of({}).status == Status::input_at_fault);
  CHECK(contains(field_of({data + "A.yaml"}).err, "a case and its readings"));
  CHECK(contains(field_of({"-", "-"}).err, "only once"));
  CHECK(contains(field_of({data + "A.yaml", "-", data + "A-readings.csv"}).err, "stand alone"));
  CHECK(contains(field_of({data + "A.yaml", "/nonexistent.csv"}).err, "cannot be read"));
  CHECK(contains(field_of({data + "A.yaml", data}).err, "is a folder"));
  CHECK(contains(field_of({"--case", "winter", data + "A.yaml", data + "A-readings.csv"}).err,
                 "no operating case"));
}
