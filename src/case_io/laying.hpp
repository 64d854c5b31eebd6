#pragma once
#include <string>

#include "dutygauge/case_io.hpp"

/// Values laid on a document by dotted key.
namespace dutygauge::case_io {

/// Lays what stands below `block` of `from` on `onto`; mistakes are noted there.
void lay(const Document& from, const std::string& block, Document& onto);

/// Where the shell side of `after` is scaled or a flow is found from a duty, keeps the case the sheet speaks of, as `before` has it.
void keep_sheet(const Document& before, Document& after);

}  // namespace dutygauge::case_io
