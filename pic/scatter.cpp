// SPDX-License-Identifier: MIT
#include "pic/scatter.hpp"

#include <fmt/format.h>
#include <omp.h>

#include <algorithm>
#include <cmath>

#include "inputs/errors.hpp"

namespace spokewright {

Scatter::Scatter(const StepUnits& units, double macro_charge, int threads)
    : units_(units),
      macro_charge_(macro_charge),
      threads_(threads),
      stride_(static_cast<std::size_t>(units.grid.n_theta) + 2),
      bend_(radial_bend(units)),
      thread_cells_(static_cast<std::size_t>(threads),
                    AlignedVector<Corners>(static_cast<std::size_t>(units.grid.n_r) * stride_)),
      node_sum_(units.grid.nodes()),
      node_charge_(units.grid.nodes()) {}

void Scatter::deposit_range(const ElectronStore& store, std::size_t begin, std::size_t end, Corners* cells) const {
    constexpr float one = kChargeOne;
    for (std::size_t p = begin; p < end; ++p) {
        const CellShare at = cell_share(store.r[p], store.theta[p], bend_.data());
        // Three corners rounded, the fourth as the remainder: the electron's charge is exact.
        const auto outer = static_cast<std::int32_t>(std::lrint(at.radial * one));
        const auto next = static_cast<std::int32_t>(std::lrint(at.azimuthal * one));
        const auto outer_next = static_cast<std::int32_t>(std::lrint(at.radial * at.azimuthal * one));
        Corners& cell = cells[static_cast<std::size_t>(at.i) * stride_ + static_cast<std::size_t>(at.j)];
        cell.inner += kChargeOne - outer - next + outer_next;
        cell.inner_next += next - outer_next;
        cell.outer += outer - outer_next;
        cell.outer_next += outer_next;
    }
}

void Scatter::deposit(const ElectronStore& store) {
#pragma omp parallel num_threads(threads_)
    {
        const auto team = static_cast<std::size_t>(omp_get_num_threads());
        const auto thread = static_cast<std::size_t>(omp_get_thread_num());
        std::fill(thread_cells_[thread].begin(), thread_cells_[thread].end(), Corners{});
        deposit_range(store, store.size() * thread / team, store.size() * (thread + 1) / team,
                      thread_cells_[thread].data());
#pragma omp single
        for (std::size_t idle = team; idle < thread_cells_.size(); ++idle) {
            std::fill(thread_cells_[idle].begin(), thread_cells_[idle].end(), Corners{});
        }
    }
    reduce();
    // A wrapped counter loses 2^32 and no other can gain it, so the total shows every overflow.
    if (total_ != static_cast<std::int64_t>(store.size()) * kChargeOne) {
        throw NumericsError(
            fmt::format("a cell of the grid holds more than 8191 macro-electrons ({} in all); lower "
                        "electrons.target_count or raise grid.azimuthal_cells",
                        store.size()));
    }
}

void Scatter::reduce() {
    const auto width = static_cast<std::size_t>(units_.grid.n_theta);
    std::fill(node_sum_.begin(), node_sum_.end(), 0);
    for (const auto& cells : thread_cells_) {
        for (std::size_t i = 0; i < static_cast<std::size_t>(units_.grid.n_r); ++i) {
            const Corners* row = cells.data() + i * stride_;
            std::int64_t* inner = node_sum_.data() + i * width;
            std::int64_t* outer = inner + width;
            inner[0] += row[width - 1].inner_next;
            outer[0] += row[width - 1].outer_next;
            for (std::size_t j = 0; j + 1 < width; ++j) {
                inner[j + 1] += row[j].inner_next;
                outer[j + 1] += row[j].outer_next;
            }
            for (std::size_t j = 0; j < width; ++j) {
                inner[j] += row[j].inner;
                outer[j] += row[j].outer;
            }
        }
    }
    const double unit = macro_charge_ / kChargeOne;
    total_ = 0;
    for (std::size_t k = 0; k < node_sum_.size(); ++k) {
        total_ += node_sum_[k];
        node_charge_[k] = unit * static_cast<double>(node_sum_[k]);
    }
}

}  // namespace spokewright
