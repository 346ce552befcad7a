// SPDX-License-Identifier: MIT
// A summary as a file and as words.
#pragma once

#include <nlohmann/json_fwd.hpp>
#include <string>
#include <vector>

#include "diagnostics/summary.hpp"

namespace spokewright {

/// The caution that ends every summary.
extern const char* const kSafetyNote;

/// summary.json: keys in a fixed order, means as {"mean", "ci95"} (95 % half-width), null for what is undefined.
nlohmann::ordered_json summary_json(const Summary& summary);

/// The same, indented, as the bytes of the file. Ill-formed UTF-8 in a warning is replaced.
std::string summary_file_text(const Summary& summary);

/// At most 25 lines of at most 100 characters for an engineer to read aloud, status first, the caution last.
std::vector<std::string> summary_lines(const Summary& summary);

}  // namespace spokewright
