#pragma once
#include <cmath>
#include <fstream>
#include <map>
#include <sstream>
#include <stdexcept>
#include <string>
#include <vector>

/// Small helpers shared by the tests.
namespace support {

/// Relative difference, absolute where the reference is zero.
inline double relative(double ours, double reference) {
  return reference == 0.0 ? std::abs(ours) : std::abs(ours / reference - 1.0);
}

inline std::string read_text(const std::string& path) {
  std::ifstream file(path, std::ios::binary);
  if (!file) throw std::runtime_error("cannot open " + path);
  std::ostringstream text;
  text << file.rdbuf();
  return text.str();
}

/// Rows of a comma-separated file with a header, by column name. Quoted fields may
/// hold commas; lines starting with # are comments.
using CsvRow = std::map<std::string, std::string>;
inline std::vector<CsvRow> read_csv(const std::string& path) {
  std::vector<CsvRow> rows;
  std::vector<std::string> header;
  std::istringstream lines(read_text(path));
  for (std::string line; std::getline(lines, line);) {
    if (!line.empty() && line.back() == '\r') line.pop_back();
    if (line.empty() || line[0] == '#') continue;
    std::vector<std::string> fields(1);
    bool quoted = false;
    for (char c : line) {
      if (c == '"')
        quoted = !quoted;
      else if (c == ',' && !quoted)
        fields.emplace_back();
      else
        fields.back() += c;
    }
    if (header.empty()) {
      header = fields;
      continue;
    }
    CsvRow row;
    for (std::size_t i = 0; i < header.size() && i < fields.size(); ++i) row[header[i]] = fields[i];
    rows.push_back(std::move(row));
  }
  return rows;
}

}  // namespace support
