// SPDX-License-Identifier: MIT
// Sums over the electrons that a sample or the self field wants, in blocks of fixed size that are added in the store's
// order: the same to the last bit for any number of threads and any instruction set.
#pragma once

#include <array>
#include <span>
#include <vector>

#include "pic/electron_store.hpp"
#include "pic/force_table.hpp"
#include "pic/particle_kernel.hpp"

namespace spokewright {

class ElectronSums {
public:
    ElectronSums(const StepUnits& units, int threads = 1, InstructionSet set = fastest_instruction_set())
        : units_(units),
          plan_(units.plan()),
          kernel_(particle_kernel(set)),
          threads_(threads),
          chains_(kChains * (static_cast<std::size_t>(units.grid.n_r) + 1)) {}

    /// Kinetic energy at time n of all electrons, eV a macro-electron: u is carried half an electric kick forward,
    /// which is where Boris's scheme passes time n.
    double kinetic_energy_eV(const ElectronStore& store, const ForceTable& force) const;

    /// Adds the angular speed of the electrons to the rows, shared like their charge: rad/s a macro-electron,
    /// [n_r + 1].
    void add_angular_speed(const ElectronStore& store, std::span<double> rows);

private:
    static constexpr std::size_t kBlock = 1024;
    static constexpr std::size_t kChains = 4;
    using Block = std::array<float, kBlock>;

    StepUnits units_;
    ParticlePlan plan_;
    const ParticleKernel& kernel_;
    int threads_;
    std::vector<double> chains_;  // [kChains][n_r + 1]
};

}  // namespace spokewright
