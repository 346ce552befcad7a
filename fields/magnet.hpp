// SPDX-License-Identifier: MIT
// The axial magnetic field at the grid's rows: the applied field, uniform or B_z(r), and the field of the electrons'
// azimuthal current in free space, B_self(r) = mu0 * integral from r to r_a of J_theta dr (axisymmetric magnetostatics,
// Ampere's law). SI units.
#pragma once

#include <span>
#include <vector>

#include "fields/polar_grid.hpp"
#include "inputs/deck.hpp"

namespace spokewright {

class Magnet {
public:
    Magnet(const MagnetSettings& settings, const PolarGrid& grid);

    /// Applied plus self field at row i, T, [n_r + 1].
    std::span<const double> field() const { return total_; }

    /// Sets the self field from the azimuthal current of each row, A per metre of height, [n_r + 1].
    void set_self_field(std::span<const double> row_current);

    std::span<const double> self_field() const { return self_; }  // T, [n_r + 1]
    void restore_self_field(std::span<const double> self);

    /// Largest |B_self| / |B_applied| over the rows that have an applied field.
    double self_field_share() const;

private:
    std::vector<double> applied_;
    std::vector<double> self_;
    std::vector<double> total_;
};

}  // namespace spokewright
