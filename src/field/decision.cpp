#include "dutygauge/field/decision.hpp"

#include <algorithm>
#include <cmath>
#include <stdexcept>

namespace dutygauge::field {
namespace {

constexpr std::size_t priced_courses = 1000;  // enough for a mean; the forecast draws more
constexpr double step = 1.0;                  // [d]
constexpr double seconds_per_day = 86400.0;
constexpr double sure = 0.9;       // share of the courses in which the cheapest must be it
constexpr double too_soon = 30.0;  // [d] in which no stop is arranged

/// A course under one way of going on.
class Run {
 public:
  Run(const Course& course, double now, const Option& option, double residue)
      : course_(course), now_(now), cleaned_at_(option.at) {
    if (cleaned_at_) left_ = residue * std::max(course.law.at(std::max(*cleaned_at_, now)), 0.0);
  }

  double fouling(double day) const {
    if (!cleaned_at_ || day < *cleaned_at_) return course_.law.at(day);
    const Law& law = course_.law;
    return left_ + law.rise * growth(law.kind, law.shape, day - *cleaned_at_);
  }

  /// Before it is cleaned, or to the end; or where a cleaning leaves too much. What comes after a
  /// cleaning is the next cycle's question.
  bool lost_by(double end) const {
    if (cleaned_at_ && left_ >= course_.allowed) return true;
    if (cleaned_at_ && *cleaned_at_ <= now_) return false;  // a loss of the past is over
    return course_.lost && *course_.lost <= (cleaned_at_ ? *cleaned_at_ : end);
  }

 private:
  const Course& course_;
  double now_;
  std::optional<double> cleaned_at_;
  double left_ = 0;
};

std::vector<Option> ways(double now, const Plan& plan) {
  std::vector<Option> options = {{.way = Way::now, .at = now}};
  if (plan.next_stop && *plan.next_stop > now)
    options.push_back({.way = Way::next_stop, .at = plan.next_stop});
  options.push_back({.way = Way::never});
  return options;
}

double risk_of(const Forecast& forecast, const Plan& plan, const Option& option) {
  const auto lost = std::ranges::count_if(forecast.courses, [&](const Course& course) {
    return Run(course, forecast.as_of, option, plan.residue).lost_by(forecast.as_of + plan.horizon);
  });
  return static_cast<double>(lost) / static_cast<double>(forecast.courses.size());
}

Bill bill_of(const Course& course, const Forecast& forecast, const Plan& plan, const Option& option) {
  const Economics& money = *plan.economics;
  Bill bill;
  if (option.at) bill.cleaning = money.cost.cleaning;
  // At a stop that comes anyway nothing more is lost.
  if (option.way == Way::now) bill.outage = money.cost.downtime * money.cost.down_rate;
  const Run run(course, forecast.as_of, option, plan.residue);
  for (double day = 0.5 * step; day < plan.horizon; day += step) {
    const double lost = money.duty_lost(std::max(run.fouling(forecast.as_of + day), 0.0));
    bill.lost_duty += lost * step * seconds_per_day * money.heat_price;
  }
  return bill;
}

/// Those between which cost may choose.
std::vector<std::size_t> allowed(const std::vector<Option>& options, double accepted) {
  double least = 1.0;
  for (const Option& option : options) least = std::min(least, option.risk);
  std::vector<std::size_t> indices;
  for (std::size_t i = 0; i < options.size(); ++i)
    if (options[i].risk <= std::max(accepted, least)) indices.push_back(i);
  return indices;
}

void price(std::vector<Option>& options, const Forecast& forecast, const Plan& plan) {
  const auto choice = allowed(options, plan.accepted_risk);
  const std::size_t count = std::min(priced_courses, forecast.courses.size());
  const double share = 1.0 / static_cast<double>(count);
  for (Option& option : options) option.bill = Bill{};
  for (std::size_t c = 0; c < count; ++c) {
    std::vector<double> sums;
    for (Option& option : options) {
      const Bill bill = bill_of(forecast.courses[c], forecast, plan, option);
      option.bill->cleaning += share * bill.cleaning;
      option.bill->lost_duty += share * bill.lost_duty;
      option.bill->outage += share * bill.outage;
      sums.push_back(bill.sum());
    }
    const auto best = *std::ranges::min_element(choice, {}, [&sums](std::size_t i) { return sums[i]; });
    options[best].cheapest_in += share;
  }
}

/// The index of the way to go; whether it is worth a recommendation is said at the option.
std::size_t choose(std::vector<Option>& options, const Plan& plan) {
  const auto choice = allowed(options, plan.accepted_risk);
  if (!plan.economics) {
    options[choice.back()].recommended = true;
    return choice.back();
  }
  const auto best =
      *std::ranges::min_element(choice, {}, [&options](std::size_t i) { return options[i].bill->sum(); });
  options[best].recommended = options[best].cheapest_in >= sure;
  return best;
}

/// Without a stop to wait for, "never" stands for a stop that can still be arranged.
Decision advise(std::vector<Option> options, std::size_t best, const Forecast& forecast, const Plan& plan) {
  Decision decision;
  const bool accepted = options[best].risk <= plan.accepted_risk;
  const bool no_stop = std::ranges::none_of(options, [](const Option& o) { return o.way == Way::next_stop; });
  const bool must = options.back().risk > plan.accepted_risk;  // never is the last
  if (options[best].way == Way::never) {
    decision.advice = Advice::not_needed;
    decision.why = "the service holds to the horizon without a cleaning";
    if (!accepted) decision.why = "a cleaning would not bring the service back";
  } else if (options[best].way == Way::next_stop) {
    decision.advice = Advice::next_stop;
    decision.why = "the service holds to the next stop";
    if (!accepted) decision.why = "no way keeps the service; the next stop risks least";
  } else if (must && !forecast.lost_already && no_stop && forecast.lost.early &&
             *forecast.lost.early > forecast.as_of + too_soon) {
    decision.advice = Advice::next_stop;
    decision.why = "the service holds long enough to arrange a stop";
    options[best].recommended = false;
  } else {
    decision.advice = Advice::stop_now;
    decision.why =
        forecast.lost_already ? "a cleaning brings it back" : "waiting risks the service or costs more";
  }
  decision.options = std::move(options);
  return decision;
}

}  // namespace

std::string_view name_of(Way way) {
  switch (way) {
    case Way::now:
      return "now";
    case Way::next_stop:
      return "next stop";
    case Way::never:
      return "never";
  }
  throw std::logic_error("field: a way without a name");
}

std::string_view name_of(Advice advice) {
  switch (advice) {
    case Advice::stop_now:
      return "stop_now";
    case Advice::next_stop:
      return "next_stop";
    case Advice::not_needed:
      return "not_needed";
    case Advice::settle_first:
      return "settle_first";
  }
  throw std::logic_error("field: an advice without a name");
}

Decision decide(const Forecast& forecast, const Plan& plan) {
  if (forecast.courses.empty()) throw std::invalid_argument("field::decide: no courses");
  auto options = ways(forecast.as_of, plan);
  for (Option& option : options) option.risk = risk_of(forecast, plan, option);
  if (plan.economics) price(options, forecast, plan);
  const std::size_t best = choose(options, plan);
  return advise(std::move(options), best, forecast, plan);
}

}  // namespace dutygauge::field
