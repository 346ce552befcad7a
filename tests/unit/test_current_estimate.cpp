// SPDX-License-Identifier: MIT
#include <doctest/doctest.h>

#include <cmath>

#include "diagnostics/cathode_laws.hpp"
#include "diagnostics/current_estimate.hpp"
#include "diagnostics/theory.hpp"
#include "inputs/constants.hpp"
#include "tests/relative_error.hpp"
#include "tests/unit/small_deck.hpp"

using namespace spokewright;

TEST_CASE("what the cathode gives: no limit, heat, a cap") {
    CHECK(std::isinf(cathode_supply(read_text(kSmallDeck))));
    const double area = 2 * kPi * 2e-3 * 10e-3;
    const double heat = thermionic_current_density(3e4, 1900, 2.63, 0);
    CHECK(relative_error(cathode_supply(read_text(kSmallDeck, {"cathode.emission=thermionic"})), heat * area) < 1e-12);
    CHECK(relative_error(cathode_supply(read_text(kSmallDeck, {"cathode.emission_limit_A_per_cm2=0.5"})),
                         0.5e4 * area) < 1e-12);
    CHECK(relative_error(cathode_supply(read_text(
                             kSmallDeck, {"cathode.emission=thermionic", "cathode.emission_limit_A_per_cm2=0.5"})),
                         0.5e4 * area) < 1e-12);  // the cap is below the heat's 1.1 A/cm^2
}

TEST_CASE("what the tube asks for: nothing, the hub's share, the space-charge limit") {
    CHECK(expected_current(read_text(kSmallDeck)) == 0);
    const double hub = brillouin_hub_relativistic(0.175, 2e-3, 4.6e-3, 4150).charge_per_length;
    CHECK(relative_error(expected_current(read_text(kSmallDeck + kCircuit)), 0.2 * hub * 10e-3 * 2.45e9) < 1e-12);
    CHECK(relative_error(expected_current(read_text(kSmallDeck + kCircuit, {"magnet.field_T=0.1"})),
                         space_charge_limited_current_per_length_relativistic(4150, 2e-3, 4.6e-3) * 10e-3) < 1e-12);
}
