// SPDX-License-Identifier: MIT
// Source: closed forms of a resistance, a capacitance and a current source (circuit theory; common practice, no
// source).
#include <doctest/doctest.h>

#include <cmath>
#include <utility>

#include "fields/supply.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {
constexpr double kResistance = 500, kShunt = 8e-12, kTube = 2e-12, kStep = 1e-11;
constexpr double kTimeConstant = kResistance * (kShunt + kTube);  // 5 ns
constexpr double kRounding = 1e-12;                               // a thousand steps or so

SupplySettings supply(double series_resistance, double regulated_current) {
    return {4000, {{0, 1}}, series_resistance, kShunt, regulated_current};
}
}  // namespace

TEST_CASE("the programme is piecewise linear and constant beyond its ends") {
    SupplySettings settings = supply(0, 0);
    settings.programme = {{1e-9, 0.1}, {2e-9, 0.9}, {4e-9, 0.5}};
    const Supply ideal(settings, kTube, kStep);
    for (const auto& [time, voltage] : {std::pair{0.0, 400.0},
                                        {1e-9, 400.0},
                                        {1.25e-9, 1200.0},
                                        {2e-9, 3600.0},
                                        {3e-9, 2800.0},
                                        {4e-9, 2000.0},
                                        {9e-9, 2000.0}}) {
        CHECK(relative_error(ideal.programme_voltage(time), voltage) < kRounding);
    }
    CHECK(ideal.voltage() == ideal.programme_voltage(0));
}

TEST_CASE("an ideal supply follows its programme and gives mean voltage times charge") {
    SupplySettings settings = supply(0, 0);
    settings.programme = {{0, 0}, {1e-9, 1}};
    Supply ideal(settings, kTube, kStep);
    CHECK(relative_error(ideal.advance(kStep, 3e-12), 20 * 3e-12) < kRounding);  // from 0 to 40 V
    CHECK(relative_error(ideal.voltage(), 40) < kRounding);
}

TEST_CASE("charging through a resistance into a steady anode current: V = (V0 - R I)(1 - exp(-t / R C))") {
    for (const double current : {0.0, 1.5}) {
        SupplySettings settings = supply(kResistance, 0);
        settings.programme = {{0, 0}, {1e-30, 1}};  // at once
        Supply behind(settings, kTube, kStep);
        behind.advance(0, 0);
        behind.restore(0);
        double worst = 0, energy = 0, exact_energy = 0;
        const double end = 4000 - kResistance * current;
        for (int k = 1; k <= 2000; ++k) {
            const double time = k * kStep;
            energy += behind.advance(time + kStep, current * kStep);
            worst = std::fmax(worst, relative_error(behind.voltage(), -end * std::expm1(-time / kTimeConstant)));
        }
        const double total = 2000 * kStep;
        exact_energy = current * end * (total + kTimeConstant * std::expm1(-total / kTimeConstant));
        MESSAGE(current << " A: " << worst);
        CHECK(worst < kRounding);  // exact for a constant current
        // Trapezia over steps of 1/500 time constant: 1/12 of its square.
        CHECK(relative_error(energy, exact_energy) < 1e-6);
    }
}

TEST_CASE("behind a resistance a ramp comes late by the time constant: V = k (t - RC (1 - exp(-t / R C)))") {
    SupplySettings settings = supply(kResistance, 0);
    settings.programme = {{0, 0}, {100e-9, 1}};
    Supply behind(settings, kTube, kStep);
    for (int k = 1; k <= 4000; ++k) {
        behind.advance(k * kStep, 0);
    }
    const double time = 4000 * kStep;
    const double exact = 4000 / 100e-9 * (time + kTimeConstant * std::expm1(-time / kTimeConstant));
    MESSAGE("error " << relative_error(behind.voltage(), exact));
    CHECK(relative_error(behind.voltage(), exact) < 1e-6);  // midpoint of the ramp: (dt / RC)^2 / 12 of a lag of 1/7
}

TEST_CASE("a resistance without delay drops R I, also when R C is far below a step") {
    SupplySettings settings{4000, {{0, 1}}, 1e-3, 0, 0};
    Supply behind(settings, 1e-15, kStep);
    behind.advance(kStep, 2e6 * kStep);
    CHECK(relative_error(behind.voltage(), 2000) < kRounding);
}

TEST_CASE("a current-regulated supply charges the tube with what the anode does not take, up to the limit") {
    Supply regulated(supply(0, 2.0), kTube, kStep);
    CHECK(regulated.voltage() == 0);
    for (int k = 1; k <= 1000; ++k) {
        regulated.advance(k * kStep, 0.5 * kStep);
    }
    CHECK(relative_error(regulated.voltage(), (2.0 - 0.5) * 1000 * kStep / (kShunt + kTube)) < kRounding);  // 1500 V
    for (int k = 1001; k <= 3000; ++k) {
        regulated.advance(k * kStep, 0.5 * kStep);
    }
    CHECK(regulated.voltage() == 4000);  // the limit
    for (int k = 3001; k <= 3100; ++k) {
        regulated.advance(k * kStep, 3.0 * kStep);
    }
    CHECK(relative_error(regulated.voltage(), 4000 - (3.0 - 2.0) * 100 * kStep / (kShunt + kTube)) < kRounding);
}
