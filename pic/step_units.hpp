// SPDX-License-Identifier: MIT
// The electrons' own units: lengths in radial cells (dr), times in steps (dt), angles in azimuthal cells (dtheta);
// positions in the fixed point of fixed_point.hpp.
#pragma once

#include <cmath>
#include <cstddef>
#include <cstdint>

#include "fields/polar_grid.hpp"
#include "inputs/constants.hpp"
#include "pic/fixed_point.hpp"
#include "pic/particle_kernel.hpp"

namespace spokewright {

/// Kinetic energy of a momentum in velocity units.
struct EnergyScale {
    double unit_eV;     // of u^2 / (1 + gamma) = 1
    double inverse_c2;  // 1 / c^2

    /// eV, of a squared gamma v.
    double operator()(double u_squared) const {
        return unit_eV * u_squared / (1 + std::sqrt(1 + u_squared * inverse_c2));
    }
};

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
    EnergyScale energy_scale() const {
        return {kElectronMass * speed() * speed() / kElementaryCharge, 1 / (light() * light())};
    }
    std::int32_t radial_end() const { return grid.n_r << kRadialBits; }
    std::int32_t azimuthal_end() const { return grid.n_theta << kAzimuthalBits; }
    /// Cells from one row of a cell table to the next. A power of two would map whole columns to the same cache sets.
    std::size_t cell_stride() const { return static_cast<std::size_t>(grid.n_theta) + 2; }
    std::size_t table_cells() const { return static_cast<std::size_t>(grid.n_r) * cell_stride(); }

    ParticlePlan plan() const {
        return {static_cast<std::int32_t>(cell_stride()),
                radial_end(),
                azimuthal_end(),
                static_cast<float>(1 / (light() * light())),
                static_cast<float>(cathode_cells()),
                static_cast<float>(2 * kAzimuthalOne / grid.dtheta())};
    }
};

}  // namespace spokewright
