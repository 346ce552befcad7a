// SPDX-License-Identifier: MIT
// Source: areas of circular rings.
#include <doctest/doctest.h>

#include <set>

#include "fields/polar_grid.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {
constexpr double kRounding = 1e-14;
const PolarGrid kGrid{2e-3, 5e-3, 10e-3, 6, 8};
}  // namespace

TEST_CASE("rows go from cathode to anode, columns once around") {
    CHECK(relative_error(kGrid.radius(0), 2e-3) < kRounding);
    CHECK(relative_error(kGrid.radius(2), 3e-3) < kRounding);
    CHECK(relative_error(kGrid.radius(6), 5e-3) < kRounding);
    CHECK(kGrid.theta(0) == 0);
    CHECK(relative_error(kGrid.theta(2), kPi / 2) < kRounding);
    CHECK(relative_error(kGrid.theta(8), 2 * kPi) < kRounding);
}

TEST_CASE("every node has a place of its own, theta fastest") {
    std::set<std::size_t> places;
    for (int i = 0; i <= kGrid.n_r; ++i) {
        for (int j = 0; j < kGrid.n_theta; ++j) places.insert(kGrid.node(i, j));
    }
    CHECK(places.size() == kGrid.nodes());
    CHECK(*places.rbegin() == kGrid.nodes() - 1);
    CHECK(kGrid.node(0, 1) == 1);
    CHECK(kGrid.node(1, 0) == 8);
}

TEST_CASE("the nodes' volumes fill the tube") {
    for (const int n_r : {1, 2, 6, 120}) {
        const PolarGrid grid{2e-3, 5e-3, 10e-3, n_r, 8};
        double sum = 0;
        for (int i = 0; i <= n_r; ++i) sum += grid.n_theta * grid.node_volume(i);
        CHECK(relative_error(sum, kPi * (5e-3 * 5e-3 - 2e-3 * 2e-3) * 10e-3) < 100 * kRounding);  // 121 terms
    }
}

TEST_CASE("a uniform density shared by area gives each node its own volume") {
    // Integral of the node's weight, linear in r^2, over the cells on its two sides: thin rings at their middles. In
    // x = r^2 the weight is a tent, so the midpoint rule is exact.
    for (int i = 0; i <= kGrid.n_r; ++i) {
        double volume = 0;
        for (const int cell : {i - 1, i}) {
            if (cell < 0 || cell == kGrid.n_r) continue;
            const double inner = kGrid.radius(cell) * kGrid.radius(cell);
            const double outer = kGrid.radius(cell + 1) * kGrid.radius(cell + 1);
            for (int ring = 0; ring < 10; ++ring) {
                const double share = (ring + 0.5) / 10;
                const double weight = cell == i ? 1 - share : share;
                volume += weight * 0.5 * (outer - inner) / 10 * kGrid.dtheta() * kGrid.axial_height;
            }
        }
        CHECK(relative_error(kGrid.node_volume(i), volume) < 10 * kRounding);  // differences of squares of radii
    }
}
