#pragma once
#include <map>
#include <memory>
#include <optional>
#include <stdexcept>
#include <string>
#include <string_view>
#include <variant>
#include <vector>

#include "dutygauge/bids.hpp"
#include "dutygauge/field/mapping.hpp"
#include "dutygauge/findings.hpp"
#include "dutygauge/rating.hpp"
#include "dutygauge/service.hpp"
#include "dutygauge/service/control.hpp"
#include "dutygauge/uncertainty/anchor.hpp"

/// Case files: YAML to a Case of the structs below this level. No physics.
namespace dutygauge::case_io {

/// Where in a file something stands; both from 1, columns in characters. 0: nowhere.
struct Position {
  int line = 0, column = 0;
};

/// One mistake of a file.
struct Mistake {
  Position at;
  std::string key;  ///< full dotted key, or empty
  std::string what, expected, remedy;
};

/// A file that cannot be used, with everything that is wrong with it.
class InputError : public std::runtime_error {
 public:
  InputError(std::string file, std::vector<Mistake> mistakes);
  /// One line a mistake: "file:line:column: error: key: what; expected; what to do",
  /// in file order, the first 20 and then how many more.
  const std::vector<std::string>& lines() const { return lines_; }
  const std::vector<Mistake>& mistakes() const { return mistakes_; }

 private:
  std::vector<Mistake> mistakes_;
  std::vector<std::string> lines_;
};

/// One leaf of a case file: the text as written.
struct Leaf {
  std::string text;
  bool quoted = false;
  Position key_at, value_at;
  double factor = 1.0;  ///< the value read from `text` is multiplied by it
};

/// One map or list of a case file; stands where its key stands.
struct Block {
  Position at;
  bool is_list = false;
};

/// A case file as text by dotted key ("exchanger.tubes.count"; list items by
/// index: "fluid.table.rows.0.density"). Vary a case by changing leaves here.
struct Document {
  std::string file;  ///< name used in messages; "-" is standard input
  std::map<std::string, Leaf> leaves;
  std::map<std::string, Block> blocks;  ///< maps and lists, by dotted key
  std::string sha256;                   ///< of the bytes read, hexadecimal
  std::vector<Mistake> mistakes;        ///< that did not stop the reading (doubled keys)
  std::vector<std::string> of_cases;    ///< the file's operating cases, where this is one of them
  /// Where the shell side is scaled from the sheet, or a flow follows from its duty: the case the sheet
  /// speaks of, as it was before anything was varied. Null: this document is that case.
  std::shared_ptr<const Document> sheet{};
};

/// A finding that somebody has looked at and decided on.
struct Accepted {
  std::string id, because, by;
};

/// A fouling that a record of readings has shown.
struct FoundFouling {
  std::string taken = {};       ///< when, as typed
  double value = 0, sigma = 0;  ///< on the outside area [m2.K/W]
};

/// What says how the running unit is, and the unit it was taken of: as it is, without overlays.
struct AnchorReading {
  std::variant<uncertainty::SteadyReading, FoundFouling> reading;
  rating::Problem unit;
};

/// A case ready to be rated.
struct Case {
  std::string file, title, tag, sha256;
  std::string operating_case = "base";  ///< its name in the file
  std::string present_since;            ///< date since when the unit is as rated; empty where as built
  units::System display = units::System::metric;
  rating::Problem problem;
  service::Service service;
  std::optional<service::Control> control;  ///< what holds the unit at its duty
  bids::Claims claims;                      ///< of the sheet, as built
  std::optional<AnchorReading> anchor;
  Inputs inputs;        ///< as typed, and assumed, in SI
  Assumptions assumed;  ///< made while reading and deriving
  Findings findings;    ///< the same
  std::vector<Accepted> accepted;
  field::Mapping readings;  ///< how the plant's record is to be read
  field::Planned plan;
};

/// Reads YAML text strictly: one document, no anchors, aliases, tags, merges;
/// bounded size, depth and count. Doubled keys are noted in `mistakes`, the first
/// holds. Throws InputError.
Document read_document(std::string_view text, std::string file);

/// The bytes of a file (regular file or pipe, at most 4 MB), "-" for standard input.
/// Throws InputError; the text says what the system said.
std::string read_text(const std::string& path);

/// Reads such a file as a document. Throws InputError.
Document read_file(const std::string& path);

/// Names of the operating cases in file order; "base" alone where the file states none.
std::vector<std::string> operating_cases(const Document& document);

/// The document of one operating case as the unit is: `present`, then the case's own
/// overlay laid on it, as an ordinary document without either block. Messages point to
/// the overlay's line; what is wrong with the overlays themselves is in its `mistakes`.
/// Throws std::invalid_argument where the file has no such case.
Document overlaid(const Document& document, const std::string& operating_case);

/// The same as built: without `present`.
Document as_built(const Document& document, const std::string& operating_case);

/// The document with another text at a key ("x1.15": times what stands there); what the sheet
/// speaks of stays as it is. Throws InputError where the format has no such key.
Document with_value(const Document& document, const std::string& key, const std::string& text);

/// The same where the value itself is in doubt: the sheet's own case had it too.
Document with_other_reading(const Document& document, const std::string& key, const std::string& text);

/// The document with the value of a key multiplied. Throws InputError where it has none.
Document with_factor(const Document& document, const std::string& key, double factor);

/// Checks every leaf against the field table and builds every operating case as the
/// unit is, in file order. Throws InputError with all mistakes of all cases at once.
std::vector<Case> build_all(const Document& document);

/// The first of them, for a document of one case.
Case build(const Document& document);

/// Reads a fluid alone: `spec` is what stands under `fluid:` in a case, in YAML flow
/// style ("water", "{constant: {...}}"), for a stream that enters at `temperature` [K]
/// and `pressure` [Pa]. Throws InputError.
fluids::Made read_fluid_spec(std::string_view spec, double temperature, double pressure);

/// The JSON Schema (draft-07) of a case, from the field table.
std::string schema();

/// A commented starter case that rates as it stands, from the field table: in metric or US
/// units, with what sheets usually call a value.
std::string starter_case(units::System system = units::System::metric);

/// What a case key means: one entry of the field table, for `explain` and help.
struct FieldHelp {
  std::string key, kind, expected, help;
};
std::optional<FieldHelp> explain(std::string_view key);

}  // namespace dutygauge::case_io
