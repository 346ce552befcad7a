// SPDX-License-Identifier: MIT
// Charge of the electrons on the grid's nodes, by area weighting, summed as integers: exact, and the same in any order
// and on any number of threads. The deposit itself is in scatter_loops.hpp.
#pragma once

#include <span>
#include <vector>

#include "pic/electron_store.hpp"
#include "pic/particle_kernel.hpp"
#include "pic/step_units.hpp"

namespace spokewright {

class Scatter {
public:
    Scatter(const StepUnits& units, double macro_charge, int threads, InstructionSet set = fastest_instruction_set());

    /// Deposits every electron: azimuthal share linear in theta, radial share linear in r^2, so that a uniform density
    /// deposits a uniform density; each share to 2^-18 macro-electron. Throws NumericsError when a node holds more
    /// than its counter can (8191 electrons).
    void deposit(const ElectronStore& store);

    /// C, [n_r + 1][n_theta].
    std::span<const double> node_charge() const { return node_charge_; }
    /// The grid's total in macro-electrons, from the integer counters: equals the number of electrons.
    std::int64_t scattered_electrons() const { return total_ / kChargeOne; }

private:
    /// Charge of the nodes of row i from all threads' cells. Returns its counters' total.
    std::int64_t sum_row(std::size_t i);

    StepUnits units_;
    ParticlePlan plan_;
    const ParticleKernel& kernel_;
    double macro_charge_;
    int threads_;
    std::vector<AlignedVector<CellCharge>> thread_cells_;  // [threads][table_cells]
    AlignedVector<std::uint32_t> node_sum_;                // [n_r + 1][n_theta]
    AlignedVector<double> node_charge_;
    std::int64_t total_ = 0;
};

}  // namespace spokewright
