// SPDX-License-Identifier: MIT
// Source: the driven parallel circuit (circuit theory, from memory): a current I at omega gives
// P = |I|^2 G / (2 |G + j omega C (1 - omega0^2 / omega^2)|^2), and half of that at 1 / (2 Q_L) beside resonance;
// induced current I = dq/dt: W. Shockley, J. Appl. Phys. 9, 635 (1938); S. Ramo, Proc. IRE 27, 584 (1939).
#include <doctest/doctest.h>
#include <fmt/format.h>

#include "tests/one_mode.hpp"
#include "tests/published_row.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {

constexpr double kFrequency = 3e9, kUnloadedQ = 500, kExternalQ = 55, kCapacitance = 40e-12, kCharge = 1e-12;
const double kLoadedQ = 1 / (1 / kUnloadedQ + 1 / kExternalQ);

struct Power {
    double from_electrons = 0, wall = 0, load = 0;  // W
};

/// Mean power over 100 periods in the steady state, from a pattern of charge that turns with +theta at `frequency`:
/// q_cos = q cos(omega t), q_sin = q sin(omega t).
Power driven(double frequency) {
    constexpr int kPerPeriod = 400;
    const double dt = 1 / frequency / kPerPeriod;
    Resonators bank = one_mode(4, kFrequency, kUnloadedQ, kExternalQ, kCapacitance, {}, dt);
    Power power;
    for (int k = 0; k < 600 * kPerPeriod; ++k) {  // the first 500 periods are 30 decay times of the energy
        const double now = 2 * kPi * k / kPerPeriod, next = 2 * kPi * (k + 1) / kPerPeriod;
        const std::vector<double> rise{kCharge * (std::cos(next) - std::cos(now)),
                                       kCharge * (std::sin(next) - std::sin(now))};
        const ResonatorEnergy energy = bank.advance(rise);
        if (k >= 500 * kPerPeriod) {
            power.from_electrons += energy.from_electrons;
            power.wall += energy.wall_loss;
            power.load += energy.load;
        }
    }
    const double window = 100 / frequency;
    return {power.from_electrons / window, power.wall / window, power.load / window};
}

double theory(double frequency) {
    const double omega = 2 * kPi * frequency, omega0 = 2 * kPi * kFrequency;
    const double conductance = omega0 * kCapacitance / kLoadedQ;
    const std::complex<double> y(conductance, omega * kCapacitance * (1 - omega0 * omega0 / (omega * omega)));
    const double current = omega * kCharge;
    return 2 * 0.5 * current * current * conductance / std::norm(y);  // two resonators
}

// Steps of 1/400 period: finite differences and midpoint are off by (omega dt)^2 / 12 = 2e-5 in the current, and by
// that much of the frequency, which is Q_L times as much in the detuning.
constexpr double kStepError = 2e-3;

}  // namespace

TEST_CASE("a rotating charge feeds its mode with the power of theory, at and off resonance") {
    for (const double share : {1.0, 1 + 0.5 / 49.55, 1 - 0.5 / 49.55, 1.05, 0.9}) {
        const Power power = driven(share * kFrequency);
        MESSAGE(share << " f0: " << power.from_electrons << " W, theory " << theory(share * kFrequency));
        check_published({fmt::format("power from a rotating charge into its mode at {:.4f} f0, W", share),
                         "W. Shockley, J. Appl. Phys. 9, 635 (1938); parallel resonator, computed",
                         theory(share * kFrequency), power.from_electrons, kStepError,
                         "steps of 1/400 period, times Q_L in the detuning"});
        CHECK(relative_error(power.wall + power.load, power.from_electrons) < 1e-9);  // steady: nothing more is stored
        CHECK(relative_error(power.load / power.from_electrons, kLoadedQ / kExternalQ) < 1e-9);  // circuit efficiency
    }
}

TEST_CASE("half the power at half a bandwidth beside resonance") {
    const double top = driven(kFrequency).from_electrons;
    for (const double side : {-1.0, 1.0}) {
        const double half = driven(kFrequency * (1 + side * 0.5 / kLoadedQ)).from_electrons;
        MESSAGE("share " << half / top);
        CHECK(relative_error(half / top, 0.5) < 1.5 / kLoadedQ);  // the rule is of first order in 1 / Q_L: 1.25 / Q_L
    }
}
