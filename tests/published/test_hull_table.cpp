// SPDX-License-Identifier: MIT
// Source: A. W. Hull, Phys. Rev. 18, 31 (1921), as printed in S. Y. Liao, Microwave Devices and Circuits; G. S.
// Raghuvanshi, Microwave Engineering; M. Kulkarni, Microwave and Radar Engineering (title from memory). Relativistic:
// R. V. Lovelace & E. Ott, Phys. Fluids 17, 1263 (1974) (from memory), computed.
#include <doctest/doctest.h>

#include <string>

#include "diagnostics/theory.hpp"
#include "tests/published_row.hpp"

using namespace spokewright;

namespace {

const std::string kLiao = "S. Y. Liao, Microwave Devices and Circuits, example 10-1-1";
const std::string kRaghuvanshi2 = "G. S. Raghuvanshi, Microwave Engineering, example 7.2";
const std::string kRaghuvanshi3 = "G. S. Raghuvanshi, Microwave Engineering, example 7.3";
const std::string kKulkarni = "M. Kulkarni, Microwave and Radar Engineering, example 8.8 (title from memory)";
const std::string kComputed = "A. W. Hull, Phys. Rev. 18, 31 (1921), CODATA, computed";
const std::string kRelativistic = "R. V. Lovelace & E. Ott, Phys. Fluids 17, 1263 (1974) (from memory), computed";

/// The books round e / m to 1.759e11 or 1.76e11 C/kg and print three to seven figures.
void printed(const std::string& check, const std::string& source, double published, double ours) {
    check_published({check, source, published, ours, 1e-3, "the book rounds e / m"});
}

void computed(const std::string& check, const std::string& source, double published, double ours, double tolerance) {
    check_published({check, source, published, ours, tolerance, "half a unit of the last figure given"});
}

}  // namespace

TEST_CASE("Hull cutoff of textbooks, as printed") {
    printed("cyclotron frequency at 0.336 T, rad/s", kLiao, 5.91e10, cyclotron_frequency(0.336));
    printed("Hull field, 5/10 cm, 26 kV, T", kLiao, 14.499e-3, hull_field_nonrelativistic(26e3, 0.05, 0.10));
    printed("Hull voltage, 5/10 cm, 0.0336 T, V", kRaghuvanshi2, 139.709e3,
            hull_voltage_nonrelativistic(0.0336, 0.05, 0.10));
    printed("Hull field, 5/10 cm, 25 kV, T", kRaghuvanshi2, 14.213e-3, hull_field_nonrelativistic(25e3, 0.05, 0.10));
    printed("Hull field, 4/8 cm, 25 kV, T", kRaghuvanshi3, 17.767e-3, hull_field_nonrelativistic(25e3, 0.04, 0.08));
    printed("Hull voltage, 4/8 cm, 0.035 T, V", kRaghuvanshi3, 97.0e3, hull_voltage_nonrelativistic(0.035, 0.04, 0.08));
    printed("Hull voltage, 15/45 cm, 1.2 mT, V", kKulkarni, 5.066e3, hull_voltage_nonrelativistic(1.2e-3, 0.15, 0.45));
    printed("Hull field, 15/45 cm, 6 kV, T", kKulkarni, 1.305953e-3, hull_field_nonrelativistic(6e3, 0.15, 0.45));
}

TEST_CASE("the same with CODATA constants") {
    const auto row = [](const char* check, double published, double ours) {
        computed(check, kComputed, published, ours, 5e-7);  // seven figures
    };
    row("Hull voltage, 5/10 cm, 0.336 T, CODATA, V", 13961.51e3, hull_voltage_nonrelativistic(0.336, 0.05, 0.10));
    row("Hull field, 5/10 cm, 26 kV, CODATA, T", 14.49972e-3, hull_field_nonrelativistic(26e3, 0.05, 0.10));
    row("Hull voltage, 5/10 cm, 0.0336 T, CODATA, V", 139.61513e3, hull_voltage_nonrelativistic(0.0336, 0.05, 0.10));
    row("Hull field, 5/10 cm, 25 kV, CODATA, T", 14.21815e-3, hull_field_nonrelativistic(25e3, 0.05, 0.10));
    row("Hull field, 4/8 cm, 25 kV, CODATA, T", 17.77269e-3, hull_field_nonrelativistic(25e3, 0.04, 0.08));
    row("Hull voltage, 4/8 cm, 0.035 T, CODATA, V", 96.95495e3, hull_voltage_nonrelativistic(0.035, 0.04, 0.08));
    // Worked out to 28 digits: 1.30602030 mT.
    row("Hull field, 15/45 cm, 6 kV, CODATA, T", 1.306020e-3, hull_field_nonrelativistic(6e3, 0.15, 0.45));
    computed("Hull voltage, 15/45 cm, 1.2 mT, CODATA, V", kComputed, 5.06540e3,
             hull_voltage_nonrelativistic(1.2e-3, 0.15, 0.45), 1e-6);
}

TEST_CASE("the same with relativistic electrons") {
    const auto row = [](const char* check, double published, double ours, double tolerance = 1.6e-6) {
        computed(check, kRelativistic, published, ours, tolerance);  // six figures
    };
    row("relativistic Hull voltage, 5/10 cm, 0.336 T, V", 3300.79e3, hull_voltage(0.336, 0.05, 0.10));
    row("relativistic Hull field, 5/10 cm, 26 kV, T", 14.68300e-3, hull_field(26e3, 0.05, 0.10));
    row("relativistic Hull voltage, 5/10 cm, 0.0336 T, V", 124.4586e3, hull_voltage(0.0336, 0.05, 0.10));
    row("relativistic Hull field, 5/10 cm, 25 kV, T", 14.39100e-3, hull_field(25e3, 0.05, 0.10));
    row("relativistic Hull field, 4/8 cm, 25 kV, T", 17.98875e-3, hull_field(25e3, 0.04, 0.08));
    row("relativistic Hull voltage, 4/8 cm, 0.035 T, V", 89.17410e3, hull_voltage(0.035, 0.04, 0.08));
    row("relativistic Hull voltage, 15/45 cm, 1.2 mT, V", 5.04054e3, hull_voltage(1.2e-3, 0.15, 0.45));
    row("relativistic Hull field, 15/45 cm, 6 kV, T", 1.30985e-3, hull_field(6e3, 0.15, 0.45), 4e-6);
    row("relativistic Hull field, 1.58/2.11 cm, 350 kV, T", 0.49877, hull_field(350e3, 1.58e-2, 2.11e-2), 1.1e-5);
}
