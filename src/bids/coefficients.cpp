#include <cmath>

#include "sheet.hpp"

// U in service, with and without fouling, and the margin between them.

namespace dutygauge::bids {
namespace {

Number stated_number(const Stated& stated) {
  return {stated.value, stated.rounding};
}

/// Fouling of both sides on the outside area, fin efficiency in it [m2.K/W].
double fouling_of(const rating::Problem& problem, double fin_effectiveness) {
  return problem.shell_side.fouling_resistance / fin_effectiveness +
         problem.exchanger.outside_per_inside * problem.tube_side.fouling_resistance;
}

double fin_effectiveness(const Sheet& sheet) {
  const auto& outcome = sheet.ours.rating.outcome;
  return outcome ? outcome->local.fin_effectiveness : 1.0;
}

/// U with a resistance more (or, negative, less); not finite where nothing is left.
Numbers with_resistance(const Numbers& u, double more) {
  return derived({&u}, [more](std::span<const double> from) {
    const double sum = 1.0 / from[0] + more;
    return sum > 0.0 ? 1.0 / sum : std::nan("");
  });
}

/// U dirty by the sheet's own margin and U in service.
Numbers by_margin(const Sheet& sheet, double fouling) {
  const auto& margin = sheet.claims.surface_margin;
  if (!margin || sheet.claims.surface_margin_basis == MarginBasis::unstated) return {};
  const Numbers margins = {stated_number(*margin)};
  const Numbers u = derived({&sheet.u_service, &margins},
                            [](std::span<const double> from) { return from[0] * (1.0 + from[1]); });
  return sheet.claims.surface_margin_basis == MarginBasis::clean ? with_resistance(u, fouling) : u;
}

bool any_fits(const Stated& stated, const Numbers& numbers) {
  for (const Number& number : numbers)
    if (fits(stated, number)) return true;
  return false;
}

void check_dirty(Sheet& sheet, const Numbers& computed, double fouling) {
  const Claims& claims = sheet.claims;
  Check check{.key = "u_dirty",
              .computed = computed,
              .against = "U clean and the fouling of both sides",
              .otherwise = "fouling between the two U is not that of the case",
              .if_empty = ""};
  if (claims.u_clean) check.causes.push_back({claims.u_clean->value, "U clean printed as U dirty"});
  if (claims.u_service) check.causes.push_back({claims.u_service->value, "U in service printed as U dirty"});
  const auto& problem = sheet.problem();
  const double unscaled = problem.shell_side.fouling_resistance + problem.tube_side.fouling_resistance;
  for (const Number& right : computed) {
    const double clean = 1.0 / (1.0 / right.value - fouling);
    check.causes.push_back(
        {1.0 / (1.0 / clean + unscaled), "tube-side fouling is not referred to the outside"});
  }
  sheet.u_dirty = judge(sheet, claims.u_dirty, check);
}

void check_clean(Sheet& sheet, const Numbers& computed) {
  const Claims& claims = sheet.claims;
  const auto& problem = sheet.problem();
  const double shell = problem.shell_side.fouling_resistance, tube = problem.tube_side.fouling_resistance;
  Check check{.key = "u_clean",
              .computed = computed,
              .against = "U dirty and the fouling of both sides",
              .otherwise = "fouling between the two U is not that of the case",
              .if_empty = ""};
  if (claims.u_dirty) {
    const double dirty = claims.u_dirty->value;
    const auto less = [dirty](double r) { return 1.0 / (1.0 / dirty - r); };
    check.causes = {
        {dirty, "U dirty printed as U clean"},
        {less(shell + tube), "tube-side fouling is not referred to the outside"},
        {less(shell), "tube-side fouling is left out"},
        {less(fouling_of(problem, fin_effectiveness(sheet)) - shell), "shell-side fouling is left out"}};
  }
  sheet.u_clean = judge(sheet, claims.u_clean, check);
}

/// U in service must not pass U dirty: by the sheet's own numbers the surface would fall short.
void check_order(Sheet& sheet) {
  const auto above = [](const Numbers& service, const Numbers& other) {
    for (const Number& s : service)
      for (const Number& o : other)
        if (s.value - s.slack <= (o.value + o.slack) * (1.0 + arithmetic_tolerance)) return false;
    return !service.empty() && !other.empty();
  };
  const bool by_dirty = above(sheet.u_service, sheet.u_dirty);
  if (!by_dirty && !above(sheet.u_service, sheet.u_clean)) return;
  const std::string_view key = by_dirty ? "u_dirty" : "u_clean";
  if (!(by_dirty ? sheet.claims.u_dirty : sheet.claims.u_clean)) return;
  for (ClaimVerdict& verdict : sheet.verdicts) {
    if (verdict.key != key || verdict.verdict == Agreement::contradicts) continue;
    verdict.verdict = Agreement::contradicts;
    verdict.computed = sheet.u_service.front().value;
    verdict.ratio = verdict.stated / *verdict.computed;
    verdict.against = "U in service, which it must not fall below,";
    verdict.likely = "by its own numbers the surface falls short, or the two are exchanged";
  }
}

}  // namespace

void check_service_coefficient(Sheet& sheet) {
  const Claims& claims = sheet.claims;
  const auto& exchanger = sheet.problem().exchanger;
  const auto u = [](std::span<const double> of) { return of[0] / (of[1] * of[2]); };
  Check check{.key = "u_service",
              .computed = derived({&sheet.duty, &sheet.area, &sheet.mtd}, u),
              .against = "duty / (area x corrected difference) of the sheet",
              .otherwise = "U, area and difference do not give this duty",
              .if_empty = "it needs the duty or an outlet"};
  if (!check.computed.empty()) {
    const double right = check.computed.back().value;
    const double gross = exchanger.as_described.tube_length / exchanger.effective_length;
    const int shells = exchanger.shells_in_series * exchanger.shells_in_parallel;
    check.causes = {{right / gross, "U in service rests on the gross area"},
                    {right * exchanger.tube_side.outside_diameter / exchanger.tube_side.inside_diameter,
                     "U in service is on the inside surface"}};
    if (!sheet.f_correction.empty())
      check.causes.push_back({right * sheet.f_correction.back().value, "LMTD without F"});
    if (shells > 1) check.causes.push_back({right * shells, "the duty of all shells over the area of one"});
    if (claims.u_dirty) check.causes.push_back({claims.u_dirty->value, "U dirty printed as U in service"});
    if (claims.u_clean) check.causes.push_back({claims.u_clean->value, "U clean printed as U in service"});
  }
  sheet.u_service = judge(sheet, claims.u_service, check);
}

void check_fouling(Sheet& sheet) {
  const Claims& claims = sheet.claims;
  const double fouling = fouling_of(sheet.problem(), fin_effectiveness(sheet));
  const std::string alone = "the sheet gives no other U to hold it against";
  const Numbers stated_clean = claims.u_clean ? Numbers{stated_number(*claims.u_clean)} : Numbers{};
  const Numbers stated_dirty = claims.u_dirty ? Numbers{stated_number(*claims.u_dirty)} : Numbers{};
  const Numbers from_clean = with_resistance(stated_clean, fouling);
  const Numbers from_margin = by_margin(sheet, fouling);
  // The margin is a third witness: where it sides with U clean, U dirty is the odd one out.
  const bool blame_dirty = claims.u_dirty && !from_clean.empty() && !any_fits(*claims.u_dirty, from_clean) &&
                           !from_margin.empty() && !any_fits(*claims.u_dirty, from_margin) &&
                           any_fits({from_clean.front().value, from_clean.front().slack}, from_margin);
  const bool are_equal = claims.u_dirty && claims.u_clean && any_fits(*claims.u_dirty, stated_clean);
  if (blame_dirty || (are_equal && fouling > 0.0 && from_margin.empty())) {
    check_dirty(sheet, from_clean, fouling);
    sheet.u_clean = stated_clean;
    judge(sheet, claims.u_clean,
          {.key = "u_clean",
           .computed = with_resistance(sheet.u_dirty, -fouling),
           .against = "U dirty and the fouling of both sides",
           .otherwise = "",
           .if_empty = alone});
  } else if (claims.u_dirty && claims.u_clean) {
    check_clean(sheet, with_resistance(stated_dirty, -fouling));
    check_dirty(sheet, with_resistance(sheet.u_clean, fouling), fouling);
  } else {
    leave_unchecked(sheet, "u_dirty", claims.u_dirty, alone);
    leave_unchecked(sheet, "u_clean", claims.u_clean, alone);
    sheet.u_dirty = claims.u_dirty ? stated_dirty : from_clean;
    sheet.u_clean = claims.u_clean ? stated_clean : with_resistance(stated_dirty, -fouling);
  }
  check_order(sheet);
}

void check_margin(Sheet& sheet) {
  const auto ratio = [](std::span<const double> of) { return of[0] / of[1] - 1.0; };
  const Numbers on_dirty = derived({&sheet.u_dirty, &sheet.u_service}, ratio);
  const Numbers on_clean = derived({&sheet.u_clean, &sheet.u_service}, ratio);
  const auto basis = sheet.claims.surface_margin_basis;
  Check check{.key = "surface_margin",
              .computed = basis == MarginBasis::clean ? on_clean : on_dirty,
              .against = basis == MarginBasis::clean ? "U clean over U in service, less one"
                                                     : "U dirty over U in service, less one",
              .otherwise = "margin of other coefficients, or on another area",
              .if_empty = "it needs U in service and U with or without fouling",
              .scale_offset = 1.0};
  const auto& claim = sheet.claims.surface_margin;
  const auto matches = [&](const Numbers& numbers) {
    return claim && !numbers.empty() && fits(*claim, *nearest(*claim, numbers), 1.0);
  };
  const bool other_basis = basis == MarginBasis::clean ? matches(on_dirty) : matches(on_clean);
  if (other_basis)
    check.otherwise = basis == MarginBasis::clean
                          ? "margin is at design fouling, not on the clean coefficient"
                          : "margin is on the clean coefficient, not at design fouling";
  judge(sheet, claim, check);
  if (basis != MarginBasis::unstated || !claim || sheet.verdicts.back().verdict != Agreement::contradicts)
    return;
  if (!other_basis) return;
  ClaimVerdict& verdict = sheet.verdicts.back();
  verdict.verdict = Agreement::ask;
  verdict.likely = "the basis is not stated: it is the margin on the clean coefficient";
}

}  // namespace dutygauge::bids
