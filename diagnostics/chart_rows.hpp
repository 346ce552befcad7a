// SPDX-License-Identifier: MIT
// The operating chart as one list of rows, from which the terminal table, the JSON and a sweep's CSV are all made.
#pragma once

#include <string>
#include <vector>

#include "diagnostics/chart.hpp"

namespace spokewright {

struct ChartRow {
    const char* section;     // heading it stands under
    const char* key;         // name in JSON and CSV, the unit at its end
    std::string label;       // in the table
    const char* unit;        // "" for a pure number
    double value;            // in that unit; NaN where it cannot be told: the note says why
    double nonrelativistic;  // NaN unless it differs from the value by more than 0.1 %
    std::string note;
    int source;     // number in chart_sources(), 0 for none
    bool in_sweep;  // a column of a sweep
};

/// In the order of the table.
std::vector<ChartRow> chart_rows(const Chart& chart);

/// Where the formulas come from; row.source counts from 1.
const std::vector<std::string>& chart_sources();

/// NaN unless it differs from the relativistic value by more than 0.1 %.
double nonrelativistic_worth_showing(const ChartValue& value);

/// Five figures, in full up to ten million; "-" for NaN.
std::string figure(double value);

}  // namespace spokewright
