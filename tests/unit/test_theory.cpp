// SPDX-License-Identifier: MIT
// Sources: S. Y. Liao, Microwave Devices and Circuits; G. S. Raghuvanshi, Microwave Engineering; M. Kulkarni, Microwave
// and Radar Engineering; I. Langmuir & K. B. Blodgett, Phys. Rev. 22, 347 (1923); others beside each check.
#include <doctest/doctest.h>

#include <cmath>
#include <initializer_list>

#include "diagnostics/theory.hpp"
#include "inputs/constants.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {
constexpr double kRounding = 1e-5;  // the reference values stand with six or more figures, CODATA
constexpr double kTextbook = 1e-3;  // the books round e / m to 1.759e11 or 1.76e11
}  // namespace

TEST_CASE("Hull cutoff: the printed textbook examples") {
    CHECK(relative_error(cyclotron_frequency(0.336), 5.91e10) < kTextbook);  // Liao, example 10-1-1
    CHECK(relative_error(hull_field_nonrelativistic(26e3, 0.05, 0.10), 14.499e-3) < kTextbook);
    CHECK(relative_error(hull_voltage_nonrelativistic(0.0336, 0.05, 0.10), 139.709e3) < kTextbook);  // Raghuvanshi 7.2
    CHECK(relative_error(hull_field_nonrelativistic(25e3, 0.05, 0.10), 14.213e-3) < kTextbook);
    CHECK(relative_error(hull_voltage_nonrelativistic(0.035, 0.04, 0.08), 97.0e3) < kTextbook);  // Raghuvanshi 7.3
    CHECK(relative_error(hull_field_nonrelativistic(25e3, 0.04, 0.08), 17.767e-3) < kTextbook);
    CHECK(relative_error(hull_voltage_nonrelativistic(1.2e-3, 0.15, 0.45), 5.066e3) < kTextbook);  // Kulkarni 8.8
    CHECK(relative_error(hull_field_nonrelativistic(6e3, 0.15, 0.45), 1.305953e-3) < kTextbook);
}

TEST_CASE("Hull cutoff: CODATA, relativistic (R. V. Lovelace & E. Ott, 1974; computed)") {
    CHECK(relative_error(hull_voltage(0.336, 0.05, 0.10), 3300.79e3) < kRounding);
    CHECK(relative_error(hull_field(26e3, 0.05, 0.10), 14.68300e-3) < kRounding);
    CHECK(relative_error(hull_voltage(0.0336, 0.05, 0.10), 124.4586e3) < kRounding);
    CHECK(relative_error(hull_field(25e3, 0.04, 0.08), 17.98875e-3) < kRounding);
    CHECK(relative_error(hull_voltage(1.2e-3, 0.15, 0.45), 5.04054e3) < kRounding);
    // Geometry of A. Palevsky & G. Bekefi, Phys. Fluids 22, 986 (1979).
    CHECK(relative_error(hull_field(350e3, 1.58e-2, 2.11e-2), 0.49877) < kRounding);
    // Each is the other's inverse to rounding, also where gamma - 1 is tiny.
    for (const double voltage : {1.0, 4e3, 1e6}) {
        CHECK(relative_error(hull_voltage(hull_field(voltage, 2e-3, 4e-3), 2e-3, 4e-3), voltage) < 1e-13);
    }
}

TEST_CASE("Buneman-Hartree thresholds (J. C. Slater in Collins (1948); computed from the published formulas)") {
    struct Row {
        double r_c, r_a;
        int n;
        double f, field, v0, hull_nr, hull, hartree_nr, hartree;
    };
    const Row rows[] = {{1.95e-3, 4.45e-3, 5, 2.45e9, 0.16, 533.6, 7276.0, 7224.9, 3407.2, 3406.9},
                        {1.95e-3, 4.45e-3, 5, 2.45e9, 0.20, 533.6, 11368.7, 11245.0, 4392.4, 4392.1},
                        {3e-3, 8e-3, 4, 2.8e9, 0.19, 3519.5, 37513, 36229, 19461, 19449},
                        {15.8e-3, 21.1e-3, 6, 4.6e9, 0.72, 29369, 979120, 612290, 309781, 308884}};
    constexpr double kPrinted = 1e-4;  // four to five figures
    for (const Row& row : rows) {
        CHECK(relative_error(synchronous_voltage(row.r_a, row.n, row.f), row.v0) < kPrinted);
        CHECK(relative_error(hull_voltage_nonrelativistic(row.field, row.r_c, row.r_a), row.hull_nr) < kPrinted);
        CHECK(relative_error(hull_voltage(row.field, row.r_c, row.r_a), row.hull) < kPrinted);
        CHECK(relative_error(hartree_voltage_nonrelativistic(row.field, row.r_c, row.r_a, row.n, row.f),
                             row.hartree_nr) < kPrinted);
        CHECK(relative_error(hartree_voltage(row.field, row.r_c, row.r_a, row.n, row.f), row.hartree) < kPrinted);
    }
    CHECK(std::isnan(hartree_voltage(0.2, 0.1, 0.2, 1, 1e9)));  // 4 c at the anode
    // Tangent at (B0, V0): V_BH / V0 = 2 B / B0 - 1 meets the Hull parabola.
    const double wave = 2 * kPi * 2.45e9 / 5;
    const double b0 = 2 * kElectronMass * wave / (kElementaryCharge * (1 - std::pow(1.95 / 4.45, 2)));
    CHECK(relative_error(hartree_voltage_nonrelativistic(b0, 1.95e-3, 4.45e-3, 5, 2.45e9),
                         hull_voltage_nonrelativistic(b0, 1.95e-3, 4.45e-3)) < 1e-12);  // rounding
}

TEST_CASE("Brillouin hub of 4 kV at 0.18 T, 1.95/4.45 mm (computed; L. Brillouin, Phys. Rev. 67, 260 (1945))") {
    const double r_c = 1.95e-3, r_a = 4.45e-3, field = 0.18;
    const double r_b = brillouin_hub_radius(field, r_c, r_a, 4000);
    CHECK(relative_error(r_b, 2.51492e-3) < kRounding);
    CHECK(relative_error(brillouin_voltage(field, r_c, r_a, r_b), 4000) < 1e-10);  // the root itself
    CHECK(relative_error(brillouin_density(field, r_c, r_c), 3.14923e17) < kRounding);
    CHECK(relative_error(brillouin_density(field, r_c, r_b), 2.14375e17) < kRounding);
    CHECK(relative_error(brillouin_charge_per_length(field, r_c, r_b), 3.20098e-7) < kRounding);
    // A full gap is Hull cutoff.
    CHECK(relative_error(brillouin_voltage(field, r_c, r_a, r_a), hull_voltage_nonrelativistic(field, r_c, r_a)) <
          1e-12);
    CHECK(brillouin_hub_radius(field, r_c, r_a, 20e3) == r_a);
    CHECK(relative_error(brillouin_hub_radius(field, r_c, r_a, 1e-3), r_c) < 1e-3);  // hardly any hub
}

TEST_CASE("Langmuir-Blodgett beta^2 (1923 table, and an independent integration of its equation)") {
    const double ratio[] = {1.1, 2, 3, 4, 5, 10, 20};
    const double beta_squared[] = {0.008419, 0.279267, 0.517047, 0.667089, 0.766620, 0.978186, 1.071499};
    for (int k = 0; k < 7; ++k) {
        const double tolerance = 0.6e-6 / beta_squared[k];  // the last figure of the reference, rounded
        CHECK(relative_error(langmuir_blodgett_beta_squared(ratio[k]), beta_squared[k]) < tolerance);
    }
    CHECK(relative_error(langmuir_blodgett_beta_squared(41.5), 1.094667) < 1e-6);  // its maximum
}

TEST_CASE("space-charge-limited currents") {
    // C. D. Child (1911): 2.3339519e-6 A V^-3/2.
    CHECK(relative_error(child_langmuir_current_density(1, 1), 2.3339519e-6) < 1e-7);
    CHECK(relative_error(child_langmuir_current_density(4000, 2e-3), 2.3339519e-6 * std::pow(4000, 1.5) / 4e-6) < 1e-7);
    // The planar limit: a thin gap on a thick cathode, to first order in gap / radius.
    const double r_c = 1, gap = 1e-4;
    const double planar = 2 * kPi * r_c * child_langmuir_current_density(4000, gap);
    CHECK(relative_error(space_charge_limited_current_per_length(4000, r_c, r_c + gap), planar) < gap);
}

TEST_CASE("relativistic space-charge-limited current: planar limit (H. Jory & A. Trivelpiece, 1969), slow limit") {
    const double r_c = 1, r_a = 1 + 1e-6;
    const auto ratio = [&](double voltage) {
        return space_charge_limited_current_per_length_relativistic(voltage, r_c, r_a) /
               space_charge_limited_current_per_length(voltage, r_c, r_a);
    };
    CHECK(relative_error(ratio(100e3), 0.979909) < 3e-6);  // six figures, a gap of 1e-6 of the radius, the integration
    CHECK(relative_error(ratio(350e3), 0.936116) < 3e-6);
    // Slow electrons: Langmuir and Blodgett, less (3/28) e V / m c^2, 2e-7 at 1 V.
    for (const double anode : {1.1, 2.3, 20.0}) {
        CHECK(relative_error(space_charge_limited_current_per_length_relativistic(1, 1, anode),
                             space_charge_limited_current_per_length(1, 1, anode)) < 2e-6);
    }
    // In a cylinder the loss differs from the plane's, but it is one.
    const double round = space_charge_limited_current_per_length_relativistic(350e3, 1, 2.3) /
                         space_charge_limited_current_per_length(350e3, 1, 2.3);
    CHECK(round < 0.97);
    CHECK(round > 0.90);
}

TEST_CASE("relativistic Brillouin hub: the slow limit and the edge cases") {
    const double r_c = 2e-3, r_a = 4.6e-3;
    const BrillouinHub slow = brillouin_hub(1e-3, r_c, r_a, 0.1);
    const BrillouinHub hub = brillouin_hub_relativistic(1e-3, r_c, r_a, 0.1);
    CHECK(relative_error(hub.radius, slow.radius) < 1e-6);  // 0.1 V of 511 kV
    CHECK(relative_error(hub.edge_speed, slow.edge_speed) < 1e-6);
    CHECK(relative_error(hub.charge_per_length, slow.charge_per_length) < 1e-6);
    CHECK(brillouin_hub_relativistic(0.1, r_c, r_a, 10e3).radius == r_a);  // above Hull, 3.05 kV
    CHECK(relative_error(
              brillouin_voltage_relativistic(0.175, r_c, r_a, brillouin_hub_relativistic(0.175, r_c, r_a, 4150).radius),
              4150) < 1e-10);  // the root itself
}

TEST_CASE("waves faster than light have no synchronous electron") {
    CHECK(std::isnan(synchronous_voltage_relativistic(0.2, 1, 1e9)));
    CHECK(std::isnan(synchronous_field_relativistic(0.1, 0.2, 1, 1e9)));
    // (gamma - 1) m c^2 = (3/4) beta^2 above m v^2 / 2, to first order.
    const double beta = 2 * kPi * 2.45e9 / 5 * 4.45e-3 / kLightSpeed;
    const double excess =
        synchronous_voltage_relativistic(4.45e-3, 5, 2.45e9) / synchronous_voltage(4.45e-3, 5, 2.45e9) - 1;
    CHECK(relative_error(excess, 0.75 * beta * beta) < 2 * beta * beta);  // the next order
}

TEST_CASE("speed and gamma of an electron, static fields, efficiency bounds") {
    CHECK(relative_error(electron_gamma(510998.95), 2) < 1e-9);  // CODATA
    CHECK(relative_error(electron_speed(510998.95), std::sqrt(0.75) * kLightSpeed) < 1e-9);
    CHECK(relative_error(electron_speed(1), std::sqrt(2 * kElementaryCharge / kElectronMass)) <
          2e-6);  // 3/4 of 1/511000
    CHECK(relative_error(static_field_error(electrical_radius(kLightSpeed / (2 * kPi), 0.5), 4), 0.0125) < 1e-12);
    CHECK(relative_error(drift_efficiency_bound(4000, 500), 0.875) < 1e-12);
    CHECK(relative_error(cycloid_efficiency_bound(4000, 500), 0.75) < 1e-12);
}
