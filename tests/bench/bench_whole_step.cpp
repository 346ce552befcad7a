// SPDX-License-Identifier: MIT
// The whole step of the heating tube on 48 x 160 cells, with emission, walls, circuit, and a sample every 16 steps.
#include <cstdint>
#include <map>
#include <string>

#include "diagnostics/mode_watch.hpp"
#include "diagnostics/record.hpp"
#include "inputs/deck_reader.hpp"
#include "pic/interaction_space.hpp"
#include "tests/bench/counters.hpp"

namespace spokewright {
namespace {

constexpr double kFilledAfter = 8e-9;         // s: voltage up, hub full
constexpr std::int64_t kElectronSteps = 4e8;  // worth timing

Deck heating_tube(int target) {
    return read_deck(std::string(SPOKEWRIGHT_SOURCE_DIR) + "/inputs/tubes/heating.ini",
                     {"electrons.target_count=" + std::to_string(target)});
}

/// The tube with its hub full, made once for each size of cloud.
const SpaceState& filled_tube(int target) {
    static std::map<int, SpaceState> made;
    const auto found = made.find(target);
    if (found != made.end()) {
        return found->second;
    }
    InteractionSpace space(heating_tube(target), 2);
    while (space.time() < kFilledAfter) {
        space.step();
    }
    return made.emplace(target, space.save()).first->second;
}

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
