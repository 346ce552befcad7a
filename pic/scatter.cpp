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
    std::int64_t total = 0;
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
#pragma omp for schedule(static) reduction(+ : total)
        for (int i = 0; i <= units_.grid.n_r; ++i) {
            total += sum_row(static_cast<std::size_t>(i));
        }
    }
    total_ = total;
    // A wrapped sum loses 2^32 and no other can gain it, so the total shows every overflow.
    if (total_ != static_cast<std::int64_t>(store.size()) * kChargeOne) {
        throw NumericsError(
            fmt::format("a node of the grid holds more than 8191 macro-electrons ({} in all); lower "
                        "electrons.target_count or raise grid.azimuthal_cells",
                        store.size()));
    }
}

std::int64_t Scatter::sum_row(std::size_t i) {
    const auto width = static_cast<std::size_t>(units_.grid.n_theta);
    std::uint32_t* sum = node_sum_.data() + i * width;
    std::fill(sum, sum + width, 0U);
    for (const auto& cells : thread_cells_) {
        if (i < static_cast<std::size_t>(units_.grid.n_r)) {
            const CellCharge* row = cells.data() + i * units_.cell_stride();
            sum[0] += bits(row[0].inner) + bits(row[width - 1].inner_next);
            for (std::size_t j = 1; j < width; ++j) {
                sum[j] += bits(row[j].inner) + bits(row[j - 1].inner_next);
            }
        }
        if (i > 0) {
            const CellCharge* row = cells.data() + (i - 1) * units_.cell_stride();
            sum[0] += bits(row[0].outer) + bits(row[width - 1].outer_next);
            for (std::size_t j = 1; j < width; ++j) {
                sum[j] += bits(row[j].outer) + bits(row[j - 1].outer_next);
            }
        }
    }
    const double unit = macro_charge_ / kChargeOne;
    std::int64_t total = 0;
    for (std::size_t j = 0; j < width; ++j) {
        const auto counted = static_cast<std::int32_t>(sum[j]);
        total += counted;
        node_charge_[i * width + j] = unit * counted;
    }
    return total;
}

}  // namespace spokewright
