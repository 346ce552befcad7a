// SPDX-License-Identifier: MIT
#include "tests/oracle/reference_step.hpp"

#include <cmath>

#include "inputs/constants.hpp"

namespace spokewright::oracle {
namespace {

struct Place {
    int i, j, next;    // cell, and the azimuthal node after j
    double depth;      // share of the cell's depth
    double area;       // (r^2 - r_i^2) / (r_{i+1}^2 - r_i^2)
    double azimuthal;  // share of the cell's angle
};

Place place(const PolarGrid& grid, double r, double theta) {
    const double cells = (r - grid.cathode_radius) / grid.dr();
    const double turns = theta / grid.dtheta();
    const int i = static_cast<int>(std::floor(cells));
    const int j = static_cast<int>(std::floor(turns)) % grid.n_theta;
    const double inner = grid.radius(i);
    const double outer = grid.radius(i + 1);
    return {i,
            j,
            (j + 1) % grid.n_theta,
            cells - i,
            (r * r - inner * inner) / (outer * outer - inner * inner),
            turns - std::floor(turns)};
}

}  // namespace

std::size_t ReferenceStep::push(Electrons& electrons, std::span<const double> potential, double surface_share,
                                std::span<const double> magnetic) const {
    const double charge_to_mass = -kElementaryCharge / kElectronMass;
    std::size_t hits = 0;
    for (std::size_t p = 0; p < electrons.r.size(); ++p) {
        const double r = electrons.r[p];
        const double theta = electrons.theta[p];
        const Place at = place(grid_, r, theta);

        // E = -grad of the potential interpolated with the weights of the deposit
        const double inner = potential[grid_.node(at.i, at.j)];
        const double inner_next = potential[grid_.node(at.i, at.next)];
        const double outer = potential[grid_.node(at.i + 1, at.j)];
        const double outer_next = potential[grid_.node(at.i + 1, at.next)];
        const double mean =
            -((1 - at.azimuthal) * (outer - inner) + at.azimuthal * (outer_next - inner_next)) / grid_.dr();
        const double edge =
            at.i == 0 ? surface_share : 2 * grid_.radius(at.i) / (grid_.radius(at.i) + grid_.radius(at.i + 1));
        const double e_r = mean * (edge + 2 * (1 - edge) * at.depth);
        const double e_theta = -((1 - at.area) * (inner_next - inner) / (grid_.radius(at.i) * grid_.dtheta()) +
                                 at.area * (outer_next - outer) / (grid_.radius(at.i + 1) * grid_.dtheta()));
        const double b = (1 - at.area) * magnetic[static_cast<std::size_t>(at.i)] +
                         at.area * magnetic[static_cast<std::size_t>(at.i) + 1];

        // half electric kick, exact rotation, half electric kick
        const double kick = charge_to_mass * dt_ / 2;
        double u_r = electrons.u_r[p] + kick * e_r;
        double u_theta = electrons.u_theta[p] + kick * e_theta;
        const double gamma_b = std::sqrt(1 + (u_r * u_r + u_theta * u_theta) / (kLightSpeed * kLightSpeed));
        const double angle = 2 * std::atan(kick * b / gamma_b);
        const double turned_r = std::cos(angle) * u_r + std::sin(angle) * u_theta;
        const double turned_theta = std::cos(angle) * u_theta - std::sin(angle) * u_r;
        u_r = turned_r + kick * e_r;
        u_theta = turned_theta + kick * e_theta;

        // move in the local Cartesian frame, then into the polar frame of the new place
        const double gamma = std::sqrt(1 + (u_r * u_r + u_theta * u_theta) / (kLightSpeed * kLightSpeed));
        const double x = r + u_r / gamma * dt_;
        const double y = u_theta / gamma * dt_;
        const double swept = std::atan2(y, x);
        electrons.r[p] = std::sqrt(x * x + y * y);
        electrons.theta[p] = theta + swept - 2 * kPi * std::floor((theta + swept) / (2 * kPi));
        electrons.u_r[p] = std::cos(swept) * u_r + std::sin(swept) * u_theta;
        electrons.u_theta[p] = std::cos(swept) * u_theta - std::sin(swept) * u_r;
        if (electrons.r[p] <= grid_.cathode_radius || electrons.r[p] >= grid_.anode_radius) {
            ++hits;
        }
    }
    return hits;
}

void ReferenceStep::deposit(const Electrons& electrons, std::span<double> nodes) const {
    for (std::size_t p = 0; p < electrons.r.size(); ++p) {
        const Place at = place(grid_, electrons.r[p], electrons.theta[p]);
        nodes[grid_.node(at.i, at.j)] += (1 - at.area) * (1 - at.azimuthal);
        nodes[grid_.node(at.i, at.next)] += (1 - at.area) * at.azimuthal;
        nodes[grid_.node(at.i + 1, at.j)] += at.area * (1 - at.azimuthal);
        nodes[grid_.node(at.i + 1, at.next)] += at.area * at.azimuthal;
    }
}

}  // namespace spokewright::oracle
