#include <fmt/format.h>

#include <algorithm>
#include <string_view>

#include "dutygauge/arrangement.hpp"

namespace dutygauge::arrangement {
namespace {

bool has_two_ways(char shell_type) {
  return shell_type == 'F' || shell_type == 'G' || shell_type == 'H';
}

bool passes_fit(const Arrangement& a) {
  if (a.shell_type == 'F') return a.tube_passes >= 2 && a.tube_passes % 2 == 0;
  return a.tube_passes == 1 ||
         (a.tube_passes >= 1 && (!has_two_ways(a.shell_type) || a.tube_passes % 2 == 0));
}

bool flow_fits(const Arrangement& a) {
  return a.flow == Flow::counter || (a.shell_type == 'E' && a.tube_passes == 1) ||
         (a.shell_type == 'X' && a.tube_passes > 1);
}

bool mixing_fits(const Arrangement& a) {
  return a.mixing == Mixing::between_passes || a.shell_type == 'X' ||
         (a.shell_type == 'H' && a.mixing == Mixing::shell_stream);
}

/// Relative surfaces are given for all passes or for none.
bool areas_fit(const Arrangement& a) {
  if (a.pass_areas == decltype(a.pass_areas){}) return true;
  if (a.shell_type == 'X' || a.shell_type == 'K' || a.tube_passes > most_unequal_passes) return false;
  const auto end = a.pass_areas.begin() + a.tube_passes;
  return std::all_of(a.pass_areas.begin(), end, [](double area) { return area > 0.0 && area < 1e9; }) &&
         std::all_of(end, a.pass_areas.end(), [](double area) { return area == 0.0; });
}

bool shell_details_fit(const Arrangement& a) {
  const bool baffle = a.baffle_conductance == 0.0 ||
                      (a.shell_type == 'F' && a.baffle_conductance > 0.0 && a.baffle_conductance < 1e3);
  const bool split = a.tube_inlet_share == 0.5 ||
                     (a.shell_type == 'J' && a.tube_inlet_share > 0.0 && a.tube_inlet_share < 1.0);
  return baffle && split && mixing_fits(a);
}

bool is_rated(char shell_type) {
  return std::string_view("EFGHJKX").find(shell_type) != std::string_view::npos;
}

/// "an E shell", "a G shell": by how the letter is spoken.
std::string with_article(char shell_type) {
  return fmt::format(
      "{} {}", std::string_view("EFHX").find(shell_type) == std::string_view::npos ? "a" : "an", shell_type);
}

}  // namespace

bool is_built(const Arrangement& a) {
  return is_rated(a.shell_type) && a.shells_in_series >= 1 && passes_fit(a) && flow_fits(a) && areas_fit(a) &&
         shell_details_fit(a);
}

Objections objections(const Arrangement& a) {
  Objections result;
  if (!is_rated(a.shell_type))
    result.push_back({"exchanger.tema", fmt::format("there is no shell of type {}", a.shell_type),
                      "E, F, G, H, J, K or X", "take the middle letter from the data sheet"});
  else if (!shell_details_fit(a))
    result.push_back(
        {"exchanger.tema",
         fmt::format("this detail of the flow does not exist in {} shell", with_article(a.shell_type)),
         "a longitudinal baffle that conducts in F, an unequal split in J, mixing in X and H",
         "leave the detail out, or correct the shell type"});
  if (a.shells_in_series < 1)
    result.push_back({"exchanger.shells.in_series", fmt::format("{} shells in series", a.shells_in_series),
                      "1 or more", "give the number of shells one stream passes after another"});
  if (is_rated(a.shell_type) && !passes_fit(a))
    result.push_back({"exchanger.tubes.passes",
                      fmt::format("{} tube passes in {} shell", a.tube_passes, with_article(a.shell_type)),
                      a.shell_type == 'F' ? "an even number: half of them on each side of the baffle"
                      : has_two_ways(a.shell_type)
                          ? "1, or an even number: half of them on each side of the baffle"
                          : "1 or more",
                      "check the number of passes of one shell on the drawing"});
  if (!areas_fit(a))
    result.push_back({"exchanger.tubes.passes", "the surfaces of the passes do not match their number",
                      fmt::format("a positive surface for each of at most {} passes", most_unequal_passes),
                      "give one for each pass, or none"});
  if (!flow_fits(a))
    result.push_back({"exchanger.flow_direction",
                      fmt::format("parallel flow with {} tube passes in {} shell", a.tube_passes,
                                  with_article(a.shell_type)),
                      "parallel only with one tube pass in an E shell",
                      "leave flow_direction out: the passes run both ways, or the shell type decides"});
  return result;
}

}  // namespace dutygauge::arrangement
