#pragma once
#include <optional>
#include <string>
#include <vector>

#include "dutygauge/units.hpp"

/// What a calculation has to say beside its numbers: findings, assumptions,
/// objections to the input. Every module above returns these; none prints them.
namespace dutygauge {

enum class Severity { note, should, must };

/// On what kind of reasoning a finding rests.
enum class Ground { arithmetic, geometry, standard, method, judgement };

/// Something the user must know about a result or an input.
struct Finding {
  std::string id;  ///< "module.what": stable; tests and JSON rely on it
  Severity severity = Severity::note;
  std::string text;  ///< what, why it matters, what to do; "{value}" and "{limit}" stand for the two
                     ///< numbers below, which the reports show in the reader's units; any other
                     ///< number with a unit is written by units::mention
  Ground ground = Ground::method;
  double value = 0, limit = 0;            ///< SI, temperatures in K
  units::Kind kind = units::Kind::ratio;  ///< of value and limit
  std::string source = {};                ///< key of an entry in sources.hpp, or empty
};
using Findings = std::vector<Finding>;

/// What the two ends of an assumption's span are.
enum class Span {
  plausible,  ///< ends that such values rarely pass, the value in between most likely
  range,      ///< given by the case: anywhere in between
  deviation,  ///< given by the case: one standard deviation away
};

/// A value the program chose because the case does not give it.
struct Assumption {
  std::string key;   ///< full dotted key of the case file
  double value = 0;  ///< SI; unused where `word` is set
  units::Kind kind = units::Kind::ratio;
  std::string word = {};                      ///< for values that are words ("liquid")
  std::string why;                            ///< where it comes from, with mentions as in a finding
  std::optional<double> low = {}, high = {};  ///< plausible span, SI
  std::string look_in = {};                   ///< the document that would settle it
  Span span = Span::plausible;                ///< what `low` and `high` are
};
using Assumptions = std::vector<Assumption>;

/// One input as it reached the calculation.
struct Input {
  std::string key;       ///< full dotted key of the case file
  std::string as_typed;  ///< the text, or the value an assumption would be typed as
  double si = 0;         ///< SI; 0 for words
  units::Kind kind = units::Kind::ratio;
  bool is_word = false;  ///< as_typed is a name, not a number
  int line = 0;          ///< in the file; 0 where it has none
  std::string origin;    ///< "typed", "document" or "assumed"
};
using Inputs = std::vector<Input>;

/// An input that cannot be: nothing is computed until it is mended.
struct Objection {
  std::string key;       ///< full dotted key of the case file
  std::string what;      ///< what is wrong with it
  std::string expected;  ///< what would be right
  std::string remedy;    ///< what to do
};
using Objections = std::vector<Objection>;

/// A value together with what has to be said about it.
template <class T>
struct Checked {
  T value;
  Findings findings;
  Assumptions assumed;
};

}  // namespace dutygauge
