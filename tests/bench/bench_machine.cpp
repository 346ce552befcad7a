// SPDX-License-Identifier: MIT
// What the machine can do at all: the triad a_i = b_i + s c_i (J. D. McCalpin, IEEE TCCA Newsletter (1995)), 24 bytes
// an element.
#include <benchmark/benchmark.h>

#include <cstdint>
#include <vector>

namespace {

void triad(benchmark::State& state) {
    const auto length = static_cast<std::size_t>(state.range(0));
    std::vector<double> a(length, 1.0), b(length, 2.0), c(length, 3.0);
    for (auto _ : state) {
        for (std::size_t i = 0; i < length; ++i) {
            a[i] = b[i] + 3.0 * c[i];
        }
        benchmark::ClobberMemory();
    }
    state.SetBytesProcessed(static_cast<std::int64_t>(24 * length) * static_cast<std::int64_t>(state.iterations()));
}

// 384 kB, 12 MB, 384 MB: second-level cache, third-level cache, memory on most servers.
BENCHMARK(triad)->Arg(1 << 14)->Arg(1 << 19)->Arg(1 << 24)->Unit(benchmark::kMicrosecond);

}  // namespace
