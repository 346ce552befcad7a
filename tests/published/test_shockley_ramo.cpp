// SPDX-License-Identifier: MIT
// Source: W. Shockley, J. Appl. Phys. 9, 635 (1938); S. Ramo, Proc. IRE 27, 584 (1939): the charge that electrons
// induce on an electrode is minus their charge times the electrode's weighting potential.
#include <doctest/doctest.h>

#include <cmath>
#include <random>
#include <vector>

#include "fields/poisson.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

TEST_CASE("reciprocity: wall charge, weighting potential and the flux into the wall agree") {
    std::mt19937 random(11);
    std::uniform_real_distribution<double> uniform(-1, 1);
    for (const int n_theta : {5, 24, 45, 160}) {
        const PolarGrid grid{1.95e-3, 4.45e-3, 9.5e-3, 20, n_theta};
        const auto width = static_cast<std::size_t>(n_theta);
        AlignedVector<double> charge(grid.nodes()), weighting(grid.nodes()), grounded(grid.nodes());
        std::vector<double> pattern(width), other(width);
        for (double& q : charge) q = -1e-12 * (1 + uniform(random));
        for (double& s : pattern) s = 1 + uniform(random);
        for (double& s : other) s = 1 + uniform(random);
        const auto harmonics = Poisson::wall_harmonics(pattern);

        Poisson poisson(grid);
        poisson.transform(AlignedVector<double>(grid.nodes(), 0.0));
        poisson.solve(harmonics, weighting);
        poisson.transform(charge);
        const double modal = poisson.row_product(harmonics, poisson.wall_charge());
        poisson.solve(Poisson::Harmonics(harmonics.size()), grounded);  // all electrodes at 0 V

        double summed = 0, induced = 0, product = 0;
        const double flux = kVacuumPermittivity * grid.axial_height * grid.dtheta() * poisson.conductance(grid.n_r - 1);
        for (std::size_t node = 0; node < grid.nodes(); ++node) {
            summed += charge[node] * weighting[node];
        }
        for (std::size_t j = 0; j < width; ++j) {
            // What the wall's charge would be, less the charge that already stands on the wall's own nodes.
            const std::size_t wall = grid.nodes() - width + j;
            induced += pattern[j] * (-flux * grounded[wall - width] - charge[wall]);
            product += pattern[j] * other[j];
        }
        // Sums of a few thousand terms round at 1e-14 or so.
        CHECK(relative_error(modal, summed) < 1e-12);
        CHECK(relative_error(-modal, induced) < 1e-12);
        CHECK(relative_error(poisson.row_product(harmonics, Poisson::wall_harmonics(other)), product) < 1e-12);
        MESSAGE(n_theta << ": " << relative_error(modal, summed) << " and " << relative_error(-modal, induced));
    }
}
