// SPDX-License-Identifier: MIT
// One hot run: turn the clock, observe, keep, and say what the tube did.
#pragma once

#include <string>
#include <vector>

#include "diagnostics/progress.hpp"
#include "diagnostics/summary.hpp"
#include "inputs/deck.hpp"

namespace spokewright {

struct RunOptions {
    std::string folder;    // made when missing; run.h5, summary.json and state.h5 go there
    int threads = 1;       // changes the time a run takes, never its result
    bool resume = false;   // go on from the folder's state.h5
    bool replace = false;  // a result in the folder may be replaced
};

struct RunOutcome {
    Summary summary;
    int signal = 0;  // that stopped the run early, 0 if none; the files are written all the same
};

/// Threads that pay for a deck on this machine: one for every 50 000 macro-electrons (fewer lose more in waiting for
/// each other, the more so on a busy machine, than they gain), at most the processors there are.
int default_threads(const Deck& deck);

/// Runs the deck to its end time, or until stop_signal(). Throws InputError for a deck that start_checks calls
/// hopeless, FileError for a folder that cannot be written or holds a result, NumericsError when the numbers fail.
/// `warnings`: the deck's doubtful points, reported as soon as they are known.
RunOutcome hot_run(const Deck& deck, const RunOptions& options, Progress& progress,
                   const std::vector<std::string>& warnings);

/// The start checks as warnings. Throws InputError naming every hopeless point.
std::vector<std::string> check_deck(const Deck& deck);

}  // namespace spokewright
