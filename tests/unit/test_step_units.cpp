// SPDX-License-Identifier: MIT
// Sources: CODATA 2018 for m c^2 = 510 998.950 eV, e / m = 1.758 820 011e11 C/kg.
#include <doctest/doctest.h>

#include <limits>

#include "pic/step_units.hpp"
#include "tests/relative_error.hpp"

using namespace spokewright;

namespace {

constexpr double kRounding = 1e-14;  // a handful of roundings in double
constexpr double kFigures = 1e-9;    // CODATA's ten figures

const StepUnits kUnits{{2e-3, 4e-3, 10e-3, 20, 40}, 5e-12};  // dr 0.1 mm, dtheta 9 degrees

}  // namespace

TEST_CASE("one velocity unit is one radial cell a step") {
    CHECK(relative_error(kUnits.speed(), 2e7) < kRounding);
    CHECK(relative_error(kUnits.light(), 14.9896229) < kRounding);
    CHECK(relative_error(kUnits.cathode_cells(), 20) < kRounding);
}

TEST_CASE("half a kick is half a step of e E / m, towards higher potential") {
    // 1 MV/m: 1.7588e17 m/s^2 for 2.5 ps, in units of 2e7 m/s. The field points away from the anode, the electron to
    // it.
    CHECK(relative_error(kUnits.half_kick(-1e6), 1.758820011e17 * 2.5e-12 / 2e7) < kFigures);
    CHECK(kUnits.half_kick(1e6) == -kUnits.half_kick(-1e6));
}

TEST_CASE("the tangent of half the gyration angle, negative in a field along +z") {
    CHECK(relative_error(kUnits.half_turn(0.18), -1.758820011e11 * 0.18 * 2.5e-12) < kFigures);
    CHECK(kUnits.half_turn(-0.18) == -kUnits.half_turn(0.18));
}

TEST_CASE("kinetic energy by hand: gamma 2, and slow electrons") {
    const double c_squared = kUnits.light() * kUnits.light();
    CHECK(relative_error(kUnits.energy_scale()(3 * c_squared), 510998.950) < kFigures);       // gamma^2 - 1 = 3
    CHECK(relative_error(kUnits.energy_scale()(15 * c_squared), 3 * 510998.950) < kFigures);  // gamma 4
    CHECK(kUnits.energy_scale()(0) == 0);
    // 1e-6 of c: half m v^2, where gamma - 1 by subtraction would keep four figures only.
    CHECK(relative_error(kUnits.energy_scale()(1e-12 * c_squared), 0.5e-12 * 510998.950) < kFigures);
}

TEST_CASE("the largest grid a deck may ask for fits the fixed point with room for a step beyond its ends") {
    const StepUnits largest{{2e-3, 4e-3, 10e-3, 120, 504}, 5e-12};  // see deck.hpp
    constexpr std::int64_t kLast = std::numeric_limits<std::int32_t>::max();
    CHECK(largest.radial_end() == 120 * std::int64_t{kRadialOne});
    CHECK(largest.azimuthal_end() == 504 * std::int64_t{kAzimuthalOne});
    CHECK(largest.radial_end() + 7 * std::int64_t{kRadialOne} <= kLast);        // the push's longest step
    CHECK(largest.azimuthal_end() + 7 * std::int64_t{kAzimuthalOne} <= kLast);  // before it wraps
    CHECK(kRadialMask == kRadialOne - 1);
    CHECK(kAzimuthalMask == kAzimuthalOne - 1);
}
