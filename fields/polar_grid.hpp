// SPDX-License-Identifier: MIT
// The polar grid: nodes r_i = r_c + i dr (i = 0..n_r), theta_j = j dtheta (j = 0..n_theta-1).
// Arrays on it are row-major, theta fastest: [n_r + 1][n_theta]. SI units.
#pragma once

#include <cstddef>

#include "inputs/constants.hpp"

namespace spokewright {

struct PolarGrid {
    double cathode_radius;  // m
    double anode_radius;    // m
    double axial_height;    // m
    int n_r;                // radial cells
    int n_theta;            // azimuthal cells

    double dr() const { return (anode_radius - cathode_radius) / n_r; }
    double dtheta() const { return 2 * kPi / n_theta; }
    double radius(int i) const { return cathode_radius + i * dr(); }
    double theta(int j) const { return j * dtheta(); }
    std::size_t nodes() const { return static_cast<std::size_t>(n_r + 1) * static_cast<std::size_t>(n_theta); }
    std::size_t node(int i, int j) const {
        return static_cast<std::size_t>(i) * static_cast<std::size_t>(n_theta) + static_cast<std::size_t>(j);
    }
    /// Volume that belongs to one node of row i, m^3; half cells on the electrodes. Exact for the area-weighted
    /// deposit.
    double node_volume(int i) const {
        const double inner = i == 0 ? radius(0) : radius(i - 1);
        const double outer = i == n_r ? radius(n_r) : radius(i + 1);
        return 0.25 * (outer * outer - inner * inner) * dtheta() * axial_height;
    }
};

}  // namespace spokewright
