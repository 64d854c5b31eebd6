#include <fmt/core.h>
#include <unistd.h>

#include <cerrno>
#include <cstring>
#include <filesystem>
#include <fstream>
#include <ostream>

#include "command.hpp"

namespace dutygauge::cli {
namespace {

// Removes the temporary file unless it became the result.
struct Temporary {
  std::filesystem::path path;
  ~Temporary() {
    std::error_code ignored;
    std::filesystem::remove(path, ignored);
  }
};

std::optional<std::string> target(const Call& call, std::string_view option) {
  const auto file = call.value(option);
  return file == "-" ? std::nullopt : file;
}

// Beside the target, so that the last step is a rename within one file system:
// nobody ever sees half a result.
void write_file(const std::string& file, const std::string& result) {
  const Temporary temporary{fmt::format("{}.partial-{}", file, getpid())};
  std::ofstream stream(temporary.path, std::ios::binary | std::ios::trunc);
  stream << result;
  stream.close();
  if (!stream) throw WriteError(fmt::format("cannot write {}: {}", file, std::strerror(errno)));
  std::error_code fault;
  std::filesystem::rename(temporary.path, file, fault);
  if (fault) throw WriteError(fmt::format("cannot write {}: {}", file, fault.message()));
}

}  // namespace

void check_target(const Call& call) {
  for (const std::string_view option : {"out", "csv"}) {
    const auto file = target(call, option);
    if (file && file->empty())
      throw CallError(fmt::format("--{}: the file has no name; give one, or - for standard output", option));
    if (file && std::filesystem::exists(*file) && !call.has("force"))
      throw CallError(fmt::format("--{}: {} exists; give --force to replace it", option, *file));
  }
}

void deliver(const Call& call, const std::string& result, std::ostream& out) {
  deliver_to("out", call, result, out);
}

void deliver_to(std::string_view option, const Call& call, const std::string& result, std::ostream& out) {
  if (const auto file = target(call, option))
    write_file(*file, result);
  else
    out << result;
}

}  // namespace dutygauge::cli
