// SPDX-License-Identifier: MIT
// Source: closed forms of -eps0 div(grad phi) = rho: a manufactured potential, and the coaxial line
// phi = V ln(r / r_c) / ln(r_a / r_c) (J. D. Jackson, Classical Electrodynamics (1998), ch. 2, from memory).
#include <doctest/doctest.h>

#include <cmath>
#include <vector>

#include "fields/poisson.hpp"
#include "tests/fitted_order.hpp"
#include "tests/published_row.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {

AlignedVector<double> solve(const PolarGrid& grid, const AlignedVector<double>& charge, double wall_voltage) {
    Poisson poisson(grid);
    AlignedVector<double> potential(grid.nodes());
    poisson.transform(charge);
    const std::vector<double> wall(static_cast<std::size_t>(grid.n_theta), wall_voltage);
    poisson.solve(Poisson::wall_harmonics(wall), potential);
    return potential;
}

/// Largest error against phi = 1000 V sin(pi (r - r_c) / d) cos(m theta), with the charge that belongs to it.
double manufactured_error(int n_r, int n_theta, int m) {
    const PolarGrid grid{2e-3, 6e-3, 10e-3, n_r, n_theta};
    const double k = kPi / (grid.anode_radius - grid.cathode_radius);
    AlignedVector<double> charge(grid.nodes()), exact(grid.nodes());
    for (int i = 0; i <= n_r; ++i) {
        const double r = grid.radius(i), sine = std::sin(k * (r - 2e-3)), cosine = std::cos(k * (r - 2e-3));
        const double laplacian = -k * k * sine + k * cosine / r - m * m * sine / (r * r);
        for (int j = 0; j < n_theta; ++j) {
            const double wave = 1000 * std::cos(m * grid.theta(j));
            exact[grid.node(i, j)] = sine * wave;
            charge[grid.node(i, j)] = -kVacuumPermittivity * laplacian * wave * grid.node_volume(i);
        }
    }
    const auto potential = solve(grid, charge, 0);
    double worst = 0;
    for (std::size_t node = 0; node < grid.nodes(); ++node) {
        worst = std::fmax(worst, std::abs(potential[node] - exact[node]));
    }
    return worst / 1000;
}

}  // namespace

TEST_CASE("Poisson: second order against a manufactured potential") {
    for (const int m : {0, 1, 5}) {
        std::vector<double> cell, error;
        for (const int n_r : {12, 24, 48, 96}) {
            cell.push_back(1.0 / n_r);
            error.push_back(manufactured_error(n_r, 4 * n_r, m));
        }
        const double order = fitted_order(cell, error);
        MESSAGE("m = " << m << ": error " << error.back() << " at 96 cells, order " << order);
        check_published({"order of the Poisson solver in the cell size, m = " + std::to_string(m),
                         "finite volumes (R. W. Hockney, J. ACM 12, 95 (1965)), manufactured potential", 2, order,
                         0.025, "four grids, 12 to 96 cells"});
    }
}

TEST_CASE("Poisson: exact for the empty coaxial line") {
    const PolarGrid grid{1.95e-3, 4.45e-3, 9.5e-3, 48, 160};
    const auto potential = solve(grid, AlignedVector<double>(grid.nodes(), 0.0), 4000);
    for (int i = 1; i <= grid.n_r; ++i) {
        const double exact = 4000 * std::log(grid.radius(i) / 1.95e-3) / std::log(4.45 / 1.95);
        CHECK(relative_error(potential[grid.node(i, i)], exact) < 1e-12);  // rounding of 48 pivots
    }
}
