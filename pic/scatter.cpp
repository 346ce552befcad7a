// SPDX-License-Identifier: MIT
#include "pic/scatter.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "inputs/errors.hpp"
#include "pic/thread_share.hpp"

namespace spokewright {
namespace {

/// Counters are added without sign, so that an overflow wraps and is found by the total.
std::uint32_t bits(std::int32_t counter) {
    return static_cast<std::uint32_t>(counter);
}

}  // namespace

Scatter::Scatter(const StepUnits& units, double macro_charge, int threads, InstructionSet set)
    : units_(units),
      plan_(units.plan()),
      kernel_(particle_kernel(set)),
      macro_charge_(macro_charge),
      threads_(threads),
      thread_cells_(static_cast<std::size_t>(threads), AlignedVector<CellCharge>(units.table_cells())),
      node_sum_(units.grid.nodes()),
      node_charge_(units.grid.nodes()) {}

void Scatter::deposit(const ElectronStore& store) {
#pragma omp parallel num_threads(threads_)
    {
        const ThreadShare share = thread_share(store.size());
        auto& cells = thread_cells_[static_cast<std::size_t>(omp_get_thread_num())];
        std::fill(cells.begin(), cells.end(), CellCharge{});
        kernel_.scatter(plan_, store.view(), share.begin, share.end, cells.data());
#pragma omp single
        for (auto idle = static_cast<std::size_t>(omp_get_num_threads()); idle < thread_cells_.size(); ++idle) {
            std::fill(thread_cells_[idle].begin(), thread_cells_[idle].end(), CellCharge{});
        }
    }
    sum_nodes();
    // A wrapped sum loses 2^32 and no other can gain it, so the total shows every overflow.
    if (total_ != static_cast<std::int64_t>(store.size()) * kChargeOne) {
        throw NumericsError(
            fmt::format("a node of the grid holds more than 8191 macro-electrons ({} in all); lower "
                        "electrons.target_count or raise grid.azimuthal_cells",
                        store.size()));
    }
}

void Scatter::sum_nodes() {
    const auto width = static_cast<std::size_t>(units_.grid.n_theta);
    std::fill(node_sum_.begin(), node_sum_.end(), 0);
    for (const auto& cells : thread_cells_) {
        for (std::size_t i = 0; i < static_cast<std::size_t>(units_.grid.n_r); ++i) {
            const CellCharge* row = cells.data() + i * units_.cell_stride();
            std::uint32_t* inner = node_sum_.data() + i * width;
            std::uint32_t* outer = inner + width;
            inner[0] += bits(row[0].inner) + bits(row[width - 1].inner_next);
            outer[0] += bits(row[0].outer) + bits(row[width - 1].outer_next);
            for (std::size_t j = 1; j < width; ++j) {
                inner[j] += bits(row[j].inner) + bits(row[j - 1].inner_next);
                outer[j] += bits(row[j].outer) + bits(row[j - 1].outer_next);
            }
        }
    }
    const double unit = macro_charge_ / kChargeOne;
    total_ = 0;
    for (std::size_t k = 0; k < node_sum_.size(); ++k) {
        const auto sum = static_cast<std::int32_t>(node_sum_[k]);
        total_ += sum;
        node_charge_[k] = unit * sum;
    }
}

}  // namespace spokewright
