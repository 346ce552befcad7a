// SPDX-License-Identifier: MIT
// One row of the page of published checks, tests/published/README.md: it is checked here, and written where the
// environment variable SPOKEWRIGHT_CHECKS names a file (scripts/checks makes the page from it).
#pragma once

#include <string>

#include "tests/relative_error.hpp"

namespace spokewright {

struct PublishedRow {
    std::string check;   // what is compared, in a few words, with its unit
    std::string source;  // author, work, year, equation or table; "computed" or "from memory" where it is so
    double published;    // the value of the source
    double ours;         // the value of the code or the run
    double tolerance;    // allowed relative error
    std::string reason;  // why that much
};

/// Fails when the relative error of `ours` is beyond the tolerance, or is no number.
void check_published(const PublishedRow& row);

}  // namespace spokewright
