#pragma once
#include <span>
#include <string_view>

/// Citations of what the methods, constants and limits rest on. One line each;
/// findings and reports name them by key.
namespace dutygauge::sources {

struct Source {
  std::string_view key;
  std::string_view citation;
  std::string_view standing;  ///< "read", "secondary" (through a source that restates it) or "recalled"
};

std::span<const Source> all();

/// The citation of a key; empty if there is none.
std::string_view citation(std::string_view key);

}  // namespace dutygauge::sources
