// SPDX-License-Identifier: MIT
// Source: C. D. Child (1911), I. Langmuir (1913): J = 2.3339519e-6 V^1.5 / d^2 (A/m^2, V, m); relativistic: H. Jory &
// A. Trivelpiece, J. Appl. Phys. 40, 3924 (1969). The planar limit of the coaxial diode, r_a / r_c = 1.01.
#include <doctest/doctest.h>

#include <cmath>

#include "tests/field_free_diode.hpp"
#include "tests/published_row.hpp"

using namespace spokewright;

namespace {

constexpr double kGap = 0.02e-3;  // m, at r_c = 2 mm

double planar_current(double voltage) {
    // Radius that the curved diode behaves by, from beta = g - 2/5 g^2, g = ln(r_a / r_c): r_c^0.2 r_a^0.8.
    const double radius = 2e-3 * std::pow(1.01, 0.8);
    return 2.3339519e-6 * std::pow(voltage, 1.5) / (kGap * kGap) * 2 * kPi * radius * 10e-3;
}

}  // namespace

TEST_CASE("planar limit of the space-charge-limited current") {
    const double current = simulated_limited_current(1.01, 100, 120, 1200);
    const double off = current / planar_current(100) - 1;
    MESSAGE("off by " << 100 * off << " %");
    check_published({"space-charge-limited current, planar limit (r_a/r_c = 1.01), A",
                     "C. D. Child (1911); I. Langmuir (1913)", planar_current(100), current, 2e-3,
                     "cells of 1/120, steps of 1/1200 of the flight"});
}

TEST_CASE("relativistic planar current over the non-relativistic one: 0.979909 at 100 kV, 0.936116 at 350 kV") {
    for (const auto& [voltage, ratio] : {std::pair{100e3, 0.979909}, std::pair{350e3, 0.936116}}) {
        const double current = simulated_limited_current(1.01, voltage, 120, 1200);
        MESSAGE("ratio " << current / planar_current(voltage));
        check_published({"relativistic over non-relativistic planar current at " +
                             std::to_string(static_cast<int>(voltage / 1e3)) + " kV",
                         "H. Jory & A. Trivelpiece, J. Appl. Phys. 40, 3924 (1969), computed", ratio,
                         current / planar_current(voltage), 2e-3, "cells of 1/120, steps of 1/1200 of the flight"});
    }
}
