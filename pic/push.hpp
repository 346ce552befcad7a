// SPDX-License-Identifier: MIT
// One leapfrog step of every electron: gather, relativistic Boris rotation, move, on the threads of the run.
// The step itself is in push_loops.hpp.
#pragma once

#include <span>
#include <vector>

#include "pic/electron_store.hpp"
#include "pic/force_table.hpp"
#include "pic/particle_kernel.hpp"

namespace spokewright {

class Push {
public:
    Push(const StepUnits& units, int threads, InstructionSet set = fastest_instruction_set());

    /// u from n - 1/2 to n + 1/2, then r and theta from n to n + 1. Electrons that end at or beyond an electrode keep
    /// the state they arrive with; their indices are left, rising, in hits(). Bitwise the same for any number of
    /// threads and any instruction set. Error of one step: single-precision rounding, 2e-7 of u and of the way.
    void advance(ElectronStore& store, const ForceTable& force);

    std::span<const std::uint32_t> hits() const { return hits_; }

private:
    ParticlePlan plan_;
    const ParticleKernel& kernel_;
    int threads_;
    std::vector<std::vector<std::uint32_t>> found_;  // [threads]
    std::vector<std::size_t> counts_;                // [threads], used part of `found_`
    std::vector<std::uint32_t> hits_;
};

}  // namespace spokewright
