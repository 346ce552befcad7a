// SPDX-License-Identifier: MIT
// A coarse ten-vane tube with one mode, the pi mode at 2.45 GHz, primed after the voltage has come up on a hub that the
// cathode has filled itself: for the published checks of when and how it oscillates.
#pragma once

#include <cmath>
#include <complex>

#include "tests/smooth_bore.hpp"

namespace spokewright {

inline constexpr double kPrimedCathode = 1.95e-3, kPrimedAnode = 4.45e-3, kPrimedFrequency = 2.45e9;
inline constexpr int kPrimedMode = 5;
inline constexpr double kPrimedRise = 4e-9;  // s, of the anode voltage; priming one ns later

inline Deck primed_tube(double voltage, double field, double external_q, double priming) {
    Deck deck = smooth_bore(kPrimedCathode, kPrimedAnode, voltage, field);
    deck.tube.vane_count = 2 * kPrimedMode;
    deck.supply.programme = {{0, 0}, {kPrimedRise, 1}};
    deck.circuit.source = CircuitSource::table;
    deck.circuit.modes = {{kPrimedMode, kPrimedFrequency, 10 * external_q, external_q, 1e-12}};
    deck.prime = {kPrimedMode, priming, kPrimedRise + 1e-9};
    deck.cathode.launch_temperature = 0.1;
    deck.grid = {40, 80};
    deck.clock.step = 4e-12;  // a hundredth of a period, a 45th of a gyration at 0.2 T
    deck.electrons.target_count = 6000;
    return deck;
}

/// Turns as exp(j omega t).
inline std::complex<double> mode_amplitude(InteractionSpace& space) {
    return space.resonators().all().front().amplitude();
}

/// Mean rate at which the phase of complex samples, taken at equal intervals far shorter than a turn, advances: the
/// slope of the unwrapped phase by least squares, rad a sample.
class PhaseSlope {
public:
    void add(std::complex<double> sample) {
        phase_ += count_ > 0 ? std::arg(sample / last_) : 0;
        last_ = sample;
        k_ += count_;
        kk_ += count_ * count_;
        y_ += phase_;
        ky_ += count_ * phase_;
        ++count_;
    }
    double slope() const { return (count_ * ky_ - k_ * y_) / (count_ * kk_ - k_ * k_); }

private:
    double count_ = 0, k_ = 0, kk_ = 0, phase_ = 0, y_ = 0, ky_ = 0;
    std::complex<double> last_;
};

}  // namespace spokewright
