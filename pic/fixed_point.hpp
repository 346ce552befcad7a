// SPDX-License-Identifier: MIT
// Positions are fixed point: 24 fraction bits in r, 22 in theta, counted in cells, so that cell, fraction and wrap are
// integer operations.
#pragma once

#include <cstdint>

namespace spokewright {

inline constexpr int kRadialBits = 24;     // 31 - 24 bits: up to 127 radial cells
inline constexpr int kAzimuthalBits = 22;  // 31 - 22 bits: up to 511 azimuthal cells
inline constexpr std::int32_t kRadialOne = 1 << kRadialBits;
inline constexpr std::int32_t kAzimuthalOne = 1 << kAzimuthalBits;
inline constexpr std::int32_t kRadialMask = kRadialOne - 1;
inline constexpr std::int32_t kAzimuthalMask = kAzimuthalOne - 1;

}  // namespace spokewright
