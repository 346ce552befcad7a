// SPDX-License-Identifier: MIT
// What struck the electrodes since the start: counts and kinetic energy by angle and by impact energy. All sums are
// integers, so they do not depend on the order of the hits.
#pragma once

#include <cstdint>
#include <vector>

namespace spokewright {

/// One electrode's book. Energy is kept in units of kBookedEnergyUnit a macro-electron's electron.
struct WallBook {
    static constexpr double kBookedEnergyUnit = 1.0 / 1024;  // eV
    static constexpr int kEnergyBins = 128;                  // impact energy, 0 to energy_range

    double energy_range = 0;                     // eV, top of the last bin; higher impacts land in the last bin
    std::vector<std::int64_t> sector_hits;       // [sectors], macro-electrons
    std::vector<std::int64_t> sector_energy;     // [sectors], booked units
    std::vector<std::int64_t> energy_histogram;  // [kEnergyBins], macro-electrons

    std::int64_t hits() const;
    std::int64_t energy_units() const;
};

/// Anode sectors: vane 0, slot 0, vane 1, slot 1, ... (slot i follows vane i in +theta); a smooth bore has one sector a
/// node. Cathode sectors: one per azimuthal cell of the grid.
struct WallBooks {
    WallBook anode;
    WallBook cathode;
};

}  // namespace spokewright
