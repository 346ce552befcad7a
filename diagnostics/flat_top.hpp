// SPDX-License-Identifier: MIT
// The part of a run at its full voltage: the last stretch of the supply's programme that is constant and not zero.
#pragma once

#include <cstddef>
#include <span>

#include "inputs/deck.hpp"

namespace spokewright {

/// Rows [first, last) of a record. Both equal its length when it has not got there yet.
struct FlatTop {
    std::size_t first;
    std::size_t last;
    bool held;  // to the end of the programme: nothing but time follows
};

FlatTop flat_top(const Deck& deck, std::span<const double> time_ns);

}  // namespace spokewright
