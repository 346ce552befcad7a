// SPDX-License-Identifier: MIT
// Space-charge-limited current of a coaxial diode without magnetic field, as the simulator finds it.
#pragma once

#include <cmath>

#include "tests/smooth_bore.hpp"

namespace spokewright {

/// A; of a diode 10 mm high, cathode radius 2 mm. `steps` in about one transit; mean of the last 3 of 6 transits.
inline double simulated_limited_current(double radius_ratio, double voltage, int radial_cells, int steps) {
    const double r_c = 2e-3, r_a = radius_ratio * r_c;
    Deck deck = smooth_bore(r_c, r_a, voltage, 0);
    deck.grid = {radial_cells, 8};
    deck.electrons.target_count = 10000;
    // A planar limited diode is crossed in 3 d / v; at 350 kV that is a third too short, with curvature too long.
    const double speed = std::sqrt(2 * kElementaryCharge * voltage / kElectronMass);
    deck.clock.step = 3 * (r_a - r_c) / speed / steps;
    InteractionSpace space(deck, 1);
    double charge = 0;
    for (int k = 1; k <= 6 * steps; ++k) {
        const double moved = space.step().induced_charge;
        charge += k > 3 * steps ? moved : 0;
    }
    return charge / (3 * steps * deck.clock.step);
}

}  // namespace spokewright
