// SPDX-License-Identifier: MIT
// May a run end before its end time, because the rest of it would only cost time? Two verdicts, each of which must
// stand at two looks in a row, since whoever looks often at an interval finds it narrow once by chance (A. M. Law,
// Simulation Modeling and Analysis, on sequential procedures):
//
// * settled: the run has settled (settling.hpp), current and radio-frequency power are known to the half-width asked
//   for, the part kept covers the resonators' memory, and no other mode grows;
// * skipped: no mode oscillates, and none could reach the oscillation share before the end time even at the upper 99 %
//   bound of the growth seen so far.
//
// A run that ends early cannot show what would have come later. A programme that falls again is always run to its end.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "diagnostics/record.hpp"
#include "inputs/deck.hpp"

namespace spokewright {

class StopRule {
public:
    explicit StopRule(const Deck& deck) : deck_(deck) {}

    /// Why the run may end now; nothing when it must go on. Call at every sample: it looks every fortieth of the run.
    /// Never ends a deck that asks for no half-width.
    std::optional<std::string> look(const Record& record);

private:
    std::string verdict(const Record& record) const;
    std::string settled(const Record& record, std::size_t first, int leading, double since_ns) const;
    bool other_mode_grows(const Record& record, std::size_t from, int leading) const;
    std::string skipped(const Record& record, std::size_t first) const;
    double memory_ns(const ModeEntry& mode) const;

    const Deck& deck_;
    double next_look_ns_ = 0;
    bool stood_before_ = false;
};

/// Slope of a straight line through equally spaced values, a sample, and the 99 % bound above it. At least 3 values.
struct Slope {
    double value;
    double upper;
};
Slope fitted_slope(std::span<const double> values);

}  // namespace spokewright
