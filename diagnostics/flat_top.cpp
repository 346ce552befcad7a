// SPDX-License-Identifier: MIT
#include "diagnostics/flat_top.hpp"

#include <algorithm>

namespace spokewright {

FlatTop flat_top(const Deck& deck, std::span<const double> time_ns) {
    const auto row_at = [&](double time) {  // first row at or after `time`
        const auto row = std::lower_bound(time_ns.begin(), time_ns.end(), time * 1e9 * (1 - 1e-12));
        return static_cast<std::size_t>(row - time_ns.begin());
    };
    const auto& points = deck.supply.programme;
    if (points.empty()) return {0, time_ns.size(), true};
    if (points.back().share > 0) {
        std::size_t start = points.size() - 1;
        while (start > 0 && points[start - 1].share == points.back().share) --start;
        return {row_at(start == 0 ? 0.0 : points[start].time), time_ns.size(), true};
    }
    for (std::size_t end = points.size() - 1; end > 0; --end) {
        if (points[end].share == 0 || points[end].share != points[end - 1].share) continue;
        return {row_at(points[end - 1].time), std::min(row_at(points[end].time), time_ns.size()), false};
    }
    return {time_ns.size(), time_ns.size(), false};
}

}  // namespace spokewright
