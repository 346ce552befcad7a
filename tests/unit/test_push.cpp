// SPDX-License-Identifier: MIT
#include "pic/push.hpp"

#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>

#include "tests/drifting_cloud.hpp"
#include "tests/unit/edge_electrons.hpp"

using namespace spokewright;

namespace {

double angle_between(double a, double b) {
    return std::abs(std::remainder(a - b, 2 * kPi));
}

struct Worst {
    double radius = 0, angle = 0, momentum = 0;  // radial cells, azimuthal cells, cells a step
};

/// One step of the cloud's electrons, against the plain step in double precision.
Worst compare_one_step(DriftingCloud& cloud, double surface_share = 1) {
    oracle::Electrons expected = cloud.reference_electrons();
    const PolarGrid& grid = cloud.units.grid;
    const oracle::ReferenceStep step(grid, cloud.units.dt);
    const std::size_t struck = step.push(expected, cloud.potential, surface_share, cloud.magnetic);
    Push push(cloud.units, 1);
    push.advance(cloud.store, cloud.force);

    Worst worst;
    std::vector<std::uint32_t> hits;
    const oracle::Electrons found = cloud.reference_electrons();
    for (std::size_t p = 0; p < found.r.size(); ++p) {
        if (expected.r[p] <= grid.cathode_radius || expected.r[p] >= grid.anode_radius) {
            hits.push_back(static_cast<std::uint32_t>(p));
        }
        worst.radius = std::fmax(worst.radius, std::abs(found.r[p] - expected.r[p]) / grid.dr());
        worst.angle = std::fmax(worst.angle, angle_between(found.theta[p], expected.theta[p]) / grid.dtheta());
        worst.momentum = std::fmax(
            worst.momentum,
            std::hypot(found.u_r[p] - expected.u_r[p], found.u_theta[p] - expected.u_theta[p]) / cloud.units.speed());
    }
    CHECK(hits.size() == struck);
    CHECK(std::equal(push.hits().begin(), push.hits().end(), hits.begin(), hits.end()));
    return worst;
}

/// Total energy in eV an electron, in a field that does not vary with the angle: potential, and kinetic energy at time
/// n, half an electric kick after the momentum.
double total_energy(const DriftingCloud& cloud, const oracle::Electrons& electrons) {
    const PolarGrid& grid = cloud.units.grid;
    double sum = 0;
    for (std::size_t p = 0; p < electrons.r.size(); ++p) {
        const double cells = (electrons.r[p] - grid.cathode_radius) / grid.dr();
        const int i = static_cast<int>(cells);
        const double inner = cloud.potential[grid.node(i, 0)], rise = cloud.potential[grid.node(i + 1, 0)] - inner;
        const double bend = i == 0 ? 0 : 1 / (2 * (cloud.units.cathode_cells() + i) + 1);
        const double f = cells - i;
        const double kick = cloud.units.half_kick(-rise / grid.dr() * (1 + 2 * bend * (f - 0.5)));
        const double u_r = electrons.u_r[p] / cloud.units.speed() + kick;
        const double u_theta = electrons.u_theta[p] / cloud.units.speed();
        sum += cloud.units.energy_scale()(u_r * u_r + u_theta * u_theta) - inner - rise * (f + bend * f * (f - 1));
    }
    return sum / static_cast<double>(electrons.r.size());
}

}  // namespace

TEST_CASE("one step meets the plain double-precision step, edges included") {
    for (const std::size_t count : {0U, 1U, 15U, 16U, 17U, 324U, 1000U, 20000U}) {
        CAPTURE(count);
        DriftingCloud cloud(48, 160, 0);
        cloud.store = edge_electrons(cloud.units, count);
        const Worst worst = compare_one_step(cloud);
        // Single precision: momenta round at 2^-24 of some 2 cells a step, a handful of times; so does the way.
        CHECK(worst.momentum < 2e-6);
        CHECK(worst.radius < 1e-6);
        CHECK(worst.angle < 1e-6);
    }
}

TEST_CASE("one step meets the plain step at relativistic speed and on a coarse grid around a thin cathode") {
    DriftingCloud cloud(20, 36, 0, 400e3);
    cloud.units.grid.cathode_radius = 0.45e-3;  // r_a / r_c = 10, r_c of 2.2 cells
    cloud.units.dt = 5e-13;
    cloud.force = ForceTable(cloud.units);
    cloud.force.update(cloud.potential, cloud.surface, cloud.magnetic);
    cloud.store = edge_electrons(cloud.units, 5000, 0.7f);
    CHECK(cloud.units.light() < 0.8);  // a speed of 0.7 is gamma 1.3
    const Worst worst = compare_one_step(cloud);
    CHECK(worst.momentum < 2e-6);
    CHECK(worst.radius < 1e-6);
    CHECK(worst.angle < 2e-6);  // azimuthal cells are short at the cathode
}

TEST_CASE("the first cell's own shape is felt") {
    DriftingCloud cloud(48, 160, 0);
    const Poisson poisson(cloud.units.grid);
    std::vector<double> charge(cloud.units.grid.nodes(), 0.0);
    // Charge on the cathode's nodes until Gauss's law leaves no field on the surface.
    std::fill(charge.begin(), charge.begin() + cloud.units.grid.n_theta, -1e-9);
    cloud.surface.update(poisson, cloud.potential, charge);
    CHECK(cloud.surface.surface_share() == SurfaceField::kLimitedShare);
    cloud.force.update(cloud.potential, cloud.surface, cloud.magnetic);
    cloud.store = edge_electrons(cloud.units, 2000);
    const Worst worst = compare_one_step(cloud, SurfaceField::kLimitedShare);
    CHECK(worst.momentum < 2e-6);
    CHECK(worst.radius < 1e-6);
}

TEST_CASE("mean energy after 40 000 steps at 4 kV within 0.1 eV of double precision") {
    DriftingCloud cloud(48, 160, 200);
    // Linear in r^2, which the cells hold without a kink at their borders: orbits in a kinked field are chaotic, and
    // two roundings of one orbit would part within some thousand steps.
    const PolarGrid& grid = cloud.units.grid;
    for (int i = 0; i <= grid.n_r; ++i) {
        const double r = grid.radius(i), r_c = grid.cathode_radius, r_a = grid.anode_radius;
        for (int j = 0; j < grid.n_theta; ++j) {
            cloud.potential[grid.node(i, j)] = 4000 * (r * r - r_c * r_c) / (r_a * r_a - r_c * r_c);
        }
    }
    cloud.force.update(cloud.potential, cloud.surface, cloud.magnetic);
    oracle::Electrons expected = cloud.reference_electrons();
    const double at_start = total_energy(cloud, expected);
    const oracle::ReferenceStep step(cloud.units.grid, cloud.units.dt);
    Push push(cloud.units, 1);
    for (int k = 0; k < 40000; ++k) {
        REQUIRE(step.push(expected, cloud.potential, 1, cloud.magnetic) == 0);
        push.advance(cloud.store, cloud.force);
        REQUIRE(push.hits().empty());
    }
    const double fast = total_energy(cloud, cloud.reference_electrons());
    const double plain = total_energy(cloud, expected);
    MESSAGE("from " << at_start << " eV: double " << plain - at_start << " eV, fast less double " << fast - plain
                    << " eV");
    CHECK(std::abs(fast - plain) < 0.1);
}

TEST_CASE("any number of threads pushes to the same bits and lists the same hits") {
    const DriftingCloud cloud(48, 160, 0);
    const ElectronStore start = edge_electrons(cloud.units, 3001);
    ElectronStore one = start;
    Push single(cloud.units, 1);
    single.advance(one, cloud.force);
    CHECK(single.hits().size() > 10);
    for (const int threads : {2, 3, 4, 8}) {
        CAPTURE(threads);
        ElectronStore many = start;
        Push push(cloud.units, threads);
        push.advance(many, cloud.force);
        CHECK(many.r == one.r);
        CHECK(many.theta == one.theta);
        CHECK(many.u_r == one.u_r);
        CHECK(many.u_theta == one.u_theta);
        CHECK(std::equal(push.hits().begin(), push.hits().end(), single.hits().begin(), single.hits().end()));
    }
}
