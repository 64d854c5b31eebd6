#pragma once
#include <optional>
#include <string_view>
#include <vector>

#include "dutygauge/case_io.hpp"
#include "dutygauge/report.hpp"
#include "dutygauge/report/explored.hpp"

/// A case rated as a whole, and varied by key and rated again.
namespace dutygauge::explore {

/// Judges a problem by its own solution and puts the other one's duty beside it.
service::Assessment assess_both_ways(const rating::Problem& problem, const service::Service& service);

/// What `dutygauge rate` does with one file: rates and judges every operating case as the
/// unit is, clean and at design fouling, and audits the claims as built. The worst governs:
/// the case without a result, else the one with the lowest probability, then the smallest duty
/// margin, then the smallest temperature margin, then the first. `display`: units of the words, else the file's.
/// Throws case_io::InputError.
report::Result rate(const case_io::Document& document, std::optional<units::System> display = {});

/// The same of one case that is built already; its claims are audited as it stands.
report::Result rate(const case_io::Case& a_case);

/// Puts into a result what levers and assumptions are worth. `document`: the case it came from.
void weigh(const case_io::Document& document, report::Result& result);

/// What moves the line that governs, each lever by itself, the strongest first.
std::vector<report::Lever> levers(const case_io::Document& document);

/// What each assumption with a span is worth, in the order of `result.assumed`.
std::vector<std::optional<report::Effect>> effects(const case_io::Document& document,
                                                   const report::Result& result);

/// An input of a case that can be turned: how its values are typed.
struct Dial {
  std::string key;
  units::Kind kind = units::Kind::ratio;
  units::FlowBasis basis = units::FlowBasis::mass;  ///< of a volume flow: where it is measured
  double basis_temperature = 0;                     ///< [K]
  bool is_flow = false, is_whole = false;
  std::optional<double> own = {};  ///< the case's own value, typed or assumed, SI
};

/// The dial of a key; empty where its value is no number or no such key exists.
std::optional<Dial> dial(const case_io::Document& document, std::string_view key);

/// The case with one value changed; the key's blocks are made where they are missing.
case_io::Document turned(const case_io::Document& document, const Dial& dial, double value);

/// Values of one input, rising.
struct Variation {
  Dial dial;
  std::vector<double> values = {};  ///< SI
};

/// Reads "26..34 degC:9", "50..70 m3/h at inlet:5" or, times the own value, "x0.8..x1.2:5":
/// so many values from the first to the last, at equal steps.
units::Read<Variation> read_variation(const Dial& dial, std::string_view text);

/// Rates the case at every combination of the values, the last variation running
/// fastest. Points are rated in parallel; the rows do not depend on how many at a time.
report::Sweep sweep(const case_io::Document& document, const std::vector<Variation>& variations);

/// How far an input can go, both ways, before a line of the service, an allowable pressure
/// drop, the tube velocity, the range of a fluid or the drawing stops it; and which remarks
/// of the methods come up on the way. Looks from `range` if given, else from a fifth to five
/// times the own value (temperatures: 60 K either way), and finds crossings between
/// neighbouring points. Needs: an own value, not zero without a range.
report::Reach reach(const case_io::Document& document, const Dial& pushed,
                    const std::optional<Variation>& range, const std::optional<Variation>& over);

/// A case as rated, to be compared.
report::Compared compared(const case_io::Document& document);

/// What changed between two cases, going in and coming out, and how sure the difference is.
report::Comparison compare(const case_io::Document& a, const case_io::Document& b);

/// The same of two that may be recorded results: without how sure it is.
report::Comparison compare(report::Compared a, report::Compared b);

}  // namespace dutygauge::explore
