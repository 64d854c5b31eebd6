#include "dutygauge/field/history.hpp"

#include <algorithm>
#include <cmath>

#include "calibrate.hpp"
#include "day_book.hpp"
#include "dutygauge/field/times.hpp"

namespace dutygauge::field {
namespace {

constexpr std::uint64_t rows_of_a_pipe = 10'000;
constexpr double much_amplified = 5.0, too_much_amplified = 20.0;
constexpr std::int64_t days_after_cleaning = 7 * 86400;
constexpr std::size_t most_clean_points = 20'000;

/// A record as often as it is needed: files are read again, of a pipe the beginning is kept.
class Source {
 public:
  Source(const rating::Problem& problem, const Mapping& mapping, const std::vector<std::string>& files,
         const Wishes& wishes)
      : mapping_(mapping),
        streams_(streams_of(problem, mapping)),
        files_(files),
        keep_on_(wishes.keep_on),
        record_(open()) {
    rereadable_ = record_->rereadable();
    survey_ = survey_of(
        *record_, rereadable_ ? ~std::uint64_t{0} : rows_of_a_pipe,
        rereadable_ ? std::function<void(const Reading&)>{}
                    : [this](const Reading& reading) { beginning_.push_back(reading); });
  }

  /// From the first row again.
  void restart() {
    at_ = 0;
    if (rereadable_) record_ = open();
  }

  bool next(Reading& reading) {
    if (at_ < beginning_.size()) {
      reading = beginning_[at_++];
      return true;
    }
    return record_->next(reading);
  }

  /// Whether rows beyond this time can be looked at and come back to.
  bool can_look_at(std::int64_t time) const {
    return rereadable_ || survey_.whole || (!beginning_.empty() && time < beginning_.back().time);
  }

  const Survey& survey() const { return survey_; }
  const Record& record() const { return *record_; }

 private:
  std::unique_ptr<Record> open() const {
    return std::make_unique<Record>(files_, mapping_, streams_, keep_on_);
  }

  const Mapping& mapping_;
  const Streams streams_;
  const std::vector<std::string>& files_;
  const KeepOn& keep_on_;
  std::unique_ptr<Record> record_;
  bool rereadable_ = true;
  Survey survey_;
  std::vector<Reading> beginning_;
  std::size_t at_ = 0;
};

/// What a screened reading comes to.
Drop evaluate(const Plant& plant, const Instruments& instruments, const Screened& screened,
              std::optional<Apparent>& result) {
  result.reset();
  if (screened.drop != Drop::none) return screened.drop;
  int absent = 0;
  for (std::size_t c = 0; c < index_of(Channel::tube_dp); ++c)
    absent += std::isnan(screened.reading.value[c]) ? 1 : 0;
  if (absent > 1) return Drop::incomplete;
  result = apparent(plant, instruments, screened.reading.value);
  if (!result) return Drop::impossible;
  return result->noise_amplification > too_much_amplified ? Drop::noisy : Drop::none;
}

/// The time over which the unit is taken for clean.
struct CleanTime {
  Basis basis = Basis::films;
  Period period;
};

std::optional<CleanTime> clean_time(const rating::Problem& problem, const Mapping& mapping,
                                    const Survey& survey) {
  if (mapping.clean_period) return CleanTime{Basis::clean_period, *mapping.clean_period};
  // Films that the case gives are taken at their word.
  if (problem.shell_side.film_law && problem.tube_side.film_law) return {};
  for (const Done& event : mapping.events)
    if (event.kind == Doing::cleaning && event.when.to >= survey.start)
      return CleanTime{Basis::cleaning, {event.when.to, event.when.to + days_after_cleaning}};
  return {};
}

std::vector<CleanPoint> clean_points(const rating::Problem& problem, const Mapping& mapping,
                                     const Period& period, Source& source) {
  const Plant plant(problem);
  std::vector<CleanPoint> points;
  Tally unused;
  const auto take = [&](const Screened& screened) {
    if (!period.holds(screened.reading.time) || points.size() == most_clean_points) return;
    std::optional<Apparent> said;
    if (evaluate(plant, mapping.instruments, screened, said) != Drop::none) return;
    const double days = static_cast<double>(screened.reading.time - period.from) / 86400.0;
    points.push_back({days, 1.0 / said->u, 1.0 / said->u_clean});
  };
  Screen screen(mapping, source.survey(), source.record().resolution(), unused, take);
  Reading reading;
  const std::int64_t margin = 86400;  // the screen looks ahead
  while (source.next(reading) && reading.time <= period.to + margin) screen.push(reading);
  screen.finish();
  return points;
}

void calibrate(const rating::Problem& problem, const Mapping& mapping, const std::vector<std::string>& files,
               Source& source, History& history) {
  const auto scatter = film_scatter(problem);
  history.film_uncertainty = scatter.value_or(0.0);
  const auto clean = clean_time(problem, mapping, history.survey);
  if (!clean) return;
  const std::string when = written(clean->period.from) + " to " + written(clean->period.to);
  if (!source.can_look_at(clean->period.to))
    throw FileError(files.front(), 0, 0,
                    {"a pipe is read once, and the clean time (" + when + ") lies beyond its first rows",
                     "a file", "write the pipe to a file and name that"});
  source.restart();
  const auto points = clean_points(problem, mapping, clean->period, source);
  const auto found = calibrated(points);
  if (!found && clean->basis == Basis::cleaning) return;
  if (!found)
    throw FileError(files.front(), 0, 0,
                    {"the clean period (" + when + ") holds " + std::to_string(points.size()) +
                         " readings that can be used",
                     "six at least", "correct readings.clean_period in the case, or leave it out"});
  history.calibration = *found;
  history.basis = clean->basis;
  history.calibrated_on = points.size();
  history.calibrated_over = clean->period;
  history.film_uncertainty = found->standard_uncertainty / found->factor;
}

/// Instruments that were taken for usual, of what was read.
Assumptions assumed_of(const Mapping& mapping, const std::vector<Understood>& understood) {
  Assumptions assumed;
  for (const Assumption& one : mapping.assumed)
    for (const Understood& file : understood) {
      const bool is_read = std::ranges::any_of(file.columns, [&](const UsedColumn& column) {
        return one.key.starts_with("readings.columns." + std::string(name(column.channel)) + ".");
      });
      if (!is_read) continue;
      assumed.push_back(one);
      break;
    }
  return assumed;
}

/// The last pass: every row to the series, the used ones to their days.
void evaluate_all(const Plant& plant, const Mapping& mapping, const Wishes& wishes, Source& source,
                  History& result) {
  // Relative to 1/u_clean until here, where the films of each reading are known.
  const double film = result.film_uncertainty;
  Thinned levels;
  DayBook book(result.survey.start, result.days);
  const auto take = [&](const Screened& screened) {
    SeriesRow row{.time = screened.reading.time};
    row.drop = evaluate(plant, mapping.instruments, screened, row.apparent);
    ++result.tally[row.drop];
    if (row.apparent) {
      const Apparent& said = *row.apparent;
      row.fouling_u95 =
          2.0 * std::hypot(std::hypot(said.fouling_random, said.fouling_systematic), film / said.u_clean);
    }
    if (row.drop == Drop::none) {
      book.add(screened.reading, *row.apparent);
      levels.add(film / row.apparent->u_clean);
      result.amplified += row.apparent->noise_amplification > much_amplified ? 1 : 0;
    }
    if (wishes.row) wishes.row(row);
  };
  Tally found;
  Screen screen(mapping, result.survey, source.record().resolution(), found, take);
  for (Reading reading; source.next(reading);) screen.push(reading);
  screen.finish();
  book.close();
  result.film_uncertainty = levels.median();
  const Tally& read = source.record().tally();
  const auto used = result.tally.rows_by;
  result.tally = read;
  for (std::size_t i = 0; i < drop_count; ++i) result.tally.rows_by[i] += used[i];
  result.tally.frozen = found.frozen;
  result.tally.drop_spikes = found.drop_spikes;
  result.understood = source.record().understood();
}

}  // namespace

std::string_view name(Basis basis) {
  return basis == Basis::films ? "films" : basis == Basis::clean_period ? "clean_period" : "cleaning";
}

History history(const rating::Problem& problem, const Mapping& mapping, const std::vector<std::string>& files,
                const Wishes& wishes) {
  Source source(problem, mapping, files, wishes);
  History result;
  result.survey = source.survey();
  calibrate(problem, mapping, files, source, result);
  source.restart();
  evaluate_all(Plant(problem, result.calibration), mapping, wishes, source, result);
  result.assumed = assumed_of(mapping, result.understood);
  return result;
}

}  // namespace dutygauge::field
