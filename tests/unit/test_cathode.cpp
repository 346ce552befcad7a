// SPDX-License-Identifier: MIT
// Sources: Gauss's law; S. Dushman, Rev. Mod. Phys. 2, 381 (1930) and W. Schottky (1914) for heat, J. R. M. Vaughan,
// IEEE Trans. Electron Devices 36, 1963 (1989) for impact, their numbers as in test_cathode_laws.cpp; effusion from a
// Maxwell gas (any text on kinetic theory): kT of mean energy along the normal, kT / 2 along the surface.
// Statistics: seeds are fixed, every bound is 4 sigma.
#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <initializer_list>
#include <vector>

#include "pic/cathode.hpp"
#include "tests/relative_error.hpp"
#include "tests/smooth_bore.hpp"

using namespace spokewright;

namespace {

constexpr std::size_t kNodes = 16;
constexpr int kSteps = 2000, kRoundings = 16 * kSteps;       // one a node and step
const StepUnits kUnits{{2e-3, 4e-3, 10e-3, 20, 16}, 5e-12};  // dr 0.1 mm; velocity unit 2e7 m/s
const double kNodeArea = 2e-3 * (2 * kPi / 16) * 10e-3;      // m^2

Deck cold_deck() {
    return smooth_bore(2e-3, 4e-3, 4000, 0);  // electrons from rest
}

/// Answers impacts as the surface of test_cathode_laws.cpp.
Deck secondary_deck(double temperature_eV, double yield_max = 1.4) {
    Deck deck = cold_deck();
    deck.cathode.secondary_emission = true;
    deck.cathode.secondary_yield_max = yield_max;
    deck.cathode.secondary_energy_max = 650;
    deck.cathode.secondary_temperature = temperature_eV;
    return deck;
}

/// The field when row 1 stands at `rise` volts (positive pulls electrons out) and row 0 holds `charge`.
SurfaceField surface(const std::vector<double>& rise, const std::vector<double>& charge = {}) {
    std::vector<double> potential(kUnits.grid.nodes(), 0.0), node_charge(kUnits.grid.nodes(), 0.0);
    std::copy(rise.begin(), rise.end(), potential.begin() + kNodes);
    std::copy(charge.begin(), charge.end(), node_charge.begin());
    SurfaceField field(kUnits.grid);
    field.update(Poisson(kUnits.grid), potential, node_charge);
    return field;
}

SurfaceField even_surface(double rise) {
    return surface(std::vector<double>(kNodes, rise));
}

/// A macro-charge of which Gauss's law wants `count` a node, the field as in a coaxial line, V / (r ln(r_1 / r_c)).
double charge_for(double count, double rise) {
    return -kVacuumPermittivity * rise / (2e-3 * std::log(2.1e-3 / 2e-3)) * kNodeArea / count;
}

/// Electrons about each node; a cathode of cold electrons leaves them within half a cell.
std::vector<int> at_nodes(const ElectronStore& store) {
    std::vector<int> count(kNodes, 0);
    for (std::size_t p = 0; p < store.size(); ++p) {
        CHECK_UNARY(store.theta[p] >= 0 && store.theta[p] < kUnits.azimuthal_end());
        ++count[static_cast<std::size_t>((store.theta[p] + kAzimuthalOne / 2) >> kAzimuthalBits) % kNodes];
    }
    return count;
}

/// Primaries of many steps.
ElectronStore primaries(const Deck& deck, double macro_charge, const SurfaceField& field, int steps) {
    Cathode cathode(deck, kUnits, macro_charge);
    ElectronStore store;
    for (int step = 0; step < steps; ++step) {
        const std::size_t before = store.size();
        cathode.emit(step, field, 0, {}, store);
        CHECK(static_cast<std::size_t>(cathode.primaries()) == store.size() - before);
        CHECK(cathode.secondaries() == 0);
    }
    return store;
}

/// `total` of `count` integers of mean `mean` each, rounded at random.
void check_total(double total, double mean, int count, double more = 0) {
    const double share = mean - std::floor(mean);
    CHECK(std::abs(total - mean * count) <= 4 * std::sqrt(count * share * (1 - share)) + more);
}

/// Numbers spread evenly over 0..1: variance 1/12, and that of their square about 1/2 is 1/180.
void check_even(const std::vector<double>& numbers) {
    double sum = 0, squares = 0;
    for (const double x : numbers) {
        sum += x - 0.5;
        squares += (x - 0.5) * (x - 0.5);
    }
    const auto n = static_cast<double>(numbers.size());
    CHECK(std::abs(sum / n) < 4 * std::sqrt(1 / (12 * n)));
    CHECK(std::abs(squares / n - 1.0 / 12) < 4 * std::sqrt(1 / (180 * n)));
}

/// Checks normal and tangential energies (in units of kT) of electrons launched without a field.
void check_half_maxwellian(const ElectronStore& store, double temperature_eV) {
    const auto n = static_cast<double>(store.size());
    const double unit = 0.5 * kElectronMass * kUnits.speed() * kUnits.speed() / (temperature_eV * kElementaryCharge);
    double normal = 0, along = 0, product = 0, drift = 0;
    std::vector<double> across_all, along_all;
    for (std::size_t p = 0; p < store.size(); ++p) {
        CHECK(store.u_r[p] > 0);
        const double u_r = static_cast<double>(store.u_r[p]), u_theta = static_cast<double>(store.u_theta[p]);
        across_all.push_back(unit * u_r * u_r);
        along_all.push_back(unit * u_theta * u_theta);
        normal += across_all.back();
        along += along_all.back();
        product += (across_all.back() - 1) * (along_all.back() - 0.5);
        drift += u_theta * std::sqrt(2 * unit);
    }
    // An exponential energy has the variance 1, half the square of a normal number the variance 1/2.
    CHECK(std::abs(normal / n - 1) < 4 / std::sqrt(n));
    CHECK(std::abs(along / n - 0.5) < 4 * std::sqrt(0.5 / n));
    CHECK(std::abs(product / n) < 4 * std::sqrt(0.5 / n));
    CHECK(std::abs(drift / n) < 4 / std::sqrt(n));
    const auto bound = [n](double p) { return 4 * std::sqrt(p * (1 - p) / n); };  // of a share p of n trials
    for (const double x : {0.1, 0.5, 1.0, 2.0, 4.0}) {
        const auto above = [x](double energy) { return energy > x; };
        const double across = static_cast<double>(std::count_if(across_all.begin(), across_all.end(), above)) / n;
        const double sideways = static_cast<double>(std::count_if(along_all.begin(), along_all.end(), above)) / n;
        CAPTURE(x);
        CHECK(std::abs(across - std::exp(-x)) < bound(std::exp(-x)));
        CHECK(std::abs(sideways - std::erfc(std::sqrt(x))) < bound(std::erfc(std::sqrt(x))));
    }
}

/// 40000 secondaries from one place, without any field.
ElectronStore secondaries_without_field(double temperature_eV, std::int32_t theta) {
    const Deck deck = secondary_deck(temperature_eV, 20);  // twenty an impact at 650 eV
    Cathode cathode(deck, kUnits, -1e-14);
    ElectronStore store;
    cathode.emit(0, even_surface(0), 0, std::vector<CathodeImpact>(2000, {theta, 650, 0}), store);
    CHECK(store.size() == 40000);
    double sum = 0;
    for (std::size_t p = 0; p < store.size(); ++p) {
        sum += std::pow(static_cast<double>(store.u_r[p]), 2) + std::pow(static_cast<double>(store.u_theta[p]), 2);
    }
    // The energy booked is theirs. Not relativistic: 45 eV of 511 keV on average, 1e-4.
    const double electron_volts = 0.5 * kElectronMass * std::pow(kUnits.speed(), 2) * sum / kElementaryCharge;
    CHECK(relative_error(cathode.energy_eV(), electron_volts) < 2e-4);
    return store;
}

}  // namespace

TEST_CASE("the space-charge limit emits the charge of Gauss's law, rounded at random node by node") {
    Cathode cathode(cold_deck(), kUnits, charge_for(3.3, 100));
    const SurfaceField field = even_surface(100);
    std::int64_t total = 0;
    for (int step = 0; step < kSteps; ++step) {
        ElectronStore store;
        cathode.emit(step, field, 0, {}, store);
        for (const int count : at_nodes(store)) CHECK_UNARY(count == 3 || count == 4);
        total += cathode.primaries();
    }
    check_total(static_cast<double>(total), 3.3, kRoundings);
}

TEST_CASE("what was emitted leaves no field on the surface, to one macro-electron") {
    std::vector<double> rise, charge;
    for (std::size_t j = 0; j < kNodes; ++j) rise.push_back(20.0 + 10.0 * static_cast<double>(j));
    const double macro_charge = charge_for(7.5, 100);
    Cathode cathode(cold_deck(), kUnits, macro_charge);
    ElectronStore store;
    cathode.emit(0, surface(rise), 0, {}, store);
    for (const int count : at_nodes(store)) charge.push_back(count * macro_charge);
    const double one = -macro_charge / (kVacuumPermittivity * kNodeArea);  // V/m
    const SurfaceField after = surface(rise, charge);
    for (const double left : after.on_surface()) CHECK(std::abs(left) <= one * (1 + 1e-12));
    CHECK(std::abs(surface(rise).on_surface()[3]) > 3 * one);
}

TEST_CASE("nothing leaves where the field pushes back or is nil") {
    std::vector<double> rise(kNodes, -100.0);
    rise[5] = 100;
    rise[6] = 0;
    const ElectronStore store = primaries(cold_deck(), charge_for(3.3, 100), surface(rise), 20);
    const std::vector<int> count = at_nodes(store);
    CHECK(count[5] >= 60);
    CHECK(static_cast<std::size_t>(count[5]) == store.size());
}

TEST_CASE("a hot cathode gives at most Richardson-Dushman's current, raised by the pulling field after Schottky") {
    Deck deck = cold_deck();
    deck.cathode.emission = EmissionLaw::thermionic;
    deck.cathode.temperature = 2500;
    deck.cathode.work_function = 4.52;
    deck.cathode.richardson_constant = 60.2e4;
    // 2908 A/m^2 without field. 1 MV/m lowers 4.52 eV by 37.947 meV; kT is 215.433 meV.
    const double rise = 1e6 * 2e-3 * std::log(1.05);
    const double density = 2907.75 * std::exp(37.947 / 215.433);
    const double macro_charge = -density * kNodeArea * kUnits.dt / 2.4;
    const auto count = static_cast<double>(primaries(deck, macro_charge, even_surface(rise), kSteps).size());
    check_total(count, 2.4, kRoundings);  // six figures of the reference are nothing beside the statistics
    CHECK(primaries(deck, macro_charge, even_surface(-rise), 20).size() == 0);

    SUBCASE("a field too weak to take it all is the limit") {
        // 1226 of these electrons a node at 1 MV/m, or one and a half at 1.2 kV/m.
        const double weak = rise * 1.5 * macro_charge / charge_for(1, rise);
        const auto limited = static_cast<double>(primaries(deck, macro_charge, even_surface(weak), kSteps).size());
        check_total(limited, 1.5, kRoundings);
    }
    SUBCASE("a cold one gives nothing") {
        deck.cathode.temperature = 0;
        CHECK(primaries(deck, macro_charge, even_surface(rise), 20).size() == 0);
    }
}

TEST_CASE("the deck's limit caps the current") {
    Deck deck = cold_deck();
    deck.cathode.emission_limit = 1000;  // A/m^2
    const double macro_charge = -1000 * kNodeArea * kUnits.dt / 1.7;
    const auto count = static_cast<double>(primaries(deck, macro_charge, even_surface(100), kSteps).size());
    check_total(count, 1.7, kRoundings);
}

TEST_CASE("primaries start evenly over the angle") {
    const ElectronStore store = primaries(cold_deck(), charge_for(3.3, 100), even_surface(100), kSteps);
    std::vector<double> shares;  // of the cell
    for (const std::int32_t theta : store.theta) shares.push_back((theta & kAzimuthalMask) * (1.0 / kAzimuthalOne));
    check_even(shares);
}

TEST_CASE("an electron from rest moves evenly accelerated for its share of the step, and turns with the field") {
    const SurfaceField field = even_surface(100);  // 100 V over 0.1 mm: 1 MV/m on average in the first cell
    Cathode cathode(cold_deck(), kUnits, charge_for(1000, 100));
    ElectronStore store;
    cathode.emit(0, field, 0.18, {}, store);
    REQUIRE(store.size() > 15000);
    const double acceleration = kElementaryCharge / kElectronMass * 1e6;  // m/s^2
    const double turn = kElementaryCharge / kElectronMass * 0.18;         // rad/s
    std::vector<double> shares;
    for (std::size_t p = 0; p < store.size(); ++p) {
        const double rise = store.r[p] * (1.0 / kRadialOne) * kUnits.grid.dr();
        const double flown = std::sqrt(2 * rise / acceleration) / kUnits.dt;
        shares.push_back(flown);
        if (flown < 0.05) continue;  // there the fixed point's rounding of r grows in the root
        // The velocity stands half a step before the place.
        const double since = (flown - 0.5) * kUnits.dt;
        const double top = 0.5 * acceleration * kUnits.dt / kUnits.speed();
        // r is known to 1/2^25 cell. At flown 0.05 it is 5.5e-5 cells, which leaves 1.4e-5 of a step unsure.
        CHECK(std::abs(static_cast<double>(store.u_r[p]) - acceleration * since / kUnits.speed()) < 1e-4 * top);
        const double swung = turn * 0.5 * acceleration * since * since / kUnits.speed();
        CHECK(std::abs(static_cast<double>(store.u_theta[p]) - swung) < 1e-4 * top * turn * kUnits.dt);
    }
    check_even(shares);
    CHECK(cathode.energy_eV() == 0);  // from rest
}

TEST_CASE("primaries leave as from a gas at the launch temperature") {
    Deck deck = cold_deck();
    deck.cathode.launch_temperature = 0.2;
    // 0.1 mV over the first cell: what it adds within a step is 1e-6 of the thermal speed.
    check_half_maxwellian(primaries(deck, charge_for(50, 1e-4), even_surface(1e-4), 50), 0.2);
}

TEST_CASE("secondaries leave as from a gas at their own temperature") {
    check_half_maxwellian(secondaries_without_field(3, 5 * kAzimuthalOne), 3);
}

TEST_CASE("without field an electron flies straight on for its share of the step") {
    const ElectronStore store = secondaries_without_field(30, 5 * kAzimuthalOne);
    std::vector<double> shares;
    for (std::size_t p = 0; p < store.size(); ++p) {
        const double u_r = static_cast<double>(store.u_r[p]), u_theta = static_cast<double>(store.u_theta[p]);
        CHECK(store.r[p] >= 1);
        const double flown = store.r[p] * (1.0 / kRadialOne) / u_r;
        shares.push_back(flown);
        if (u_r < 0.01) continue;  // r too small to tell the time from
        const double cells = flown * u_theta / (20 * kUnits.grid.dtheta());
        // r is known to 1/2^25 cell in 0.01, or 3e-6 of the time; theta to 1/2^23 cell.
        CHECK(std::abs(store.theta[p] * (1.0 / kAzimuthalOne) - 5 - cells) < 3e-6 * std::abs(cells) + 1.5e-7);
    }
    check_even(shares);
}

TEST_CASE("secondaries keep to the turn on both sides of theta = 0") {
    for (const std::int32_t start : {0, kUnits.azimuthal_end() - 1}) {
        const ElectronStore store = secondaries_without_field(30, start);
        CHECK(at_nodes(store)[0] == 40000);
    }
}

TEST_CASE("secondaries are switched off unless asked for") {
    Deck deck = secondary_deck(3);
    deck.cathode.secondary_emission = false;
    ElectronStore store;
    Cathode(deck, kUnits, -1e-14).emit(0, even_surface(0), 0, std::vector<CathodeImpact>(1000, {0, 650, 0}), store);
    CHECK(store.size() == 0);
}

TEST_CASE("impacts yield after Vaughan") {
    struct Row {
        float energy, angle;
        double yield;
    };
    const double growth = 1 + kPi / 18;  // at 60 degrees: 1 + angle^2 / (2 pi)
    const Row rows[] = {{50, 0, 0.4853}, {200, 0, 1.0475},
                        {650, 0, 1.4},   {3000, 0, 0.9173},
                        {12, 0, 0},      {static_cast<float>(650 * growth), static_cast<float>(kPi / 3), 1.4 * growth}};
    constexpr int kImpacts = 20000;
    Cathode cathode(secondary_deck(0), kUnits, -1e-14);
    for (const Row& row : rows) {
        ElectronStore store;
        cathode.emit(7, even_surface(0), 0, std::vector<CathodeImpact>(kImpacts, {0, row.energy, row.angle}), store);
        CAPTURE(row.energy);
        CHECK(static_cast<std::size_t>(cathode.secondaries()) == store.size());
        check_total(static_cast<double>(store.size()), row.yield, kImpacts, 1e-4 * kImpacts);  // four figures
    }
}

TEST_CASE("what impacts gave at a node is taken off its primaries; secondaries come first in the store") {
    // 5.5 primaries a node. Twenty secondaries of one impact leave nothing to wish for there.
    const auto counts = [](double theta) {
        Cathode cathode(secondary_deck(0, 20), kUnits, charge_for(5.5, 100));
        ElectronStore store;
        const auto place = static_cast<std::int32_t>(theta * kAzimuthalOne);
        cathode.emit(0, even_surface(100), 0, std::vector<CathodeImpact>{{place, 650, 0}}, store);
        CHECK(cathode.secondaries() == 20);
        CHECK(static_cast<std::size_t>(cathode.primaries()) == store.size() - 20);
        CHECK(std::all_of(store.theta.begin(), store.theta.begin() + 20, [=](std::int32_t t) { return t == place; }));
        return at_nodes(store);
    };
    for (const auto& [theta, node] : {std::pair{3.4, 3}, std::pair{3.6, 4}, std::pair{15.6, 0}}) {
        std::vector<int> count = counts(theta);
        CHECK(count[static_cast<std::size_t>(node)] == 20);
        count.erase(count.begin() + node);
        CHECK(std::all_of(count.begin(), count.end(), [](int seen) { return seen == 5 || seen == 6; }));
    }
}

TEST_CASE("the same step gives the same electrons, another step or seed others") {
    const auto radii = [](std::int64_t step, std::uint64_t seed) {
        Deck deck = cold_deck();
        deck.electrons.seed = seed;
        Cathode cathode(deck, kUnits, charge_for(3.3, 100));
        ElectronStore store;
        cathode.emit(step, even_surface(100), 0.18, {}, store);
        return std::vector<std::int32_t>(store.r.begin(), store.r.end());
    };
    CHECK(radii(12, 1) == radii(12, 1));
    CHECK(radii(12, 1) != radii(13, 1));
    CHECK(radii(12, 1) != radii(12 + (std::int64_t{1} << 32), 1));
    CHECK(radii(12, 1) != radii(12, 2));
}
