// SPDX-License-Identifier: MIT
// Sources: Gauss's law; W. Shockley, J. Appl. Phys. 9, 635 (1938) and S. Ramo, Proc. IRE 27, 584 (1939) for the charge
// of the cathode; C. D. Child (1911) for the planar limited flow.
#include <doctest/doctest.h>

#include <cmath>
#include <numeric>
#include <random>
#include <utility>
#include <vector>

#include "fields/surface_field.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {

constexpr double kRounding = 1e-12;
const PolarGrid kGrid{1.95e-3, 4.45e-3, 9.5e-3, 20, 24};
using Row = AlignedVector<double>;

struct Solved {
    Poisson poisson{kGrid};
    Row charge = Row(kGrid.nodes());
    Row potential = Row(kGrid.nodes());
    SurfaceField surface{kGrid};

    void solve(const std::vector<double>& wall) {
        poisson.transform(charge);
        poisson.solve(Poisson::wall_harmonics(wall), potential);
        surface.update(poisson, potential, charge);
    }
};

/// E_r(r_c) of the empty tube at 4000 V.
double vacuum_field() {
    return -4000 / std::log(4.45 / 1.95) / 1.95e-3;
}

/// Share after charge on the cathode's row that cancels `cancelled` of the vacuum field.
double share_after(double cancelled) {
    Solved s;
    const double all = kVacuumPermittivity * kGrid.axial_height * kGrid.dtheta() * 1.95e-3 * vacuum_field();
    for (std::size_t j = 0; j < 24; ++j) s.charge[j] = all * cancelled * (j % 2 == 0 ? 1.5 : 0.5);  // mean counts
    s.solve(std::vector<double>(24, 4000.0));
    return s.surface.surface_share();
}

/// Stationary planar flow as the scheme has it, in units of cell, flux, e / m and eps0: electrons gain the potential
/// difference of a cell, a node's charge is the sum of their linear shares, the field jumps by it from cell to cell
/// and is zero on the surface. `share`: field at the surface over the mean of the first cell. Returns the speed at
/// node `cells`.
double flow_speed(double share, int cells) {
    // First cell, field E (a + 2 (1 - a) x), so v^2 / 2 = E (a x + (1 - a) x^2): its charge, and the part that goes to
    // the outer node, are integrals of 1 / v and x / v. With x = s^2 they are smooth; Simpson's rule.
    constexpr int kPanels = 400;
    double charge = 0, outer = 0;
    for (int k = 0; k <= kPanels; ++k) {
        const double s = static_cast<double>(k) / kPanels;
        const double weight = (k == 0 || k == kPanels ? 1 : k % 2 == 1 ? 4 : 2) / (3.0 * kPanels);
        const double slowness = weight * std::sqrt(2) / std::sqrt(share + (1 - share) * s * s);
        charge += slowness;
        outer += slowness * s * s;
    }
    // Half cell: E = (charge - outer) / sqrt(E).
    double field = std::cbrt(std::pow(charge - outer, 2));
    double carried = outer / std::sqrt(field);  // share of the last cell's charge on the node ahead
    double speed = std::sqrt(2 * field);
    double inner = charge / std::sqrt(field);
    for (int node = 1; node < cells; ++node) {
        // field' = field + carried + (inner share of the next cell, which falls as field' rises): by halving.
        double low = field, high = field + carried + 4 * inner, next = 0, ahead = 0;
        for (int halving = 0; halving < 60; ++halving) {
            next = 0.5 * (low + high);
            const double time = 2 / (speed + std::sqrt(speed * speed + 2 * next));
            ahead = time * time * (speed / 2 + next * time / 6);
            inner = time - ahead;
            (next < field + carried + inner ? low : high) = next;
        }
        field = next;
        carried = ahead;
        speed = std::sqrt(speed * speed + 2 * field);
    }
    return speed;
}

/// Current of the flow over Child's for the same potential difference and depth, v^3 = 9/2 x^2 in these units.
double current_over_child(double share, int cells) {
    return 4.5 * cells * cells / std::pow(flow_speed(share, cells), 3);
}

/// The share with which the flow meets Child's speed at a depth of `cells`.
double matched_share(int cells) {
    double low = 0.2, high = 0.4;  // a larger share makes the flow slower
    for (int halving = 0; halving < 30; ++halving) {
        const double middle = 0.5 * (low + high);
        (current_over_child(middle, cells) < 1 ? low : high) = middle;
    }
    return low;
}

}  // namespace

TEST_CASE("the limited share is the one whose discrete flow meets Child's law 4000 cells from the cathode") {
    const double share = matched_share(4000);
    MESSAGE("matched share " << share);
    CHECK(std::abs(SurfaceField::kLimitedShare - share) < 1e-5);  // given with five figures
}

TEST_CASE("matched at an endless depth the share would be 0.2927, which moves no current by as much as 0.05 %") {
    // The flow is also shifted by a part of a cell, which is felt as depth^(-1/3): eight times the depth halves it.
    const double endless = 2 * matched_share(4000) - matched_share(500);
    MESSAGE("endless depth " << endless);
    CHECK(std::abs(endless - 0.2927) < 2e-4);  // what is left of the next power of the depth
    for (const int cells : {24, 48, 120}) {
        const double limited = current_over_child(SurfaceField::kLimitedShare, cells);
        CHECK(relative_error(current_over_child(endless, cells), limited) < 5e-4);
    }
}

TEST_CASE("the limited share brings the discrete flow to Child's law at the depth of real grids") {
    for (const auto& [cells, allowed] : {std::pair{24, 2.5e-3}, {48, 1.2e-3}, {120, 5e-4}, {1000, 1e-4}}) {
        const double off = current_over_child(SurfaceField::kLimitedShare, cells) - 1;
        MESSAGE(cells << " cells: " << 100 * off << " %");
        CHECK(std::abs(off) < allowed);  // the rest is a shift of the flow by 0.03 cells: 0.06 / cells
    }
    CHECK(std::abs(current_over_child(1, 60) - 1.043) < 1e-3);  // a uniform first cell, as surface_field.hpp says
}

TEST_CASE("in the empty tube the surface field is that of the coaxial line, and the share 1") {
    Solved s;
    s.solve(std::vector<double>(24, 4000.0));
    for (std::size_t j = 0; j < 24; ++j) {
        CHECK(relative_error(s.surface.on_surface()[j], vacuum_field()) < kRounding);
        const double mean = -4000 * std::log(kGrid.radius(1) / 1.95e-3) / std::log(4.45 / 1.95) / kGrid.dr();
        CHECK(relative_error(s.surface.first_cell()[j], mean) < kRounding);
    }
    CHECK(relative_error(s.surface.surface_share(), 1) < kRounding);
}

TEST_CASE("Gauss: the surface field is the cathode's charge, which electrons and wall induce") {
    std::mt19937 random(2);
    std::uniform_real_distribution<double> uniform(-1, 1);
    Solved s;
    for (double& q : s.charge) q = -1e-12 * (1 + uniform(random));
    std::vector<double> wall(24);
    for (double& v : wall) v = 4000 + 1000 * uniform(random);
    s.solve(wall);

    const double gap = std::log(4.45 / 1.95);
    const double mean_wall = std::accumulate(wall.begin(), wall.end(), 0.0) / 24;
    double induced = -2 * kPi * kVacuumPermittivity * kGrid.axial_height / gap * mean_wall;
    for (int i = 0; i <= kGrid.n_r; ++i) {
        for (int j = 0; j < kGrid.n_theta; ++j) {
            induced -= s.charge[kGrid.node(i, j)] * std::log(4.45e-3 / kGrid.radius(i)) / gap;
        }
    }
    double charge = 0;
    for (const double field : s.surface.on_surface()) {
        charge += kVacuumPermittivity * field * 1.95e-3 * kGrid.dtheta() * kGrid.axial_height;
    }
    CHECK(relative_error(charge, induced) < 1e-11);  // 500 charges, each of which the solver rounds
}

TEST_CASE("Gauss node by node: charge on one cathode node changes the field there alone") {
    Solved s;
    s.solve(std::vector<double>(24, 4000.0));
    const std::vector<double> before(s.surface.on_surface().begin(), s.surface.on_surface().end());
    s.charge[5] = -1e-13;
    s.solve(std::vector<double>(24, 4000.0));
    const double weaker = 1e-13 / (kVacuumPermittivity * 1.95e-3 * kGrid.dtheta() * kGrid.axial_height);
    CHECK(weaker > 1e3);  // V/m, well above the rounding of a field of 2.5e6
    for (std::size_t j = 0; j < 24; ++j) {
        CHECK(std::abs(s.surface.on_surface()[j] - before[j] - (j == 5 ? weaker : 0)) < 1e-6);
    }
}

TEST_CASE("the share is surface field over vacuum field, kept between the limited share and 1") {
    CHECK(relative_error(share_after(0.25), 0.75) < kRounding);
    CHECK(relative_error(share_after(0.6), 0.4) < kRounding);
    CHECK(share_after(1) == SurfaceField::kLimitedShare);
    CHECK(share_after(1.5) == SurfaceField::kLimitedShare);
    CHECK(share_after(-0.5) == 1);
}

TEST_CASE("without any field the share is 1") {
    Solved s;
    CHECK(s.surface.surface_share() == 1);
    s.solve(std::vector<double>(24, 0.0));
    CHECK(s.surface.surface_share() == 1);
    for (const double field : s.surface.on_surface()) CHECK(field == 0);
}
