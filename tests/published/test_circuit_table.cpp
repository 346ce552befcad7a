// SPDX-License-Identifier: MIT
// Source: S. Y. Liao, Microwave Devices and Circuits, example 10-1-1A; G. B. Collins (ed.), Microwave Magnetrons (1948)
// (pulling figure; from memory); G. S. Raghuvanshi, Microwave Engineering, example 7.3.
#include <doctest/doctest.h>

#include <algorithm>
#include <complex>
#include <string>

#include "diagnostics/theory.hpp"
#include "fields/resonators.hpp"
#include "inputs/constants.hpp"
#include "tests/published_row.hpp"

using namespace spokewright;

namespace {
const std::string kLiao = "S. Y. Liao, Microwave Devices and Circuits, example 10-1-1A";
constexpr double kFrequency = 9e9, kCapacitance = 2.5e-12, kResonator = 2e-4, kLoad = 2.5e-5;  // Hz, F, S, S
}  // namespace

TEST_CASE("quality factors and circuit efficiency of the printed example") {
    const double unloaded = quality_factor(kFrequency, kCapacitance, kResonator);
    const double external = quality_factor(kFrequency, kCapacitance, kLoad);
    const auto row = [](const char* check, double published, double ours, double tolerance) {
        check_published({check, kLiao, published, ours, tolerance, "half a unit of the last printed figure"});
    };
    row("unloaded Q, 9 GHz, 2.5 pF, 0.2 mS", 706.86, unloaded, 7.1e-6);
    row("external Q, 9 GHz, 2.5 pF, 0.025 mS", 5654.9, external, 9e-6);
    row("loaded Q of the two", 628.3, loaded_q(unloaded, external), 8e-5);
    row("circuit efficiency of the two", 0.1111, circuit_efficiency(unloaded, external), 4.5e-4);
}

TEST_CASE("pulling figure: 0.417 f / Q_ext at a VSWR of 1.5, and the model's load through all its phases") {
    check_published({"pulling figure times Q_ext / f, VSWR 1.5",
                     "G. B. Collins (ed.), Microwave Magnetrons (1948) (from memory)", 0.417, pulling_figure(1, 1, 1.5),
                     1.2e-3, "printed with three figures"});
    double lowest = 0, highest = 0;
    for (int degrees = 0; degrees < 360; ++degrees) {
        const double susceptance = load_admittance({3, degrees * kPi / 180}).imag();
        lowest = std::min(lowest, susceptance / (2 * 167));
        highest = std::max(highest, susceptance / (2 * 167));
    }
    check_published({"pulling of the model's load over all phases over (f / 2 Q_ext)(s - 1 / s), VSWR 3",
                     "G. B. Collins (ed.), Microwave Magnetrons (1948) (from memory)", 1,
                     2.45e9 * (highest - lowest) / pulling_figure(2.45e9, 167, 3), 1e-3,
                     "phases in steps of a degree"});
}
