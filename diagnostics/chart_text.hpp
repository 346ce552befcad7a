// SPDX-License-Identifier: MIT
// The operating chart for people and for programs.
#pragma once

#include <nlohmann/json_fwd.hpp>
#include <string>
#include <vector>

#include "diagnostics/chart.hpp"

namespace spokewright {

/// The table, at most 100 columns wide.
std::vector<std::string> chart_lines(const Chart& chart);

/// The same numbers, unrounded; null where there is none.
nlohmann::ordered_json chart_json(const Chart& chart);
std::string chart_json_text(const Chart& chart);

}  // namespace spokewright
