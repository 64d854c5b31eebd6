#pragma once
#include <unistd.h>

#include <atomic>
#include <filesystem>
#include <fstream>
#include <optional>
#include <stdexcept>
#include <string>
#include <vector>

#include "dutygauge/field/readings.hpp"

/// Files of readings and what becomes of them.
namespace field_support {

using namespace dutygauge;
using namespace dutygauge::field;

/// A temporary file with a text.
struct Written {
  explicit Written(const std::string& text) {
    static std::atomic<int> count = 0;
    path = (std::filesystem::temp_directory_path() /
            ("field-" + std::to_string(getpid()) + "-" + std::to_string(count++) + ".csv"))
               .string();
    std::ofstream(path, std::ios::binary) << text;
  }
  ~Written() {
    std::error_code ignored;
    std::filesystem::remove(path, ignored);
  }
  Written(const Written&) = delete;
  Written& operator=(const Written&) = delete;
  std::string path;
};

/// An invented fluid: 1000 kg/m3 at 20 degC, 0.3 kg/m3 less a kelvin.
inline rating::Stream stream(double inlet) {
  const fluids::PropertyRow cold{273.15, 1006.0, 4180.0, 0.6, 1e-3}, warm{373.15, 976.0, 4180.0, 0.6, 1e-3};
  const auto made = fluids::make_two_point(cold, warm, fluids::Phase::liquid);
  if (!made.objections.empty()) throw std::invalid_argument(made.objections.front().what);
  return {.name = "stream",
          .fluid = made.fluid,
          .mass_flow = 80.0,
          .inlet_temperature = inlet,
          .inlet_pressure = 5e5};
}

struct ReadRecord {
  std::vector<Reading> readings;
  Tally tally;
  std::vector<Understood> understood;
};

inline ReadRecord read_all(const std::vector<std::string>& files, const Mapping& mapping = {}) {
  const rating::Stream hot = stream(353.15), cold = stream(293.15);
  Record record(files, mapping, {.hot = &hot, .cold = &cold});
  ReadRecord result;
  for (Reading reading; record.next(reading);) result.readings.push_back(reading);
  result.tally = record.tally();
  result.understood = record.understood();
  return result;
}

/// What is wrong with a file of that text; empty where it can be read.
inline std::optional<FileError> error_of(const std::string& text, const Mapping& mapping = {}) {
  const Written file(text);
  try {
    read_all({file.path}, mapping);
  } catch (const FileError& error) {
    return error;
  }
  return {};
}

}  // namespace field_support
