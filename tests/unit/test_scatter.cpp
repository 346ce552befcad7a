// SPDX-License-Identifier: MIT
#include "pic/scatter.hpp"

#include <doctest/doctest.h>

#include <cmath>
#include <numeric>
#include <string>

#include "inputs/errors.hpp"
#include "tests/drifting_cloud.hpp"
#include "tests/relative_error.hpp"
#include "tests/unit/edge_electrons.hpp"

using namespace spokewright;

namespace {

constexpr double kMacroCharge = -1.6e-14;

double sum(std::span<const double> values) {
    return std::accumulate(values.begin(), values.end(), 0.0);
}

}  // namespace

TEST_CASE("each electron's charge lands where the plain deposit puts it, and all of it lands") {
    for (const std::size_t count : {0U, 1U, 15U, 16U, 17U, 324U, 1000U}) {
        CAPTURE(count);
        DriftingCloud cloud(48, 160, 0);
        cloud.store = edge_electrons(cloud.units, count);
        Scatter scatter(cloud.units, kMacroCharge, 1);
        scatter.deposit(cloud.store);
        CHECK(scatter.scattered_electrons() == static_cast<std::int64_t>(count));

        std::vector<double> expected(cloud.units.grid.nodes(), 0.0);
        oracle::ReferenceStep(cloud.units.grid, cloud.units.dt).deposit(cloud.reference_electrons(), expected);
        double worst = 0;
        for (std::size_t node = 0; node < expected.size(); ++node) {
            worst = std::fmax(worst, std::abs(scatter.node_charge()[node] / kMacroCharge - expected[node]));
        }
        // Each corner to two roundings of 2^-19 and those of single precision; up to `count` electrons at a node.
        CHECK(worst <= 1.2 * static_cast<double>(count) / kChargeOne);
    }
}

TEST_CASE("a uniform density deposits a uniform density") {
    const StepUnits units{{1e-3, 3e-3, 10e-3, 8, 12}, 1e-12};
    ElectronStore store;
    constexpr int fine = 200;  // electrons at equal steps of r^2 and of theta
    for (int a = 0; a < units.grid.n_theta * 10; ++a) {
        for (int k = 0; k < fine; ++k) {
            const double c = units.cathode_cells(), end = c + units.grid.n_r;
            const double r = std::sqrt(c * c + (end * end - c * c) * (k + 0.5) / fine) - c;
            store.append({static_cast<std::int32_t>(r * kRadialOne),
                          static_cast<std::int32_t>((a + 0.5) / 10 * kAzimuthalOne), 0, 0});
        }
    }
    Scatter scatter(units, -1, 1);
    scatter.deposit(store);
    const double gap = kPi * (9e-6 - 1e-6) * 10e-3;
    const double density = -static_cast<double>(store.size()) / gap;
    for (int i = 0; i <= units.grid.n_r; ++i) {
        for (int j = 0; j < units.grid.n_theta; ++j) {
            const double found = scatter.node_charge()[units.grid.node(i, j)] / units.grid.node_volume(i);
            CHECK(relative_error(found, density) < 0.02);  // sums over 200 places in r, not an integral
        }
    }
}

TEST_CASE("scatter is the transpose of the gather's weights") {
    DriftingCloud cloud(16, 24, 500);
    Scatter scatter(cloud.units, kMacroCharge, 1);
    scatter.deposit(cloud.store);
    // A field of node numbers: a swapped axis or a shifted column shows.
    std::vector<double> field(cloud.units.grid.nodes());
    std::iota(field.begin(), field.end(), 1.0);
    double nodes = 0;
    for (std::size_t node = 0; node < field.size(); ++node) {
        nodes += field[node] * scatter.node_charge()[node] / kMacroCharge;
    }
    double electrons = 0;
    for (std::size_t p = 0; p < cloud.store.size(); ++p) {
        const double r = cloud.store.r[p] * (1.0 / kRadialOne), theta = cloud.store.theta[p] * (1.0 / kAzimuthalOne);
        const int i = static_cast<int>(r), j = static_cast<int>(theta), next = (j + 1) % 24;
        const CellForce& cell =
            cloud.force.cells()[static_cast<std::size_t>(i) * cloud.units.cell_stride() + static_cast<std::size_t>(j)];
        const double f = r - i, t = theta - j, s = f + static_cast<double>(cell.bend) * f * (f - 1);
        const PolarGrid& grid = cloud.units.grid;
        electrons += (1 - s) * ((1 - t) * field[grid.node(i, j)] + t * field[grid.node(i, next)]) +
                     s * ((1 - t) * field[grid.node(i + 1, j)] + t * field[grid.node(i + 1, next)]);
    }
    CHECK(relative_error(nodes, electrons) < 4.0 / kChargeOne);  // each share is rounded to 1 / kChargeOne
}

TEST_CASE("any number of threads finds the same charge") {
    const DriftingCloud cloud(48, 160, 5003);
    Scatter one(cloud.units, kMacroCharge, 1);
    one.deposit(cloud.store);
    for (const int threads : {2, 3, 4, 8}) {
        Scatter many(cloud.units, kMacroCharge, threads);
        many.deposit(cloud.store);
        CHECK(std::equal(one.node_charge().begin(), one.node_charge().end(), many.node_charge().begin()));
    }
}

TEST_CASE("8191 electrons at one node are counted, one more is caught") {
    const StepUnits units{{2e-3, 4e-3, 10e-3, 8, 24}, 1e-12};
    ElectronStore store;
    for (int k = 0; k < 8191; ++k) {
        store.append({3 * kRadialOne, 5 * kAzimuthalOne, 0, 0});
    }
    Scatter scatter(units, kMacroCharge, 1);
    scatter.deposit(store);
    CHECK(relative_error(scatter.node_charge()[units.grid.node(3, 5)], 8191 * kMacroCharge) < 1e-15);
    CHECK(relative_error(sum(scatter.node_charge()), 8191 * kMacroCharge) < 1e-15);
    store.append({3 * kRadialOne, 5 * kAzimuthalOne, 0, 0});
    std::string message;
    try {
        scatter.deposit(store);
    } catch (const NumericsError& error) {
        message = error.what();
    }
    CHECK(
        message ==
        "a node of the grid holds more than 8191 macro-electrons (8192 in all); lower electrons.target_count or raise "
        "grid.azimuthal_cells");
}
