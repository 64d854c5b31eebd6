#pragma once
#include <string>
#include <utility>

#include "command.hpp"
#include "dutygauge/explore.hpp"

/// What sweep and reach share: keys and ranges as typed behind an option.
namespace dutygauge::cli {

/// "KEY=RANGE" at its first '='. Throws CallError.
std::pair<std::string, std::string> key_and_range(std::string_view option, const std::string& typed);

/// The dial of a key; what is wrong with the key otherwise. Throws CallError.
explore::Dial dial_named(std::string_view option, const case_io::Document& document, const std::string& key);

/// Reads "KEY=FROM..TO:STEPS" against a case. Throws CallError.
explore::Variation variation(std::string_view option, const case_io::Document& document,
                             const std::string& typed);

/// The operating case that --case names, else the first, as the unit is. Throws CallError.
case_io::Document operating_case(const Call& call, const case_io::Document& document);

/// The one case a command is given, in the units asked for. Throws CallError, InputError.
case_io::Document case_given(const Call& call, std::string_view command);

}  // namespace dutygauge::cli
