#include <doctest/doctest.h>
#include <fcntl.h>
#include <sys/resource.h>
#include <sys/stat.h>
#include <unistd.h>

#include <fmt/format.h>

#include <thread>

#include "field_support.hpp"

using namespace dutygauge::field;
using field_support::error_of;
using field_support::read_all;
using field_support::Written;

namespace {

const std::string header =
    "time,hot_flow[kg/s],cold_flow[kg/s],hot_in[degC],hot_out[degC],cold_in[degC],cold_out[degC]\n";

std::string row(int hour, const char* values = "80,100,54,35,16,31") {
  return fmt::format("2021-01-{:02}T{:02}:00:00Z,{}\n", 1 + hour / 24, hour % 24, values);
}

}  // namespace

TEST_CASE("field: what is no file of readings is refused with its reason") {
  struct Row {
    const char* what;
    std::string text;
    const char* said;
  };
  std::string binary(100'000, '\0');
  for (std::size_t i = 0; i < binary.size(); ++i) binary[i] = static_cast<char>((i * 7919 + i / 251) % 256);
  std::string wide = "time";
  for (int i = 0; i < 1'000'000; ++i) wide += ",x";
  std::string many = "time";
  for (int i = 0; i < 3000; ++i) many += ",c" + std::to_string(i);
  const Row rows[] = {
      {"empty", "", "the file is empty"},
      {"comments only", "# one\n\n# two\n", "the file is empty"},
      {"header only", header, "no reading below the header"},
      {"one column", "time\n2021-01-01T00:00Z\n", "one column only"},
      {"random bytes", binary, ""},
      {"zero bytes", std::string("time,\0hot\n", 10), "a zero byte"},
      {"UTF-16", std::string("\xFF\xFEt\0i\0m\0e\0", 10), "UTF-16"},
      {"packed", "\x1F\x8B\x08 and so on", "compressed"},
      {"a workbook", "PK\x03\x04 and so on", "compressed"},
      {"a line of 10 MB", header + row(0) + std::string(10'000'000, '7') + "\n", "a line of more than"},
      {"a line of 10 MB without an end", std::string(10'000'000, 'x'), "a line of more than"},
      {"a million columns", wide + "\n", "a line of more than"},
      {"three thousand columns", many + "\n", "more than 2000 columns"},
      {"no header", row(0) + row(1), "no column 'time'"},
      {"prose", "This is, of course, a letter\nand, no, record.\n", "no column 'time'"},
      {"day or month first", header + "01/02/2021 00:00,80,100,54,35,16,31\n", "day or its month first"},
      {"local time", header + "2021-01-01 00:00,80,100,54,35,16,31\n", "no offset"},
      {"a number for a time", header + "44197.5,80,100,54,35,16,31\n", "is no time"},
      {"two date formats", header + row(0) + "02.01.2021 01:00,80,100,54,35,16,31\n", "two date formats"},
      {"decimal commas cut at commas", header + "2021-01-01T00:00Z,80,1,100,2,54,3,35,1,16,0,31,2\n",
       "13 values under 7 headers"},
      {"decimal commas in a file without more", "time,hot_in[degC]\n2021-01-01T00:00Z,80,1\n", ""},
  };
  for (const Row& one : rows) {
    CAPTURE(one.what);
    const auto error = error_of(one.text);
    REQUIRE(error);
    CHECK_MESSAGE(error->text().what.find(one.said) != std::string::npos, error->text().what);
    CHECK(error->text().what.size() < 600);
    CHECK_FALSE(error->text().expected.empty());
    CHECK_FALSE(error->text().remedy.empty());
  }
}

TEST_CASE("field: a file that is not there, a folder and a device are refused") {
  for (const char* path : {"/nonexistent/file.csv", "/tmp", "/dev/null"}) {
    CAPTURE(path);
    CHECK_THROWS_AS(read_all({path}), FileError);
  }
}

TEST_CASE("field: bad words alone give readings without a value") {
  std::string text = header;
  for (int i = 0; i < 30; ++i) text += row(i, "bad,no data,#N/A,?,Bad,I/O Timeout");
  const Written file(text);
  const auto read = read_all({file.path});
  CHECK(read.readings.size() == 30);
  CHECK(read.tally.bad == 180);
  CHECK(read.tally.first_bad.size() == 3);
}

TEST_CASE("field: headers may repeat, and broken rows cost no more than themselves") {
  const Written file(header + row(0) + header + row(1) + "\n,,,,,,\n" + row(2, "80,100") +
                     "\"2021-01-01T03:00:00Z\",\"80\",\"1\"\"00\",54,35,16,31\n" + row(4) +
                     "2021-01-01T05:00:00Z,\"unclosed,54,35,16,31\n" + std::string(60'000, ',') + "\n" +
                     row(6));
  const auto read = read_all({file.path});
  CHECK(read.tally[Drop::repeated_header] == 1);
  CHECK(read.tally[Drop::unreadable_time] == 2);
  CHECK(read.readings.size() == 7);
  CHECK(read.tally.bad == 2);
}

TEST_CASE("field: cut anywhere, a file is read up to there or refused") {
  const std::string text =
      "\xEF\xBB\xBF# x\r\n" + header + row(0) + row(1, "\"80\",100,54,35,16,31") + row(2);
  for (std::size_t length = 0; length < text.size(); ++length) {
    CAPTURE(length);
    const Written file(text.substr(0, length));
    try {
      const auto read = read_all({file.path});
      CHECK(read.readings.size() <= 3);
    } catch (const FileError& error) {
      CHECK_FALSE(error.text().what.empty());
    }
  }
}

TEST_CASE("field: a pipe that hands over its bytes one by one is read like a file") {
  const std::string path = "/tmp/field-pipe-" + std::to_string(getpid());
  REQUIRE(mkfifo(path.c_str(), 0600) == 0);
  const std::string text = "\xEF\xBB\xBF" + header + row(0) + row(1);
  std::thread writer([&] {
    const int handle = open(path.c_str(), O_WRONLY | O_CLOEXEC);
    for (const char c : text) CHECK(write(handle, &c, 1) == 1);
    close(handle);
  });
  const auto read = read_all({path});
  writer.join();
  unlink(path.c_str());
  CHECK(read.readings.size() == 2);
  CHECK(read.understood[0].header_rows == 1);
}

TEST_CASE("field: reading stops when it is told to") {
  const Written file(header + row(0) + row(1));
  const auto hot = field_support::stream(350), cold = field_support::stream(290);
  CHECK_THROWS_AS(
      Record({file.path}, Mapping{}, {.hot = &hot, .cold = &cold}, [](std::uint64_t) { return false; }),
      Interrupted);
}

TEST_CASE("field: memory does not grow with the rows") {
  std::string text = header;
  for (int i = 0; i < 700; ++i) text += row(i);
  const auto hot = field_support::stream(350), cold = field_support::stream(290);
  const Mapping mapping;
  const auto peak = [] {
    rusage usage{};
    getrusage(RUSAGE_SELF, &usage);
    return usage.ru_maxrss;  // [kB]
  };
  const Written small(text);
  read_all({small.path});
  const long before = peak();
  const std::string path = small.path + ".long";
  {
    std::ofstream file(path, std::ios::binary);
    file << header;
    for (int i = 0; i < 400'000; ++i)
      file << fmt::format("{}T{:02}:{:02}:00Z,80.1,100.2,54.3,35.4,16.5,31.6\n", 2021 + i / 1440 / 28 / 12,
                          i / 60 % 24, i % 60)
                  .insert(4, fmt::format("-{:02}-{:02}", 1 + i / 1440 / 28 % 12, 1 + i / 1440 % 28));
  }
  Record record({path}, mapping, {.hot = &hot, .cold = &cold});
  std::uint64_t rows = 0;
  for (Reading reading; record.next(reading);) ++rows;
  std::filesystem::remove(path);
  CHECK(rows == 400'000);
  CHECK(peak() - before < 2000);  // a file of 22 MB
}
