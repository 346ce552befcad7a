// SPDX-License-Identifier: MIT
// Source: A. W. Hull, Phys. Rev. 18, 31 (1921); relativistic: R. V. Lovelace & E. Ott, Phys. Fluids 17, 1263 (1974).
// Electrons that leave a smooth cathode at rest, too few to change the field: below the cutoff field all of them reach
// the anode, above it none does.
#include <doctest/doctest.h>
#include <fmt/format.h>

#include "diagnostics/theory.hpp"
#include "tests/published_row.hpp"
#include "tests/relative_error.hpp"
#include "tests/smooth_bore.hpp"

using namespace spokewright;

namespace {

struct Flight {
    std::int64_t emitted = 0, arrived = 0, returned = 0;

    void count(const Tally& tally) {
        emitted += tally.primaries;
        arrived += tally.anode_hits;
        returned += tally.cathode_hits;
    }
    double transmitted() const { return static_cast<double>(arrived) / static_cast<double>(emitted); }
};

/// A thousand electrons or so, until the last has landed or has had 5 ns: above cutoff an electron from rest comes back
/// to the cathode with no speed, and some only touch it and set out again.
Flight fly(Deck deck) {
    deck.electrons.target_count = 4'000'000;  // a thousand of them are 2.5e-4 of the hub's charge
    deck.cathode.emission_limit = 100;        // A/m^2: some ten a step at 4 kV, one in two steps at 350 kV
    Flight flight;
    InteractionSpace emitting(deck, 1);
    while (flight.emitted < 1000) {
        flight.count(emitting.step());
    }
    InteractionSpace rest(silent(deck), 1);
    rest.restore(emitting.save());
    for (int k = 0; k < 5000 && flight.arrived + flight.returned < flight.emitted; ++k) {
        flight.count(rest.step());
    }
    return flight;
}

void check_cutoff(double r_c, double r_a, double voltage, double cutoff) {
    // Required: one percent of field on either side decides over all but one percent of the electrons.
    const Flight below = fly(smooth_bore(r_c, r_a, voltage, 0.99 * cutoff));
    MESSAGE("at 0.99 B_H " << below.transmitted() << " of " << below.emitted << " reach the anode");
    const std::string source =
        "A. W. Hull, Phys. Rev. 18, 31 (1921); R. V. Lovelace & E. Ott, Phys. Fluids 17, 1263 (1974)";
    const std::string tube = fmt::format("{}/{} mm at {} kV", 1e3 * r_c, 1e3 * r_a, 1e-3 * voltage);
    check_published({"share of a dilute flow that reaches the anode at 0.99 B_H, " + tube, source, 1,
                     below.transmitted(), 0.01, "required: one per cent of field decides"});
    const Flight above = fly(smooth_bore(r_c, r_a, voltage, 1.01 * cutoff));
    MESSAGE("at 1.01 B_H " << above.transmitted() << " of " << above.emitted << " reach the anode");
    check_published({"share of a dilute flow that reaches the anode at 1.01 B_H, " + tube, source, 0,
                     above.transmitted(), 0.01, "required"});
}

}  // namespace

TEST_CASE("dilute Hull cutoff: 1.95/4.45 mm at 4 kV") {
    check_cutoff(1.95e-3, 4.45e-3, 4e3, hull_field(4e3, 1.95e-3, 4.45e-3));
}

TEST_CASE("dilute Hull cutoff, relativistic: 1.58/2.11 cm at 350 kV") {
    const double cutoff = 0.49877;  // T; geometry of A. Palevsky & G. Bekefi, Phys. Fluids 22, 986 (1979), computed
    CHECK(relative_error(hull_field(350e3, 1.58e-2, 2.11e-2), cutoff) < 1e-5);  // five figures
    check_cutoff(1.58e-2, 2.11e-2, 350e3, cutoff);
}
