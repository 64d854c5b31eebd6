#pragma once
#include <limits>
#include <span>
#include <string>
#include <string_view>
#include <unordered_map>
#include <vector>

#include "dutygauge/units.hpp"

/// The one table of what a case may hold. Reading, messages, schema, starter case
/// and help all come from its rows.
namespace dutygauge::case_io {

/// How a key's value is written.
enum class Form {
  block,             ///< a map of the keys below it
  list,              ///< a list of blocks
  text,              ///< free text
  word,              ///< one of `words`
  boolean,           ///< true or false
  version,           ///< the format's version
  tema,              ///< three TEMA letters
  whole,             ///< a whole number
  whole_or_list,     ///< a whole number, or one for each tube pass
  wholes,            ///< a list of whole numbers, one for each shell
  number,            ///< a plain number
  quantity,          ///< a number with a unit of `kind`
  either_viscosity,  ///< kinematic or dynamic
  property,          ///< a quantity "at" a temperature
  angle,             ///< an angle that is one of `words`
  wall,              ///< a length or a gauge
  bore,              ///< a length or a nominal pipe
  flow,              ///< a mass or volume flow
  pair,              ///< "a -> b" of `kind`
  fluid,             ///< a fluid's name, or a block of one family
  overlay,           ///< values by dotted key, laid on the case
  texts,             ///< a list of texts
  instant,           ///< a date, or a time in ISO 8601
  money,             ///< an amount with its currency
  energy_price,      ///< the same for an energy
  uncertainty,       ///< of an instrument: a share of the reading, or a quantity of `kind`
};

enum class Need {
  required,  ///< where its block stands
  usual,     ///< may be left out; in the starter case
  optional,  ///< may be left out; a comment in the starter case
};

/// What is plausible. Outside: a mistake, not an exchanger.
struct Bounds {
  double least = -std::numeric_limits<double>::infinity();
  double most = std::numeric_limits<double>::infinity();
  bool least_excluded = false;
};

struct Field {
  std::string key{};  ///< "#" stands for a list's index, "?" for any name
  Form form = Form::text;
  Need need = Need::optional;
  units::Kind kind = units::Kind::ratio;
  Bounds bounds{};
  std::string example{};  ///< a value as it may be typed
  std::string help{};     ///< what it means
  std::string words{};    ///< "this|that"
  std::string instead{};  ///< the neighbouring key that serves as well
};

class FieldTable {
 public:
  explicit FieldTable(std::vector<Field> fields);
  FieldTable(const FieldTable&) = delete;  // the index points into the rows
  FieldTable& operator=(const FieldTable&) = delete;

  std::span<const Field> all() const { return fields_; }

  /// The row of a key as a file has it ("rows.0.density"); null if there is none.
  const Field* find(std::string_view key) const;

 private:
  std::vector<Field> fields_;
  std::unordered_map<std::string_view, const Field*> by_key_;
};

/// Of a case.
const FieldTable& case_fields();

/// Of a fluid alone, under the key `fluid`.
const FieldTable& fluid_fields();

/// "a length such as 19.05 mm": what a row's value should be.
std::string expected_of(const Field& field);

/// Blocks in which operating cases may differ.
inline constexpr std::string_view blocks_that_may_differ = "exchanger|streams|service|methods";

/// What `fluid` may be, in words.
inline constexpr std::string_view known_fluids =
    "a name ('dutygauge fluid --list' has all), or a block with one of constant, table, two_point, oil, "
    "petroleum, gas_mixture, seawater, a glycol or a brine";

/// What a key of the case format means that this version does not read yet; null for others.
struct Unread {
  std::string_view key;  ///< "*" stands for one segment; all below it is meant too
  std::string_view meaning;
};
const Unread* find_unread(std::string_view key);

}  // namespace dutygauge::case_io
