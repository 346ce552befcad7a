// SPDX-License-Identifier: MIT
// Source: the parallel resonant circuit and the reflection coefficient of a load (circuit theory, from memory).
// The published checks of ringing, drive and pulling stand in tests/published.
#include <doctest/doctest.h>

#include <cmath>
#include <complex>
#include <random>
#include <vector>

#include "fields/resonators.hpp"
#include "inputs/constants.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {

constexpr double kRounding = 1e-12;
constexpr double kStep = 2e-12;

/// Ten vanes, modes 3, 4 and 5 (pi): five resonators.
CircuitSettings circuit(double unloaded_q, double external_q) {
    return {CircuitSource::table,
            {{3, 3.1e9, unloaded_q, external_q, 0.8e-12},
             {4, 2.8e9, unloaded_q, external_q, 0.9e-12},
             {5, 2.45e9, unloaded_q, external_q, 1e-12}}};
}

Resonators lossless() {
    return {circuit(1e15, 1e15), {}, 10, kStep};  // loses 1e-15 of its energy a radian
}

std::vector<double> random_charge(std::size_t count, std::mt19937& random) {
    std::uniform_real_distribution<double> uniform(-1e-11, 1e-11);
    std::vector<double> rise(count);
    for (double& q : rise) q = uniform(random);
    return rise;
}

}  // namespace

TEST_CASE("books of every step: electrons gave wall loss, load and rise of energy, to rounding") {
    std::mt19937 random(4);
    for (const LoadSettings load : {LoadSettings{1, 0}, LoadSettings{3, 2.0}}) {
        Resonators bank(circuit(300, 40), load, 10, kStep);
        double from_electrons = 0, lost = 0;
        for (int k = 0; k < 500; ++k) {
            const double before = bank.energy();
            const ResonatorEnergy energy = bank.advance(random_charge(5, random));
            const double rise = bank.energy() - before;
            const double scale = before + std::abs(energy.from_electrons);
            CHECK(std::abs(energy.from_electrons - energy.wall_loss - energy.load - rise) < kRounding * scale);
            CHECK(energy.wall_loss >= 0);
            CHECK(energy.load >= 0);
            from_electrons += energy.from_electrons;
            lost += energy.wall_loss + energy.load;
        }
        CHECK(lost > 0.1 * from_electrons);  // all terms of the books have counted
        CHECK(bank.energy() > 1e-3 * from_electrons);
    }
}

TEST_CASE("losses divide as 1 / Q_0 to Re y / Q_ext") {
    Resonators bank(circuit(300, 40), {2, kPi}, 10, kStep);  // y = 2
    bank.all()[2].voltage = 1000;
    const ResonatorEnergy energy = bank.advance(std::vector<double>(5, 0.0));
    CHECK(energy.wall_loss > 0);
    CHECK(relative_error(energy.load / energy.wall_loss, 2 * 300.0 / 40) < kRounding);
    CHECK(energy.from_electrons == 0);
}

TEST_CASE("a mode's capacitance is one resonator's times 2 N sin^2(pi n / N), 4 N for the pi mode") {
    const Resonators bank = lossless();
    REQUIRE(bank.all().size() == 5);
    const double sine3 = std::sin(0.3 * kPi), sine4 = std::sin(0.4 * kPi);
    CHECK(relative_error(bank.all()[0].capacitance, 0.8e-12 * 20 * sine3 * sine3) < kRounding);
    CHECK(relative_error(bank.all()[1].capacitance, 0.8e-12 * 20 * sine3 * sine3) < kRounding);
    CHECK(relative_error(bank.all()[2].capacitance, 0.9e-12 * 20 * sine4 * sine4) < kRounding);
    CHECK(relative_error(bank.all()[4].capacitance, 1e-12 * 40) < kRounding);
    CHECK(bank.all()[1].entry == 0);
    CHECK(bank.all()[2].entry == 1);
    CHECK(bank.all()[4].entry == 2);
}

TEST_CASE("a mode takes up no charge but its own") {
    Resonators bank = lossless();
    bank.advance(std::vector<double>{0, 0, 3e-12, 0, 0});
    for (std::size_t k = 0; k < 5; ++k) CHECK((bank.all()[k].voltage != 0) == (k == 2));
    // Within a step far below a period dv = dq / C, but for (omega dt)^2 / 4 = 3e-4.
    CHECK(relative_error(bank.all()[2].voltage, 3e-12 / bank.all()[2].capacitance) < 5e-4);
}

TEST_CASE("prime adds a wave and returns what it puts in: C V^2, and half of it in the pi mode") {
    for (const int mode : {4, 5}) {
        Resonators bank = lossless();
        const double capacitance = bank.all()[mode == 4 ? 2 : 4].capacitance;
        const double expected = (mode == 4 ? 1 : 0.5) * capacitance * 600 * 600;
        CHECK(relative_error(bank.prime(mode, 600), expected) < kRounding);
        CHECK(relative_error(bank.energy(), expected) < kRounding);
        const double before = bank.energy();
        const double second = bank.prime(mode, 600);  // on top of the first: four times the energy
        CHECK(relative_error(second, 3 * expected) < kRounding);
        CHECK(relative_error(bank.energy(), before + second) < kRounding);
    }
}

TEST_CASE("a primed wave turns with +theta at its frequency and keeps its height") {
    Resonators bank = lossless();
    bank.prime(4, 600);
    for (int k = 1; k <= 500; ++k) {
        bank.advance(std::vector<double>(5, 0.0));
        // V cos(n theta - omega t) = V cos(omega t) cos(n theta) + V sin(omega t) sin(n theta).
        const double phase = 2 * kPi * 2.8e9 * k * kStep;
        CHECK(std::abs(bank.all()[2].voltage - 600 * std::cos(phase)) < 600 * 1e-10);  // 500 steps of rounding
        CHECK(std::abs(bank.all()[3].voltage - 600 * std::sin(phase)) < 600 * 1e-10);
        CHECK(bank.all()[4].voltage == 0);
    }
}

TEST_CASE("the complex amplitude turns as exp(j omega t)") {
    Resonators bank = lossless();
    bank.all()[4].voltage = 250;
    for (int k = 1; k <= 500; ++k) {
        bank.advance(std::vector<double>(5, 0.0));
        const auto expected = std::polar(250.0, 2 * kPi * 2.45e9 * k * kStep);
        CHECK(std::abs(bank.all()[4].amplitude() - expected) < 250 * 1e-10);  // 500 steps of rounding
    }
}

TEST_CASE("priming a mode that the tube does not have puts in nothing") {
    Resonators bank = lossless();
    CHECK(bank.prime(2, 600) == 0);
    CHECK(bank.energy() == 0);
}

TEST_CASE("the admittance of a load: 1 when matched, 1 / s at phase 0, s at phase pi") {
    CHECK(std::abs(load_admittance({1, 0}) - 1.0) < kRounding);
    CHECK(std::abs(load_admittance({1, 2.5}) - 1.0) < kRounding);
    CHECK(std::abs(load_admittance({2, 0}) - 0.5) < kRounding);
    CHECK(std::abs(load_admittance({2, kPi}) - 2.0) < kRounding);
    // Gamma = j / 3: (1 - j / 3)^2 / (1 + 1 / 9).
    CHECK(std::abs(load_admittance({2, kPi / 2}) - std::complex<double>(0.8, -0.6)) < kRounding);
    CHECK(std::abs(load_admittance({2, -kPi / 2}) - std::complex<double>(0.8, 0.6)) < kRounding);
}

TEST_CASE("without a circuit the bank is empty and does nothing") {
    CircuitSettings none = circuit(300, 40);
    none.source = CircuitSource::none;
    Resonators bank(none, {}, 10, kStep);
    CHECK(bank.all().empty());
    const ResonatorEnergy energy = bank.advance({});
    CHECK(energy.from_electrons == 0);
    CHECK(energy.wall_loss == 0);
    CHECK(energy.load == 0);
    CHECK(bank.prime(5, 600) == 0);
    CHECK(bank.energy() == 0);
}

TEST_CASE("a generator brings its available power, on average and in every mode") {
    for (const int mode : {4, 5}) {
        const double frequency = mode == 4 ? 2.8e9 : 2.45e9, period = 1 / frequency;
        const double dt = period / 200;
        Resonators bank(circuit(1e9, 60), {}, 10, dt, {mode, 25, frequency, 0.3, 0});
        double brought = 0, left = 0;
        for (int k = 0; k < 200 * 400; ++k) {  // 400 periods, twenty fill times
            const ResonatorEnergy energy = bank.advance(std::vector<double>(5, 0.0), k * dt);
            if (k < 200 * 300) continue;
            brought += energy.drive;
            left += energy.load;
        }
        CHECK(relative_error(brought / (100 * period), 25) < 1e-9);  // whole periods
        CHECK(relative_error(left, brought) < 1e-6);  // no loss in the walls: all of it comes back, but for e^-20
    }
}

TEST_CASE("a driven resonator stands at the phasor of the parallel circuit, at and beside resonance") {
    const double cold = 2.45e9, unloaded_q = 400, external_q = 80, power = 40;
    for (const double share : {1.0, 1.004, 0.99}) {
        const double frequency = share * cold, dt = 1 / frequency / 400, omega = 2 * kPi * frequency;
        Resonators bank(circuit(unloaded_q, external_q), {}, 10, dt, {5, power, frequency, 0, 0});
        const Resonator& pi_mode = bank.all().back();
        for (int k = 0; k < 400 * 500; ++k) bank.advance(std::vector<double>(5, 0.0), k * dt);
        const double c = pi_mode.capacitance, g = pi_mode.wall_conductance + pi_mode.load_conductance;
        const std::complex<double> y(g, omega * c * (1 - 1 / (share * share)));
        const std::complex<double> expected = std::sqrt(8 * pi_mode.load_conductance * power) / y;  // at a whole period
        const double scale = std::abs(expected);
        CHECK(std::abs(pi_mode.voltage - expected.real()) < 2e-3 * scale);  // (omega dt)^2 / 12 = 2e-5, times Q_L
        for (int k = 0; k < 100; ++k) bank.advance(std::vector<double>(5, 0.0), k * dt);  // a quarter period on
        CHECK(std::abs(pi_mode.voltage + expected.imag()) < 2e-3 * scale);
    }
}

TEST_CASE("a cold cavity throws back ((beta - 1) / (beta + 1))^2 of a resonant wave, beta = Q_0 / Q_ext") {
    for (const int mode : {4, 5}) {
        for (const double external_q : {50.0, 100.0, 300.0}) {
            const double frequency = mode == 4 ? 2.8e9 : 2.45e9, dt = 1 / frequency / 200, power = 25;
            Resonators bank(circuit(100, external_q), {}, 10, dt, {mode, power, frequency, 0.3, 0});
            double load = 0, wall = 0;
            for (int k = 0; k < 200 * 400; ++k) {  // 400 periods, at least ten fill times of the energy
                const ResonatorEnergy energy = bank.advance(std::vector<double>(5, 0.0), k * dt);
                if (k < 200 * 399) continue;
                load += energy.load;
                wall += energy.wall_loss;
            }
            const double beta = 100 / external_q, back = std::pow((beta - 1) / (beta + 1), 2);
            CHECK(std::abs(load * frequency / power - back) < 1e-6);  // the start is e^-16 by then
            CHECK(std::abs(wall * frequency / power - (1 - back)) < 1e-6);
        }
    }
}

TEST_CASE("books of a driven step: generator and electrons gave wall loss, load and rise of energy, to rounding") {
    std::mt19937 random(6);
    Resonators bank(circuit(300, 40), {}, 10, kStep, {4, 1e4, 2.81e9, 1, 0.1e-9});
    bool driven = false;
    for (int k = 0; k < 500; ++k) {
        const double before = bank.energy();
        const ResonatorEnergy energy = bank.advance(random_charge(5, random), k * kStep);
        const double open =
            energy.from_electrons + energy.drive - energy.wall_loss - energy.load - bank.energy() + before;
        CHECK(std::abs(open) < kRounding * (before + std::abs(energy.from_electrons) + energy.drive));
        CHECK((energy.drive > 0) == (k * kStep + 0.5 * kStep >= 0.1e-9));
        driven = driven || energy.drive > 0;
    }
    CHECK(driven);
}

TEST_CASE("the generator drives the wave that turns with the electrons, and no other mode") {
    Resonators bank(circuit(300, 40), {}, 10, kStep, {4, 100, 2.8e9, 0, 0});
    for (int k = 0; k < 20000; ++k) bank.advance(std::vector<double>(5, 0.0), k * kStep);
    const auto all = bank.all();  // 3 cos, 3 sin, 4 cos, 4 sin, 5
    const std::complex<double> j(0, 1);
    const auto forward = 0.5 * (all[2].amplitude() + j * all[3].amplitude());
    const auto backward = 0.5 * (all[2].amplitude() - j * all[3].amplitude());
    CHECK(std::abs(forward) > 10);
    CHECK(std::abs(backward) < 2e-2 * std::abs(forward));  // amplitude() of a driven circuit is exact at resonance only
    CHECK(all[0].energy() + all[1].energy() + all[4].energy() == 0);
}
