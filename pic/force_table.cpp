// SPDX-License-Identifier: MIT
#include "pic/force_table.hpp"

namespace spokewright {

ForceTable::ForceTable(const StepUnits& units, int threads, InstructionSet set)
    : units_(units), kernel_(&particle_kernel(set)), threads_(threads), cells_(units.table_cells()) {}

void ForceTable::update(std::span<const double> potential, const SurfaceField& surface,
                        std::span<const double> magnetic) {
    const PolarGrid& grid = units_.grid;
    const auto width = static_cast<std::size_t>(grid.n_theta);
#pragma omp parallel for num_threads(threads_) schedule(static)
    for (int i = 0; i < grid.n_r; ++i) {
        const auto row = static_cast<std::size_t>(i);
        const double bend = 1 / (2 * (units_.cathode_cells() + i) + 1);
        // Slope of the area share, ds/df = 1 + 2 b (f - 1/2); the first cell has a shape of its own. Either way the
        // mean over the cell is 1, so the gain across it is the potential difference.
        const double slope = i == 0 ? 2 * (1 - surface.surface_share()) : 2 * bend;
        const auto kick = [&](double distance) { return static_cast<float>(units_.half_kick(-1 / distance)); };
        const RowForce force{kick(grid.dr()),
                             kick(grid.radius(i) * grid.dtheta()),
                             kick(grid.radius(i + 1) * grid.dtheta()),
                             static_cast<float>(slope),
                             static_cast<float>(bend),
                             static_cast<float>(units_.half_turn(magnetic[row])),
                             static_cast<float>(units_.half_turn(magnetic[row + 1] - magnetic[row]))};
        const double* inner = potential.data() + row * width;
        kernel_->tabulate(force, inner, inner + width, width, cells_.data() + row * units_.cell_stride());
    }
}

}  // namespace spokewright
