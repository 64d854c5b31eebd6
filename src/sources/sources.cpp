#include "dutygauge/sources.hpp"

#include <algorithm>

namespace dutygauge::sources {
namespace {

// Sorted by key. `standing` says how we know the text, not how good the source is.
constexpr Source table[] = {
    {"ahmad_1988", "Ahmad, Linnhoff & Smith, J. Heat Transfer 110, 304-310 (1988)", "recalled"},
    {"api_mpms_11_1",
     "API MPMS 11.1 / ASTM D1250-80, tables 54A, B and D: density of petroleum against temperature",
     "secondary"},
    {"asme_b36_10", "ASME B36.10M, Welded and Seamless Wrought Steel Pipe", "secondary"},
    {"astm_d2270", "ASTM D2270, viscosity index of petroleum products", "secondary"},
    {"astm_d341", "ASTM D341, viscosity-temperature equation of liquid petroleum products", "secondary"},
    {"bell_1963", "K. J. Bell, Univ. of Delaware Eng. Exp. Sta. Bull. 5 (1963)", "secondary"},
    {"bowman_1936", "R. A. Bowman, Ind. Eng. Chem. 28, 541-544 (1936)", "recalled"},
    {"bowman_1940", "Bowman, Mueller & Nagle, Trans. ASME 62, 283-294 (1940)", "secondary"},
    {"caglayan_1976", "A. N. Caglayan & P. Buthod, Oil & Gas J. 74 (36), 91-94 (1976)", "recalled"},
    {"churchill_1977", "S. W. Churchill, Chem. Eng. 84 (24), 91-92 (1977)", "recalled"},
    {"common_practice", "common practice, no source", "recalled"},
    {"cragoe_1929", "C. S. Cragoe, Thermal Properties of Petroleum Products, NBS Misc. Publ. 97 (1929)",
     "recalled"},
    {"fischer_1938", "F. K. Fischer, Ind. Eng. Chem. 30, 377-383 (1938)", "recalled"},
    {"fritsch_butland_1984", "Fritsch & Butland, SIAM J. Sci. Stat. Comput. 5, 300-304 (1984)", "recalled"},
    {"gardner_1977", "K. Gardner & J. Taborek, AIChE J. 23, 777-786 (1977)", "recalled"},
    {"gnielinski_1976", "V. Gnielinski, Int. Chem. Eng. 16, 359-368 (1976)", "secondary"},
    {"gnielinski_2013", "V. Gnielinski, Int. J. Heat Mass Transfer 63, 134-140 (2013)", "secondary"},
    {"iapws_if97", "IAPWS R7-97(2012), Industrial Formulation 1997 for water and steam", "secondary"},
    {"iapws_r12", "IAPWS R12-08, viscosity of ordinary water substance", "secondary"},
    {"iapws_r15", "IAPWS R15-11, thermal conductivity of ordinary water substance", "secondary"},
    {"iso_3448", "ISO 3448, viscosity classification of industrial liquid lubricants", "recalled"},
    {"jaw_1964", "L. Jaw, J. Heat Transfer 86, 408-416 (1964)", "recalled"},
    {"kern_1950", "D. Q. Kern, Process Heat Transfer, McGraw-Hill (1950)", "secondary"},
    {"kesler_lee_1976", "Kesler & Lee, Hydrocarbon Processing 55 (3), 153-158 (1976)", "recalled"},
    {"lee_kesler_1975", "Lee & Kesler, AIChE J. 21, 510-527 (1975)", "recalled"},
    {"lemmon_jacobsen_2004", "Lemmon & Jacobsen, Int. J. Thermophys. 25, 21-69 (2004)", "secondary"},
    {"mason_1955", "J. L. Mason, Proc. 2nd US Nat. Congr. Appl. Mech., 801-803 (1955)", "recalled"},
    {"mason_saxena_1958", "Mason & Saxena, Phys. Fluids 1, 361-369 (1958)", "secondary"},
    {"melinder_2010", "A. Melinder, Properties of Secondary Working Fluids for Indirect Systems, IIR (2010)",
     "secondary"},
    {"millero_1978", "F. J. Millero, Freezing point of sea water, UNESCO Tech. Papers Mar. Sci. 28 (1978)",
     "recalled"},
    {"moody_1944", "L. F. Moody, Trans. ASME 66, 671-684 (1944)", "recalled"},
    {"nasa_tm4513", "McBride, Gordon & Reno, NASA TM-4513 (1993)", "secondary"},
    {"nayar_2016", "Nayar, Sharqawy, Banchik & Lienhard, Desalination 390, 1-24 (2016)", "secondary"},
    {"nist_sp811", "Thompson & Taylor, Guide for the Use of the SI, NIST SP 811 (2008), appendix B",
     "secondary"},
    {"nusselt_1911", "W. Nusselt, Z. VDI 55, 2021-2024 (1911)", "recalled"},
    {"palen_taborek_1969", "J. W. Palen & J. Taborek, Chem. Eng. Prog. Symp. Ser. 65 (92), 53-63 (1969)",
     "recalled"},
    {"perry_2008", "Perry's Chemical Engineers' Handbook, 8th ed., McGraw-Hill (2008)", "secondary"},
    {"schindler_1960", "D. L. Schindler & H. T. Bates, Chem. Eng. Prog. Symp. Ser. 56 (30), 203-206 (1960)",
     "recalled"},
    {"serth_2007", "R. W. Serth, Process Heat Transfer, Academic Press (2007)", "recalled"},
    {"sharqawy_2010", "Sharqawy, Lienhard & Zubair, Desalination and Water Treatment 16, 354-380 (2010)",
     "secondary"},
    {"smith_van_ness_abbott",
     "Smith, Van Ness & Abbott, Introduction to Chemical Engineering Thermodynamics: second virial "
     "coefficients",
     "secondary"},
    {"taborek_1983", "J. Taborek, Heat Exchanger Design Handbook, section 3.3, Hemisphere (1983)",
     "secondary"},
    {"tema", "Standards of the Tubular Exchanger Manufacturers Association, 9th ed.", "recalled"},
    {"twu_1985", "C. H. Twu, Ind. Eng. Chem. Process Des. Dev. 24, 1287-1293 (1985)", "secondary"},
    {"underwood_1934", "A. J. V. Underwood, J. Inst. Petrol. Technol. 20, 145-158 (1934)", "recalled"},
    {"wilke_1950", "C. R. Wilke, J. Chem. Phys. 18, 517-519 (1950)", "secondary"},
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
