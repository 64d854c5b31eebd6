#include "log.hpp"

#include <spdlog/logger.h>
#include <spdlog/sinks/ostream_sink.h>

namespace dutygauge::cli {
namespace {

spdlog::level::level_enum level_of(Detail detail) {
  switch (detail) {
    case Detail::quiet:
      return spdlog::level::err;
    case Detail::usual:
      return spdlog::level::warn;
    case Detail::all:
      return spdlog::level::info;
  }
  return spdlog::level::warn;
}

}  // namespace

Log::Log(std::ostream& err, Detail detail)
    : log_(std::make_shared<spdlog::logger>("dutygauge",
                                            std::make_shared<spdlog::sinks::ostream_sink_mt>(err, true))) {
  log_->set_pattern("%n: %v");
  log_->set_level(level_of(detail));
}

void Log::note(const std::string& text) const {
  log_->warn("{}", text);
}

void Log::progress(const std::string& text) const {
  log_->info("{}", text);
}

}  // namespace dutygauge::cli
