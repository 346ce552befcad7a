// SPDX-License-Identifier: MIT
// Source: S. Y. Liao, Microwave Devices and Circuits, Ex. 10-1-1A: 9 GHz, 2.5 pF, G_r 2e-4 and G_l 2.5e-5 S give Q_0
// 706.86, Q_ext 5654.9, Q_L 628.3 and eta_c 11.11 %. The free parallel circuit rings at omega0 sqrt(1 - 1 / (4 Q_L^2))
// and its energy falls as exp(-omega0 t / Q_L) (circuit theory, from memory).
#include <doctest/doctest.h>

#include "tests/one_mode.hpp"
#include "tests/published_row.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {
constexpr double kTextbook = 1e-4;  // the book prints four or five figures
constexpr double kLoadedQ = 628.3, kUnloadedQ = 706.86, kExternalQ = 5654.9;
}  // namespace

TEST_CASE("Liao's example: conductances of the circuit from Q_0 and Q_ext") {
    const Resonators bank = one_mode(5, 9e9, kUnloadedQ, kExternalQ, 2.5e-12, {}, 1e-12);
    const Resonator& r = bank.all().front();
    CHECK(relative_error(r.capacitance, 2.5e-12) < 1e-14);  // rounding
    CHECK(relative_error(r.wall_conductance, 2e-4) < kTextbook);
    CHECK(relative_error(r.load_conductance, 2.5e-5) < kTextbook);
}

TEST_CASE("free ringing: decay, split between walls and load, books") {
    const double dt = 0.5e-12, omega = 2 * kPi * 9e9;
    Resonators bank = one_mode(5, 9e9, kUnloadedQ, kExternalQ, 2.5e-12, {}, dt);
    bank.all().front().voltage = 1000;
    const double start = bank.energy();
    CHECK(relative_error(start, 0.5 * 2.5e-12 * 1e6) < 1e-14);
    double wall = 0, load = 0;
    const int steps = 40000;  // 20 ns, 1.8 decay times
    for (int k = 0; k < steps; ++k) {
        const ResonatorEnergy energy = bank.advance(std::vector<double>{0.0});
        wall += energy.wall_loss;
        load += energy.load;
    }
    const double decay = std::log(start / bank.energy()) / (omega * dt * steps);
    MESSAGE("1 / decay " << 1 / decay << ", eta_c " << load / (wall + load));
    const std::string source = "S. Y. Liao, Microwave Devices and Circuits, example 10-1-1A";
    check_published({"loaded Q from the decay of a ringing resonator", source, kLoadedQ, 1 / decay, 1e-3,
                     "implicit midpoint: (omega dt)^2 / 12 = 7e-5; ripple of 1 / Q_L"});
    check_published({"circuit efficiency from a ringing resonator", source, 0.1111, load / (wall + load), 2e-4,
                     "printed with four figures"});
    CHECK(relative_error(wall + load + bank.energy(), start) < 1e-10);  // the step loses nothing; 40000 roundings
}

TEST_CASE("free ringing: frequency, for coarse and fine steps and light and heavy load") {
    for (const double loaded_q : {50.0, 628.3}) {
        for (const double dt : {4e-12, 1e-12}) {
            Resonators bank = one_mode(4, 9e9, 2 * loaded_q, 2 * loaded_q, 2.5e-12, {}, dt);
            bank.all().front().voltage = 1;
            const double frequency = ringing_frequency(bank, dt, static_cast<int>(4e-9 / dt));
            const double exact = 9e9 * std::sqrt(1 - 1 / (4 * loaded_q * loaded_q));
            MESSAGE("Q_L " << loaded_q << ", dt " << dt << ": " << frequency / exact - 1);
            // Linear interpolation of the crossings over 36 periods; without prewarping 4 ps would be off by 4e-3.
            CHECK(relative_error(frequency, exact) < 5e-6);
        }
    }
}
