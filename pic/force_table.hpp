// SPDX-License-Identifier: MIT
// The table of what the push reads of each cell (cell_force.hpp), made anew each step.
//
// The force is the exact gradient of the potential interpolated with the weights of the scatter, so what an electron
// gains is what the electrodes and the space charge lose, whatever the size of the cells: only the time step is left to
// unbalance the ledger (H. R. Lewis, J. Comput. Phys. 6, 136 (1970); Birdsall & Langdon (1985), ch. 10).
#pragma once

#include <span>

#include "fields/aligned.hpp"
#include "fields/surface_field.hpp"
#include "pic/cell_force.hpp"
#include "pic/step_units.hpp"

namespace spokewright {

class ForceTable {
public:
    explicit ForceTable(const StepUnits& units, int threads = 1, InstructionSet set = fastest_instruction_set());

    /// From the potential (V, [n_r + 1][n_theta]), the shape of the first cell and the magnetic field of each row
    /// (T, [n_r + 1]).
    void update(std::span<const double> potential, const SurfaceField& surface, std::span<const double> magnetic);

    /// Cell (i, j) stands at i * units.cell_stride() + j.
    const CellForce* cells() const { return cells_.data(); }

private:
    StepUnits units_;
    const ParticleKernel* kernel_;
    int threads_;
    AlignedVector<CellForce> cells_;
};

}  // namespace spokewright
