// SPDX-License-Identifier: MIT
// Source: J. C. Slater in G. B. Collins, ed., Microwave Magnetrons, MIT Radiation Laboratory Series 6 (1948) (from
// memory): a load admittance y pulls an oscillating tube by -(f0 / 2 Q_ext) Im y, the electrons being the same.
#include <doctest/doctest.h>

#include <cmath>
#include <complex>
#include <cstdio>
#include <string>

#include "tests/primed_tube.hpp"
#include "tests/published_row.hpp"

using namespace spokewright;

namespace {

constexpr double kExternalQ = 100, kVoltage = 3600, kField = 0.16;

struct Oscillation {
    double frequency = 0, amplitude = 0;  // Hz, V
};

/// Of the tube that has been locked into a matched load, with another load since then.
Oscillation oscillation(const SpaceState& locked, const LoadSettings& load) {
    Deck deck = primed_tube(kVoltage, kField, kExternalQ, 350);
    deck.load = load;
    InteractionSpace space(deck, 1);
    space.restore(locked);
    const double start = space.time();
    while (space.time() < start + 48e-9) space.step();  // 4 times the 12 ns in which it forgets
    PhaseSlope wave;
    Oscillation found;
    int samples = 0;
    for (; space.time() < start + 108e-9; ++samples) {
        space.step();
        wave.add(mode_amplitude(space));
        found.amplitude += std::abs(mode_amplitude(space));
    }
    found.amplitude /= samples;
    found.frequency = wave.slope() / deck.clock.step / (2 * kPi);
    return found;
}

}  // namespace

TEST_CASE("the load's phase pulls an oscillating tube") {
    InteractionSpace space(primed_tube(kVoltage, kField, kExternalQ, 350), 1);
    while (space.time() < 60e-9) space.step();
    CHECK(std::abs(mode_amplitude(space)) > 0.2 * kVoltage);  // it does oscillate
    const SpaceState locked = space.save();
    for (const double vswr : {1.5, 2.0}) {
        for (const double degrees : {90.0, 120.0}) {
            const double phase = degrees * kPi / 180;
            // At phases of opposite sign y has the same real part, so the electrons see the same load and add the same
            // detuning of their own; the difference is the load's.
            const Oscillation plus = oscillation(locked, {vswr, phase}), minus = oscillation(locked, {vswr, -phase});
            const std::complex<double> gamma = std::polar((vswr - 1) / (vswr + 1), phase);
            const double theory = -kPrimedFrequency / kExternalQ * ((1.0 - gamma) / (1.0 + gamma)).imag();
            MESSAGE("VSWR " << vswr << " at " << degrees << " degrees: " << plus.frequency - minus.frequency
                            << " Hz, theory " << theory << ", amplitudes " << plus.amplitude << ", " << minus.amplitude
                            << " V, mean frequency " << 0.5 * (plus.frequency + minus.frequency));
            char name[96];
            std::snprintf(name, sizeof name,
                          "pulling of an oscillating tube, VSWR %.1f, from -%.0f to +%.0f degrees, Hz", vswr, degrees,
                          degrees);
            check_published({name, "Slater in G. B. Collins, ed. (1948) (from memory): (f0 / Q_ext) |Im y|", theory,
                             plus.frequency - minus.frequency, 0.05,
                             "required; first order in 1 / Q_ext, noise of the spokes"});
        }
    }
}
