#pragma once
#include <filesystem>
#include <fstream>
#include <string>
#include <string_view>

/// A result on its way into a file.
namespace dutygauge::cli {

/// Written beside its target and renamed at the end, within one file system: nobody ever
/// sees half a result. Without `commit` nothing is left.
class ResultFile {
 public:
  /// Throws WriteError, as the other calls do.
  explicit ResultFile(std::string target);
  ~ResultFile();
  ResultFile(const ResultFile&) = delete;
  ResultFile& operator=(const ResultFile&) = delete;

  void write(std::string_view text);
  void commit();

 private:
  [[noreturn]] void fail(const std::string& why) const;

  std::string target_;
  std::filesystem::path path_;
  std::ofstream stream_;
};

}  // namespace dutygauge::cli
