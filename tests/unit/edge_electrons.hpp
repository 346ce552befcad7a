// SPDX-License-Identifier: MIT
// Electrons where a step is most likely to go wrong: at the walls, in the last cell, on both sides of theta = 0, at
// rest and fast, then random ones.
#pragma once

#include <random>

#include "pic/electron_store.hpp"
#include "pic/step_units.hpp"

namespace spokewright {

/// The first `count` of them. All lie within the gap; speeds up to `fastest` cells a step.
inline ElectronStore edge_electrons(const StepUnits& units, std::size_t count, float fastest = 1.5f) {
    const std::int32_t anode = units.radial_end(), turn = units.azimuthal_end();
    ElectronStore store;
    for (const std::int32_t r : {1, kRadialOne - 3, kRadialOne + 3, anode / 2 + 5, anode - kRadialOne + 3, anode - 1}) {
        for (const std::int32_t theta :
             {0, 1, kAzimuthalOne + 3, turn / 2 + 12345, turn - kAzimuthalOne + 3, turn - 1}) {
            for (const float u_r : {0.0f, -fastest, fastest}) {
                for (const float u_theta : {0.0f, -fastest, fastest}) {
                    store.append({r, theta, u_r, u_theta});
                }
            }
        }
    }
    std::mt19937 random(3);
    std::uniform_real_distribution<float> speed(-fastest, fastest);
    std::uniform_int_distribution<std::int32_t> radius(1, anode - 1), angle(0, turn - 1);
    while (store.size() < count) {
        store.append({radius(random), angle(random), speed(random), speed(random)});
    }
    store.resize(count);
    return store;
}

}  // namespace spokewright
