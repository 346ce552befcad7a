// SPDX-License-Identifier: MIT
// The radial field at the cathode, V/m (negative pulls electrons out): on the surface itself, by Gauss's law on the
// half cell, and averaged over the first cell; and how the field is to rise within that cell.
#pragma once

#include <span>
#include <vector>

#include "fields/poisson.hpp"
#include "fields/polar_grid.hpp"

namespace spokewright {

class SurfaceField {
public:
    explicit SurfaceField(const PolarGrid& grid);

    /// From the potential, V, and the node charge, C, both [n_r + 1][n_theta].
    void update(const Poisson& poisson, std::span<const double> potential, std::span<const double> node_charge);

    std::span<const double> on_surface() const { return on_surface_; }  // E_r(r_c), [n_theta]
    std::span<const double> first_cell() const { return first_cell_; }  // mean E_r of the first cell, [n_theta]

    /// E_r at r_c as the electrons of the first cell are to feel it, over what it were in a vacuum with the same drop;
    /// the field then rises linearly so that the mean is kept. 1 in a vacuum field. Not below kLimitedShare.
    double surface_share() const { return surface_share_; }

    /// Under space-charge limited emission the field rises as x^(1/3) from zero (C. D. Child 1911), so that a linear
    /// rise a + 2 (1 - a) x must stand for it in the first cell. This a is matched: the stationary planar flow of the
    /// discrete scheme (gain by potential, charge by linear weights) has the speed of Child's law 4000 cells from the
    /// cathode (endlessly far: 0.2927, less than 0.05 % of the current). test_surface_field.cpp solves for it. With a
    /// uniform first cell (a = 1) the limited current comes out 4.3 % high at 60 cells.
    static constexpr double kLimitedShare = 0.29101;

private:
    PolarGrid grid_;
    std::vector<double> on_surface_;
    std::vector<double> first_cell_;
    double surface_share_ = 1;
};

}  // namespace spokewright
