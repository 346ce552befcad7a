// SPDX-License-Identifier: MIT
#include "diagnostics/wall_books.hpp"

#include <numeric>

namespace spokewright {

std::int64_t WallBook::hits() const {
    return std::accumulate(sector_hits.begin(), sector_hits.end(), std::int64_t{0});
}

std::int64_t WallBook::energy_units() const {
    return std::accumulate(sector_energy.begin(), sector_energy.end(), std::int64_t{0});
}

}  // namespace spokewright
