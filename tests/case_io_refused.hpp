#pragma once
#include <doctest/doctest.h>

#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/case_io.hpp"

/// Tables of texts and what the reader must say of them.
namespace refused {

using dutygauge::case_io::build;
using dutygauge::case_io::InputError;
using dutygauge::case_io::read_document;

/// What a message must hold, in one line of it.
using Fragments = std::vector<std::string>;

struct Text {
  std::string what;
  std::string text;
  Fragments fragments;
};

inline std::vector<std::string> lines_of(const std::string& text) {
  try {
    build(read_document(text, "x"));
  } catch (const InputError& error) {
    return error.lines();
  }
  return {};
}

inline bool has_line_with(const std::vector<std::string>& lines, const Fragments& fragments) {
  for (const auto& line : lines) {
    bool all = true;
    for (const auto& fragment : fragments) all = all && line.find(fragment) != std::string::npos;
    if (all) return true;
  }
  return false;
}

inline std::string shown(const std::vector<std::string>& lines) {
  std::string text;
  for (const auto& line : lines) text += line.substr(0, 300) + "\n";
  return text.empty() ? "accepted" : text;
}

inline void check(const std::vector<Text>& rows) {
  for (const Text& row : rows) {
    CAPTURE(row.what);
    const auto lines = lines_of(row.text);
    CHECK_MESSAGE(has_line_with(lines, row.fragments), shown(lines));
  }
}

inline std::string repeated(std::string_view part, int times) {
  std::string text;
  for (int i = 0; i < times; ++i) text += part;
  return text;
}

inline const std::string water_row =
    "{temperature: 20 degC, density: 998 kg/m3, heat_capacity: 4.18 kJ/kg.K, conductivity: 0.6 W/m.K, "
    "viscosity: 1 cP}";

}  // namespace refused
