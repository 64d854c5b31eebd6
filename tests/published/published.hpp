#pragma once
#include <string>
#include <vector>

/// Values printed elsewhere, each beside ours. A file of this folder registers
/// its rows; `published_test` checks them all and `scoreboard` prints them.
namespace published {

enum class Known {
  seen,      ///< read in a published page or file
  computed,  ///< recomputed from published inputs or equations by an independent program
  memory,    ///< recalled, not re-read
  practice,  ///< common practice, no source
};

struct Row {
  std::string source;  ///< author, title, page
  Known known = Known::seen;
  std::string what;  ///< quantity and case
  std::string unit;
  double published = 0;
  double ours = 0;
  double tolerance = 0;  ///< what the source's precision justifies
  bool relative = true;  ///< tolerance is relative to the published value
  std::string reason;    ///< why they differ, where the source's method is not ours
};

using Rows = std::vector<Row>;

/// All rows of all files, in file order.
Rows all();

/// `const Registration x{&rows_of_this_file};` at namespace scope adds a file's rows.
struct Registration {
  explicit Registration(Rows (*rows)());
};

}  // namespace published
