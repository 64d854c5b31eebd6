#include <cmath>

#include "dutygauge/shellside.hpp"

namespace dutygauge::shellside {
namespace {

using units::Kind;

void check_cut(const geometry::ShellSide& shell, Findings& findings) {
  if (shell.baffle_cut >= 0.15 && shell.baffle_cut <= 0.45) return;
  findings.push_back(
      {.id = "shellside.cut",
       .severity = Severity::should,
       .text = "the baffle cut is {value} of the shell diameter; the method was fitted from 0.15 to "
               "0.45 and the nearest of these is {limit}. Shell film and pressure drop are "
               "extrapolated: check whether the sheet means a cut of diameter or of area",
       .ground = Ground::method,
       .value = shell.baffle_cut,
       .limit = shell.baffle_cut < 0.15 ? 0.15 : 0.45,
       .source = "taborek_1983"});
}

void check_spacing(const geometry::ShellSide& shell, Findings& findings) {
  const double ratio = shell.central_spacing / shell.inside_diameter;
  if (ratio >= 0.2 && ratio <= 1.0) return;
  const bool close = ratio < 0.2;
  findings.push_back(
      {.id = "shellside.spacing",
       .severity = Severity::should,
       .text = close ? "the central baffle spacing is {value} of the shell diameter, below {limit}: "
                       "leakage past so many baffles is hardly covered by the data and the film "
                       "may be less than shown. Check spacing and count against the drawing"
                     : "the central baffle spacing is {value} of the shell diameter, above {limit}: "
                       "the flow is more along than across the tubes and the film may be less than "
                       "shown. Check spacing and count against the drawing",
       .ground = Ground::method,
       .value = ratio,
       .limit = close ? 0.2 : 1.0,
       .source = "taborek_1983"});
}

void check_bank(const geometry::ShellSide& shell, Findings& findings) {
  const double ratio = shell.pitch / shell.tube_outside_diameter;
  // 15/16 in on 3/4 in tubes, rounded to 23.81 mm, must still pass for 1.25.
  if (ratio < 1.245 || ratio > 1.505)
    findings.push_back(
        {.id = "shellside.pitch_ratio",
         .severity = Severity::should,
         .text = "the tube pitch is {value} tube diameters; the ideal-bank data cover about 1.25 to "
                 "1.5 and the nearest of these is {limit}. Shell film and pressure drop are "
                 "extrapolated: check pitch and tube diameter, widen the margin",
         .ground = Ground::method,
         .value = ratio,
         .limit = ratio < 1.245 ? 1.25 : 1.5,
         .source = "taborek_1983"});
  if (shell.layout == 60)
    findings.push_back(
        {.id = "shellside.layout_60",
         .severity = Severity::should,
         .text = "there are no data for a layout of {value} deg in this method: those of {limit} deg "
                 "stand in for it, with the rows and gaps of the real layout. Take the shell film "
                 "for less sure than usual",
         .ground = Ground::method,
         .value = 60,
         .limit = 30,
         .kind = Kind::angle,
         .source = "taborek_1983"});
}

void check_shell(const geometry::ShellSide& shell, Findings& findings) {
  if (shell.shell_type == 'E' || shell.shell_type == 'F' || shell.shell_type == 'J') return;
  findings.push_back(
      {.id = "shellside.shell_type",
       .severity = Severity::should,
       .text = std::string("the shell-side method is published for shells E, F and J; shell ") +
               shell.shell_type +
               " is put together from it by reasoning. Take film and pressure drop for less sure "
               "than usual",
       .ground = Ground::judgement,
       .source = "taborek_1983"});
}

void check_leakage(const Bundle& bundle, Findings& findings) {
  if (bundle.j_leakage >= 0.6) return;
  findings.push_back(
      {.id = "shellside.leakage",
       .severity = Severity::should,
       .text = "leakage past the baffles leaves {value} of the film (J_l); a sound design keeps above "
               "{limit}, 0.7 to 0.9 is usual. The result leans on the two baffle clearances: take them "
               "from the drawing, or widen the baffle spacing",
       .ground = Ground::method,
       .value = bundle.j_leakage,
       .limit = 0.6,
       .source = "taborek_1983"});
}

void check_window(const Bundle& bundle, Findings& findings) {
  if (bundle.drawing.shell_type == 'X' || bundle.window_tube_fraction > 0.0) return;
  findings.push_back(
      {.id = "shellside.no_tubes_in_window",
       .severity = Severity::note,
       .text = "no tubes stand in the baffle windows, so the window factor is {value} instead of the "
               "1.27 its equation would give. Check cut and bundle clearance if tubes were meant there",
       .ground = Ground::method,
       .value = 1,
       .limit = 1,
       .source = "taborek_1983"});
}

Findings check_kern_bundle(const geometry::ShellSide& shell) {
  Findings findings;
  findings.push_back(
      {.id = "shellside.kern",
       .severity = Severity::note,
       .text = "Kern's method knows no clearances: its film and pressure drop are those of a bundle "
               "with usual leakage, the drop mostly on the high side. Use it as a plausibility line",
       .ground = Ground::method,
       .source = "kern_1950"});
  // His charts are for 25 %; 5 points to either side is what we let pass.
  if (std::abs(shell.baffle_cut - 0.25) > 0.05)
    findings.push_back(
        {.id = "shellside.kern_cut",
         .severity = Severity::should,
         .text = "Kern's method was drawn up for a baffle cut of {limit} of the shell diameter and is "
                 "used with {value}, of which it takes no account. Prefer bell_delaware",
         .ground = Ground::method,
         .value = shell.baffle_cut,
         .limit = 0.25,
         .source = "kern_1950"});
  return findings;
}

Findings check_kern_film(const Film& film) {
  if (film.reynolds >= 2e3 && film.reynolds <= 1e6) return {};
  const bool low = film.reynolds < 2e3;
  return {
      {.id = "shellside.kern_range",
       .severity = Severity::should,
       .text =
           low ? "shell-side Re {value} (on Kern's diameter) is below {limit}, where his film equation was "
                 "fitted (the pressure drop holds from 400); both are continued. Prefer bell_delaware"
               : "shell-side Re {value} (on Kern's diameter) is above {limit}, where his equations were "
                 "fitted; both are continued. Prefer bell_delaware",
       .ground = Ground::method,
       .value = film.reynolds,
       .limit = low ? 2e3 : 1e6,
       .source = "kern_1950"}};
}

void check_reynolds(const Film& film, Findings& findings) {
  if (film.reynolds > 1e5)
    findings.push_back({.id = "shellside.reynolds_high",
                        .severity = Severity::should,
                        .text =
                            "shell-side Re {value} is above {limit}, where the ideal-bank data end; film and "
                            "pressure drop are extrapolated with the last constants. Keep a wider margin",
                        .ground = Ground::method,
                        .value = film.reynolds,
                        .limit = 1e5,
                        .source = "taborek_1983"});
  if (film.reynolds > 50.0 && film.reynolds < 200.0)
    findings.push_back(
        {.id = "shellside.transition",
         .severity = Severity::should,
         .text = "shell-side Re {value} lies between 50 and {limit}, where the published method jumps "
                 "from laminar to turbulent constants and we go over smoothly: the pressure drop is "
                 "uncertain by a factor of 1.5. Do not judge a tight allowable drop by it",
         .ground = Ground::method,
         .value = film.reynolds,
         .limit = 200,
         .source = "taborek_1983"});
  if (film.reynolds < 10.0)
    findings.push_back(
        {.id = "shellside.reynolds_low",
         .severity = Severity::should,
         .text = "shell-side Re {value} is below {limit}: comparisons with test units found pressure "
                 "drops about twice too high there and films scattering twice as much as in turbulent "
                 "flow. Keep a wide margin; check viscosity and flow",
         .ground = Ground::method,
         .value = film.reynolds,
         .limit = 10,
         .source = "taborek_1983"});
}

}  // namespace

Findings check_bundle(const Bundle& bundle) {
  if (bundle.method == Method::kern) return check_kern_bundle(bundle.drawing);
  Findings findings;
  const geometry::ShellSide& shell = bundle.drawing;
  if (shell.shell_type != 'X') {
    check_cut(shell, findings);
    check_spacing(shell, findings);
  }
  check_bank(shell, findings);
  check_shell(shell, findings);
  check_leakage(bundle, findings);
  check_window(bundle, findings);
  return findings;
}

Findings check_film(const Bundle& bundle, const Film& film) {
  if (bundle.method == Method::kern) return check_kern_film(film);
  Findings findings;
  check_reynolds(film, findings);
  const double product = film.j_cut * film.j_leakage * film.j_bypass * film.j_spacing;
  // 0.4 to 0.8 is where well-made bundles lie; below it the bundle's own film hardly matters any more.
  if (product < 0.4)
    findings.push_back(
        {.id = "shellside.streams",
         .severity = Severity::should,
         .text = "leakage, bypass and end spaces leave {value} of the ideal film; usual bundles keep "
                 "more than {limit}. The result leans on clearances and sealing strips: take them from "
                 "the drawing and look for the largest gap",
         .ground = Ground::judgement,
         .value = product,
         .limit = 0.4,
         .source = "common_practice"});
  return findings;
}

}  // namespace dutygauge::shellside
