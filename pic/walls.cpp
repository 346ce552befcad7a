// SPDX-License-Identifier: MIT
#include "pic/walls.hpp"

#include <algorithm>
#include <cmath>

#include "inputs/errors.hpp"

namespace spokewright {
namespace {

void book(WallBook& book, std::size_t sector, double energy_eV, std::int64_t units) {
    const double bin = energy_eV / book.energy_range * WallBook::kEnergyBins;
    const double last = WallBook::kEnergyBins - 1;
    ++book.sector_hits[sector];
    book.sector_energy[sector] += units;
    ++book.energy_histogram[static_cast<std::size_t>(std::min(bin, last))];
}

WallBook empty_book(double energy_range, int sectors) {
    WallBook book;
    book.energy_range = energy_range;
    book.sector_hits.assign(static_cast<std::size_t>(sectors), 0);
    book.sector_energy.assign(static_cast<std::size_t>(sectors), 0);
    book.energy_histogram.assign(WallBook::kEnergyBins, 0);
    return book;
}

}  // namespace

Walls::Walls(const StepUnits& units, const Deck& deck)
    : units_(units),
      energy_of_(units.energy_scale()),
      wall_(deck.tube.vane_count, deck.tube.gap_share),
      anode_deposit_(static_cast<std::size_t>(units.grid.n_theta)) {
    // Radio-frequency fields lift some electrons above the direct voltage; on the cathode a third of it is ample.
    const double highest = 1.5 * deck.supply.anode_voltage;
    const int sectors = deck.tube.vane_count > 0 ? 2 * deck.tube.vane_count : units.grid.n_theta;
    books_.anode = empty_book(highest, sectors);
    books_.cathode = empty_book(0.3 * highest, units.grid.n_theta);
}

std::int32_t Walls::crossing_angle(const Electron& electron) const {
    // Back along a straight line to the electrode: where it ends, the electron is up to a step beyond.
    const std::int32_t wall = electron.r <= 0 ? 0 : units_.radial_end();
    const double beyond = (electron.r - wall) * (1.0 / kRadialOne);
    const double u_r = static_cast<double>(electron.u_r);
    if (beyond / u_r <= 0) {
        return electron.theta;
    }
    const double radius = units_.cathode_cells() + wall * (1.0 / kRadialOne);
    const double cells = static_cast<double>(electron.u_theta) * beyond / u_r / (radius * units_.grid.dtheta());
    const double back = std::clamp(cells, -1.0 * units_.grid.n_theta, 1.0 * units_.grid.n_theta);
    std::int32_t theta = electron.theta - static_cast<std::int32_t>(std::lrint(back * kAzimuthalOne));
    theta += theta < 0 ? units_.azimuthal_end() : 0;
    theta -= theta >= units_.azimuthal_end() ? units_.azimuthal_end() : 0;
    return theta;
}

std::size_t Walls::anode_sector(std::int32_t theta) const {
    if (wall_.vane_count() == 0) {
        return static_cast<std::size_t>(theta >> kAzimuthalBits);
    }
    return static_cast<std::size_t>(wall_.sector(theta * (units_.grid.dtheta() / kAzimuthalOne)));
}

void Walls::strike(const ElectronStore& store, std::span<const std::uint32_t> hits) {
    impacts_.clear();
    std::fill(anode_deposit_.begin(), anode_deposit_.end(), 0.0);
    anode_hits_ = anode_units_ = cathode_units_ = 0;
    for (const std::uint32_t index : hits) {
        const Electron electron = store.at(index);
        const double u_r = static_cast<double>(electron.u_r);
        const double u_theta = static_cast<double>(electron.u_theta);
        const double energy = energy_of_(u_r * u_r + u_theta * u_theta);
        if (!std::isfinite(energy)) {
            throw NumericsError(
                "the momentum of an electron at a wall is no longer a finite number; lower clock.step_ps or check the "
                "circuit's values");
        }
        const std::int64_t units = std::llrint(energy / WallBook::kBookedEnergyUnit);
        const std::int32_t theta = crossing_angle(electron);
        const auto node = static_cast<std::size_t>(theta >> kAzimuthalBits);
        if (electron.r <= 0) {
            book(books_.cathode, node, energy, units);
            cathode_units_ += units;
            impacts_.push_back(
                {theta, static_cast<float>(energy), std::atan2(std::abs(electron.u_theta), std::abs(electron.u_r))});
        } else {
            book(books_.anode, anode_sector(theta), energy, units);
            anode_units_ += units;
            ++anode_hits_;
            // Multiples of 2^-22: sums of them are exact in a double.
            const double share = (theta & kAzimuthalMask) * (1.0 / kAzimuthalOne);
            anode_deposit_[node] += 1 - share;
            anode_deposit_[node + 1 == anode_deposit_.size() ? 0 : node + 1] += share;
        }
    }
}

}  // namespace spokewright
