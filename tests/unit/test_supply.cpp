// SPDX-License-Identifier: MIT
// Source: closed forms of resistance, capacitance and current source (circuit theory; common practice, no source).
// The published checks (programme, charging, ramp, regulation) stand in tests/published/test_supply.cpp.
#include <doctest/doctest.h>

#include <cmath>

#include "fields/supply.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {

constexpr double kRounding = 1e-12;
constexpr double kStep = 1e-11, kTube = 2e-12;

SupplySettings settings(double series_resistance, double regulated_current) {
    return {4000, {{0, 1}}, series_resistance, 8e-12, regulated_current};
}

/// Voltage after `steps` steps that together last 1 ns, 1.2 A drawn, from 1000 V.
double after_a_nanosecond(int steps) {
    const double dt = 1e-9 / steps;
    Supply supply(settings(500, 0), kTube, dt);
    supply.restore(1000);
    for (int k = 1; k <= steps; ++k) supply.advance(k * dt, 1.2 * dt);
    return supply.voltage();
}

}  // namespace

TEST_CASE("a supply starts at its programme, a regulated one at zero") {
    SupplySettings half = settings(500, 0);
    half.programme = {{0, 0.5}, {1e-9, 1}};
    CHECK(Supply(half, kTube, kStep).voltage() == 2000);
    half.regulated_current = 1;
    CHECK(Supply(half, kTube, kStep).voltage() == 0);
}

TEST_CASE("an ideal supply does not feel the current") {
    Supply supply(settings(0, 0), kTube, kStep);
    supply.advance(kStep, 1e-9);
    CHECK(supply.voltage() == 4000);
}

TEST_CASE("behind a resistance, one long step is as good as many short ones while voltage and current hold") {
    const double settled = 4000 - 500 * 1.2;
    const double exact = settled + (1000 - settled) * std::exp(-1e-9 / (500 * 10e-12));
    for (const int steps : {1, 7, 100}) {
        CHECK(relative_error(after_a_nanosecond(steps), exact) < kRounding);
    }
}

TEST_CASE("energy booked is the mean of the voltages before and after, times the charge, with its sign") {
    for (const double resistance : {0.0, 500.0}) {
        for (const double regulated : {0.0, 2.0}) {
            for (const double charge : {5e-12, 0.0, -5e-12}) {
                Supply supply(settings(resistance, regulated), kTube, kStep);
                supply.restore(1500);
                const double energy = supply.advance(kStep, charge);
                CHECK(relative_error(energy, 0.5 * (1500 + supply.voltage()) * charge) < kRounding);
                CHECK(supply.voltage() > 1500);  // all of them charge the tube or jump to 4000 V
            }
        }
    }
}

TEST_CASE("energy of a capacitance that only the anode current drains is what it held") {
    // A regulated supply of next to nothing: the tube lives on the 10 pF, from 3000 V to 2000 V.
    Supply supply(settings(0, 1e-12), kTube, kStep);
    supply.restore(3000);
    double energy = 0;
    for (int k = 1; k <= 100; ++k) energy += supply.advance(k * kStep, 1e-10);
    CHECK(relative_error(supply.voltage(), 2000) < 1e-9);  // the supply gives 1e-12 A beside 10 A
    CHECK(relative_error(energy, 0.5 * 10e-12 * (9e6 - 4e6)) < 1e-9);
}

TEST_CASE("a regulated supply stays between zero and its programme, also while that falls") {
    SupplySettings falling = settings(0, 2.0);
    falling.programme = {{0, 1}, {1e-9, 1}, {2e-9, 0}};
    Supply supply(falling, kTube, kStep);
    supply.restore(3990);
    supply.advance(0.5e-9, 0);
    CHECK(relative_error(supply.voltage(), 3990 + 2.0 * kStep / 10e-12) < kRounding);
    for (int k = 0; k < 10; ++k) supply.advance(0.6e-9, 0);
    CHECK(supply.voltage() == 4000);
    supply.advance(1.75e-9, 0);
    CHECK(relative_error(supply.voltage(), 1000) < kRounding);
    supply.advance(3e-9, 0);
    CHECK(supply.voltage() == 0);
    supply.restore(100);
    supply.advance(0.5e-9, 1e-8);  // would end 898 V below zero
    CHECK(supply.voltage() == 0);
}

TEST_CASE("a restored supply goes on as the one that was saved") {
    Supply first(settings(500, 0), kTube, kStep);
    for (int k = 1; k <= 50; ++k) first.advance(k * kStep, 3e-11);
    Supply second(settings(500, 0), kTube, kStep);
    second.restore(first.voltage());
    CHECK(first.advance(51 * kStep, 2e-11) == second.advance(51 * kStep, 2e-11));
    CHECK(first.voltage() == second.voltage());
}
