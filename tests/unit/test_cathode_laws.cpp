// SPDX-License-Identifier: MIT
// Sources: S. Dushman & J. W. Ewald, Phys. Rev. 29, 857 (1927); W. Schottky (1914); J. R. M. Vaughan, IEEE Trans.
// Electron Devices 36, 1963 (1989) and 40, 830 (1993).
#include <doctest/doctest.h>

#include <cmath>

#include "diagnostics/cathode_laws.hpp"
#include "inputs/constants.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

TEST_CASE("thermionic emission of tungsten and thoriated tungsten") {
    constexpr double kFigures = 1e-3;  // the references stand with four figures
    CHECK(relative_error(thermionic_current_density(60.2e4, 2500, 4.52, 0), 2908) < kFigures);
    CHECK(relative_error(thermionic_current_density(3.0e4, 1900, 2.63, 0), 1.144e4) < kFigures);
    CHECK(relative_error(thermionic_current_density(3.0e4, 2000, 2.63, 0), 2.831e4) < kFigures);
    CHECK(thermionic_current_density(3.0e4, 0, 2.63, 0) == 0);
}

TEST_CASE("a pulling field lowers the work function after Schottky, a holding one does nothing") {
    const double cold = thermionic_current_density(3.0e4, 1900, 2.63, 0);
    // sqrt(e E / 4 pi eps0) at 1 MV/m is 37.947 mV, a number of every electron-emission text (from memory).
    const double lowered = thermionic_current_density(3.0e4, 1900, 2.63, 1e6);
    const double lowering = std::log(lowered / cold) * kBoltzmann * 1900 / kElementaryCharge;
    CHECK(relative_error(lowering, 37.947e-3) < 2e-5);  // five figures
    CHECK(thermionic_current_density(3.0e4, 1900, 2.63, -1e6) == cold);
}

TEST_CASE("Vaughan's yield of a surface with delta_max 1.4 at 650 eV (computed from the published law)") {
    const SecondarySurface surface{1.4, 650, 1};
    const double energy[] = {50, 100, 200, 650, 1000, 3000};
    const double yield[] = {0.4853, 0.7464, 1.0475, 1.4, 1.3615, 0.9173};
    for (int k = 0; k < 6; ++k) {
        CHECK(relative_error(secondary_yield(surface, energy[k], 0), yield[k]) < 1.1e-4);  // four figures
    }
    CHECK(secondary_yield(surface, 12.5, 0) == 0);
    CHECK(secondary_yield(surface, 0, 1) == 0);
    // The two branches meet at v = 3.6 to the rounding of the published 1.125.
    const double join = 12.5 + 3.6 * (650 - 12.5);
    CHECK(relative_error(secondary_yield(surface, join * 1.000001, 0), secondary_yield(surface, join, 0)) < 5e-3);
}

TEST_CASE("grazing impact raises the yield and its energy, a rough surface does not") {
    const double angle = kPi / 3;
    const double growth = 1 + angle * angle / (2 * kPi);
    CHECK(relative_error(secondary_yield({1.4, 650, 1}, 650 * growth, angle), 1.4 * growth) < 1e-12);  // the maximum
    CHECK(secondary_yield({1.4, 650, 0}, 650, angle) == secondary_yield({1.4, 650, 0}, 650, 0));
}
