// SPDX-License-Identifier: MIT
// Energies by hand from CODATA 2018: m c^2 = 510 998.950 eV, u = gamma v.
#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <initializer_list>
#include <vector>

#include "pic/walls.hpp"
#include "tests/fitted_order.hpp"
#include "tests/relative_error.hpp"
#include "tests/smooth_bore.hpp"

using namespace spokewright;

namespace {

// dr 0.1 mm, cathode at 20 and anode at 40 cells; 9 degrees a cell; velocity unit 2e7 m/s, of which u = 1 is 1135.86
// eV.
const StepUnits kUnits{{2e-3, 4e-3, 10e-3, 20, 40}, 5e-12};
constexpr std::int64_t kUnitEnergy = 1163124;  // 1135.863605 eV in 1/1024 eV
constexpr double kTick = 1.0 / kAzimuthalOne;  // cells

/// 4 kV: the anode's histogram ends at 6 kV, 46.875 eV a bin, the cathode's at 1.8 kV, 14.0625 eV a bin.
Walls walls(int vane_count) {
    Deck deck = smooth_bore(2e-3, 4e-3, 4000, 0.18);
    deck.tube.vane_count = vane_count;  // ten vanes: 4 cells a pitch, tips of +- 1.2 cells, slots of 1.6
    return Walls(kUnits, deck);
}

/// `r`, `theta`: cells.
Electron electron(double r, double theta, float u_r, float u_theta) {
    return {static_cast<std::int32_t>(std::lrint(r * kRadialOne)),
            static_cast<std::int32_t>(std::lrint(theta * kAzimuthalOne)), u_r, u_theta};
}

void strike(Walls& walls, const std::vector<Electron>& electrons) {
    ElectronStore store;
    std::vector<std::uint32_t> hits;
    for (const Electron& e : electrons) {
        hits.push_back(static_cast<std::uint32_t>(store.size()));
        store.append(e);
    }
    walls.strike(store, hits);
}

/// The sector of the anode that takes an electron which arrives at right angles.
std::size_t sector_at(int vane_count, double theta) {
    Walls tube = walls(vane_count);
    strike(tube, {electron(20.01, theta, 1, 0)});
    const auto& hits = tube.books().anode.sector_hits;
    CHECK(tube.books().anode.hits() == 1);
    return static_cast<std::size_t>(std::find(hits.begin(), hits.end(), 1) - hits.begin());
}

/// Where a single electron landed on the anode, cells, from what it put on the two nodes about it.
double landing(double r, double theta, float u_r, float u_theta) {
    Walls tube = walls(0);
    strike(tube, {electron(r, theta, u_r, u_theta)});
    const auto deposit = tube.anode_deposit();
    const auto& hits = tube.books().anode.sector_hits;
    const auto cell = static_cast<std::size_t>(std::find(hits.begin(), hits.end(), 1) - hits.begin());
    return static_cast<double>(cell) + deposit[(cell + 1) % 40];
}

std::vector<std::int64_t> bins_of(const WallBook& book) {
    std::vector<std::int64_t> filled;
    for (std::size_t bin = 0; bin < book.energy_histogram.size(); ++bin) {
        for (std::int64_t k = 0; k < book.energy_histogram[bin]; ++k) filled.push_back(static_cast<std::int64_t>(bin));
    }
    return filled;
}

}  // namespace

TEST_CASE("a hit on the anode is booked on its vane or slot") {
    CHECK(walls(10).books().anode.sector_hits.size() == 20);
    CHECK(sector_at(10, 0) == 0);
    CHECK(sector_at(10, 38.9) == 0);  // vane 0 lies on both sides of theta = 0
    CHECK(sector_at(10, 1.1) == 0);
    CHECK(sector_at(10, 1.3) == 1);  // slot 0
    CHECK(sector_at(10, 12) == 6);   // vane 3
    CHECK(sector_at(10, 14) == 7);   // slot 3
    CHECK(sector_at(10, 38.7) == 19);
}

TEST_CASE("a hit in a smooth bore is booked in its cell") {
    CHECK(walls(0).books().anode.sector_hits.size() == 40);
    CHECK(sector_at(0, 0) == 0);
    CHECK(sector_at(0, 12.99) == 12);
    CHECK(sector_at(0, 39.99) == 39);
}

TEST_CASE("a hit on the cathode is booked in its cell") {
    Walls tube = walls(10);
    strike(tube, {electron(-0.01, 17.5, -1, 0), electron(0, 39.5, -1, 0)});
    CHECK(tube.books().cathode.sector_hits.size() == 40);
    CHECK(tube.books().cathode.sector_hits[17] == 1);
    CHECK(tube.books().cathode.sector_hits[39] == 1);
    CHECK(tube.books().cathode.hits() == 2);
    CHECK(tube.books().anode.hits() == 0);
    CHECK(tube.cathode_hits() == 2);
    CHECK(tube.anode_hits() == 0);
}

TEST_CASE("an electron lands where it crossed, not where its step ended") {
    // Half a cell beyond, twice as fast along as across: one cell back on a circle of 40 cells, whose pitch is 2 pi.
    CHECK(std::abs(landing(20.5, 10, 1, 2) - (10 - 1 / (2 * kPi))) < kTick);
    CHECK(std::abs(landing(20.5, 10, 1, -2) - (10 + 1 / (2 * kPi))) < kTick);
    // On the cathode's 20 cells the same way is twice the angle.
    Walls tube = walls(0);
    strike(tube, {electron(-0.5, 10, -1, 2)});
    CHECK(std::abs(tube.impacts()[0].theta * kTick - (10 - 1 / kPi)) < kTick);
    // Exactly on the wall, or with a velocity away from it, nothing is left to go back.
    CHECK(landing(20, 10.25, 1, 2) == 10.25);
    CHECK(landing(20.5, 10.25, -1, 2) == 10.25);
}

TEST_CASE("the crossing differs from that of the exact straight line in second order") {
    std::vector<double> beyond, errors;
    for (const double cells : {0.4, 0.2, 0.1}) {
        // |P - s u| = R with P = (R + cells, 0), u = (1, 1.5): the smaller root of u^2 s^2 - 2 (P.u) s + P^2 - R^2 = 0.
        const double x = 40 + cells, square = 1 + 1.5 * 1.5;
        const double s = (x - std::sqrt(x * x - square * (x * x - 1600))) / square;
        const double back = std::atan2(1.5 * s, x - s) / kUnits.grid.dtheta();
        beyond.push_back(cells);
        errors.push_back(std::abs(landing(20 + cells, 10, 1, 1.5f) - (10 - back)));
    }
    CHECK(errors.front() < 2e-3);                       // of a cell, at nearly half a cell beyond
    const double order = fitted_order(beyond, errors);  // the fixed point rounds at a thousandth of the least error
    CHECK(order > 1.9);
    CHECK(order < 2.1);
}

TEST_CASE("crossings back and forth over theta = 0") {
    CHECK(std::abs(landing(20.5, 0.1, 1, 2) - (40.1 - 1 / (2 * kPi))) < kTick);
    CHECK(std::abs(landing(20.5, 39.9, 1, -2) - (1 / (2 * kPi) - 0.1)) < kTick);
}

TEST_CASE("kinetic energy by hand") {
    Walls tube = walls(10);
    strike(tube, {electron(20.1, 12, 1, 0), electron(20.1, 14, 0.6f, 0.8f)});  // 3, 4, 5
    const WallBook& anode = tube.books().anode;
    CHECK(anode.sector_energy[6] == kUnitEnergy);
    CHECK(std::abs(anode.sector_energy[7] - kUnitEnergy) <= 1);  // 0.6f and 0.8f are rounded
    CHECK(tube.anode_energy_eV() == static_cast<double>(anode.energy_units()) / 1024);
    CHECK(tube.cathode_energy_eV() == 0);
    strike(tube, {electron(-0.1, 3, -1, 0)});
    CHECK(tube.books().cathode.sector_energy[3] == kUnitEnergy);
    CHECK(relative_error(tube.cathode_energy_eV(), 1135.863605) < 1e-6);  // the booked unit is 1e-3 eV
    CHECK(tube.anode_energy_eV() == 0);
}

TEST_CASE("an impact keeps its energy and its angle from the normal") {
    Walls tube = walls(10);
    strike(tube, {electron(0, 5, -3, 4), electron(0, 6, -3, -4), electron(0, 7, -1, 0)});
    REQUIRE(tube.impacts().size() == 3);
    constexpr double kFloat = 1.2e-7;  // it is kept in a float
    CHECK(relative_error(static_cast<double>(tube.impacts()[0].angle), std::atan(4.0 / 3)) < kFloat);
    CHECK(tube.impacts()[1].angle == tube.impacts()[0].angle);
    CHECK(tube.impacts()[1].energy == tube.impacts()[0].energy);
    CHECK(tube.impacts()[2].angle == 0);
    CHECK(relative_error(static_cast<double>(tube.impacts()[2].energy), 1135.863605) < kFloat);
    CHECK(tube.impacts()[2].theta == 7 * kAzimuthalOne);
}

TEST_CASE("the histograms of impact energy; the last bin holds all above") {
    Walls tube = walls(10);
    // 284.20 eV, 1135.86 eV, 4528.44 eV; 27.7 keV is over the top.
    strike(tube, {electron(20.1, 0, 0.5f, 0), electron(20.1, 0, 1, 0), electron(20.1, 0, 2, 0), electron(20.1, 0, 5, 0),
                  electron(20.1, 0, 0, 0)});
    CHECK(tube.books().anode.energy_range == 6000);
    CHECK(bins_of(tube.books().anode) == std::vector<std::int64_t>{0, 6, 24, 96, 127});
    strike(tube, {electron(-0.1, 0, -0.5f, 0), electron(-0.1, 0, -1, 0), electron(-0.1, 0, -2, 0)});
    CHECK(relative_error(tube.books().cathode.energy_range, 1800) < 1e-15);  // 0.3 times 6000 rounds
    CHECK(bins_of(tube.books().cathode) == std::vector<std::int64_t>{20, 80, 127});
}

TEST_CASE("what lands on the anode is shared linearly between two nodes") {
    Walls tube = walls(10);
    strike(tube, {electron(20, 7.25, 1, 0), electron(20, 39.75, 1, 0), electron(0, 3, -1, 0)});
    const auto deposit = tube.anode_deposit();
    REQUIRE(deposit.size() == 40);
    CHECK(deposit[7] == 0.75);
    CHECK(deposit[8] == 0.25);
    CHECK(deposit[39] == 0.25);
    CHECK(deposit[0] == 0.75);  // across theta = 0
    double sum = 0;
    for (const double share : deposit) sum += share;
    CHECK(sum == 2);  // the cathode's is not in it
    strike(tube, {});
    CHECK(*std::max_element(tube.anode_deposit().begin(), tube.anode_deposit().end()) == 0);
}

TEST_CASE("the order of the hits does not matter, to the last bit, and the deposit is just the number of hits") {
    std::vector<Electron> electrons;
    for (int k = 0; k < 1000; ++k) {
        const double angle = 40 * (k * 0.6180339887 - std::floor(k * 0.6180339887));
        electrons.push_back(
            electron(k % 3 == 0 ? -0.2 : 20.2, angle, k % 3 == 0 ? -0.7f : 0.7f, 0.001f * static_cast<float>(k)));
    }
    Walls forth = walls(10), back = walls(10);
    strike(forth, electrons);
    std::reverse(electrons.begin(), electrons.end());
    strike(back, electrons);
    CHECK(forth.books().anode.sector_energy == back.books().anode.sector_energy);
    CHECK(forth.books().cathode.sector_energy == back.books().cathode.sector_energy);
    CHECK(forth.anode_energy_eV() == back.anode_energy_eV());
    CHECK(std::equal(forth.anode_deposit().begin(), forth.anode_deposit().end(), back.anode_deposit().begin()));
    double sum = 0;
    for (const double share : forth.anode_deposit()) sum += share;
    CHECK(sum == 666);
    CHECK(forth.anode_hits() == 666);
}

TEST_CASE("only the named electrons are booked, and they stay in the store") {
    Walls tube = walls(0);
    ElectronStore store;
    for (const double theta : {1.0, 2.0, 3.0}) store.append(electron(20.1, theta, 1, 0));
    const std::vector<std::uint32_t> hits{1};
    tube.strike(store, hits);
    CHECK(tube.books().anode.hits() == 1);
    CHECK(tube.books().anode.sector_hits[2] == 1);
    CHECK(store.size() == 3);
}

TEST_CASE("books add up over the steps, what a step booked does not; restored books go on") {
    Walls tube = walls(0);
    strike(tube, {electron(20.1, 1, 1, 0), electron(-0.1, 2, -1, 0)});
    strike(tube, {electron(20.1, 1, 1, 0)});
    CHECK(tube.anode_hits() == 1);
    CHECK(tube.cathode_hits() == 0);
    CHECK(tube.impacts().empty());
    CHECK(tube.books().anode.sector_hits[1] == 2);
    CHECK(tube.books().anode.sector_energy[1] == 2 * kUnitEnergy);
    CHECK(tube.books().cathode.hits() == 1);

    Walls other = walls(0);
    other.restore(tube.books());
    strike(other, {electron(20.1, 1, 1, 0)});
    CHECK(other.books().anode.sector_hits[1] == 3);
    CHECK(other.books().anode.energy_histogram[24] == 3);
    CHECK(other.books().cathode.sector_energy[2] == kUnitEnergy);
}
