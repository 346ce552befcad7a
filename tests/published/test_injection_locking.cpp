// SPDX-License-Identifier: MIT
// Source: R. Adler, Proc. IRE 34, 351 (1946) (from memory): an oscillator follows a signal of power P_in within the
// full band 2 (f0 / Q_ext) sqrt(P_in / P_out); outside it the two beat at sqrt(d^2 - h^2), d the offset, h half the
// band.
#include <doctest/doctest.h>
#include <fmt/format.h>

#include <cmath>
#include <complex>

#include "tests/published_row.hpp"
#include "tests/smooth_bore.hpp"

using namespace spokewright;

namespace {

constexpr double kExternalQ = 40;  // a wide band: the heating tube's current per volt, a quarter of its stored energy

Deck one_mode_tube() {
    Deck deck = smooth_bore(2e-3, 4.6e-3, 4150, 0.175);
    deck.tube.vane_count = 10;
    deck.supply.programme = {{0, 0}, {5e-9, 1}};
    deck.circuit.source = CircuitSource::table;
    deck.circuit.modes = {{5, 2.45e9, 1500, kExternalQ, 0.24e-12}};
    deck.prime = {5, 600, 8e-9};
    deck.cathode.launch_temperature = 1;
    deck.cathode.secondary_emission = true;
    deck.grid = {32, 100};
    deck.clock.step = 3.2e-12;
    deck.electrons.target_count = 3000;
    return deck;
}

/// The phase of the pi mode against a wave of `frequency`, followed from call to call, cycles.
class Slip {
public:
    explicit Slip(double frequency) : frequency_(frequency) {}
    double follow(InteractionSpace& space) {
        const double turns = std::arg(space.view().modes.front().forward) / (2 * kPi) - frequency_ * space.time();
        if (started_) total_ += std::remainder(turns - last_, 1);
        last_ = turns;
        started_ = true;
        return total_;
    }

private:
    double frequency_, last_ = 0, total_ = 0;
    bool started_ = false;
};

constexpr int kLook = 64;  // steps between two looks: half a period of the pi mode, the slip is a hundred times slower

struct FreeTube {
    SpaceState state;
    double frequency;  // Hz
    double power;      // W, to the load
};

FreeTube settle() {
    InteractionSpace space(one_mode_tube());
    while (space.time() < 80e-9) space.step();
    FreeTube tube{space.save(), 0, 0};
    Slip slip(2.45e9);
    const double from = space.time(), start = slip.follow(space);
    double load = 0, end = start;
    while (space.time() < from + 100e-9) {
        const Tally& tally = space.step();
        load += tally.load_energy;
        if (tally.step % kLook == 0) end = slip.follow(space);
    }
    return {tube.state, 2.45e9 + (end - start) / 100e-9, load / 100e-9};
}

InteractionSpace driven(const FreeTube& tube, double power, double frequency) {
    Deck deck = one_mode_tube();
    deck.drive = {5, power, frequency, 0, 0};
    InteractionSpace space(deck);
    space.restore(tube.state);
    return space;
}

/// Cycles that the tube slips within the last quarter of `time`.
double late_slip(const FreeTube& tube, double power, double frequency, double time) {
    InteractionSpace space = driven(tube, power, frequency);
    Slip slip(frequency);
    double before = 0, now = 0;
    const double end = space.time() + time;
    while (space.time() < end) {
        if (space.step().step % kLook != 0) continue;
        now = slip.follow(space);
        if (space.time() < end - time / 4) before = now;
    }
    return now - before;
}

/// Beat frequency, Hz, from whole cycles of slip: the tube lingers near the generator's phase and then runs round.
double beat(const FreeTube& tube, double power, double frequency) {
    constexpr int cycles = 3;
    InteractionSpace space = driven(tube, power, frequency);
    Slip slip(frequency);
    const double start = space.time();
    double first = 0, now = 0;
    while (std::abs(now) < cycles + 1 && space.time() < start + 2e-6) {
        if (space.step().step % kLook != 0) continue;
        now = slip.follow(space);
        if (std::abs(now) >= 1 && first == 0) first = space.time();
    }
    return cycles / (space.time() - first);
}

}  // namespace

TEST_CASE("a hot tube locks to a generator within Adler's band, and beats with it outside") {
    const FreeTube tube = settle();
    MESSAGE("free: " << tube.frequency * 1e-9 << " GHz, " << tube.power << " W");
    for (const double ratio : {0.01, 0.02, 0.04}) {
        const double adler = tube.frequency / kExternalQ * std::sqrt(ratio),
                     power = ratio * tube.power;  // half the band
        double half_band = 0;
        for (const double side : {-1.0, 1.0}) {
            const double slipped = late_slip(tube, power, tube.frequency + side * 0.85 * adler, 2.5 / adler);
            const double beating = beat(tube, power, tube.frequency + side * 1.5 * adler);
            const double edge = std::sqrt(std::max(0.0, std::pow(1.5 * adler, 2) - beating * beating));
            MESSAGE("P_in / P_out " << ratio << ": at " << side * 0.85 << " of Adler's half band it slips " << slipped
                                    << " cycles, at " << side * 1.5 << " it beats at " << beating * 1e-6
                                    << " MHz: edge " << edge / adler);
            CHECK(std::abs(slipped) < 0.02);
            half_band += 0.5 * edge;
        }
        check_published({fmt::format("full locking band of a hot tube at P_in / P_out = {}, MHz", ratio),
                         "R. Adler, Proc. IRE 34, 351 (1946) (from memory)", 2e-6 * adler, 2e-6 * half_band, 0.15,
                         "required; the tube's frequency depends on its amplitude, which Adler leaves out"});
    }
}
