// SPDX-License-Identifier: MIT
// What the push reads: eight floats a cell for the electric half kick (value, d_i, d_j, d_ij of the bilinear form for
// each component) and two a row for the magnetic half turn. In the units of step_units.hpp.
//
// The force is the exact gradient of the potential interpolated with the weights of the scatter, so what an electron
// gains is what the electrodes and the space charge lose, whatever the size of the cells: only the time step is left to
// unbalance the ledger (H. R. Lewis, J. Comput. Phys. 6, 136 (1970); Birdsall & Langdon (1985), ch. 10).
#pragma once

#include <span>

#include "fields/aligned.hpp"
#include "fields/surface_field.hpp"
#include "pic/step_units.hpp"

namespace spokewright {

/// Bilinear coefficients of one cell: kick = value + d_i s + d_j t + d_ij s t, s the radial area share, t the
/// azimuthal.
struct alignas(32) CellForce {
    float r_value, r_i, r_j, r_ij;
    float theta_value, theta_i, theta_j, theta_ij;
};

class ForceTable {
public:
    explicit ForceTable(const StepUnits& units);

    /// From the potential (V, [n_r + 1][n_theta]), the shape of the first cell and the magnetic field of each row
    /// (T, [n_r + 1]).
    void update(std::span<const double> potential, const SurfaceField& surface, std::span<const double> magnetic);

    /// Cell (i, j) stands at i * stride() + j.
    const CellForce* cells() const { return cells_.data(); }
    std::size_t stride() const { return stride_; }
    /// Half turn at s = 0 and its rise to s = 1, [n_r].
    const float* turn() const { return turn_.data(); }
    const float* turn_rise() const { return turn_rise_.data(); }

private:
    StepUnits units_;
    std::size_t stride_;  // n_theta + 2: a power of two would map whole columns to the same cache sets
    AlignedVector<CellForce> cells_;
    AlignedVector<float> turn_;
    AlignedVector<float> turn_rise_;
};

}  // namespace spokewright
