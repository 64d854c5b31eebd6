#include <sys/mman.h>
#include <unistd.h>

#include <cstddef>
#include <cstdint>
#include <stdexcept>
#include <string>

#include "dutygauge/field/readings.hpp"

namespace {

using namespace dutygauge;

rating::Stream stream(double inlet) {
  rating::Stream made;
  made.fluid = fluids::make_constant({1000.0, 4180.0, 0.6, 1e-3}, fluids::Phase::liquid).fluid;
  made.mass_flow = 80.0;
  made.inlet_temperature = inlet;
  made.inlet_pressure = 5e5;
  return made;
}

/// A plant's own export: tags, decimal commas, wall-clock times.
field::Mapping plant() {
  field::Mapping mapping;
  mapping.clock.column = "Zeit";
  mapping.clock.format = "%d.%m.%Y %H:%M";
  mapping.clock.offset = 3600;
  mapping.clock.summer_time = field::SummerTime::eu;
  mapping.bad_words = {"bad", "-999"};
  for (std::size_t i = 0; i < 6; ++i) {
    mapping.columns[i].tag = std::string(1, static_cast<char>('A' + i));
    mapping.columns[i].unit = i < 2 ? "m3/h" : "degC";
  }
  return mapping;
}

}  // namespace

/// Any bytes are either readings or refused with a reason.
extern "C" int LLVMFuzzerTestOneInput(const std::uint8_t* data, std::size_t size) {
  static const int handle = memfd_create("readings", 0);
  static const std::string path = "/proc/self/fd/" + std::to_string(handle);
  static const field::Mapping mappings[] = {field::Mapping{}, plant()};
  static const rating::Stream hot = stream(350.0), cold = stream(290.0);
  if (ftruncate(handle, 0) != 0 || pwrite(handle, data, size, 0) != static_cast<ssize_t>(size)) return -1;
  for (const field::Mapping& mapping : mappings) try {
      field::Record record({path}, mapping, {&hot, &cold});
      for (field::Reading reading, last; record.next(reading); last = reading)
        if (last.time >= reading.time && last.time != 0) throw std::logic_error("readings out of order");
    } catch (const field::FileError&) {
      // a refused file is an answer
    }
  return 0;
}
