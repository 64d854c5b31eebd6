#pragma once
#include <iosfwd>
#include <memory>
#include <string>

namespace spdlog {
class logger;
}

/// Notes on the way, to standard error. Results and errors do not come here.
namespace dutygauge::cli {

enum class Detail { quiet, usual, all };

/// The log of one call. Its lines carry no time stamp: the same call writes the same bytes.
class Log {
 public:
  Log(std::ostream& err, Detail detail);
  /// Something the user should see unless it is quiet.
  void note(const std::string& text) const;
  /// What was done; shown with -v.
  void progress(const std::string& text) const;

 private:
  std::shared_ptr<spdlog::logger> log_;
};

}  // namespace dutygauge::cli
