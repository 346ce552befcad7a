// SPDX-License-Identifier: MIT
// What a benchmark reports besides its time: nanoseconds and processor cycles an electron-step.
#pragma once

#include <benchmark/benchmark.h>

#include <chrono>
#include <cstdint>
#ifdef __x86_64__
#include <x86intrin.h>
#endif

namespace spokewright {

/// Started before the loop of a benchmark, reported after it. Cycles are those of the time-stamp counter, which ticks
/// at the processor's nominal rate.
class ElectronClock {
public:
    void report(benchmark::State& state, double electrons) const {
        const double steps = electrons * static_cast<double>(state.iterations());
        const std::chrono::duration<double, std::nano> elapsed = std::chrono::steady_clock::now() - start_;
        state.counters["electrons"] = electrons;
        state.counters["ns"] = elapsed.count() / steps;
        state.counters["cycles"] = static_cast<double>(ticks() - start_ticks_) / steps;
    }

private:
    static std::uint64_t ticks() {
#ifdef __x86_64__
        return __rdtsc();
#else
        return 0;
#endif
    }
    std::chrono::steady_clock::time_point start_ = std::chrono::steady_clock::now();
    std::uint64_t start_ticks_ = ticks();
};

}  // namespace spokewright
