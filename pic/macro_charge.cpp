// SPDX-License-Identifier: MIT
#include "pic/macro_charge.hpp"

#include <cmath>

#include "diagnostics/theory.hpp"
#include "inputs/constants.hpp"

namespace spokewright {

double macro_charge_of(const Deck& deck) {
    const double r_c = deck.tube.cathode_radius;
    const double r_a = deck.tube.anode_radius;
    const double voltage = deck.supply.anode_voltage;
    const double field = std::abs(mean_field(deck));
    double charge = 2 * kPi * kVacuumPermittivity / std::log(r_a / r_c) * voltage;  // C/m
    if (field > 0 && voltage < hull_voltage_nonrelativistic(field, r_c, r_a)) {
        charge = brillouin_charge_per_length(field, r_c, brillouin_hub_radius(field, r_c, r_a, voltage));
    }
    return -charge * deck.tube.axial_height / static_cast<double>(deck.electrons.target_count);
}

}  // namespace spokewright
