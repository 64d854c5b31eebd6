#include <fmt/core.h>

#include <algorithm>
#include <cmath>
#include <numeric>

#include "parts.hpp"

// Plugged holes: of each shell alike, by pass, by shell, or of the whole unit.

namespace dutygauge::geometry {
namespace {

constexpr const char* key = "exchanger.tubes.plugged";
constexpr const char* shells_key = "exchanger.tubes.plugged_per_shell";
constexpr const char* unit_key = "exchanger.tubes.plugged_in_unit";

int shells_of(const Description& d) {
  return d.shells_in_series * d.shells_in_parallel;
}

/// The numbers as the file has them.
std::vector<int> stated(const Description& d) {
  if (!d.plugged_per_shell.empty()) return d.plugged_per_shell;
  if (!d.plugged_per_pass.empty()) return d.plugged_per_pass;
  return {d.plugged_in_unit.value_or(d.plugged)};
}

const char* key_of(const Description& d) {
  return !d.plugged_per_shell.empty() ? shells_key : d.plugged_in_unit ? unit_key : key;
}

void check_passes_plugged(const Description& d, Objections& out) {
  if (static_cast<int>(d.plugged_per_pass.size()) != d.tube_passes) {
    out.push_back({key, fmt::format("{} numbers for {} passes", d.plugged_per_pass.size(), d.tube_passes),
                   "one number for each tube pass",
                   "list the plugged tubes pass by pass, or give their sum"});
    return;
  }
  long long sum = 0;
  for (const int plugged : d.plugged_per_pass) {
    sum += plugged;
    if (plugged < 0 || plugged >= static_cast<double>(d.tube_count) / d.tube_passes)
      out.push_back(
          {key, fmt::format("{} plugged in one pass", plugged),
           fmt::format("0 or more, and fewer than the {} tubes of a pass", d.tube_count / d.tube_passes),
           "list the plugged tubes pass by pass"});
  }
  if (sum != d.plugged)
    out.push_back({key, fmt::format("the passes add up to {}, not {}", sum, d.plugged), "the same number",
                   "give one or the other"});
}

void check_shells_plugged(const Description& d, Objections& out) {
  if (static_cast<int>(d.plugged_per_shell.size()) != shells_of(d))
    out.push_back({shells_key,
                   fmt::format("{} numbers for {} shells", d.plugged_per_shell.size(), shells_of(d)),
                   "one number for each shell, along the shell stream, bank by bank",
                   "list the plugged holes shell by shell, or give their sum as plugged_in_unit"});
}

/// How uneven groups of tubes are that the rating takes as even.
struct Uneven {
  int fewest, most;
  double group, open_mean;  ///< holes of a group, and those open in the mean
  std::string_view name;    ///< "pass" or "shell"
};

void report_uneven(const Uneven& u, Findings& findings) {
  if (u.fewest == u.most) return;
  const double faster = u.open_mean / (u.group - u.most);
  findings.push_back(
      {.id = "geometry.unequal_plugging",
       // Passes alike within 5 % are what Kern (1950) asks of a tube layout.
       .severity = u.most - u.fewest > 0.05 * u.group ? Severity::should : Severity::note,
       .text =
           fmt::format("{{value}} tubes are plugged in one {0} and {{limit}} in another, of about {1:.0f} in "
                       "each. The rating shares the open tubes evenly; in the worst {0} the velocity is "
                       "{2:.0f} % higher and the pressure drop about {3:.0f} %. Judge that {0} by itself",
                       u.name, u.group, 100.0 * (faster - 1.0), 100.0 * (std::pow(faster, 1.8) - 1.0)),
       .ground = Ground::geometry,
       .value = static_cast<double>(u.most),
       .limit = static_cast<double>(u.fewest),
       .kind = units::Kind::count});
}

}  // namespace

double plugged_in_shell(const Description& d) {
  if (d.plugged_in_unit) return static_cast<double>(*d.plugged_in_unit) / shells_of(d);
  if (d.plugged_per_shell.empty()) return d.plugged;
  return std::accumulate(d.plugged_per_shell.begin(), d.plugged_per_shell.end(), 0.0) / shells_of(d);
}

void check_plugging(const Description& d, Objections& out) {
  const auto all = stated(d);
  const double most =
      std::max(static_cast<double>(d.plugged_in_unit ? 0 : std::ranges::max(all)), plugged_in_shell(d));
  if (std::ranges::min(all) < 0)
    return out.push_back({key_of(d), fmt::format("is {}", std::ranges::min(all)), "zero or more",
                          "count the holes of one tubesheet that are plugged"});
  if (most >= d.tube_count)
    return out.push_back({key_of(d), fmt::format("{:g} of {} tubes leave none open", most, d.tube_count),
                          "fewer than the tube count", "count the holes of one tubesheet that are plugged"});
  if (d.tube_passes > d.tube_count - most)
    out.push_back({"exchanger.tubes.passes",
                   fmt::format("{} passes need more tubes than the {:g} that are open", d.tube_passes,
                               d.tube_count - most),
                   "at least one open tube a pass", "mend the passes, the count or the plugging"});
  if (!d.plugged_per_pass.empty()) check_passes_plugged(d, out);
  if (!d.plugged_per_shell.empty()) check_shells_plugged(d, out);
}

void report_plugging(const Description& d, Findings& findings, Assumptions& assumed) {
  const auto all = stated(d);
  const auto odd = std::ranges::find_if(all, [](int plugged) { return plugged % 2 != 0; });
  if (has_u_tubes(d) && d.plugged_per_pass.empty() && odd != all.end())
    findings.push_back(
        {.id = "geometry.plugged_u_tube",
         .severity = Severity::should,
         .text = "{value} plugged holes are not whole U-tubes: a plugged U-tube counts as two holes. "
                 "The rating takes the holes as given; check whether tubes or holes were counted",
         .ground = Ground::geometry,
         .value = static_cast<double>(*odd),
         .limit = static_cast<double>(*odd + 1),
         .kind = units::Kind::count});
  if (d.plugged_in_unit.value_or(0) > 0 && shells_of(d) > 1)
    assumed.push_back({.key = shells_key,
                       .word = fmt::format("{:g} in each", plugged_in_shell(d)),
                       .why = "nothing says in which shells the plugs are: shared evenly",
                       .look_in = "maintenance record"});
  const auto [fewest, most] = std::ranges::minmax(all);
  const double passes = d.plugged_per_pass.empty() ? 1.0 : d.tube_passes;
  report_uneven({.fewest = fewest,
                 .most = most,
                 .group = d.tube_count / passes,
                 .open_mean = (d.tube_count - plugged_in_shell(d)) / passes,
                 .name = d.plugged_per_pass.empty() ? "shell" : "pass"},
                findings);
}

}  // namespace dutygauge::geometry
