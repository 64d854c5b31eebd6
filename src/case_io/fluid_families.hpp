#pragma once
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "parts.hpp"

/// The families of fluids: each makes its fluid from the values read below its key.
namespace dutygauge::case_io {

/// A family's block.
struct Source {
  Reading& reading;
  std::string key;  ///< "streams.shell_side.fluid.constant"

  std::optional<double> value(std::string_view name) const { return si(reading.entries(), joined_key(name)); }
  std::string joined_key(std::string_view name) const { return key + '.' + std::string(name); }

  /// The keys that may have any name, in the block `name`.
  std::vector<std::pair<std::string, const Entry*>> entries_of(std::string_view name) const;
};

struct Family {
  std::string_view name;
  std::optional<fluids::Made> (*make)(const Source&);  ///< empty: a value is missing, which is noted
};

/// The family of that name, or null.
const Family* family_named(std::string_view name);

/// All that `key`, a fluid's block, holds.
std::vector<const Family*> families_in(const Reading& reading, const std::string& key);

/// What `given` below the family's block says of the fluid.
std::vector<fluids::GivenProperty> given_in(const Source& source);

}  // namespace dutygauge::case_io
