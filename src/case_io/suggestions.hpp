#pragma once
#include <string>
#include <string_view>

#include "fields.hpp"

/// What somebody who wrote an unknown key may have meant.
namespace dutygauge::case_io {

struct Suggestion {
  std::string meant;  ///< the full key; empty where nothing is near
  std::string expected, remedy;
};

Suggestion suggest(const FieldTable& table, std::string_view key);

/// "a block with count, passes, ..." of a block's key; empty: the file itself.
std::string keys_of(const FieldTable& table, std::string_view block);

}  // namespace dutygauge::case_io
