#include <algorithm>
#include <cctype>
#include <vector>

#include "parts.hpp"

namespace dutygauge::geometry {
namespace {

using Point = ConductivityPoint;

// Roughness by the make of the tube. 1.5 um drawn copper alloys, 15 um drawn steel, 2 and 15 um for
// stainless are handbook values; 5 um is a choice between the two; 50 um is commercial steel pipe.
constexpr Span nonferrous{1.5e-6, 1.0e-6, 1.5e-6};
constexpr Span high_alloy{5e-6, 2e-6, 15e-6};
constexpr Span steel{15e-6, 15e-6, 50e-6};

// ASME BPVC Section II Part D, Table TCD (metric), groups A, J, K (recalled).
constexpr Point carbon_steel[] = {{20, 60.4}, {100, 58.0}, {200, 53.6}, {300, 49.2}, {400, 44.9}};
constexpr Point stainless_304[] = {{20, 14.8}, {100, 16.2}, {200, 17.9}, {300, 19.4}, {400, 20.8}};
constexpr Point stainless_316[] = {{20, 14.1}, {100, 15.4}, {200, 16.8}, {300, 18.3}, {400, 19.7}};
// The same table, low and medium chromium (recalled, rounded).
constexpr Point chrome_1[] = {{20, 41}};
constexpr Point chrome_2[] = {{20, 36}};
constexpr Point chrome_5[] = {{20, 30}};
constexpr Point chrome_9[] = {{20, 26}};
// Kothandaraman, Heat and Mass Transfer Data Book, table of metals.
constexpr Point half_carbon_steel[] = {{20, 53.6}};
constexpr Point low_alloy[] = {{27, 37.7}};
// CRC Handbook, "Thermal conductivity of alloys as a function of temperature".
constexpr Point stainless_generic[] = {{0, 14}, {100, 16}, {300, 19}};
constexpr Point electrolytic_copper[] = {{0, 390}, {100, 380}, {300, 370}};
constexpr Point aluminium_1100[] = {{0, 220}};
constexpr Point aluminium_3003[] = {{0, 160}};
// Roberge, Corrosion Engineering: Principles and Practice (2008), Table 8.9.
constexpr Point superaustenitic[] = {{20, 11.0}};
constexpr Point superferritic[] = {{20, 17.0}};
constexpr Point admiralty[] = {{20, 111}};
constexpr Point aluminium_brass[] = {{20, 100}};
constexpr Point aluminium_bronze[] = {{20, 79.5}};
constexpr Point copper_nickel_90[] = {{20, 44.9}};
constexpr Point copper_nickel_70[] = {{20, 29.4}};
constexpr Point titanium[] = {{20, 21.6}};
// Copper Development Association: copper-nickels; phosphorus-deoxidised copper (recalled).
constexpr Point copper_nickel_66[] = {{20, 25}};
constexpr Point deoxidised_copper[] = {{20, 339}};
// Tube makers' data sheets: alloy 2205 (CRA), alloy 400 (BTI Metals).
constexpr Point duplex[] = {{21, 13.8}, {93, 15.6}, {204, 17.3}, {316, 19.0}};
constexpr Point alloy_400[] = {{93, 24.0}, {204, 26.9}, {316, 30.1}, {427, 33.4}};
// Special Metals SMC-063; Haynes International H-2002 (both recalled).
constexpr Point alloy_625[] = {{93, 10.8}, {204, 12.5}, {316, 14.1}, {427, 15.7}};
constexpr Point alloy_c276[] = {{38, 10.2}, {93, 11.1}, {204, 13.0}, {316, 15.0}, {427, 16.9}};

// Sorted by name.
constexpr Material table[] = {
    {"Cr-Mo steel 1.25Cr-0.5Mo", ";T11;K11597;", steel, chrome_1},
    {"Cr-Mo steel 2.25Cr-1Mo", ";T22;K21590;", steel, chrome_2},
    {"Cr-Mo steel 5Cr-0.5Mo", ";T5;K41545;", steel, chrome_5},
    {"Cr-Mo steel 9Cr-1Mo", ";T9;K90941;", steel, chrome_9},
    {"Hastelloy C-276", ";alloy C-276;N10276;", high_alloy, alloy_c276},
    {"Inconel 625", ";alloy 625;N06625;", high_alloy, alloy_625},
    {"Monel 400", ";alloy 400;N04400;", high_alloy, alloy_400},
    {"admiralty brass", ";admiralty;C44300;", nonferrous, admiralty},
    {"aluminium 1100", ";A91100;", nonferrous, aluminium_1100},
    {"aluminium 3003", ";A93003;", nonferrous, aluminium_3003},
    {"aluminium brass", ";aluminum brass;C68700;", nonferrous, aluminium_brass},
    {"aluminium bronze", ";aluminum bronze;C60800;", nonferrous, aluminium_bronze},
    {"carbon steel", ";K01200;A179;A214;", steel, carbon_steel},
    {"carbon steel 0.5 % C", ";", steel, half_carbon_steel},
    {"copper, electrolytic", ";electrolytic copper;C11000;", nonferrous, electrolytic_copper},
    {"copper, phosphorus deoxidised", ";phosphorus deoxidised copper;C12200;", nonferrous, deoxidised_copper},
    {"copper-nickel 66/30/2/2", ";C71640;", nonferrous, copper_nickel_66},
    {"copper-nickel 70/30", ";cupronickel 70/30;C71500;", nonferrous, copper_nickel_70},
    {"copper-nickel 90/10", ";cupronickel 90/10;C70600;", nonferrous, copper_nickel_90},
    {"duplex 2205", ";duplex;S31803;S32205;", high_alloy, duplex},
    {"low alloy 0.5Cr-0.25Mo", ";", steel, low_alloy},
    {"stainless (generic 18-8)", ";stainless 18-8;", high_alloy, stainless_generic},
    {"stainless 304/304L", ";304;304L;stainless 304;stainless 304L;S30400;S30403;", high_alloy,
     stainless_304},
    {"stainless 316/316L", ";316;316L;stainless 316;stainless 316L;S31600;S31603;", high_alloy,
     stainless_316},
    {"superaustenitic 6Mo", ";N08367;", high_alloy, superaustenitic},
    {"superferritic", ";S44735;S44660;", high_alloy, superferritic},
    {"titanium grade 2", ";titanium;R50400;", nonferrous, titanium},
};

std::string lower(std::string_view text) {
  std::string result(text);
  for (char& c : result) c = static_cast<char>(std::tolower(static_cast<unsigned char>(c)));
  return result;
}

/// Letters to insert, drop, change or swap to turn one word into the other.
std::size_t distance(std::string_view a, std::string_view b) {
  std::vector<std::vector<std::size_t>> d(a.size() + 1, std::vector<std::size_t>(b.size() + 1));
  for (std::size_t i = 0; i <= a.size(); ++i) d[i][0] = i;
  for (std::size_t j = 0; j <= b.size(); ++j) d[0][j] = j;
  for (std::size_t i = 1; i <= a.size(); ++i)
    for (std::size_t j = 1; j <= b.size(); ++j) {
      const std::size_t change = a[i - 1] == b[j - 1] ? 0 : 1;
      d[i][j] = std::min({d[i - 1][j] + 1, d[i][j - 1] + 1, d[i - 1][j - 1] + change});
      if (i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1])
        d[i][j] = std::min(d[i][j], d[i - 2][j - 2] + 1);
    }
  return d[a.size()][b.size()];
}

}  // namespace

const Material* find_material(std::string_view name) {
  const std::string wanted = lower(name);
  for (const Material& material : table)
    if (lower(material.name) == wanted || lower(material.also).find(";" + wanted + ";") != std::string::npos)
      return &material;
  return nullptr;
}

std::string_view nearest_material(std::string_view name) {
  const std::string wanted = lower(name);
  const auto closer = [&](const Material& a, const Material& b) {
    return distance(lower(a.name), wanted) < distance(lower(b.name), wanted);
  };
  return std::ranges::min_element(table, closer)->name;
}

Span unnamed_roughness() {
  return steel;
}

double Conductivity::at(double metal_temperature) const {
  const auto above = std::ranges::lower_bound(temperature, metal_temperature);
  if (above == temperature.begin()) return value.front();
  if (above == temperature.end()) return value.back();
  const auto i = static_cast<std::size_t>(above - temperature.begin());
  const double share = (metal_temperature - temperature[i - 1]) / (temperature[i] - temperature[i - 1]);
  return value[i - 1] + share * (value[i] - value[i - 1]);
}

std::vector<std::string> tube_materials() {
  std::vector<std::string> names;
  for (const Material& material : table) names.emplace_back(material.name);
  return names;
}

}  // namespace dutygauge::geometry
