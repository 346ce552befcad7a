// SPDX-License-Identifier: MIT
#include "pic/electron_sums.hpp"

#include <algorithm>
#include <numeric>
#include <vector>

namespace spokewright {

double ElectronSums::kinetic_energy_eV(const ElectronStore& store, const ForceTable& force) const {
    const std::size_t blocks = (store.size() + kBlock - 1) / kBlock;
    std::vector<double> sums(blocks);
#pragma omp parallel for num_threads(threads_) schedule(static)
    for (std::size_t block = 0; block < blocks; ++block) {
        Block energy;
        const std::size_t begin = block * kBlock, end = std::min(begin + kBlock, store.size());
        kernel_.kinetic(plan_, force.cells(), store.view(), begin, end, energy.data());
        std::fill(energy.begin() + static_cast<std::ptrdiff_t>(end - begin), energy.end(), 0.0f);
        std::array<double, 8> chains{};  // eight chains of additions run side by side
        for (std::size_t k = 0; k < kBlock; k += chains.size()) {
            for (std::size_t chain = 0; chain < chains.size(); ++chain) {
                chains[chain] += static_cast<double>(energy[k + chain]);
            }
        }
        sums[block] = std::accumulate(chains.begin(), chains.end(), 0.0);
    }
    return units_.energy_scale().unit_eV * std::accumulate(sums.begin(), sums.end(), 0.0);
}

void ElectronSums::add_angular_speed(const ElectronStore& store, std::span<double> rows) {
    Block inner, outer;
    // Four electrons in turn add to rows of their own: neighbours in the store are often in the same row, and each
    // addition would wait for the one before.
    std::fill(chains_.begin(), chains_.end(), 0.0);
    for (std::size_t begin = 0; begin < store.size(); begin += kBlock) {
        const std::size_t end = std::min(begin + kBlock, store.size());
        kernel_.turning(plan_, store.view(), begin, end, inner.data(), outer.data());
        for (std::size_t p = begin; p < end; ++p) {
            double* row = chains_.data() + p % kChains * rows.size() + (store.r[p] >> kRadialBits);
            row[0] += static_cast<double>(inner[p - begin]);
            row[1] += static_cast<double>(outer[p - begin]);
        }
    }
    for (std::size_t row = 0; row < rows.size(); ++row) {
        for (std::size_t chain = 0; chain < kChains; ++chain) {
            rows[row] += chains_[chain * rows.size() + row] / units_.dt;
        }
    }
}

}  // namespace spokewright
