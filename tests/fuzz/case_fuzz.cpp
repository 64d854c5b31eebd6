#include <cstddef>
#include <cstdint>
#include <string_view>

#include "dutygauge/case_io.hpp"

/// Any bytes are either a case or refused with their mistakes.
extern "C" int LLVMFuzzerTestOneInput(const std::uint8_t* data, std::size_t size) {
  const std::string_view text(reinterpret_cast<const char*>(data), size);
  try {
    dutygauge::case_io::build(dutygauge::case_io::read_document(text, "fuzz"));
  } catch (const dutygauge::case_io::InputError&) {
    // a refused file is an answer
  }
  return 0;
}
