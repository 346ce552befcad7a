// SPDX-License-Identifier: MIT
// Source: L. Brillouin, Phys. Rev. 67, 260 (1945): the laminar hub below a smooth anode, v = (omega_c / 2)(r - r_c^2 / r) and
// n = (eps0 m omega_c^2 / 2 e^2)(1 + (r_c / r)^4), is an equilibrium: laid in, it stays.
#include <doctest/doctest.h>

#include <algorithm>
#include <cmath>
#include <vector>

#include "tests/brillouin_hub.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {

struct Ring {
    double share = 0, speed = 0, radius = 0;  // of all electrons; means
};

/// The hub in `count` rings of equal width, and the radius within which `kCore` of its charge lies.
std::vector<Ring> rings(const ElectronSnapshot& electrons, std::size_t count) {
    std::vector<Ring> found(count);
    for (std::size_t p = 0; p < electrons.radius.size(); ++p) {
        const double r = static_cast<double>(electrons.radius[p]);
        const double place = (r - kHubCathode) / (kHubRadius - kHubCathode) * static_cast<double>(count);
        if (place >= static_cast<double>(count)) continue;
        Ring& ring = found[static_cast<std::size_t>(place)];
        ring.share += 1;
        ring.speed += static_cast<double>(electrons.u_theta[p]);
        ring.radius += r;
    }
    for (Ring& ring : found) {
        ring.speed /= ring.share;
        ring.radius /= ring.share;
        ring.share /= static_cast<double>(electrons.radius.size());
    }
    return found;
}

constexpr double kHeld = 0.02;  // the bound of the brief

}  // namespace

TEST_CASE("a Brillouin hub keeps radius, density and rotation over ten turns of its edge") {
    const Deck deck = hub_deck();
    InteractionSpace space(deck, 1);
    load_hub(space, deck);
    CHECK(relative_error(-space.macro_charge() * 40000 / 10e-3, kHubCharge) < 1e-5);  // six figures
    const double turn = 2 * kPi * kHubRadius / hub_speed(kHubRadius);
    std::int64_t hits = 0;
    while (space.time() < 10 * turn) {
        const Tally& tally = space.step();
        hits += tally.anode_hits + tally.cathode_hits;
    }
    const ElectronSnapshot electrons = space.electrons();
    MESSAGE(space.time() << " s, lost " << hits << " of 40000");
    CHECK(static_cast<double>(hits) / 40000 < kHeld);

    std::vector<float> sorted = electrons.radius;
    std::sort(sorted.begin(), sorted.end());
    const double edge = static_cast<double>(sorted[sorted.size() * 99 / 100]);
    MESSAGE("99 % of the charge within " << edge << " m, share there by theory " << hub_share(edge));
    CHECK(relative_error(hub_share(edge), 0.99) < kHeld);
    CHECK(relative_error(edge, kHubRadius) < kHeld);

    const std::vector<Ring> found = rings(electrons, 8);
    for (std::size_t k = 0; k < 8; ++k) {
        const double width = (kHubRadius - kHubCathode) / 8;
        const double inner = kHubCathode + width * static_cast<double>(k);
        const double share = hub_share(inner + width) - hub_share(inner);
        MESSAGE("ring " << k << ": density " << found[k].share / share << ", speed "
                        << found[k].speed / hub_speed(found[k].radius));
        CHECK(relative_error(found[k].share, share) < kHeld);
        CHECK(std::abs(found[k].speed - hub_speed(found[k].radius)) < kHeld * hub_speed(kHubRadius));
    }
}
