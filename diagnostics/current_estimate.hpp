// SPDX-License-Identifier: MIT
// How much current the cathode can give and how much the tube will ask for, from closed forms: the start checks and the
// chart hold one against the other. SI units, at the deck's nominal voltage and mean field.
#pragma once

#include "inputs/deck.hpp"

namespace spokewright {

/// Share of the hub that reaches the anode each period: a trial run drew 0.2, a published pulsed tube about 1.
inline constexpr double kHubShareAPeriod = 0.2;

/// Primary emission of the whole cathode without a pulling field, A: Richardson-Dushman, or the deck's cap where that
/// is less. Infinity when only the space charge limits it.
double cathode_supply(const Deck& deck);

/// Anode current to expect, A: space-charge limited at and above the Hull voltage, below it kHubShareAPeriod of the hub
/// a period of the highest mode number; 0 in a tube that is cut off and has no modes. Good to a factor of a few.
double expected_current(const Deck& deck);

}  // namespace spokewright
