// SPDX-License-Identifier: MIT
// Source: A. W. Hull, Phys. Rev. 18, 31 (1921): the cutoff field is the same with any space charge; the current without
// field is that of I. Langmuir & K. B. Blodgett, Phys. Rev. 22, 347 (1923).
#include <doctest/doctest.h>

#include "diagnostics/theory.hpp"
#include "tests/published_row.hpp"
#include "tests/smooth_bore.hpp"

using namespace spokewright;

namespace {

/// Mean anode current of the last 5 of 20 ns over the space-charge-limited current without field.
double share_of_limited_current(double field_over_cutoff) {
    const double r_c = 1.95e-3, r_a = 4.45e-3, voltage = 4100;
    Deck deck = smooth_bore(r_c, r_a, voltage, field_over_cutoff * hull_field(voltage, r_c, r_a));
    deck.supply.programme = {{0, 0}, {2e-9, 1}};
    deck.cathode.launch_temperature = 0.1;
    deck.clock.step = 2e-12;
    deck.electrons.target_count = 10000;
    InteractionSpace space(deck, 1);
    double charge = 0;
    for (int k = 1; k <= 10000; ++k) {
        const double moved = space.step().induced_charge;
        charge += k > 7500 ? moved : 0;
    }
    const double limited = space_charge_limited_current_per_length(voltage, r_c, r_a) * deck.tube.axial_height;
    return charge / 5e-9 / limited;
}

}  // namespace

TEST_CASE("Hull cutoff with full space charge: 1.95/4.45 mm at 4.1 kV, 0.1 eV") {
    // Required: three percent of field on either side decide.
    const double above = share_of_limited_current(1.03);
    MESSAGE("at 1.03 B_H " << above << " of the limited current");
    check_published({"anode current with full space charge at 1.03 B_H over the limited current without field",
                     "A. W. Hull, Phys. Rev. 18, 31 (1921)", 0, above, 0.01, "required; some noise gets across"});
    const double below = share_of_limited_current(0.97);
    MESSAGE("at 0.97 B_H " << below << " of the limited current");
    CHECK(below > 0.5);
    CHECK(below < 1.0);
}
