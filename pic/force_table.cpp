// SPDX-License-Identifier: MIT
#include "pic/force_table.hpp"

namespace spokewright {

ForceTable::ForceTable(const StepUnits& units) : units_(units), cells_(units.table_cells()) {}

void ForceTable::update(std::span<const double> potential, const SurfaceField& surface,
                        std::span<const double> magnetic) {
    const PolarGrid& grid = units_.grid;
    const auto width = static_cast<std::size_t>(grid.n_theta);
    for (std::size_t i = 0; i < static_cast<std::size_t>(grid.n_r); ++i) {
        const int row_number = static_cast<int>(i);
        const double bend = 1 / (2 * (units_.cathode_cells() + row_number) + 1);
        // Slope of the area share, ds/df = 1 + 2 b (f - 1/2); the first cell has a shape of its own. Either way the
        // mean over the cell is 1, so the gain across it is the potential difference.
        const double slope = i == 0 ? 2 * (1 - surface.surface_share()) : 2 * bend;
        const double across = units_.half_kick(-1 / grid.dr());
        const double inner_arc = units_.half_kick(-1 / (grid.radius(row_number) * grid.dtheta()));
        const double outer_arc = units_.half_kick(-1 / (grid.radius(row_number + 1) * grid.dtheta()));
        const auto turn = static_cast<float>(units_.half_turn(magnetic[i]));
        const auto turn_rise = static_cast<float>(units_.half_turn(magnetic[i + 1] - magnetic[i]));
        const double* inner = potential.data() + i * width;
        const double* outer = inner + width;
        CellForce* row = cells_.data() + i * units_.cell_stride();
        for (std::size_t j = 0; j < width; ++j) {
            const std::size_t next = j + 1 == width ? 0 : j + 1;
            const double drop = outer[j] - inner[j];
            const double along = inner_arc * (inner[next] - inner[j]);
            row[j] = {static_cast<float>(across * drop),
                      static_cast<float>(across * (outer[next] - inner[next] - drop)),
                      static_cast<float>(along),
                      static_cast<float>(outer_arc * (outer[next] - outer[j]) - along),
                      static_cast<float>(slope),
                      static_cast<float>(bend),
                      turn,
                      turn_rise};
        }
    }
}

}  // namespace spokewright
