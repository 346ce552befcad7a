// SPDX-License-Identifier: MIT
// Source: J. C. Slater in G. B. Collins, ed., Microwave Magnetrons, MIT Radiation Laboratory Series 6 (1948) (from
// memory): in a tube that oscillates in mode n the spokes turn with the wave, at omega / n.
#include <doctest/doctest.h>

#include <cmath>
#include <complex>

#include "tests/primed_tube.hpp"
#include "tests/published_row.hpp"

using namespace spokewright;

namespace {

/// Of the charge round the cathode, C: turns as exp(j n W t) when the spokes turn at W towards +theta.
std::complex<double> charge_harmonic(const SpaceView& view, int n) {
    std::complex<double> sum;
    for (int i = 0; i <= view.grid.n_r; ++i) {
        for (int j = 0; j < view.grid.n_theta; ++j) {
            sum += std::polar(view.node_charge[view.grid.node(i, j)], n * view.grid.theta(j));
        }
    }
    return sum;
}

}  // namespace

TEST_CASE("the spokes of a locked tube turn with the wave") {
    const Deck deck = primed_tube(3600, 0.16, 200, 350);
    InteractionSpace space(deck, 1);
    while (space.time() < 60e-9) space.step();
    PhaseSlope spokes, wave;
    double weakest = 1;
    const int every = 8;  // 13 samples a period
    while (space.time() < 120e-9) {
        for (int k = 0; k < every; ++k) space.step();
        const SpaceView view = space.view();
        const auto harmonic = charge_harmonic(view, kPrimedMode);
        weakest = std::fmin(weakest, std::abs(harmonic / charge_harmonic(view, 0)));
        spokes.add(harmonic);
        wave.add(mode_amplitude(space));
    }
    CHECK(std::abs(mode_amplitude(space)) > 0.2 * deck.supply.anode_voltage);  // it does oscillate
    CHECK(weakest > 0.1);                                                      // in spokes
    const double interval = every * deck.clock.step;
    const double turning = spokes.slope() / interval / kPrimedMode;
    const double synchronous = wave.slope() / interval / kPrimedMode;
    MESSAGE("wave " << synchronous * kPrimedMode / (2 * kPi) << " Hz, spokes " << turning << ", omega / n "
                    << synchronous << " rad/s, weakest harmonic " << weakest);
    // The cold frequency, moved by the electrons by less than half the width f / Q_L of the resonance.
    CHECK(relative_error(synchronous, 2 * kPi * kPrimedFrequency / kPrimedMode) < 0.5 / 182);
    check_published({"angular velocity of the spokes of a locked tube, rad/s",
                     "Slater in G. B. Collins, ed. (1948) (from memory): omega / n, omega of the run's own wave",
                     synchronous, turning, 1e-3, "required; jitter of the phase over 147 periods"});
}
