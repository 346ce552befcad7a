// SPDX-License-Identifier: MIT
// Source: Y. Chen, T. A. Davis, W. W. Hager & S. Rajamanickam, ACM Trans. Math. Softw. 35, 22 (2008): CHOLMOD, sparse
// Cholesky, as an independent solver of the same finite-volume equations.
#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <random>
#include <vector>

#include "fields/poisson.hpp"
#include "tests/cholmod_poisson.hpp"
#include "tests/published_row.hpp"

using namespace spokewright;

namespace {}  // namespace

TEST_CASE("Poisson agrees with sparse Cholesky on the same matrix") {
    std::mt19937 random(7);
    std::uniform_real_distribution<double> uniform(-1, 1);
    struct Size {
        int n_r, n_theta;
    };
    for (const Size size : {Size{2, 5}, Size{7, 24}, Size{48, 160}, Size{33, 45}, Size{120, 64}}) {
        const PolarGrid grid{1.95e-3, 4.45e-3, 9.5e-3, size.n_r, size.n_theta};
        std::vector<double> charge(grid.nodes()), wall(static_cast<std::size_t>(grid.n_theta));
        for (double& q : charge) q = 1e-12 * uniform(random);
        for (double& v : wall) v = 4000 + 1000 * uniform(random);

        Poisson poisson(grid);
        AlignedVector<double> potential(grid.nodes());
        const AlignedVector<double> aligned(charge.begin(), charge.end());
        poisson.transform(aligned);
        poisson.solve(Poisson::wall_harmonics(wall), potential);

        const std::vector<double> reference = CholmodPoisson(grid).solve(charge, wall);
        double worst = 0, largest = 0;
        for (std::size_t node = 0; node < grid.nodes(); ++node) {
            worst = std::fmax(worst, std::abs(potential[node] - reference[node]));
            largest = std::fmax(largest, std::abs(reference[node]));
            CHECK(std::isfinite(potential[node]));
        }
        MESSAGE(size.n_r << " x " << size.n_theta << ": " << worst / largest);
        CHECK(largest > 1000);
        check_published({"potential against sparse Cholesky on the same matrix, " + std::to_string(size.n_r) + " x " +
                             std::to_string(size.n_theta) + " cells",
                         "CHOLMOD: Y. Chen et al., ACM Trans. Math. Softw. 35, 22 (2008)", 0, worst / largest, 1e-10,
                         "required; both solvers round at about 1e-13"});
    }
}
