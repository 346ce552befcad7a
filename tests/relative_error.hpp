// SPDX-License-Identifier: MIT
// The one measure by which tests compare numbers: doctest::Approx has a scale of 1 and calls any two small numbers
// equal.
#pragma once

#include <cmath>
#include <limits>

namespace spokewright {

/// |value - reference| / |reference|; the absolute error when the reference is 0; +infinity when either is NaN.
inline double relative_error(double value, double reference) {
    if (std::isnan(value) || std::isnan(reference)) return std::numeric_limits<double>::infinity();
    if (value == reference) return 0;  // equal infinities too
    const double difference = std::abs(value - reference);
    return reference == 0 ? difference : difference / std::abs(reference);
}

}  // namespace spokewright
