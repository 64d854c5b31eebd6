#pragma once
#include <map>
#include <string>
#include <vector>

#include "vary.hpp"

/// Internal to explore: one input followed through a range, and where things cease to hold.
namespace dutygauge::explore {

/// Something that holds or not: a limit of the service, of practice, or a remark.
struct Condition {
  std::string name, what;
  bool stops = true;
};

/// What is known of one value. `room` of a condition: not negative where it holds.
struct Reading {
  double value = 0;
  bool unsettled = false;
  std::string stopper = {}, why = {};  ///< where there is no result
  std::vector<double> room = {};       ///< one a condition; empty where there is no result
  std::vector<Finding> remarks = {};   ///< of the methods, should and must
  bool has_result() const { return stopper.empty() && !unsettled; }
};

/// A case with one input free.
class Follower {
 public:
  Follower(const case_io::Document& document, const Dial& dial);

  const std::vector<Condition>& conditions() const { return conditions_; }
  const case_io::Case& base() const { return case_; }
  Reading at(double value) const;

  /// All crossings between neighbouring readings, by rising value.
  std::vector<report::Limit> crossings(const std::vector<Reading>& readings) const;

  /// Where everything that stops holds, nearest to the own value; empty: nowhere.
  std::optional<report::Room> room(const std::vector<report::Limit>& limits, double from, double to) const;

 private:
  void between(const Reading& low, const Reading& high, std::vector<report::Limit>& found) const;
  void compare(const Reading& low, const Reading& high, std::vector<report::Limit>& found) const;
  double crossing(std::size_t condition, const Reading& low, const Reading& high) const;
  template <class Holds>
  std::pair<Reading, Reading> narrowed(Reading low, Reading high, Holds&& holds) const;

  const case_io::Document& document_;
  Dial dial_;
  case_io::Case case_;
  bool shell_is_hot_ = false;
  std::vector<Condition> conditions_;
};

/// Every reading that settled, in the order of `values`; rated in parallel.
std::vector<Reading> readings(const Follower& follower, const std::vector<double>& values, int& unsettled);

/// What stands at one value although it should not, in words.
std::vector<std::string> broken(const Follower& follower, const Reading& reading);

}  // namespace dutygauge::explore
