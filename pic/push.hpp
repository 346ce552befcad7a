// SPDX-License-Identifier: MIT
// One leapfrog step of every electron: gather, relativistic Boris rotation, move. J. P. Boris, Proc. 4th Conf. on
// Numerical Simulation of Plasmas (1970); C. K. Birdsall & A. B. Langdon, Plasma Physics via Computer Simulation
// (1985), ch. 4.
#pragma once

#include <span>
#include <vector>

#include "pic/cell_share.hpp"
#include "pic/electron_store.hpp"
#include "pic/force_table.hpp"

namespace spokewright {

class Push {
public:
    Push(const StepUnits& units, int threads);

    /// u from n - 1/2 to n + 1/2, then r and theta from n to n + 1. Electrons that end at or beyond an electrode keep
    /// the state they arrive with; their indices are left, rising, in hits(). Bitwise the same for any thread count.
    void advance(ElectronStore& store, const ForceTable& force);

    std::span<const std::uint32_t> hits() const { return hits_; }

    /// Kinetic energy at time n of all electrons, eV a macro-electron: u is carried half an electric kick forward,
    /// which is where Boris's scheme passes time n. Sums in order of the store.
    double kinetic_energy_eV(const ElectronStore& store, const ForceTable& force) const;

private:
    void advance_range(ElectronStore& store, const ForceTable& force, std::size_t begin, std::size_t end,
                       std::vector<std::uint32_t>& hits) const;

    StepUnits units_;
    int threads_;
    AlignedVector<float> bend_;
    std::vector<std::vector<std::uint32_t>> thread_hits_;  // [threads]
    std::vector<std::uint32_t> hits_;
};

}  // namespace spokewright
