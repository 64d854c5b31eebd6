#include <doctest/doctest.h>
#include <unistd.h>

#include <cmath>
#include <filesystem>
#include <fstream>

#include "dutygauge/field/readings.hpp"
#include "dutygauge/field/times.hpp"
#include "field_support.hpp"

using namespace dutygauge;
using namespace dutygauge::field;
using field_support::error_of;
using field_support::read_all;
using field_support::Written;

namespace {

constexpr std::string_view header =
    "time,hot_flow[kg/s],cold_flow[kg/s],hot_in[degC],hot_out[degC],cold_in[degC],cold_out[degC]\n";

double of(const Reading& reading, Channel channel) {
  return reading.value[index_of(channel)];
}

std::int64_t utc(std::string_view text) {
  return read_moment(text, {}).value();
}

std::int64_t read_time(const Clock& clock, std::string_view text, std::int64_t last = 0) {
  const auto read = TimeReader(clock).read(text, last);
  REQUIRE(read.fault == TimeFault::none);
  return read.time;
}

}  // namespace

TEST_CASE("field: times with an offset are the same instant") {
  // 1 625 137 200: `date -u -d 2021-07-01T11:00:00Z +%s` of coreutils.
  for (const char* text : {"2021-07-01T13:00:00+02:00", "2021-07-01T11:00:00Z", "2021-07-01 11:00Z",
                           "2021-07-01T05:30-0530", "2021-07-01T11:00:00.250 +00:00"}) {
    CAPTURE(text);
    CHECK(read_time({}, text) == 1625137200);
  }
  CHECK(written(1625137200) == "2021-07-01T11:00:00Z");
  CHECK(written(951782400) == "2000-02-29T00:00:00Z");
  CHECK(written(-1) == "1969-12-31T23:59:59Z");
}

TEST_CASE("field: what is no time is said to be none") {
  for (const char* text :
       {"", "2021", "2021-13-01T00:00Z", "2021-02-29T00:00Z", "2021-01-01T25:00Z", "2021-01-01T00:60Z",
        "2021-01-01", "x2021-01-01T00:00Z", "2021-01-01T00:00Zx", "2021-01-01T00:00+99:00"}) {
    CAPTURE(text);
    CHECK(TimeReader({}).read(text, 0).fault == TimeFault::unreadable);
  }
  CHECK(TimeReader({}).read("01/02/2021 13:00", 0).fault == TimeFault::slashes);
  CHECK(TimeReader({}).read("1.2.21 13:00", 0).fault == TimeFault::slashes);
  CHECK(TimeReader({}).read("2021-02-01T13:00", 0).fault == TimeFault::no_offset);
}

TEST_CASE("field: a stated format is followed to the letter") {
  const Clock clock{.column = "Zeit", .format = "%d.%m.%Y %H:%M", .offset = 3600};
  CHECK(read_time(clock, "01.07.2021 12:00") == utc("2021-07-01T11:00Z"));
  CHECK(TimeReader(clock).read("2021-07-01 12:00", 0).fault == TimeFault::unreadable);
  const Clock american{.column = {}, .format = "%b %d %Y %I:%M %p", .offset = 0};
  CHECK(read_time(american, "Jul 1 2021 12:05 AM") == utc("2021-07-01T00:05Z"));
  CHECK(read_time(american, "JUL 01 2021 1:05 pm") == utc("2021-07-01T13:05Z"));
  CHECK(objection_to_format("%d.%m.%Y %H:%M").empty());
  for (const char* format : {"", "%d.%m.%Y", "%Y-%m-%d %H:%M %", "%Y %Q", "%m/%d %H:%M", "%Y-%m-%d %I:%M"}) {
    CAPTURE(format);
    CHECK_FALSE(objection_to_format(format).empty());
  }
}

TEST_CASE("field: summer time has one repeated and one absent hour") {
  // Europe 2021: 28 March and 31 October, 01:00 UTC (Directive 2000/84/EC).
  const Clock clock{.column = {}, .format = "%Y-%m-%d %H:%M", .offset = 3600, .summer_time = SummerTime::eu};
  CHECK(read_time(clock, "2021-03-28 01:59") == utc("2021-03-28T00:59Z"));
  CHECK(TimeReader(clock).read("2021-03-28 02:30", 0).fault == TimeFault::absent);
  CHECK(read_time(clock, "2021-03-28 03:00") == utc("2021-03-28T01:00Z"));
  const std::int64_t first = read_time(clock, "2021-10-31 02:30", utc("2021-10-31T00:00Z"));
  CHECK(first == utc("2021-10-31T00:30Z"));
  CHECK(read_time(clock, "2021-10-31 02:30", first) == first + 3600);
  CHECK(read_time(clock, "2021-10-31 02:00", first) == utc("2021-10-31T01:00Z"));
  CHECK(read_time(clock, "2021-10-31 03:00") == utc("2021-10-31T02:00Z"));
  // United States 2021: 14 March and 7 November (Energy Policy Act of 2005); UTC-5.
  const Clock eastern{
      .column = {}, .format = "%Y-%m-%d %H:%M", .offset = -18000, .summer_time = SummerTime::us};
  CHECK(read_time(eastern, "2021-03-14 01:59") == utc("2021-03-14T06:59Z"));
  CHECK(TimeReader(eastern).read("2021-03-14 02:30", 0).fault == TimeFault::absent);
  CHECK(read_time(eastern, "2021-03-14 03:00") == utc("2021-03-14T07:00Z"));
  const std::int64_t once = read_time(eastern, "2021-11-07 01:30", utc("2021-11-07T05:00Z"));
  CHECK(once == utc("2021-11-07T05:30Z"));
  CHECK(read_time(eastern, "2021-11-07 01:30", once) == once + 3600);
}

TEST_CASE("field: an hourly year of wall-clock times loses and repeats nothing") {
  const Clock clock{.column = {}, .format = "%Y-%m-%d %H:%M", .offset = 3600, .summer_time = SummerTime::eu};
  const TimeReader reader(clock);
  std::int64_t last = utc("2020-12-31T22:00Z");
  for (std::int64_t time = last + 3600; time < utc("2022-01-01T00:00Z"); time += 3600) {
    const bool summer = time >= utc("2021-03-28T01:00Z") && time < utc("2021-10-31T01:00Z");
    std::string wall = written(time + 3600 + (summer ? 3600 : 0)).substr(0, 16);
    wall[10] = ' ';
    const auto read = reader.read(wall, last);
    if (read.fault != TimeFault::none || read.time != time) {
      CAPTURE(wall);
      REQUIRE(read.time == time);
    }
    last = time;
  }
}

TEST_CASE("field: a plain file becomes SI") {
  const Written file("# a comment\n" + std::string(header) +
                     "2021-01-01T00:00:00Z,81.05,101.25,53.78,35.01,15.91,30.71\n"
                     "\n# another\n2021-01-01T01:00:00Z,78.47,,54.31,nan,-,NA\n");
  const auto read = read_all({file.path});
  REQUIRE(read.readings.size() == 2);
  CHECK(read.readings[0].time == utc("2021-01-01T00:00Z"));
  CHECK(of(read.readings[0], Channel::hot_flow) == 81.05);
  CHECK(of(read.readings[0], Channel::cold_out) == doctest::Approx(303.86).epsilon(1e-14));
  CHECK(std::isnan(of(read.readings[0], Channel::tube_dp)));
  CHECK(std::isnan(of(read.readings[1], Channel::cold_flow)));
  CHECK(read.tally.missing == 4);
  CHECK(read.tally.rows == 2);
  const Understood& understood = read.understood.front();
  CHECK(understood.separator == ',');
  CHECK(understood.separator_found);
  CHECK(understood.header_rows == 1);
  CHECK(understood.first->typed == "2021-01-01T00:00:00Z,81.05,101.25,53.78,35.01,15.91,30.71");
  CHECK(understood.first->line == 3);
  CHECK(understood.last->line == 6);
}

TEST_CASE("field: units are those of the header, differences without a zero") {
  const Written file(
      "time,hot_flow[t/h],cold_flow[gpm],hot_in[degF],hot_out[K],cold_in[°C],cold_out[degC],"
      "tube_dp[psi],shell_dp[bar],valve[%]\n"
      "2021-01-01T00:00:00Z,36,100,212,350,20,30,10,0.5,40\n");
  const auto reading = read_all({file.path}).readings.at(0);
  CHECK(of(reading, Channel::hot_flow) == doctest::Approx(10.0).epsilon(1e-14));
  CHECK(of(reading, Channel::hot_in) == doctest::Approx(373.15).epsilon(1e-12));
  CHECK(of(reading, Channel::hot_out) == 350.0);
  CHECK(of(reading, Channel::cold_in) == doctest::Approx(293.15).epsilon(1e-14));
  CHECK(of(reading, Channel::tube_dp) == doctest::Approx(68947.57).epsilon(1e-6));
  CHECK(of(reading, Channel::shell_dp) == doctest::Approx(50000.0).epsilon(1e-14));
  CHECK(of(reading, Channel::valve) == doctest::Approx(0.4).epsilon(1e-14));
  // 100 US gallons a minute of the cold fluid, 1000 - 0.3 (t - 20) kg/m3, at its 20 degC.
  CHECK(of(reading, Channel::cold_flow) == doctest::Approx(100 * 3.785411784e-3 / 60 * 1000).epsilon(1e-9));
}

TEST_CASE("field: a volume is taken with the density at its meter") {
  const Written file(
      "time,hot_flow[kg/s],cold_flow[m3/h],hot_in[degC],hot_out[degC],cold_in[degC],cold_out[degC]\n"
      "2021-01-01T00:00:00Z,10,36,80,60,40,30\n2021-01-01T01:00:00Z,10,36,80,60,,30\n");
  const auto read = read_all({file.path});
  CHECK(of(read.readings[0], Channel::cold_flow) == doctest::Approx(10 * 0.994).epsilon(1e-9));
  CHECK(of(read.readings[1], Channel::cold_flow) == doctest::Approx(10.0).epsilon(1e-9));
  CHECK(read.understood[0].columns[1].density.find("1000 kg/m3") != std::string::npos);
  Mapping mapping;
  mapping.columns[index_of(Channel::cold_flow)].at = "60 degC";
  const auto elsewhere = read_all({file.path}, mapping);
  CHECK(of(elsewhere.readings[0], Channel::cold_flow) == doctest::Approx(10 * 0.988).epsilon(1e-9));
}

TEST_CASE("field: a meter that takes its design density for the true one is corrected") {
  const auto flow = [](const char* unit, Principle principle) {
    const Written file(std::string("time,hot_flow[kg/s],cold_flow[") + unit +
                       "],hot_in[degC],hot_out[degC],cold_in[degC],cold_out[degC]\n"
                       "2021-01-01T00:00:00Z,10,36,80,60,40,30\n");
    Mapping mapping;
    mapping.columns[index_of(Channel::cold_flow)].meter = {principle, 800.0, false};
    return of(read_all({file.path}, mapping).readings.at(0), Channel::cold_flow);
  };
  // The densities are tabulated: the square root is straight to 1e-7 between two entries.
  // A true flow of 10 kg/s of 994 kg/m3. An orifice shows m sqrt(rho_d/rho), or V sqrt(rho/rho_d).
  const double shown_mass = 10.0 * std::sqrt(800.0 / 994.0);
  CHECK(flow("kg/s", Principle::differential_pressure) ==
        doctest::Approx(36.0 * 10.0 / shown_mass).epsilon(1e-7));
  const double shown_volume = 10.0 / 994.0 * std::sqrt(994.0 / 800.0);  // [m3/s]
  CHECK(flow("m3/h", Principle::differential_pressure) ==
        doctest::Approx(36.0 / 3600.0 * 10.0 / shown_volume).epsilon(1e-7));
  CHECK(flow("kg/s", Principle::velocity) == doctest::Approx(36.0 * 994.0 / 800.0).epsilon(1e-9));
  CHECK(flow("m3/h", Principle::velocity) == doctest::Approx(9.94).epsilon(1e-9));
  CHECK(flow("kg/s", Principle::mass) == 36.0);
}

TEST_CASE("field: a plant's own export needs no editing") {
  const Written file(
      "\xEF\xBB\xBF"
      "Zeit;21FI1043.PV;21FI2007.PV;21TI1044.PV;21TI1045.PV;21TI2001.PV;\"21TI2002.PV\";Kommentar\r\n"
      ";Einsatz;Wasser;;;;;\r\n"
      ";t/h;m3/h;C;C;C;C;\r\n"
      "28.03.2021 01:00;36,5;36;80,1;60,2;20,0;\"30,4\";\"ein \"\"Wort\"\"; zwei\"\r\n"
      "28.03.2021 03:00;36,5;No Data;80,1;60,2;20,0;30,4;\r\n");
  Mapping mapping;
  mapping.clock = {
      .column = "Zeit", .format = "%d.%m.%Y %H:%M", .offset = 3600, .summer_time = SummerTime::eu};
  mapping.bad_words = {"no data"};
  const std::pair<Channel, std::pair<const char*, const char*>> tags[] = {
      {Channel::hot_flow, {"21FI1043.PV", "t/h"}}, {Channel::cold_flow, {"21FI2007.PV", "m3/h"}},
      {Channel::hot_in, {"21TI1044.PV", "degC"}},  {Channel::hot_out, {"21TI1045.PV", "degC"}},
      {Channel::cold_in, {"21TI2001.PV", "degC"}}, {Channel::cold_out, {"21TI2002.PV", "degC"}}};
  for (const auto& [channel, tag] : tags) {
    mapping.columns[index_of(channel)].tag = tag.first;
    mapping.columns[index_of(channel)].unit = tag.second;
  }
  const auto read = read_all({file.path}, mapping);
  REQUIRE(read.readings.size() == 2);
  CHECK(read.readings[0].time == utc("2021-03-28T00:00Z"));
  CHECK(read.readings[1].time == utc("2021-03-28T01:00Z"));
  CHECK(of(read.readings[0], Channel::hot_flow) == doctest::Approx(36.5 / 3.6).epsilon(1e-14));
  CHECK(of(read.readings[0], Channel::cold_out) == doctest::Approx(303.55).epsilon(1e-14));
  const Understood& understood = read.understood.front();
  CHECK(understood.separator == ';');
  CHECK(understood.decimal == ',');
  CHECK(understood.header_rows == 3);
  CHECK(understood.ignored == std::vector<std::string>{"Kommentar"});
  CHECK(read.tally.bad == 1);
  REQUIRE(read.tally.first_bad.size() == 1);
  CHECK(read.tally.first_bad[0].find(":5: cold_flow: 'No Data'") != std::string::npos);
}

TEST_CASE("field: rows out of order are dropped and counted") {
  const auto row = [](const char* hour) {
    return std::string("2021-01-01T") + hour + ":00:00Z,80,100,54,35,16,31\n";
  };
  const Written file(std::string(header) + row("00") + row("01") + row("01") + row("00") +
                     std::string(header) + row("02") + "Total\n" + "end of export,,,,,,\n");
  const auto read = read_all({file.path});
  CHECK(read.readings.size() == 3);
  CHECK(read.tally[Drop::duplicate] == 1);
  CHECK(read.tally[Drop::backward] == 1);
  CHECK(read.tally[Drop::repeated_header] == 1);
  CHECK(read.tally[Drop::malformed] == 1);
  CHECK(read.tally[Drop::unreadable_time] == 1);
  CHECK(read.tally.rows == 8);
}

TEST_CASE("field: several files are read in order of time, each by its own header") {
  const Written late(std::string(header) + "2021-01-02T00:00:00Z,80,100,54,35,16,31\n");
  const Written early(
      "time;cold_flow[t/h];hot_flow[kg/s];hot_in[degF];hot_out[degC];cold_in[degC];cold_out[degC]\n"
      "2021-01-01T00:00:00Z;360;80;129,2;35;16;31\n2021-01-02T00:00:00Z;360;80;129,2;35;16;31\n");
  const auto read = read_all({late.path, early.path});
  REQUIRE(read.readings.size() == 2);
  CHECK(read.understood[0].file == early.path);
  for (const Reading& reading : read.readings) {
    CHECK(of(reading, Channel::cold_flow) == doctest::Approx(100.0).epsilon(1e-12));
    CHECK(of(reading, Channel::hot_in) == doctest::Approx(327.15).epsilon(1e-12));
  }
  CHECK(read.tally[Drop::duplicate] == 1);
}

TEST_CASE("field: one of six channels may be missing, and unknown ones are named once") {
  const Written file(
      "time,hot_in[degC],hot_out[degC],cold_in[degC],cold_out[degC],cold_flow[kg/s],pump,note\n"
      "2021-01-01T00:00:00Z,54,35,16,31,100,on,ok\n2021-01-01T01:00:00Z,54,35,16,31,100,on,ok\n");
  const auto read = read_all({file.path});
  CHECK(read.readings.size() == 2);
  CHECK(read.understood[0].ignored == std::vector<std::string>{"pump", "note"});
  CHECK(read.tally.bad == 0);
}

TEST_CASE("field: a value may be bad by its number, too") {
  const Written file(
      std::string(header) +
      "2021-01-01T00:00:00Z,-999,1e400,54,-300,0x10,inf\n2021-01-01T01:00:00Z,1,2,54,35,16,31\n");
  Mapping mapping;
  mapping.bad_words = {"-999"};
  const auto read = read_all({file.path}, mapping);
  CHECK(read.tally.bad == 5);
  CHECK(read.tally.first_bad.size() == 3);
  CHECK(std::isnan(of(read.readings[0], Channel::hot_flow)));
}

TEST_CASE("field: the header's mistakes are named where they stand") {
  struct Row {
    const char *what, *text, *said;
    int column;
  };
  const Row rows[] = {
      {"no unit", "time,hot_flow,cold_flow[kg/s],hot_in[degC],hot_out[degC],cold_in[degC],cold_out[degC]\n",
       "has no unit", 6},
      {"wrong brackets", "time,hot_flow (kg/s),cold_flow[kg/s],hot_in[degC]\n", "no unit in square brackets",
       6},
      {"a pressure as flow", "time,hot_flow[bar],cold_flow[kg/s]\n", "hot_flow[bar]", 6},
      {"an ambiguous unit", "time,hot_in[C],cold_flow[kg/s]\n", "\"C\"", 6},
      {"a gauge for a drop", "time,tube_dp[barg],cold_flow[kg/s]\n", "gauge", 6},
      {"no unit at all", "time,hot_flow[+- 1 kg/s],x\n", "is no unit", 6},
      {"twice", "time,hot_in[degC],hot_in[degF]\n", "two columns for hot_in", 19},
      {"no time", "Zeit,hot_in[degC]\n", "no column 'time'", 1},
      {"too few", "time,hot_in[degC],cold_in[degC]\n", "no columns for hot_flow", 1},
  };
  for (const Row& row : rows) {
    CAPTURE(row.what);
    const auto error = error_of(std::string(row.text) + "2021-01-01T00:00:00Z,1,2\n");
    REQUIRE(error);
    CHECK_MESSAGE(error->text().what.find(row.said) != std::string::npos, error->text().what);
    CHECK(error->line() == 1);
    CHECK(error->column() == row.column);
    CHECK_FALSE(error->text().expected.empty());
    CHECK_FALSE(error->text().remedy.empty());
  }
}

TEST_CASE("field: a case and a header that contradict each other are refused") {
  Mapping mapping;
  mapping.columns[index_of(Channel::hot_flow)].unit = "t/h";
  const auto error = error_of(std::string(header) + "2021-01-01T00:00:00Z,80,100,54,35,16,31\n", mapping);
  REQUIRE(error);
  CHECK(error->text().what.find("the header says kg/s, the case t/h") != std::string::npos);
  mapping = {};
  mapping.columns[index_of(Channel::hot_flow)].tag = "21FI1043.PV";
  const auto unknown = error_of(std::string(header) + "2021-01-01T00:00:00Z,80,100,54,35,16,31\n", mapping);
  REQUIRE(unknown);
  CHECK(unknown->text().what.find("21FI1043.PV") != std::string::npos);
}
