// SPDX-License-Identifier: MIT
// Does the energy add up, and the charge? In: supply, priming, a generator's wave, kinetic energy of the emitted. Out:
// walls, load (the generator's reflected wave included), heat of anode and cathode. Stored: electrons in motion,
// space-charge field, resonators. The anode voltage's own static field is on neither side: the supply column holds only
// what it gives to the electrons.
#pragma once

#include <cstddef>

#include "diagnostics/record.hpp"

namespace spokewright {

/// Sums over a window, J.
struct EnergyBalance {
    double in = 0;
    double out = 0;
    double stored_change = 0;
    /// |in - out - stored_change| / in; 0 when nothing moved, infinite when something did without any input.
    double imbalance() const;
};

/// Between two rows of the record (first < last < samples). Throws std::out_of_range beyond them.
EnergyBalance energy_balance(const Record& record, std::size_t first, std::size_t last);

/// From an empty, silent tube to the last row. All zero without a row.
EnergyBalance energy_balance(const Record& record);

/// Largest difference seen at a sample between the electrons emitted less absorbed, those in the store and those on the
/// grid, as a charge in C. Zero, unless an electron went astray: all three are integers.
double charge_imbalance(const Record& record, double macro_charge);

}  // namespace spokewright
