// SPDX-License-Identifier: MIT
// Source: J. C. Slater in G. B. Collins, ed., Microwave Magnetrons (1948) (from memory): a load admittance y moves the
// frequency by -(f0 / 2 Q_ext) Im y; over all phases of VSWR 1.5 it swings by the pulling figure, 0.417 f0 / Q_ext.
#include <doctest/doctest.h>

#include <algorithm>

#include "tests/one_mode.hpp"
#include "tests/published_row.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {
constexpr double kFrequency = 2.45e9, kExternalQ = 165, kStep = 2e-12;

double pulled_frequency(const LoadSettings& load) {
    Resonators bank = one_mode(5, kFrequency, 1e9, kExternalQ, 40e-12, load, kStep);
    bank.all().front().voltage = 1;
    return ringing_frequency(bank, kStep, 25000);
}
}  // namespace

TEST_CASE("a mismatched load pulls the frequency") {
    const double matched = pulled_frequency({1, 0});
    double lowest = matched, highest = matched;
    for (int k = 0; k < 36; ++k) {
        const LoadSettings load{1.5, k * 2 * kPi / 36};
        const std::complex<double> gamma = std::polar(0.2, load.phase);  // (s - 1) / (s + 1)
        const double theory = -kFrequency / (2 * kExternalQ) * ((1.0 - gamma) / (1.0 + gamma)).imag();
        const double pulled = pulled_frequency(load) - matched;
        // The formula is of first order in 1 / Q_ext.
        CHECK(std::abs(pulled - theory) < 0.01 * 0.417 * kFrequency / kExternalQ);
        lowest = std::min(lowest, matched + pulled);
        highest = std::max(highest, matched + pulled);
    }
    const double figure = (highest - lowest) / (kFrequency / kExternalQ);
    MESSAGE("pulling figure " << figure << " f0 / Q_ext");
    check_published({"pulling figure of a resonator, VSWR 1.5, in f0 / Q_ext",
                     "circuit theory (S. Y. Liao, Microwave Devices and Circuits)", 0.417, figure, 5e-3,
                     "first order in 1 / Q_ext; 36 phases miss the extremes by up to 0.4 %"});
}

TEST_CASE("a mismatched load takes Re y of the power") {
    for (const double phase : {0.0, kPi}) {
        const Resonators bank = one_mode(5, kFrequency, 1500, kExternalQ, 40e-12, {1.5, phase}, kStep);
        const double matched = 2 * kPi * kFrequency * 40e-12 / kExternalQ;
        // Gamma = 0.2 is y = 1 / 1.5, a light load; Gamma = -0.2 is y = 1.5.
        CHECK(relative_error(bank.all().front().load_conductance, matched * (phase > 0 ? 1.5 : 1 / 1.5)) < 1e-12);
    }
}
