#include "result_file.hpp"

#include <fmt/core.h>
#include <unistd.h>

#include <cerrno>
#include <cstring>

#include "command.hpp"

namespace dutygauge::cli {

ResultFile::ResultFile(std::string target)
    : target_(std::move(target)),
      path_(fmt::format("{}.partial-{}", target_, getpid())),
      stream_(path_, std::ios::binary | std::ios::trunc) {
  if (!stream_) fail(std::strerror(errno));
}

ResultFile::~ResultFile() {
  std::error_code ignored;
  std::filesystem::remove(path_, ignored);
}

void ResultFile::fail(const std::string& why) const {
  throw WriteError(fmt::format("cannot write {}: {}", target_, why));
}

void ResultFile::write(std::string_view text) {
  stream_.write(text.data(), static_cast<std::streamsize>(text.size()));
  if (!stream_) fail(std::strerror(errno));
}

void ResultFile::commit() {
  stream_.close();
  if (!stream_) fail(std::strerror(errno));
  std::error_code fault;
  std::filesystem::rename(path_, target_, fault);
  if (fault) fail(fault.message());
}

}  // namespace dutygauge::cli
