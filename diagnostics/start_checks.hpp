// SPDX-License-Identifier: MIT
// Can this deck be simulated, and can the tube do what is asked? Checked before the first step, each finding with its
// number and its cure. Estimates from theory.hpp at the deck's nominal voltage and mean field.
#pragma once

#include <string>
#include <vector>

#include "inputs/deck.hpp"

namespace spokewright {

struct Finding {
    bool fatal;        // hopeless: do not start; else a warning
    std::string text;  // "what is so, with the number: which key to set to which value"
};

/// All findings on a read deck, in order: clock, grid, electrons, circuit, operating point. Empty when all is well.
std::vector<Finding> start_checks(const Deck& deck);

}  // namespace spokewright
