// SPDX-License-Identifier: MIT
// Source: I. Langmuir & K. B. Blodgett, Phys. Rev. 22, 347 (1923): I/L = (8 pi eps0 / 9) sqrt(2e/m) V^1.5 / (r_a
// beta^2).
#include <doctest/doctest.h>
#include <fmt/format.h>

#include <cmath>
#include <vector>

#include "tests/field_free_diode.hpp"
#include "tests/fitted_order.hpp"
#include "tests/published_row.hpp"

using namespace spokewright;

namespace {

// beta^2 of the printed table at r_a / r_c (from memory, agreeing with their equation within its rounding).
struct Entry {
    double ratio, beta_squared;
};
constexpr Entry kTable[] = {{1.1, 0.008419}, {2, 0.279267}, {4, 0.667089}, {10, 0.978186}};

constexpr double kVoltage = 400;  // V: relativity takes less than 1e-4 of the current here

double error(const Entry& entry, int radial_cells, int steps) {
    const double per_length = 8 * kPi * kVacuumPermittivity / 9 * std::sqrt(2 * kElementaryCharge / kElectronMass) *
                              std::pow(kVoltage, 1.5) / (entry.ratio * 2e-3 * entry.beta_squared);
    const double current = simulated_limited_current(entry.ratio, kVoltage, radial_cells, steps);
    return current / (per_length * 10e-3) - 1;
}

}  // namespace

TEST_CASE("Langmuir-Blodgett current within 1 % at four radius ratios") {
    for (const Entry& entry : kTable) {
        const double off = error(entry, 120, 1200);
        MESSAGE("r_a/r_c " << entry.ratio << ": " << 100 * off << " %");
        check_published({"space-charge-limited current over theory at r_a/r_c = " + fmt::format("{}", entry.ratio),
                         "I. Langmuir & K. B. Blodgett, Phys. Rev. 22, 347 (1923), table (from memory)", 1, 1 + off,
                         0.01, "required; 120 cells leave 0.14 % at the largest ratio"});
    }
}

TEST_CASE("Langmuir-Blodgett: measured order of accuracy at r_a/r_c = 10, cells and steps refined together") {
    std::vector<double> cell, off;
    for (const int cells : {15, 30, 60, 120}) {
        cell.push_back(1.0 / cells);
        off.push_back(std::abs(error(kTable[3], cells, 10 * cells)));
        MESSAGE(cells << " cells: " << 100 * off.back() << " %");
    }
    const double order = fitted_order(cell, off);
    MESSAGE("order " << order);
    // Between one and two: at the cathode the density is infinite, as x^(-2/3).
    CHECK(order > 1.4);
    CHECK(order < 1.7);
}
