#pragma once
#include <string>

#include "dutygauge/case_io.hpp"

/// Values laid on a document by dotted key.
namespace dutygauge::case_io {

/// Lays what stands below `block` of `from` on `onto`; mistakes are noted there.
void lay(const Document& from, const std::string& block, Document& onto);

}  // namespace dutygauge::case_io
