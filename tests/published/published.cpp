#include "published/published.hpp"

namespace published {
namespace {

std::vector<Rows (*)()>& tables() {
  static std::vector<Rows (*)()> instance;
  return instance;
}

}  // namespace

Registration::Registration(Rows (*rows)()) {
  tables().push_back(rows);
}

Rows all() {
  Rows result;
  for (auto* table : tables()) {
    const Rows rows = table();
    result.insert(result.end(), rows.begin(), rows.end());
  }
  return result;
}

}  // namespace published
