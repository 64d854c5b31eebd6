#pragma once
#include <functional>
#include <initializer_list>
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "dutygauge/bids.hpp"

/// A sheet under audit: numbers that may stand, and the verdicts so far.
namespace dutygauge::bids {

constexpr double arithmetic_tolerance = 0.01;

/// A number and how far the rounding of printed digits may have moved it.
struct Number {
  double value = 0, slack = 0;
};

/// The values a quantity may have: what is stated, or else computed; both where they differ.
using Numbers = std::vector<Number>;

struct Sheet {
  const Claims& claims;
  const service::Assessment& ours;
  std::vector<ClaimVerdict> verdicts{};
  Numbers duty{}, shell_outlet{}, tube_outlet{}, log_mean{}, f_correction{}, mtd{};
  Numbers area{};  ///< effective, of the whole unit
  Numbers u_service{}, u_dirty{}, u_clean{};

  const rating::Problem& problem() const { return ours.problem; }
};

/// A slip that would explain a claim: the value it would lead to.
struct Cause {
  double value;
  std::string text;
};

/// How one claim is judged.
struct Check {
  std::string_view key;
  Numbers computed;
  Ground ground = Ground::arithmetic;
  std::string against{};
  std::vector<Cause> causes = {};
  std::string otherwise{};    ///< the cause where none of the above explains it
  std::string if_empty{};     ///< why it was not checked, where nothing was computed
  double scale_offset = 0;    ///< 1 % and the ratio are of computed + offset
  bool nothing_fits = false;  ///< nothing computed because no value could be right
};

/// Values of a formula over all combinations of its inputs, with the rounding carried through.
/// What is not finite is left out.
using Formula = std::function<double(std::span<const double>)>;
Numbers derived(std::initializer_list<const Numbers*> inputs, const Formula& formula);

/// Whether a claim is the number, within rounding and 1 %.
bool fits(const Stated& stated, const Number& computed, double scale_offset = 0.0);

/// The number nearest to a claim; empty without any.
std::optional<Number> nearest(const Stated& stated, const Numbers& computed);

/// The text of the slip that explains the claim best; `otherwise` where none does.
std::string likely_cause(const Stated& stated, const std::vector<Cause>& causes, std::string otherwise);

/// Adds the verdict on a claim, if it is stated, and returns what later checks may rest on.
Numbers judge(Sheet& sheet, const std::optional<Stated>& stated, const Check& check);

/// Why a claim about dimensions cannot be checked of a unit that is known by its area.
inline constexpr const char* no_drawing = "the unit is known by its area, not by its tubes";

/// A verdict that says why there is none.
void leave_unchecked(Sheet& sheet, std::string_view key, const std::optional<Stated>& stated,
                     std::string why);

units::Kind kind_of(std::string_view key);

/// The parts of the audit, in this order.
void check_heat_balance(Sheet& sheet);
void check_differences(Sheet& sheet);
void check_areas(Sheet& sheet);
void check_flow_areas(Sheet& sheet);
void check_service_coefficient(Sheet& sheet);
void check_fouling(Sheet& sheet);
void check_margin(Sheet& sheet);
void check_against_methods(Sheet& sheet);

}  // namespace dutygauge::bids
