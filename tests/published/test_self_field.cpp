// SPDX-License-Identifier: MIT
// Source: Ampere's law: a long solenoidal sheet of K amperes a metre makes mu0 K inside and nothing outside
// (J. D. Jackson, Classical Electrodynamics (1998), ch. 5, from memory); Brillouin flow: L. Brillouin, Phys. Rev. 67,
// 260 (1945).
#include <doctest/doctest.h>

#include <cmath>
#include <vector>

#include "fields/magnet.hpp"
#include "tests/brillouin_hub.hpp"
#include "tests/published_row.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {
const PolarGrid kGrid{2e-3, 4e-3, 10e-3, 20, 8};
constexpr double kRounding = 1e-14;

Magnet uniform_magnet(double field) {
    MagnetSettings settings;
    settings.field = field;
    settings.self_field = true;
    return Magnet(settings, kGrid);
}
}  // namespace

TEST_CASE("a solenoidal sheet: mu0 K inside, half of it within the sheet, nothing outside") {
    Magnet magnet = uniform_magnet(0.2);
    std::vector<double> current(21, 0.0);
    current[12] = -5000;  // A/m; electrons that turn with +theta weaken the field
    magnet.set_self_field(current);
    for (std::size_t i = 0; i < 21; ++i) {
        const double inside = i < 12 ? 1 : i == 12 ? 0.5 : 0;
        CHECK(relative_error(magnet.self_field()[i], -inside * kVacuumPermeability * 5000) < kRounding);
        CHECK(relative_error(magnet.field()[i], 0.2 - inside * kVacuumPermeability * 5000) < kRounding);
    }
    CHECK(relative_error(magnet.self_field_share(), kVacuumPermeability * 5000 / 0.2) < kRounding);
}

TEST_CASE("a thick winding: B = mu0 J (r_a - r)") {
    Magnet magnet = uniform_magnet(0.2);
    std::vector<double> current(21, 1e6 * kGrid.dr());
    current.front() = current.back() = 0.5e6 * kGrid.dr();  // half cells
    magnet.set_self_field(current);
    for (int i = 1; i < 20; ++i) {
        const double exact = kVacuumPermeability * 1e6 * (4e-3 - kGrid.radius(i));
        CHECK(relative_error(magnet.self_field()[static_cast<std::size_t>(i)], exact) < 1e-12);  // sums of 20 terms
    }
}

TEST_CASE("self field of a Brillouin hub") {
    Deck deck = hub_deck();
    deck.magnet.self_field = true;
    deck.clock.step = 1e-13;  // the field is found after some steps, before anything has moved far
    InteractionSpace space(deck, 1);
    load_hub(space, deck);
    for (int k = 0; k < kSelfFieldEvery; ++k) {
        space.step();
    }
    // At the cathode the whole current lies outside: mu0 times the integral of e n v dr, by Simpson's rule.
    double integral = 0;
    const double width = kHubRadius - deck.tube.cathode_radius;
    for (int k = 0; k <= 200; ++k) {
        const double r = deck.tube.cathode_radius + width * k / 200;
        const double weight = k == 0 || k == 200 ? 1 : k % 2 == 1 ? 4 : 2;
        integral += weight * kElementaryCharge * hub_density(r) * hub_speed(r) * width / 600;
    }
    const double exact = kVacuumPermeability * integral / kHubField;
    MESSAGE("share " << space.view().self_field_share << ", theory " << exact);
    check_published({"self field of a Brillouin hub at the cathode over the applied field",
                     "Ampere's law on L. Brillouin, Phys. Rev. 67, 260 (1945), computed", exact,
                     space.view().self_field_share, 3e-3, "1e-4 is relativity; some 1e-3 is the loading"});
}
