#include <fmt/core.h>

#include <filesystem>
#include <ostream>

#include "command.hpp"
#include "result_file.hpp"

namespace dutygauge::cli {
namespace {

std::optional<std::string> target(const Call& call, std::string_view option) {
  const auto file = call.value(option);
  return file == "-" ? std::nullopt : file;
}

}  // namespace

void check_target(const Call& call) {
  for (const std::string_view option : {"out", "csv", "html"}) {
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
  const auto file = target(call, option);
  if (!file) {
    out << result;
    return;
  }
  ResultFile written(*file);
  written.write(result);
  written.commit();
}

}  // namespace dutygauge::cli
