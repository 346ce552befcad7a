// SPDX-License-Identifier: MIT
// Sources: Gauss's law; the Laplace solutions ln(r / r_c) and (r / r_c)^m - (r_c / r)^m of the coaxial gap (J. D.
// Jackson, Classical Electrodynamics (1998), ch. 2, from memory); direct sums.
#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <random>
#include <utility>
#include <vector>

#include "fields/poisson.hpp"
#include "tests/fitted_order.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {

constexpr double kRounding = 1e-12;  // of the largest value: tens of pivots, transforms of tens of terms
using Row = AlignedVector<double>;

PolarGrid grid_of(int n_r, int n_theta) {
    return {1.95e-3, 4.45e-3, 9.5e-3, n_r, n_theta};
}

/// Node charges (C) and wall values (V) of no symmetry.
struct Case {
    Row charge;
    std::vector<double> wall;
};

Case random_case(const PolarGrid& grid, unsigned seed) {
    std::mt19937 random(seed);
    std::uniform_real_distribution<double> uniform(-1, 1);
    Case c{Row(grid.nodes()), std::vector<double>(static_cast<std::size_t>(grid.n_theta))};
    for (double& q : c.charge) q = -1e-12 * (1 + uniform(random));
    for (double& v : c.wall) v = 4000 + 1000 * uniform(random);
    return c;
}

Row solve(const PolarGrid& grid, const Case& c) {
    Poisson poisson(grid);
    Row potential(grid.nodes());
    poisson.transform(c.charge);
    poisson.solve(Poisson::wall_harmonics(c.wall), potential);
    return potential;
}

/// Largest difference over the largest value.
double difference(const Row& a, const Row& b) {
    double worst = 0, largest = 0;
    for (std::size_t k = 0; k < a.size(); ++k) {
        if (std::isnan(a[k]) || std::isnan(b[k])) return INFINITY;
        worst = std::max(worst, std::abs(a[k] - b[k]));
        largest = std::max(largest, std::abs(b[k]));
    }
    return worst / largest;
}

/// Largest error of the Laplace weights of harmonic m, with n_theta in proportion to n_r.
double laplace_error(int n_r, int m) {
    const PolarGrid grid = grid_of(n_r, 4 * n_r);
    const Poisson poisson(grid);
    const auto rise = [&](double r) { return std::pow(r / 1.95e-3, m) - std::pow(1.95e-3 / r, m); };
    double worst = 0;
    for (int i = 0; i <= n_r; ++i) {
        worst = std::fmax(worst, std::abs(poisson.laplace_weight(i, m) - rise(grid.radius(i)) / rise(4.45e-3)));
    }
    return worst;
}

}  // namespace

TEST_CASE("the charges on cathode and wall are minus the space charge") {
    for (const auto& [n_r, n_theta] : {std::pair{2, 5}, {20, 24}, {33, 45}}) {
        const PolarGrid grid = grid_of(n_r, n_theta);
        const Case c = random_case(grid, 3);
        const Row potential = solve(grid, c);
        // Flux of the outermost and innermost cell; rows 0 and n_r lie between it and the metal.
        const double flux = kVacuumPermittivity * grid.axial_height * grid.dtheta();
        const double inner = flux / std::log(grid.radius(1) / grid.radius(0));
        const double outer = flux / std::log(grid.radius(n_r) / grid.radius(n_r - 1));
        double electrodes = 0, space = 0;
        for (int j = 0; j < n_theta; ++j) {
            electrodes += inner * (potential[grid.node(0, j)] - potential[grid.node(1, j)]);
            electrodes += outer * (potential[grid.node(n_r, j)] - potential[grid.node(n_r - 1, j)]);
            for (int i = 1; i < n_r; ++i) space += c.charge[grid.node(i, j)];
        }
        CHECK(relative_error(-electrodes, space) < 1e-11);  // small differences of potentials in the flux
    }
}

TEST_CASE("the Laplace weight of harmonic 0 is ln(r / r_c) / ln(r_a / r_c)") {
    const PolarGrid grid = grid_of(48, 20);
    const Poisson poisson(grid);
    CHECK(poisson.laplace_weight(0, 0) == 0);
    CHECK(poisson.laplace_weight(48, 0) == 1);
    for (int i = 1; i < 48; ++i) {
        const double exact = std::log(grid.radius(i) / 1.95e-3) / std::log(4.45 / 1.95);
        CHECK(relative_error(poisson.laplace_weight(i, 0), exact) < kRounding);
    }
}

TEST_CASE("the Laplace weights of higher harmonics: second order") {
    for (const int m : {1, 3, 8}) {
        std::vector<double> cell, error;
        for (const int n_r : {24, 48, 96}) {
            cell.push_back(1.0 / n_r);
            error.push_back(laplace_error(n_r, m));
        }
        const double order = fitted_order(cell, error);
        MESSAGE("m = " << m << ": error " << error.back() << " at 96 cells, order " << order);
        CHECK(order > 1.95);
        CHECK(order < 2.05);
        CHECK(error.back() < 6e-6 * m * m);  // a wrong harmonic would be off by tenths
    }
}

TEST_CASE("potentials add like their charges and wall values") {
    const PolarGrid grid = grid_of(20, 24);
    const Case a = random_case(grid, 1), b = random_case(grid, 2);
    Case sum = a;
    for (std::size_t k = 0; k < sum.charge.size(); ++k) sum.charge[k] = 3 * a.charge[k] - 0.5 * b.charge[k];
    for (std::size_t j = 0; j < sum.wall.size(); ++j) sum.wall[j] = 3 * a.wall[j] - 0.5 * b.wall[j];
    const Row phi_a = solve(grid, a), phi_b = solve(grid, b);
    Row expected(grid.nodes());
    for (std::size_t k = 0; k < expected.size(); ++k) expected[k] = 3 * phi_a[k] - 0.5 * phi_b[k];
    CHECK(difference(solve(grid, sum), expected) < kRounding);
}

TEST_CASE("turning charge and wall by one node turns the potential; a mirror mirrors it") {
    for (const int n_theta : {24, 45}) {
        const PolarGrid grid = grid_of(20, n_theta);
        const Case c = random_case(grid, 5);
        const Row potential = solve(grid, c);
        for (const int mirror : {1, -1}) {
            const auto image = [&](int j) { return (mirror * j + 1 + n_theta) % n_theta; };
            Case turned = c;
            Row expected = potential;
            for (int j = 0; j < n_theta; ++j) {
                turned.wall[static_cast<std::size_t>(image(j))] = c.wall[static_cast<std::size_t>(j)];
                for (int i = 0; i <= grid.n_r; ++i) {
                    turned.charge[grid.node(i, image(j))] = c.charge[grid.node(i, j)];
                    expected[grid.node(i, image(j))] = potential[grid.node(i, j)];
                }
            }
            CHECK(difference(solve(grid, turned), expected) < kRounding);
        }
    }
}

TEST_CASE("the cathode stays at 0 V and the wall at its values") {
    const PolarGrid grid = grid_of(20, 45);
    const Case c = random_case(grid, 4);
    const Row potential = solve(grid, c);
    for (int j = 0; j < 45; ++j) {
        CHECK(potential[grid.node(0, j)] == 0);
        CHECK(relative_error(potential[grid.node(20, j)], c.wall[static_cast<std::size_t>(j)]) < kRounding);
    }
}

TEST_CASE("charge that stands on the electrodes moves no potential") {
    const PolarGrid grid = grid_of(20, 24);
    Case c = random_case(grid, 6);
    const Row potential = solve(grid, c);
    for (int j = 0; j < 24; ++j) c.charge[grid.node(0, j)] = c.charge[grid.node(20, j)] = 1;
    CHECK(solve(grid, c) == potential);
}

TEST_CASE("a negative charge lowers the potential around it, most at its own node") {
    const PolarGrid grid = grid_of(20, 24);
    Case c{Row(grid.nodes()), std::vector<double>(24, 0.0)};
    c.charge[grid.node(7, 5)] = -1e-12;
    const Row potential = solve(grid, c);
    CHECK(std::ranges::min_element(potential) - potential.begin() == static_cast<std::ptrdiff_t>(grid.node(7, 5)));
    CHECK(potential[grid.node(7, 6)] < 0);
    CHECK(potential[grid.node(8, 5)] < 0);
}

TEST_CASE("the same object, used again, gives the same bits") {
    const PolarGrid grid = grid_of(20, 24);
    const Case a = random_case(grid, 7), b = random_case(grid, 8);
    Poisson poisson(grid);
    std::vector<Row> potentials;
    std::vector<std::vector<std::complex<double>>> wall_charges;
    for (const Case* c : {&a, &b, &a}) {
        poisson.transform(c->charge);
        wall_charges.emplace_back(poisson.wall_charge().begin(), poisson.wall_charge().end());
        potentials.emplace_back(grid.nodes());
        poisson.solve(Poisson::wall_harmonics(c->wall), potentials.back());
    }
    CHECK(potentials[0] == potentials[2]);
    CHECK(potentials[0] != potentials[1]);
    CHECK(wall_charges[0] == wall_charges[2]);
    CHECK(wall_charges[0] != wall_charges[1]);
}

TEST_CASE("harmonics and the product of two rows are the direct sums") {
    for (const int n_theta : {5, 8, 24, 45}) {
        const Poisson poisson(grid_of(4, n_theta));
        std::vector<double> a, b;
        double product = 0;
        for (int j = 0; j < n_theta; ++j) {
            a.push_back(1 + std::sin(1.7 * j) + (j % 2));  // the Nyquist harmonic is not empty
            b.push_back(2 - std::cos(0.9 * j) - 2 * (j % 2));
            product += a.back() * b.back();
        }
        const auto harmonics = Poisson::wall_harmonics(a);
        REQUIRE(harmonics.size() == static_cast<std::size_t>(poisson.harmonics()));
        for (std::size_t m = 0; m < harmonics.size(); ++m) {
            std::complex<double> sum = 0;
            for (int j = 0; j < n_theta; ++j) {
                sum +=
                    a[static_cast<std::size_t>(j)] * std::polar(1.0, -2 * kPi * static_cast<double>(m) * j / n_theta);
            }
            CHECK(std::abs(harmonics[m] - sum) < kRounding * n_theta);
        }
        CHECK(relative_error(poisson.row_product(harmonics, Poisson::wall_harmonics(b)), product) < kRounding);
    }
}

TEST_CASE("wall charge: harmonic m weighs each row with the Laplace weight of m") {
    const PolarGrid grid = grid_of(6, 9);
    const Case c = random_case(grid, 9);
    Poisson poisson(grid);
    poisson.transform(c.charge);
    for (int m = 0; m < poisson.harmonics(); ++m) {
        std::complex<double> sum = 0;
        for (int i = 0; i <= grid.n_r; ++i) {
            for (int j = 0; j < grid.n_theta; ++j) {
                sum += poisson.laplace_weight(i, m) * c.charge[grid.node(i, j)] * std::polar(1.0, -m * grid.theta(j));
            }
        }
        const auto found = poisson.wall_charge()[static_cast<std::size_t>(m)];
        CHECK(std::abs(found - sum) < kRounding * 63e-12);  // 63 charges of 1e-12 C
    }
}
