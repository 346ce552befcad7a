// SPDX-License-Identifier: MIT
#include "fields/surface_field.hpp"

#include <algorithm>

#include "inputs/constants.hpp"

namespace spokewright {

SurfaceField::SurfaceField(const PolarGrid& grid)
    : grid_(grid),
      on_surface_(static_cast<std::size_t>(grid.n_theta)),
      first_cell_(static_cast<std::size_t>(grid.n_theta)) {}

void SurfaceField::update(const Poisson& poisson, std::span<const double> potential,
                          std::span<const double> node_charge) {
    const auto width = static_cast<std::size_t>(grid_.n_theta);
    const double r_c = grid_.cathode_radius;
    // Gauss on the half cell: r E_r half a cell out, less r_c E_r(r_c), is the charge of row 0 a radian over eps0 h.
    const double charge_to_flux = 1 / (kVacuumPermittivity * grid_.axial_height * grid_.dtheta());
    const double g = poisson.conductance(0);
    double surface_sum = 0;
    double vacuum_sum = 0;
    for (std::size_t j = 0; j < width; ++j) {
        const double drop = potential[j] - potential[width + j];
        on_surface_[j] = (g * drop - charge_to_flux * node_charge[j]) / r_c;
        first_cell_[j] = drop / grid_.dr();
        surface_sum += on_surface_[j];
        vacuum_sum += g * drop / r_c;
    }
    // The ratio of the sums: single nodes are too noisy to take the shape of their own cell from.
    const double share = vacuum_sum == 0 ? 1 : surface_sum / vacuum_sum;
    surface_share_ = std::clamp(share, kLimitedShare, 1.0);
}

}  // namespace spokewright
