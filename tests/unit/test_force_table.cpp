// SPDX-License-Identifier: MIT
#include "pic/force_table.hpp"

#include <doctest/doctest.h>

#include "tests/drifting_cloud.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {

/// Potential interpolated with the scatter's weights, V, at shares f and t of cell (i, j).
double interpolated(const DriftingCloud& cloud, int i, int j, double f, double t) {
    const PolarGrid& grid = cloud.units.grid;
    const double bend = 1 / (2 * (cloud.units.cathode_cells() + i) + 1);
    const double s = f + bend * f * (f - 1);
    const int next = (j + 1) % grid.n_theta;
    const auto at = [&](int row, int column) { return cloud.potential[grid.node(row, column)]; };
    return (1 - s) * ((1 - t) * at(i, j) + t * at(i, next)) + s * ((1 - t) * at(i + 1, j) + t * at(i + 1, next));
}

const CellForce& cell_at(const DriftingCloud& cloud, int i, int j) {
    return cloud.force.cells()[static_cast<std::size_t>(i) * cloud.units.cell_stride() + static_cast<std::size_t>(j)];
}

}  // namespace

TEST_CASE("the force is the gradient of the interpolated potential, in the last column too") {
    const DriftingCloud cloud(12, 20, 0);
    const PolarGrid& grid = cloud.units.grid;
    for (const int i : {1, 5, 11}) {
        for (const int j : {0, 7, 19}) {
            const CellForce& cell = cell_at(cloud, i, j);
            for (const double f : {0.1, 0.5, 0.9}) {
                const double t = 0.3, step = 1e-4;
                const double s = f + static_cast<double>(cell.bend) * f * (f - 1);
                const double kick_r = (static_cast<double>(cell.radial) + static_cast<double>(cell.radial_rise) * t) *
                                      (1 + static_cast<double>(cell.slope) * (f - 0.5));
                const double e_r = -(interpolated(cloud, i, j, f + step, t) - interpolated(cloud, i, j, f - step, t)) /
                                   (2 * step * grid.dr());
                CHECK(relative_error(kick_r, cloud.units.half_kick(e_r)) < 1e-6);  // single precision
                const double kick_theta = static_cast<double>(cell.along) + static_cast<double>(cell.along_rise) * s;
                // At the rows, where the arc has the row's own radius.
                if (f == 0.5) continue;
                const double inner = -(interpolated(cloud, i, j, 0, 1) - interpolated(cloud, i, j, 0, 0)) /
                                     (grid.radius(i) * grid.dtheta());
                const double outer = -(interpolated(cloud, i, j, 1, 1) - interpolated(cloud, i, j, 1, 0)) /
                                     (grid.radius(i + 1) * grid.dtheta());
                const double e_theta = (1 - s) * inner + s * outer;
                CHECK(std::abs(kick_theta - cloud.units.half_kick(e_theta)) < 1e-6 * std::abs(kick_r));
            }
        }
    }
}

TEST_CASE("the magnetic turn is the field's, linear in the area share") {
    const DriftingCloud cloud(12, 20, 0);
    const CellForce& cell = cell_at(cloud, 4, 3);
    CHECK(relative_error(static_cast<double>(cell.turn), cloud.units.half_turn(cloud.magnetic[4])) < 1e-7);
    CHECK(relative_error(static_cast<double>(cell.turn) + static_cast<double>(cell.turn_rise),
                         cloud.units.half_turn(cloud.magnetic[5])) < 1e-7);
    CHECK(cell.turn < 0);  // electrons turn the other way round B
}

TEST_CASE("in a vacuum the first cell is uniform, and its bend is the grid's") {
    const DriftingCloud cloud(12, 20, 0);
    CHECK(cell_at(cloud, 0, 0).slope == 0.0f);
    const double c = cloud.units.cathode_cells();
    CHECK(relative_error(static_cast<double>(cell_at(cloud, 0, 0).bend), 1 / (2 * c + 1)) < 1e-7);
    CHECK(relative_error(static_cast<double>(cell_at(cloud, 3, 0).slope), 2 / (2 * c + 7)) < 1e-7);
}
