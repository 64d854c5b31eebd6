#include <fmt/core.h>

#include <stdexcept>

#include "dutygauge/uncertainty.hpp"

namespace dutygauge::uncertainty {

Grade grade_of(double probability) {
  if (!(probability >= 0.0 && probability <= 1.0))
    throw std::invalid_argument("uncertainty::grade_of: not a probability");
  if (probability >= 0.95) return Grade::meets;
  if (probability >= 0.80) return Grade::likely;
  if (probability >= 0.20) return Grade::too_close;
  return probability >= 0.05 ? Grade::unlikely : Grade::fails;
}

std::string_view word(Grade grade) {
  switch (grade) {
    case Grade::meets:
      return "meets";
    case Grade::likely:
      return "likely";
    case Grade::too_close:
      return "too_close";
    case Grade::unlikely:
      return "unlikely";
    case Grade::fails:
      return "fails";
  }
  throw std::invalid_argument("uncertainty::word: no such grade");
}

std::string in_words(double probability) {
  if (probability > 0.99) return "> 99 %";
  if (probability < 0.01) return "< 1 %";
  return fmt::format("{:.0f} %", 100.0 * probability);
}

}  // namespace dutygauge::uncertainty
