// SPDX-License-Identifier: MIT
// The electrons of one thread: contiguous shares in thread order, cut where vectors and cache lines begin.
#pragma once

#include <omp.h>

#include <cstddef>

namespace spokewright {

struct ThreadShare {
    std::size_t begin, end;
};

/// To be called within a parallel region.
inline ThreadShare thread_share(std::size_t electrons) {
    constexpr std::size_t line = 16;
    const auto thread = static_cast<std::size_t>(omp_get_thread_num());
    const auto team = static_cast<std::size_t>(omp_get_num_threads());
    const std::size_t lines = electrons / line;
    const std::size_t end = thread + 1 == team ? electrons : lines * (thread + 1) / team * line;
    return {lines * thread / team * line, end};
}

}  // namespace spokewright
