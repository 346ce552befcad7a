// SPDX-License-Identifier: MIT
#include "diagnostics/current_estimate.hpp"

#include <algorithm>
#include <limits>

#include "diagnostics/cathode_laws.hpp"
#include "diagnostics/theory.hpp"
#include "inputs/constants.hpp"

namespace spokewright {

double cathode_supply(const Deck& deck) {
    const CathodeSettings& cathode = deck.cathode;
    double density = std::numeric_limits<double>::infinity();
    if (cathode.emission == EmissionLaw::thermionic) {
        density =
            thermionic_current_density(cathode.richardson_constant, cathode.temperature, cathode.work_function, 0);
    }
    if (cathode.emission_limit > 0) density = std::min(density, cathode.emission_limit);
    return density * 2 * kPi * deck.tube.cathode_radius * deck.tube.axial_height;
}

double expected_current(const Deck& deck) {
    const double r_c = deck.tube.cathode_radius;
    const double r_a = deck.tube.anode_radius;
    const double height = deck.tube.axial_height;
    const double voltage = deck.supply.anode_voltage;
    const double field = mean_field(deck);
    if (voltage >= hull_voltage(field, r_c, r_a)) {
        return space_charge_limited_current_per_length_relativistic(voltage, r_c, r_a) * height;
    }
    if (deck.circuit.modes.empty()) return 0;
    const double charge = brillouin_hub_relativistic(field, r_c, r_a, voltage).charge_per_length * height;
    return kHubShareAPeriod * charge * deck.circuit.modes.back().frequency;
}

}  // namespace spokewright
