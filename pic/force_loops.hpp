// SPDX-License-Identifier: MIT
// The force table of one row of cells, from the potential on either side (force_table.hpp).
#pragma once

#include "pic/particle_kernel.hpp"

namespace spokewright {

template <class Lanes>
struct ForceLoops {
    using Real = typename Lanes::Real;
    static constexpr std::size_t kWidth = Lanes::kWidth;

    static typename Lanes::Cells cells_of(const RowForce& row, const double* inner, const double* outer) {
        const Real drop = Lanes::difference(outer, inner);
        const Real next_drop = Lanes::difference(outer + 1, inner + 1);
        const Real along = Lanes::multiply(Lanes::difference(inner + 1, inner), Lanes::all(row.inner_arc));
        const Real outer_along = Lanes::multiply(Lanes::difference(outer + 1, outer), Lanes::all(row.outer_arc));
        return {Lanes::multiply(drop, Lanes::all(row.across)),
                Lanes::multiply(Lanes::subtract(next_drop, drop), Lanes::all(row.across)),
                along,
                Lanes::subtract(outer_along, along),
                Lanes::all(row.slope),
                Lanes::all(row.bend),
                Lanes::all(row.turn),
                Lanes::all(row.turn_rise)};
    }

    static void tabulate(const RowForce& row, const double* inner, const double* outer, std::size_t width,
                         CellForce* cells) {
        std::size_t j = 0;
        for (; j + kWidth < width; j += kWidth) {
            Lanes::store_cells(cells + j, cells_of(row, inner + j, outer + j));
        }
        // The last cells, whose next node is the first of the row: in a copy that goes round.
        double inner_end[kWidth + 1], outer_end[kWidth + 1];
        for (std::size_t k = 0; k <= kWidth; ++k) {
            const std::size_t node = (j + k) % width;
            inner_end[k] = inner[node];
            outer_end[k] = outer[node];
        }
        CellForce last[kWidth];
        Lanes::store_cells(last, cells_of(row, inner_end, outer_end));
        for (std::size_t k = 0; j + k < width; ++k) {
            cells[j + k] = last[k];
        }
    }
};

}  // namespace spokewright
