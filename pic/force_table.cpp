// SPDX-License-Identifier: MIT
#include "pic/force_table.hpp"

namespace spokewright {

ForceTable::ForceTable(const StepUnits& units)
    : units_(units),
      stride_(static_cast<std::size_t>(units.grid.n_theta) + 2),
      cells_(static_cast<std::size_t>(units.grid.n_r) * stride_),
      turn_(static_cast<std::size_t>(units.grid.n_r)),
      turn_rise_(static_cast<std::size_t>(units.grid.n_r)) {}

void ForceTable::update(std::span<const double> potential, const SurfaceField& surface,
                        std::span<const double> magnetic) {
    const PolarGrid& grid = units_.grid;
    const auto width = static_cast<std::size_t>(grid.n_theta);
    for (std::size_t i = 0; i < turn_.size(); ++i) {
        const int row_number = static_cast<int>(i);
        // Slope of the area share over a cell, ds/df = 1 - b + 2 b f, written in s and scaled so that the mean over the
        // cell is 1: the gain across a cell is then the potential difference exactly.
        const double bend = 1 / (2 * (units_.cathode_cells() + row_number) + 1);
        const double rise = i == 0 ? 1 - surface.surface_share() * (1 - bend) : bend;
        const double scale = units_.half_kick(-1 / grid.dr()) / (1 - bend * rise / 3);
        const double at_inner = scale * (1 - rise);
        const double to_outer = scale * 2 * rise;
        const double inner_arc = units_.half_kick(-1 / (grid.radius(row_number) * grid.dtheta()));
        const double outer_arc = units_.half_kick(-1 / (grid.radius(row_number + 1) * grid.dtheta()));
        const double* inner = potential.data() + i * width;
        const double* outer = inner + width;
        CellForce* row = cells_.data() + i * stride_;
        for (std::size_t j = 0; j < width; ++j) {
            const std::size_t next = j + 1 == width ? 0 : j + 1;
            const double drop = outer[j] - inner[j];
            const double twist = outer[next] - inner[next] - drop;
            const double along_inner = inner_arc * (inner[next] - inner[j]);
            const double along_outer = outer_arc * (outer[next] - outer[j]);
            row[j] = {static_cast<float>(at_inner * drop),
                      static_cast<float>(to_outer * drop),
                      static_cast<float>(at_inner * twist),
                      static_cast<float>(to_outer * twist),
                      static_cast<float>(along_inner),
                      static_cast<float>(along_outer - along_inner),
                      0.0f,
                      0.0f};
        }
        turn_[i] = static_cast<float>(units_.half_turn(magnetic[i]));
        turn_rise_[i] = static_cast<float>(units_.half_turn(magnetic[i + 1] - magnetic[i]));
    }
}

}  // namespace spokewright
