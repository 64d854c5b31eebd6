#pragma once
#include <string>
#include <string_view>
#include <vector>

/// The keys of the case format as a list, for looking one up.
namespace dutygauge::case_io {

/// Every key, in the order of the format: '#' stands for an index, '?' for a name of one's own.
std::vector<std::string> all_keys();

/// Those whose last parts are `end` ("spacing": exchanger.baffles.spacing).
std::vector<std::string> keys_ending_in(std::string_view end);

}  // namespace dutygauge::case_io
