// SPDX-License-Identifier: MIT
// Where an electron stands in its cell, the same for scatter and gather: azimuthal share linear in theta, radial share
// linear in r^2, (r^2 - r_i^2) / (r_{i+1}^2 - r_i^2), so that a uniform density deposits a uniform density.
#pragma once

#include "fields/aligned.hpp"
#include "pic/step_units.hpp"

namespace spokewright {

/// 1 / (2 r_i / dr + 1) of each radial cell: how far the area share bends away from the linear one. [n_r]
inline AlignedVector<float> radial_bend(const StepUnits& units) {
    AlignedVector<float> bend;
    for (int i = 0; i < units.grid.n_r; ++i) {
        bend.push_back(static_cast<float>(1 / (2 * (units.cathode_cells() + i) + 1)));
    }
    return bend;
}

struct CellShare {
    std::int32_t i, j;        // cell
    float depth;              // share of the cell's depth, 0..1
    float radial, azimuthal;  // weights of the outer and of the next node, 0..1
};

inline CellShare cell_share(std::int32_t r, std::int32_t theta, const float* bend) {
    const std::int32_t i = r >> kRadialBits;
    const float depth = static_cast<float>(r & kRadialMask) * (1.0f / kRadialOne);
    return {i, theta >> kAzimuthalBits, depth, depth + bend[i] * depth * (depth - 1.0f),
            static_cast<float>(theta & kAzimuthalMask) * (1.0f / kAzimuthalOne)};
}

}  // namespace spokewright
