// SPDX-License-Identifier: MIT
#include "tests/published_row.hpp"

#include <doctest/doctest.h>

#include <cstdlib>
#include <fstream>
#include <nlohmann/json.hpp>

namespace spokewright {

void check_published(const PublishedRow& row) {
    const double error = relative_error(row.ours, row.published);
    INFO(row.check << ": published " << row.published << ", ours " << row.ours << ", error " << error);
    CHECK(error <= row.tolerance);
    if (const char* path = std::getenv("SPOKEWRIGHT_CHECKS")) {
        const nlohmann::ordered_json line = {
            {"check", row.check}, {"source", row.source},       {"published", row.published}, {"ours", row.ours},
            {"error", error},     {"tolerance", row.tolerance}, {"reason", row.reason}};
        std::ofstream(path, std::ios::app) << line.dump() << '\n';
    }
}

}  // namespace spokewright
