// SPDX-License-Identifier: MIT
// What the push reads of one cell, 32 bytes: the electric half kick and the magnetic half turn anywhere in it, in the
// units of step_units.hpp.
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

/// With f the share of the cell's depth, s the area share and t the azimuthal share (cell_share.hpp):
///   radial kick    = (radial + radial_rise t) (1 + slope (f - 1/2)),
///   azimuthal kick = along + along_rise s,
///   half turn      = turn + turn_rise s,   s = f + bend f (f - 1).
struct alignas(32) CellForce {
    float radial, radial_rise;
    float along, along_rise;
    float slope, bend;
    float turn, turn_rise;
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

private:
    StepUnits units_;
    std::size_t stride_;  // n_theta + 2: a power of two would map whole columns to the same cache sets
    AlignedVector<CellForce> cells_;
};

}  // namespace spokewright
