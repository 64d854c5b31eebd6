#include "dutygauge/sources.hpp"

#include <algorithm>

namespace dutygauge::sources {
namespace {

// Sorted by key. `standing` says how we know the text, not how good the source is.
constexpr Source table[] = {
    {"asme_b36_10", "ASME B36.10M, Welded and Seamless Wrought Steel Pipe", "secondary"},
    {"bell_1963", "K. J. Bell, Univ. of Delaware Eng. Exp. Sta. Bull. 5 (1963)", "secondary"},
    {"bowman_1940", "Bowman, Mueller & Nagle, Trans. ASME 62, 283-294 (1940)", "secondary"},
    {"churchill_1977", "S. W. Churchill, Chem. Eng. 84 (24), 91-92 (1977)", "recalled"},
    {"common_practice", "common practice, no source", "recalled"},
    {"gnielinski_1976", "V. Gnielinski, Int. Chem. Eng. 16, 359-368 (1976)", "secondary"},
    {"gnielinski_2013", "V. Gnielinski, Int. J. Heat Mass Transfer 63, 134-140 (2013)", "secondary"},
    {"iapws_if97", "IAPWS R7-97(2012), Industrial Formulation 1997 for water and steam", "secondary"},
    {"iapws_r12", "IAPWS R12-08, viscosity of ordinary water substance", "secondary"},
    {"iapws_r15", "IAPWS R15-11, thermal conductivity of ordinary water substance", "secondary"},
    {"kern_1950", "D. Q. Kern, Process Heat Transfer, McGraw-Hill (1950)", "secondary"},
    {"nist_sp811", "Thompson & Taylor, Guide for the Use of the SI, NIST SP 811 (2008), appendix B",
     "secondary"},
    {"serth_2007", "R. W. Serth, Process Heat Transfer, Academic Press (2007)", "recalled"},
    {"taborek_1983", "J. Taborek, Heat Exchanger Design Handbook, section 3.3, Hemisphere (1983)",
     "secondary"},
    {"tema", "Standards of the Tubular Exchanger Manufacturers Association, 9th ed.", "recalled"},
};

}  // namespace

std::span<const Source> all() {
  return table;
}

std::string_view citation(std::string_view key) {
  const auto* found = std::ranges::find(table, key, &Source::key);
  return found == std::end(table) ? std::string_view{} : found->citation;
}

}  // namespace dutygauge::sources
