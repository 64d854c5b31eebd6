// The table of ideal-bank constants in Taborek (Heat Exchanger Design Handbook 3.3, 1983), evaluated away
// from its borders by a program written independently of this one.
#include "dutygauge/shellside.hpp"
#include "published/published.hpp"

namespace {

using namespace dutygauge;
using published::Known;
using published::Rows;

const char* const source = "Taborek 1983 equations, independent evaluation";

struct Bank {
  int layout;
  double pitch_ratio, reynolds, j, f;
};

constexpr Bank banks[] = {
    {30, 1.25, 5.0, 0.51220998, 13.362871},         {30, 1.25, 50.0, 0.10869792, 1.2469547},
    {30, 1.25, 500.0, 0.031209251, 0.26355107},     {30, 1.25, 5000.0, 0.011868496, 0.13857842},
    {30, 1.25, 50000.0, 0.0048338696, 0.09963398},  {30, 1.5, 5.0, 0.4194216, 5.0556446},
    {30, 1.5, 50.0, 0.095644001, 0.65662379},       {30, 1.5, 500.0, 0.029437319, 0.1934975},
    {30, 1.5, 5000.0, 0.011622813, 0.12326588},     {30, 1.5, 50000.0, 0.0048015844, 0.095774542},
    {45, 1.25, 5.0, 0.58038897, 8.7166496},         {45, 1.25, 50.0, 0.12221302, 0.89720372},
    {45, 1.25, 500.0, 0.033606749, 0.19880343},     {45, 1.25, 5000.0, 0.012828628, 0.10797485},
    {45, 1.25, 50000.0, 0.0051170443, 0.078311535}, {45, 1.5, 5.0, 0.44394967, 3.5158155},
    {45, 1.5, 50.0, 0.10240512, 0.50219715},        {45, 1.5, 500.0, 0.03086232, 0.15261967},
    {45, 1.5, 5000.0, 0.012421081, 0.098255771},    {45, 1.5, 50000.0, 0.0050616096, 0.075986675},
    {90, 1.25, 5.0, 0.35161058, 9.5521666},         {90, 1.25, 50.0, 0.079843295, 0.94524354},
    {90, 1.25, 500.0, 0.024125902, 0.16929613},     {90, 1.25, 5000.0, 0.011296516, 0.10720991},
    {90, 1.25, 50000.0, 0.0051975357, 0.082197394}, {90, 1.5, 5.0, 0.29587497, 3.8311272},
    {90, 1.5, 50.0, 0.069714539, 0.46400008},       {90, 1.5, 500.0, 0.022041907, 0.10627127},
    {90, 1.5, 5000.0, 0.010738435, 0.083068224},    {90, 1.5, 50000.0, 0.0050693911, 0.072707212},
};

Rows ideal_banks() {
  Rows rows;
  for (const Bank& b : banks) {
    const auto bank = shellside::ideal_bank(b.layout, b.pitch_ratio);
    const auto add = [&](const char* what, double expected, double value) {
      rows.push_back({.source = source,
                      .known = Known::computed,
                      .what = std::string(what) + " of an ideal bank, " + std::to_string(b.layout) +
                              " deg, Re " + std::to_string(static_cast<int>(b.reynolds)),
                      .unit = "-",
                      .published = expected,
                      .ours = value,
                      .tolerance = 1e-6,
                      .reason = ""});
    };
    add("j", b.j, shellside::colburn_factor(bank, b.reynolds));
    add("f", b.f, shellside::bank_friction(bank, b.reynolds));
  }
  return rows;
}

const published::Registration bank_rows{&ideal_banks};

}  // namespace
