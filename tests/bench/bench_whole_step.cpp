// SPDX-License-Identifier: MIT
// The whole step of the heating tube on 48 x 160 cells, with emission, walls, circuit, and a sample every 16 steps.
#include <string>

#include "diagnostics/mode_watch.hpp"
#include "diagnostics/record.hpp"
#include "inputs/deck_reader.hpp"
#include "pic/interaction_space.hpp"
#include "tests/bench/counters.hpp"

namespace spokewright {
namespace {

constexpr double kFilledAfter = 8e-9;  // s: voltage up, hub full

void whole_step(benchmark::State& state, int target, int threads) {
    const Deck deck = read_deck(std::string(SPOKEWRIGHT_SOURCE_DIR) + "/inputs/tubes/heating.ini",
                                {"electrons.target_count=" + std::to_string(target)});
    InteractionSpace space(deck, threads);
    while (space.time() < kFilledAfter) {
        space.step();
    }
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
                ->MinTime(1.0);
        }
    }
    return true;
}();

}  // namespace
}  // namespace spokewright
