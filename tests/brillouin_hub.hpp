// SPDX-License-Identifier: MIT
// A cold Brillouin hub laid into a smooth bore with a silent cathode. L. Brillouin, Phys. Rev. 67, 260 (1945).
// 4 kV, 0.18 T, 1.95/4.45 mm: r_b = 2.51492 mm, v_b = 1.5876e7 m/s, 3.20098e-7 C/m (computed).
#pragma once

#include <cmath>

#include "tests/smooth_bore.hpp"

namespace spokewright {

inline constexpr double kHubField = 0.18, kHubCathode = 1.95e-3, kHubRadius = 2.51492e-3, kHubCharge = 3.20098e-7;
inline constexpr double kHubTurn = kElementaryCharge * kHubField / kElectronMass;  // cyclotron frequency, rad/s

inline double hub_speed(double r) {
    return 0.5 * kHubTurn * (r - kHubCathode * kHubCathode / r);
}

inline double hub_density(double r) {
    return kVacuumPermittivity * kElectronMass * kHubTurn * kHubTurn / (2 * kElementaryCharge * kElementaryCharge) *
           (1 + std::pow(kHubCathode / r, 4));
}

/// Share of the hub's charge within r.
inline double hub_share(double r) {
    const auto charge = [](double x) { return x * x - std::pow(kHubCathode, 4) / (x * x); };  // integral of 2 x n
    return charge(r) / charge(kHubRadius);
}

inline Deck hub_deck() {
    Deck deck = silent(smooth_bore(kHubCathode, 4.45e-3, 4000, kHubField));
    deck.grid = {120, 4};
    deck.electrons.target_count = 40000;  // just as many as load_hub() places
    return deck;
}

/// Evenly in charge over r, by the golden section over theta; each on its circle, half a step before now.
inline void load_hub(InteractionSpace& space, const Deck& deck) {
    const std::int64_t count = deck.electrons.target_count;
    for (std::int64_t k = 0; k < count; ++k) {
        double low = kHubCathode, high = kHubRadius;
        for (int halving = 0; halving < 50; ++halving) {
            const double middle = 0.5 * (low + high);
            (hub_share(middle) * static_cast<double>(count) < static_cast<double>(k) + 0.5 ? low : high) = middle;
        }
        const double back = 0.5 * deck.clock.step * hub_speed(low) / low;
        const double u = hub_speed(low) / std::sqrt(1 - std::pow(hub_speed(low) / kLightSpeed, 2));
        const double turns = static_cast<double>(k) * 0.6180339887498949;
        space.place_electron(low, 2 * kPi * (turns - std::floor(turns)), u * std::sin(back), u * std::cos(back));
    }
    space.settle_fields();
}

}  // namespace spokewright
