// SPDX-License-Identifier: MIT
// A smooth-bore tube for the published checks: no vanes, no circuit, full voltage from the start, electrons from rest.
#pragma once

#include "inputs/deck.hpp"
#include "pic/interaction_space.hpp"

namespace spokewright {

inline Deck smooth_bore(double cathode_radius, double anode_radius, double voltage, double field) {
    Deck deck;
    deck.tube = {"smooth bore", cathode_radius, anode_radius, 10e-3, 0, 0.4};
    deck.supply.anode_voltage = voltage;
    deck.supply.programme = {{0, 1}};
    deck.magnet.field = field;
    deck.grid = {48, 64};
    deck.clock = {1e-12, 0, 16};
    return deck;
}

/// The same tube with a cathode that gives nothing.
inline Deck silent(Deck deck) {
    deck.cathode.emission_limit = 1e-30;  // A/m^2; 0 would mean no limit
    return deck;
}

}  // namespace spokewright
