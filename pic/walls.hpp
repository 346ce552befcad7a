// SPDX-License-Identifier: MIT
// What happens to an electron that strikes an electrode: it is booked by place and energy, its charge goes to the wall,
// and on the cathode the impact is kept for secondary emission. Integer books: the order of the hits does not matter.
#pragma once

#include <span>
#include <vector>

#include "diagnostics/wall_books.hpp"
#include "fields/vane_wall.hpp"
#include "inputs/deck.hpp"
#include "pic/electron_store.hpp"
#include "pic/step_units.hpp"

namespace spokewright {

/// An electron that came back to the cathode.
struct CathodeImpact {
    std::int32_t theta;  // fixed point
    float energy;        // eV
    float angle;         // rad from the normal
};

class Walls {
public:
    Walls(const StepUnits& units, const Deck& deck);

    /// Books the electrons named by `hits`; they stay in the store. Throws NumericsError for a momentum that is no
    /// number.
    void strike(const ElectronStore& store, std::span<const std::uint32_t> hits);

    // What the last call of strike() booked.
    std::int64_t anode_hits() const { return anode_hits_; }
    std::int64_t cathode_hits() const { return static_cast<std::int64_t>(impacts_.size()); }
    double anode_energy_eV() const { return static_cast<double>(anode_units_) * WallBook::kBookedEnergyUnit; }
    double cathode_energy_eV() const { return static_cast<double>(cathode_units_) * WallBook::kBookedEnergyUnit; }
    std::span<const CathodeImpact> impacts() const { return impacts_; }
    /// Macro-electrons that the last call put on each node of the anode, linear in theta, [n_theta].
    std::span<const double> anode_deposit() const { return anode_deposit_; }

    const WallBooks& books() const { return books_; }
    void restore(const WallBooks& books) { books_ = books; }

private:
    std::int32_t crossing_angle(const Electron& electron) const;
    std::size_t anode_sector(std::int32_t theta) const;

    StepUnits units_;
    EnergyScale energy_of_;
    VaneWall wall_;
    WallBooks books_;
    std::vector<CathodeImpact> impacts_;
    std::vector<double> anode_deposit_;
    std::int64_t anode_hits_ = 0;
    std::int64_t anode_units_ = 0;
    std::int64_t cathode_units_ = 0;
};

}  // namespace spokewright
