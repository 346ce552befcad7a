// SPDX-License-Identifier: MIT
// What an electron reads and writes of one cell of the grid, in the units of step_units.hpp.
#pragma once

#include <cstdint>

namespace spokewright {

/// The electric half kick and the magnetic half turn anywhere in one cell, 32 bytes: one vector load.
/// With f the share of the cell's depth, t the azimuthal share, s the area share (r^2 - r_i^2) / (r_{i+1}^2 - r_i^2):
///   radial kick    = (radial + radial_rise t) (1 + slope (f - 1/2)),
///   azimuthal kick = along + along_rise s,
///   half turn      = turn + turn_rise s,   s = f + bend f (f - 1).
struct alignas(32) CellForce {
    float radial, radial_rise;
    float along, along_rise;
    float slope, bend;
    float turn, turn_rise;
};

/// Charge at the corners (i, j), (i, j+1), (i+1, j), (i+1, j+1), in units of 1 / kChargeOne macro-electron.
struct alignas(16) CellCharge {
    std::int32_t inner, inner_next, outer, outer_next;
};

inline constexpr std::int32_t kChargeOne = 1 << 18;

}  // namespace spokewright
