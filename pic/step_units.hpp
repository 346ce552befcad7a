// SPDX-License-Identifier: MIT
// The electrons' own units: lengths in radial cells (dr), times in steps (dt), angles in azimuthal cells (dtheta).
// Positions are fixed point: 24 fraction bits in r, 22 in theta, so that cell, fraction and wrap are integer
// operations.
#pragma once

#include <cmath>
#include <cstdint>

#include "fields/polar_grid.hpp"
#include "inputs/constants.hpp"

namespace spokewright {

inline constexpr int kRadialBits = 24;     // 31 - 24 bits: up to 127 radial cells
inline constexpr int kAzimuthalBits = 22;  // 31 - 22 bits: up to 511 azimuthal cells
inline constexpr std::int32_t kRadialOne = 1 << kRadialBits;
inline constexpr std::int32_t kAzimuthalOne = 1 << kAzimuthalBits;
inline constexpr std::int32_t kRadialMask = kRadialOne - 1;
inline constexpr std::int32_t kAzimuthalMask = kAzimuthalOne - 1;

struct StepUnits {
    PolarGrid grid;
    double dt;  // s

    double speed() const { return grid.dr() / dt; }                           // m/s in one velocity unit
    double light() const { return kLightSpeed / speed(); }                    // c in velocity units
    double cathode_cells() const { return grid.cathode_radius / grid.dr(); }  // r_c in cells
    /// Half-step electric kick of gamma v, velocity units, for a field in V/m.
    double half_kick(double field) const { return -kElementaryCharge / kElectronMass * field * 0.5 * dt / speed(); }
    /// Tangent of half the gyration angle in one step at gamma = 1, for a field in T. Negative for B > 0: q = -e.
    double half_turn(double field) const { return -kElementaryCharge / kElectronMass * field * 0.5 * dt; }
    /// Kinetic energy in eV of a squared gamma v given in velocity units.
    double energy_eV(double u_squared) const {
        const double c_squared = light() * light();
        const double gamma = std::sqrt(1 + u_squared / c_squared);
        return u_squared / (c_squared * (1 + gamma)) * kElectronMass * kLightSpeed * kLightSpeed / kElementaryCharge;
    }
    std::int32_t radial_end() const { return grid.n_r << kRadialBits; }
    std::int32_t azimuthal_end() const { return grid.n_theta << kAzimuthalBits; }
};

}  // namespace spokewright
