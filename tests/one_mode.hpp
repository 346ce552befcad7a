// SPDX-License-Identifier: MIT
// A bank with one mode of ten vanes, for the checks of the resonators against closed forms.
#pragma once

#include <cmath>
#include <complex>
#include <vector>

#include "fields/resonators.hpp"
#include "inputs/constants.hpp"

namespace spokewright {

/// `capacitance`: of the mode's resonator, F; the deck's is referred to one gap.
inline Resonators one_mode(int number, double frequency, double unloaded_q, double external_q, double capacitance,
                           const LoadSettings& load, double dt) {
    CircuitSettings circuit;
    circuit.source = CircuitSource::table;
    const double gaps = gap_square_sum(vane_patterns(10, number).front());
    circuit.modes = {{number, frequency, unloaded_q, external_q, capacitance / gaps}};
    return Resonators(circuit, load, 10, dt);
}

/// Frequency at which the first resonator rings freely, Hz, from the upward zero crossings of its voltage.
inline double ringing_frequency(Resonators& bank, double dt, int steps) {
    const std::vector<double> nothing(bank.all().size(), 0.0);
    double first = 0, last = 0, before = bank.all().front().voltage;
    int crossings = 0;
    for (int k = 1; k <= steps; ++k) {
        bank.advance(nothing);
        const double now = bank.all().front().voltage;
        if (before < 0 && now >= 0) {
            last = (k - now / (now - before)) * dt;
            first = crossings == 0 ? last : first;
            ++crossings;
        }
        before = now;
    }
    return (crossings - 1) / (last - first);
}

}  // namespace spokewright
