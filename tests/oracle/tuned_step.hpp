// SPDX-License-Identifier: MIT
// The plain step after an afternoon's tuning by hand, still scalar and double: lengths in cells, times in steps, a
// table of coefficients a cell, reciprocals instead of divisions where they can be shared, no trigonometry. The second
// measure of the fast step's speed; pinned as the first.
#pragma once

#include <span>
#include <vector>

#include "fields/polar_grid.hpp"

namespace spokewright::oracle {

/// Radial cells from the cathode; azimuthal cells, 0..n_theta; gamma v in radial cells a step.
struct TunedElectrons {
    std::vector<double> r, theta, u_r, u_theta;
};

class TunedStep {
public:
    TunedStep(const PolarGrid& grid, double dt);

    /// Arguments as of ReferenceStep::push.
    void set_field(std::span<const double> potential, double surface_share, std::span<const double> magnetic);
    std::size_t push(TunedElectrons& electrons) const;
    /// Adds the electrons to the nodes, in electrons, [n_r + 1][n_theta].
    void deposit(const TunedElectrons& electrons, std::span<double> nodes) const;

private:
    struct Cell {
        double radial, radial_rise, along, along_rise, slope, bend, turn, turn_rise;
    };
    PolarGrid grid_;
    double dt_;
    double cathode_cells_, inverse_c2_;
    std::vector<Cell> cells_;  // [n_r][n_theta]
};

}  // namespace spokewright::oracle
