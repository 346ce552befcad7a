// SPDX-License-Identifier: MIT
// How much charge one macro-electron carries.
#pragma once

#include "inputs/deck.hpp"

namespace spokewright {

/// C, negative: the Brillouin hub's charge at full voltage over electrons.target_count; where no hub can form (above
/// Hull cutoff, or without field) the charge that the voltage holds on the electrodes of the empty tube.
double macro_charge_of(const Deck& deck);

}  // namespace spokewright
