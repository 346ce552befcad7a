// SPDX-License-Identifier: MIT
// A hot run small enough for a unit test: the invented tube of played_run.hpp at full voltage from the start and in a
// weaker field, so that electrons reach both electrodes at once, behind a resistance, with two modes, self field and
// secondaries; and a state as bytes, for comparisons to the last bit.
#pragma once

#include <string>

#include "pic/interaction_space.hpp"
#include "tests/played_run.hpp"

namespace spokewright {

inline Deck coarse_tube() {
    Deck deck = played_deck();
    deck.supply.programme = {{0, 1}};
    deck.supply.series_resistance = 100;
    deck.supply.shunt_capacitance = 2e-12;
    deck.magnet.field = 0.13;
    deck.magnet.self_field = true;
    deck.cathode.launch_temperature = 0.2;
    deck.cathode.secondary_emission = true;
    deck.cathode.secondary_yield_max = 2.5;
    deck.cathode.secondary_energy_max = 500;
    deck.cathode.secondary_temperature = 3;
    deck.prime = {5, 1500, 20e-12};
    deck.grid = {24, 80};
    deck.electrons.target_count = 2000;
    return deck;
}

/// Every number of a state in a fixed order; equal texts are equal states, NaN and signed zero included.
inline std::string bytes_of(const SpaceState& state) {
    std::string bytes;
    const auto append = [&](const auto& values) {
        bytes += std::to_string(values.size()) + ':';
        bytes.append(reinterpret_cast<const char*>(values.data()), values.size() * sizeof(values[0]));
    };
    const auto append_number = [&](const auto& value) {
        bytes.append(reinterpret_cast<const char*>(&value), sizeof(value));
    };
    append_number(state.step);
    append(state.electrons.r);
    append(state.electrons.theta);
    append(state.electrons.u_r);
    append(state.electrons.u_theta);
    append(state.resonator_voltage);
    append(state.resonator_current);
    append_number(state.anode_voltage);
    append(state.self_field);
    for (const WallBook* book : {&state.books.anode, &state.books.cathode}) {
        append_number(book->energy_range);
        append(book->sector_hits);
        append(book->sector_energy);
        append(book->energy_histogram);
    }
    return bytes;
}

}  // namespace spokewright
