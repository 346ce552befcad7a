// SPDX-License-Identifier: MIT
#include "tests/oracle/tuned_step.hpp"

#include <cmath>

#include "inputs/constants.hpp"

namespace spokewright::oracle {

TunedStep::TunedStep(const PolarGrid& grid, double dt)
    : grid_(grid),
      dt_(dt),
      cathode_cells_(grid.cathode_radius / grid.dr()),
      inverse_c2_(std::pow(grid.dr() / (dt * kLightSpeed), 2)),
      cells_(static_cast<std::size_t>(grid.n_r) * static_cast<std::size_t>(grid.n_theta)) {}

void TunedStep::set_field(std::span<const double> potential, double surface_share, std::span<const double> magnetic) {
    const double to_kick = kElementaryCharge / kElectronMass * dt_ * dt_ / (2 * grid_.dr());  // times dV/dr
    const double to_turn = -kElementaryCharge / kElectronMass * dt_ / 2;
    for (int i = 0; i < grid_.n_r; ++i) {
        const double bend = 1 / (2 * (cathode_cells_ + i) + 1);
        const double b = magnetic[static_cast<std::size_t>(i)];
        const double b_rise = magnetic[static_cast<std::size_t>(i) + 1] - b;
        for (int j = 0; j < grid_.n_theta; ++j) {
            const int next = j + 1 == grid_.n_theta ? 0 : j + 1;
            const double inner = potential[grid_.node(i, j)], inner_next = potential[grid_.node(i, next)];
            const double outer = potential[grid_.node(i + 1, j)], outer_next = potential[grid_.node(i + 1, next)];
            const double along = to_kick * (inner_next - inner) / (grid_.radius(i) * grid_.dtheta());
            cells_[grid_.node(i, j)] = {to_kick * (outer - inner) / grid_.dr(),
                                        to_kick * (outer_next - inner_next - outer + inner) / grid_.dr(),
                                        along,
                                        to_kick * (outer_next - outer) / (grid_.radius(i + 1) * grid_.dtheta()) - along,
                                        i == 0 ? 2 * (1 - surface_share) : 2 * bend,
                                        bend,
                                        to_turn * b,
                                        to_turn * b_rise};
        }
    }
}

std::size_t TunedStep::push(TunedElectrons& electrons) const {
    const double turns = grid_.n_theta;
    const double to_cells = 2 / grid_.dtheta();
    std::size_t hits = 0;
    for (std::size_t p = 0; p < electrons.r.size(); ++p) {
        const double r = electrons.r[p], theta = electrons.theta[p];
        const int i = static_cast<int>(r), j = static_cast<int>(theta);
        const double depth = r - i, azimuthal = theta - j;
        const Cell& cell = cells_[static_cast<std::size_t>(i * grid_.n_theta + j)];
        const double area = depth + cell.bend * depth * (depth - 1);
        const double kick_r = (cell.radial + cell.radial_rise * azimuthal) * (1 + cell.slope * (depth - 0.5));
        const double kick_theta = cell.along + cell.along_rise * area;

        double u_r = electrons.u_r[p] + kick_r, u_theta = electrons.u_theta[p] + kick_theta;
        const double t =
            (cell.turn + cell.turn_rise * area) / std::sqrt(1 + (u_r * u_r + u_theta * u_theta) * inverse_c2_);
        const double s = 2 * t / (1 + t * t);
        const double prime_r = u_r + u_theta * t, prime_theta = u_theta - u_r * t;
        u_r += prime_theta * s + kick_r;
        u_theta += kick_theta - prime_r * s;

        const double inverse_gamma = 1 / std::sqrt(1 + (u_r * u_r + u_theta * u_theta) * inverse_c2_);
        const double x = cathode_cells_ + r + u_r * inverse_gamma, y = u_theta * inverse_gamma;
        const double reach = std::sqrt(x * x + y * y);
        const double inverse = 1 / (reach * (x + reach));
        const double h = y * reach * inverse;  // tan of half the angle swept
        const double sine = y * (x + reach) * inverse;
        const double h2 = h * h;
        const double half = h * (1 - h2 * (1.0 / 3 - h2 * (1.0 / 5 - h2 * (1.0 / 7 - h2 * (1.0 / 9 - h2 / 11)))));
        double place = theta + to_cells * half;
        place += place < 0 ? turns : 0;
        place -= place >= turns ? turns : 0;
        electrons.r[p] = reach - cathode_cells_;
        electrons.theta[p] = place;
        electrons.u_r[p] = u_r + (u_theta - u_r * h) * sine;
        electrons.u_theta[p] = u_theta - (u_r + u_theta * h) * sine;
        hits += electrons.r[p] <= 0 || electrons.r[p] >= grid_.n_r ? 1 : 0;
    }
    return hits;
}

void TunedStep::deposit(const TunedElectrons& electrons, std::span<double> nodes) const {
    for (std::size_t p = 0; p < electrons.r.size(); ++p) {
        const int i = static_cast<int>(electrons.r[p]), j = static_cast<int>(electrons.theta[p]);
        const double depth = electrons.r[p] - i, azimuthal = electrons.theta[p] - j;
        const double area = depth + cells_[static_cast<std::size_t>(i * grid_.n_theta)].bend * depth * (depth - 1);
        double* inner = nodes.data() + i * grid_.n_theta;
        double* outer = inner + grid_.n_theta;
        const int next = j + 1 == grid_.n_theta ? 0 : j + 1;
        const double both = area * azimuthal;
        inner[j] += 1 - area - azimuthal + both;
        inner[next] += azimuthal - both;
        outer[j] += area - both;
        outer[next] += both;
    }
}

}  // namespace spokewright::oracle
