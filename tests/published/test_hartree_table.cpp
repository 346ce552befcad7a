// SPDX-License-Identifier: MIT
// Source: J. C. Slater; A. M. Clogston in G. B. Collins (ed.), Microwave Magnetrons, MIT Radiation Laboratory Series 6
// (1948) (from memory); relativistic: Y. Y. Lau et al., Phys. Plasmas 17, 033102 (2010). Values computed from the
// formulas.
#include <doctest/doctest.h>
#include <fmt/format.h>

#include <cmath>
#include <string>

#include "diagnostics/theory.hpp"
#include "tests/published_row.hpp"

using namespace spokewright;

namespace {

const std::string kSlater = "J. C. Slater in G. B. Collins (ed.), Microwave Magnetrons (1948) (from memory), computed";
const std::string kClogston = "A. M. Clogston in G. B. Collins (ed.), Microwave Magnetrons (1948) (from memory)";
const std::string kLau = "Y. Y. Lau et al., Phys. Plasmas 17, 033102 (2010), computed";
const std::string kHull = "A. W. Hull, Phys. Rev. 18, 31 (1921), computed";
const std::string kLovelace = "R. V. Lovelace & E. Ott, Phys. Fluids 17, 1263 (1974) (from memory), computed";

struct Tube {
    double r_c, r_a;
    int n;
    double f, field, v0, hull, hull_rel, hartree, hartree_rel;
};

// V0 of the first tube is given once, for both fields.
const Tube kTubes[] = {{1.95e-3, 4.45e-3, 5, 2.45e9, 0.16, 533.6, 7276.0, 7224.9, 3407.2, 3406.9},
                       {1.95e-3, 4.45e-3, 5, 2.45e9, 0.20, 533.6, 11368.7, 11245.0, 4392.4, 4392.1},
                       {3e-3, 8e-3, 4, 2.8e9, 0.19, 3519.5, 37513, 36229, 19461, 19449},
                       {15.8e-3, 21.1e-3, 6, 4.6e9, 0.72, 29369, 979120, 612290, 309781, 308884}};

}  // namespace

TEST_CASE("Hartree and Hull voltages of three tubes") {
    for (const Tube& t : kTubes) {
        const std::string tube =
            fmt::format("{:g}/{:g} mm, n = {}, {:g} GHz, {:g} T", 1e3 * t.r_c, 1e3 * t.r_a, t.n, 1e-9 * t.f, t.field);
        const auto row = [&](const char* what, const std::string& source, double published, double ours) {
            check_published({fmt::format("{}, {}, V", what, tube), source, published, ours, 1e-4,
                             "half a unit of the last of four figures, the fewest given"});
        };
        row("synchronous voltage V0", kSlater, t.v0, synchronous_voltage(t.r_a, t.n, t.f));
        row("Hull voltage", kHull, t.hull, hull_voltage_nonrelativistic(t.field, t.r_c, t.r_a));
        row("relativistic Hull voltage", kLovelace, t.hull_rel, hull_voltage(t.field, t.r_c, t.r_a));
        row("Hartree voltage", kSlater, t.hartree, hartree_voltage_nonrelativistic(t.field, t.r_c, t.r_a, t.n, t.f));
        row("relativistic Hartree voltage", kLau, t.hartree_rel, hartree_voltage(t.field, t.r_c, t.r_a, t.n, t.f));
    }
}

TEST_CASE("V0 in volts by the wavelength: 253000 (2 pi r_a / n lambda)^2") {
    const Tube& t = kTubes[2];
    const double turns = electrical_radius(t.r_a, t.f) / t.n;
    check_published({"synchronous voltage V0 over 253000 (2 pi r_a / n lambda)^2 V", kClogston, 1,
                     synchronous_voltage(t.r_a, t.n, t.f) / (253000 * turns * turns), 1.2e-2,
                     "253 kV stands for m c^2 / 2 e = 255.5 kV"});
}

TEST_CASE("normal form: V_BH / V0 = 2 B / B0 - 1 and V_H / V0 = (B / B0)^2") {
    for (const Tube& t : kTubes) {
        const double share = t.field / synchronous_field(t.r_c, t.r_a, t.n, t.f);
        const double v0 = synchronous_voltage(t.r_a, t.n, t.f);
        const auto row = [&](const char* what, double published, double ours) {
            check_published({fmt::format("{} at B / B0 = {:.3f}", what, share), kClogston, published, ours, 1e-12,
                             "an identity, to rounding"});
        };
        row("Hartree voltage / V0", 2 * share - 1,
            hartree_voltage_nonrelativistic(t.field, t.r_c, t.r_a, t.n, t.f) / v0);
        row("Hull voltage / V0", share * share, hull_voltage_nonrelativistic(t.field, t.r_c, t.r_a) / v0);
    }
}

TEST_CASE("relativistic, the Hartree line touches the Hull curve at B0, V0") {
    const Tube& t = kTubes[3];
    const double field = synchronous_field_relativistic(t.r_c, t.r_a, t.n, t.f);
    const double v0 = synchronous_voltage_relativistic(t.r_a, t.n, t.f);
    check_published({"relativistic Hull voltage at B0 over V0, 15.8/21.1 mm", kLovelace, 1,
                     hull_voltage(field, t.r_c, t.r_a) / v0, 1e-12, "an identity, to rounding"});
    check_published({"relativistic Hartree voltage at B0 over V0, 15.8/21.1 mm", kLau, 1,
                     hartree_voltage(field, t.r_c, t.r_a, t.n, t.f) / v0, 1e-12, "an identity, to rounding"});
    // A touch and no crossing: below by the square of the distance on both sides.
    for (const double share : {0.99, 1.01}) {
        const double gap =
            hull_voltage(share * field, t.r_c, t.r_a) - hartree_voltage(share * field, t.r_c, t.r_a, t.n, t.f);
        CHECK(gap > 0);
        CHECK(gap < 2e-4 * v0);
    }
}
