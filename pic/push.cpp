// SPDX-License-Identifier: MIT
#include "pic/push.hpp"

#include <algorithm>

#include "pic/thread_share.hpp"

namespace spokewright {

Push::Push(const StepUnits& units, int threads, InstructionSet set)
    : plan_(units.plan()),
      kernel_(particle_kernel(set)),
      threads_(threads),
      found_(static_cast<std::size_t>(threads)),
      counts_(static_cast<std::size_t>(threads)) {}

void Push::advance(ElectronStore& store, const ForceTable& force) {
    std::fill(counts_.begin(), counts_.end(), 0);
#pragma omp parallel num_threads(threads_)
    {
        const ThreadShare share = thread_share(store.size());
        const auto thread = static_cast<std::size_t>(omp_get_thread_num());
        auto& found = found_[thread];
        if (found.size() < share.end - share.begin) {
            found.resize(2 * (share.end - share.begin));  // grows with the cloud, then never again
        }
        counts_[thread] = kernel_.push(plan_, force.cells(), store.arrays(), share.begin, share.end, found.data());
    }
    hits_.clear();
    for (std::size_t thread = 0; thread < found_.size(); ++thread) {
        const auto first = found_[thread].begin();
        hits_.insert(hits_.end(), first, first + static_cast<std::ptrdiff_t>(counts_[thread]));
    }
}

}  // namespace spokewright
