// SPDX-License-Identifier: MIT
// The measured order of accuracy: slope of log error over log step, fitted by least squares.
#pragma once

#include <cmath>
#include <limits>
#include <vector>

namespace spokewright {

/// NaN when an error is not positive and finite, so that a test on a band fails.
inline double fitted_order(const std::vector<double>& steps, const std::vector<double>& errors) {
    double x = 0, y = 0, xx = 0, xy = 0;
    const auto n = static_cast<double>(steps.size());
    for (std::size_t k = 0; k < steps.size(); ++k) {
        if (!(errors[k] > 0) || std::isinf(errors[k])) return std::numeric_limits<double>::quiet_NaN();
        const double log_step = std::log(steps[k]), log_error = std::log(errors[k]);
        x += log_step;
        y += log_error;
        xx += log_step * log_step;
        xy += log_step * log_error;
    }
    return (n * xy - x * y) / (n * xx - x * x);
}

}  // namespace spokewright
