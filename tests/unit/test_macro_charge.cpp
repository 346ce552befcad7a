// SPDX-License-Identifier: MIT
// Sources: L. Brillouin, Phys. Rev. 67, 260 (1945): a hub of 4 kV at 0.18 T between 1.95 and 4.45 mm holds 3.20098e-7
// C/m (computed, as in test_theory.cpp). The capacitance of a coaxial line, 2 pi eps0 / ln(b / a), is in every
// handbook.
#include <doctest/doctest.h>

#include "pic/macro_charge.hpp"
#include "tests/relative_error.hpp"
#include "tests/smooth_bore.hpp"

using namespace spokewright;

namespace {

constexpr double kFigures = 1e-5;  // the references stand with six figures
constexpr double kRounding = 1e-14;

double charge(double voltage, double field, std::int64_t count = 20000) {
    Deck deck = smooth_bore(1.95e-3, 4.45e-3, voltage, field);  // 10 mm high
    deck.electrons.target_count = count;
    return macro_charge_of(deck);
}

}  // namespace

TEST_CASE("the hub's charge shared among the macro-electrons, negative") {
    CHECK(relative_error(charge(4000, 0.18), -3.20098e-7 * 10e-3 / 20000) < kFigures);
    CHECK(relative_error(charge(4000, 0.18, 40000), 0.5 * charge(4000, 0.18)) < kRounding);
    Deck high = smooth_bore(1.95e-3, 4.45e-3, 4000, 0.18);
    high.tube.axial_height = 30e-3;
    CHECK(relative_error(macro_charge_of(high), 3 * charge(4000, 0.18)) < kRounding);
}

TEST_CASE("the field's sign does not matter, its scale and table do") {
    CHECK(charge(4000, -0.18) == charge(4000, 0.18));
    Deck scaled = smooth_bore(1.95e-3, 4.45e-3, 4000, 0.09);
    scaled.magnet.field_scale = 2;
    CHECK(relative_error(macro_charge_of(scaled), charge(4000, 0.18)) < kRounding);
    Deck table = smooth_bore(1.95e-3, 4.45e-3, 4000, 0);
    table.magnet.table = {{0, 0.18}, {5e-3, 0.18}};
    CHECK(relative_error(macro_charge_of(table), charge(4000, 0.18)) < 1e-12);  // a mean over the area
}

TEST_CASE("where no hub can form, the charge on the electrodes of the empty tube") {
    // 67.42723 pF/m: Hull's voltage is 9.2 kV at 0.18 T.
    CHECK(relative_error(charge(12000, 0.18), -67.42723e-12 * 12000 * 10e-3 / 20000) < kFigures);
    CHECK(relative_error(charge(4000, 0), -67.42723e-12 * 4000 * 10e-3 / 20000) < kFigures);
}
