// SPDX-License-Identifier: MIT
// The chart's main lines over one key of the deck, as CSV (RFC 4180) with units in the header.
#pragma once

#include <string>
#include <vector>

namespace spokewright {

/// One key and its values: both ends and steps - 1 between, evenly.
struct ChartSweep {
    std::string key;  // section.key
    double from;
    double to;
    int steps;

    double value(int step) const;  // step 0..steps
};

/// Reads "section.key=from:to:steps". Throws InputError.
ChartSweep read_chart_sweep(const std::string& text);

/// A header and a line a value; an empty field where a number cannot be told. Reads the deck once a value, with the
/// overrides and the swept key. Throws as read_deck does, with `--sweep section.key=value` as the place of a bad value.
std::string chart_csv(const std::string& deck_path, const std::vector<std::string>& overrides, const ChartSweep& sweep);

}  // namespace spokewright
