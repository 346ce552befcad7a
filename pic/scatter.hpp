// SPDX-License-Identifier: MIT
// Charge of the electrons on the grid's nodes, by area weighting, summed as integers: exact, and the same in any order
// and on any number of threads. Four counters a cell in units of 2^-18 macro-electron.
#pragma once

#include <span>
#include <vector>

#include "pic/cell_share.hpp"
#include "pic/electron_store.hpp"

namespace spokewright {

class Scatter {
public:
    Scatter(const StepUnits& units, double macro_charge, int threads);

    /// Deposits every electron. Throws NumericsError when a cell held more than its counters can (8191 electrons).
    void deposit(const ElectronStore& store);

    /// C, [n_r + 1][n_theta].
    std::span<const double> node_charge() const { return node_charge_; }
    /// The grid's total in macro-electrons, from the integer counters: equals the number of electrons.
    std::int64_t scattered_electrons() const { return total_ / kChargeOne; }

    static constexpr std::int32_t kChargeOne = 1 << 18;

private:
    struct alignas(16) Corners {
        std::int32_t inner, inner_next, outer, outer_next;  // (i, j), (i, j+1), (i+1, j), (i+1, j+1)
    };
    void deposit_range(const ElectronStore& store, std::size_t begin, std::size_t end, Corners* cells) const;
    void reduce();

    StepUnits units_;
    double macro_charge_;
    int threads_;
    std::size_t stride_;  // n_theta + 2, as in ForceTable
    AlignedVector<float> bend_;
    std::vector<AlignedVector<Corners>> thread_cells_;  // [threads][n_r * stride]
    AlignedVector<std::int64_t> node_sum_;              // [n_r + 1][n_theta]
    AlignedVector<double> node_charge_;
    std::int64_t total_ = 0;
};

}  // namespace spokewright
