// SPDX-License-Identifier: MIT
// The heating tube with its hub full, for benchmarks: made once for each size of cloud.
#pragma once

#include <map>
#include <string>

#include "inputs/deck_reader.hpp"
#include "pic/interaction_space.hpp"

namespace spokewright {

inline Deck heating_tube(int target) {
    return read_deck(std::string(SPOKEWRIGHT_SOURCE_DIR) + "/inputs/tubes/heating.ini",
                     {"electrons.target_count=" + std::to_string(target)});
}

inline const SpaceState& filled_tube(int target) {
    constexpr double filled_after = 8e-9;  // s: voltage up, hub full
    static std::map<int, SpaceState> made;
    const auto found = made.find(target);
    if (found != made.end()) {
        return found->second;
    }
    InteractionSpace space(heating_tube(target), 2);
    while (space.time() < filled_after) {
        space.step();
    }
    return made.emplace(target, space.save()).first->second;
}

}  // namespace spokewright
