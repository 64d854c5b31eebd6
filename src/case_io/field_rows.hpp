#pragma once
#include <span>

#include "fields.hpp"

/// The rows as declared, before sides and fluids are written out.
namespace dutygauge::case_io {

struct Row {
  const char* key;  ///< "*" stands for shell_side and tube_side
  Form form;
  Need need;
  units::Kind kind;
  Bounds bounds;
  const char* example;  ///< "shell // tube" where the sides differ; so in `help`
  const char* help;
  const char* words = "";
  const char* instead = "";
};

std::span<const Row> case_rows();

/// The blocks `readings` and `plan`; "@" stands for a channel.
std::span<const Row> record_rows();

/// Keys relative to a fluid.
std::span<const Row> fluid_rows();

/// Keys relative to a block `given` of a fluid.
std::span<const Row> given_rows();

}  // namespace dutygauge::case_io
