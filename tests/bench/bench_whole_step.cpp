// SPDX-License-Identifier: MIT
// The whole step of the heating tube on 48 x 160 cells, with emission, walls, circuit, and a sample every 16 steps.
#include <cstdint>
#include <string>

#include "diagnostics/record.hpp"
#include "tests/bench/counters.hpp"
#include "tests/bench/filled_tube.hpp"

namespace spokewright {
namespace {

constexpr std::int64_t kElectronSteps = 1e8;  // worth timing

void whole_step(benchmark::State& state, int target, int threads) {
    const Deck deck = heating_tube(target);
    InteractionSpace space(deck, threads);
    space.restore(filled_tube(target));
    Record record(deck);
    double electrons = 0;
    const ElectronClock clock;
    for (auto _ : state) {
        record.add(space.step());
        electrons += static_cast<double>(space.tally().electrons);
        if (space.tally().step % deck.clock.sample_every == 0) {
            record.sample(space.view());
        }
    }
    clock.report(state, electrons / static_cast<double>(state.iterations()));
}

const bool kRegistered = [] {
    for (const int target : {20'000, 50'000, 200'000, 1'000'000}) {
        for (const int threads : {1, 2}) {
            const std::string name = "whole step/heating/" + std::to_string(target) + "/" + std::to_string(threads);
            benchmark::RegisterBenchmark(name.c_str(),
                                         [=](benchmark::State& state) { whole_step(state, target, threads); })
                ->Unit(benchmark::kMicrosecond)
                ->UseRealTime()
                ->Iterations(kElectronSteps / target / 16 * 16);
        }
    }
    return true;
}();

}  // namespace
}  // namespace spokewright
