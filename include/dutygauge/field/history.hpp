#pragma once
#include <functional>
#include <optional>
#include <string>
#include <vector>

#include "dutygauge/field/plant.hpp"
#include "dutygauge/field/screening.hpp"

/// From files to what every reading says, and to days.
namespace dutygauge::field {

/// On what the level of the fouling rests.
enum class Basis {
  films,         ///< as computed or given: their own scatter is in the level
  clean_period,  ///< the fouling is zero at its beginning
  cleaning,      ///< the fouling is zero after the first logged cleaning of the record
};
std::string_view name(Basis basis);

/// One row of the series: every row whose time is sound, used or not.
struct SeriesRow {
  std::int64_t time = 0;
  std::optional<Apparent> apparent{};  ///< empty where the reading is not used, or says nothing
  double fouling_u95 = 0;              ///< of the level, films and instruments included [m2.K/W]
  Drop drop = Drop::none;
};

struct History {
  Survey survey;
  Tally tally;
  std::vector<Understood> understood;
  Assumptions assumed;  ///< instruments of channels that were read
  Calibration calibration;
  Basis basis = Basis::films;
  std::uint64_t calibrated_on = 0;  ///< readings
  std::optional<Period> calibrated_over;
  double film_uncertainty = 0;  ///< standard, of 1/u_clean at the case's flows [m2.K/W]
  std::uint64_t amplified = 0;  ///< readings used although noise is amplified by more than 5
  Days days;
};

struct Wishes {
  KeepOn keep_on{};
  std::function<void(const SeriesRow&)> row{};  ///< called in order of time
};

/// Reads, screens and evaluates a record. Files are read twice or thrice, a pipe once: what
/// needs the whole record is then taken from its first 10 000 rows. Throws FileError, Interrupted.
History history(const rating::Problem& problem, const Mapping& mapping, const std::vector<std::string>& files,
                const Wishes& wishes = {});

}  // namespace dutygauge::field
