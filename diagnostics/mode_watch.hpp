// SPDX-License-Identifier: MIT
// Which mode the tube runs in, and when that changes. The leading mode is the one with the most stored energy; a change
// counts once it has lasted a dwell, so that a beat between two modes is not a chain of events.
#pragma once

#include <span>
#include <string>
#include <vector>

#include "diagnostics/record.hpp"
#include "inputs/deck.hpp"

namespace spokewright {

/// Dwell, in periods of the mode that takes over (or dies): longer than a field build-up of the highest frequency beat
/// between neighbouring modes some 10 % apart, shorter than any fill time Q_L / pi of interest (common practice, no
/// source).
inline constexpr double kDwellPeriods = 10;

/// A mode oscillates when its vane voltage is above this share of the deck's anode voltage. Shot noise of 20 000
/// macro-electrons stays near 0.2 % in the example tubes; running modes stand at 25 to 60 % (measured, no source).
inline constexpr double kOscillationShare = 0.05;

struct ModeEvent {
    double time_ns;    // when the new state began
    std::string kind;  // "mode start", "mode shift", "mode loss", "mode skip"
    int from;          // mode number, 0 = none
    int to;
};

class ModeWatch {
public:
    explicit ModeWatch(const Deck& deck);

    /// One sample: forward voltage amplitudes (V) and stored energies (J), in the order of the deck's modes.
    void observe(double time_ns, std::span<const double> voltages, std::span<const double> energies);

    /// The end of the run: a deck with modes in which none ever started has skipped ("mode skip").
    void finish(double time_ns);

    int leading() const { return leading_; }  // mode number, 0 while none oscillates
    const std::vector<ModeEvent>& events() const { return events_; }

private:
    double period_ns(int mode) const;

    std::vector<ModeEntry> modes_;
    double threshold_;  // V
    int leading_ = 0;
    int challenger_ = 0;  // equals leading_ when nobody challenges
    double since_ns_ = 0;
    std::vector<ModeEvent> events_;
};

/// The same over a whole record, with the end of the run. Also how a resumed run gets its watch back (before `finish`).
ModeWatch watch_modes(const Deck& deck, const Record& record, bool finished);

}  // namespace spokewright
