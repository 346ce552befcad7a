// SPDX-License-Identifier: MIT
// The parts of the heating tube's step one by one, at 50 000 electrons on 48 x 160 cells: what push, walls, emission,
// scatter, field, self field and sample cost in the tube as it runs. The self field falls due every 32 steps, a sample
// every 16.
#include <benchmark/benchmark.h>

#include <string>

#include "diagnostics/record.hpp"
#include "tests/bench/filled_tube.hpp"

namespace spokewright {
namespace {

constexpr int kTarget = 50'000;

/// The tube's pieces, fed with the state of a filled tube.
struct Pieces {
    Pieces()
        : deck(heating_tube(kTarget)),
          space(deck),
          units(space.units()),
          store(filled_tube(kTarget).electrons),
          push(units, 1),
          scatter(units, space.macro_charge(), 1),
          walls(units, deck),
          cathode(deck, units, space.macro_charge()),
          poisson(units.grid),
          surface(units.grid),
          force(units),
          magnetic(static_cast<std::size_t>(units.grid.n_r) + 1, deck.magnet.field),
          potential(units.grid.nodes()),
          wall(static_cast<std::size_t>(poisson.harmonics())) {
        space.restore(filled_tube(kTarget));
        wall[0] = deck.supply.anode_voltage * units.grid.n_theta;
        scatter.deposit(store);
        field();
    }
    void field() {
        poisson.transform(scatter.node_charge());
        poisson.solve(wall, potential);
        surface.update(poisson, potential, scatter.node_charge());
        force.update(potential, surface, magnetic);
    }

    Deck deck;
    InteractionSpace space;
    StepUnits units;
    ElectronStore store;
    Push push;
    Scatter scatter;
    Walls walls;
    Cathode cathode;
    Poisson poisson;
    SurfaceField surface;
    ForceTable force;
    std::vector<double> magnetic;
    AlignedVector<double> potential;
    Poisson::Harmonics wall;
};

template <class Work>
void add(const char* name, Work work) {
    benchmark::RegisterBenchmark((std::string("parts/") + name).c_str(), [=](benchmark::State& state) {
        Pieces pieces;
        state.counters["electrons"] = static_cast<double>(pieces.store.size());
        for (auto _ : state) {
            work(state, pieces);
            benchmark::ClobberMemory();
        }
    })->Unit(benchmark::kMicrosecond);
}

const bool kRegistered = [] {
    add("push", [](benchmark::State& state, Pieces& pieces) {
        pieces.push.advance(pieces.store, pieces.force);
        state.PauseTiming();
        pieces.store = filled_tube(kTarget).electrons;
        state.ResumeTiming();
    });
    add("walls and emission", [](benchmark::State& state, Pieces& pieces) {
        state.PauseTiming();
        pieces.store = filled_tube(kTarget).electrons;
        pieces.push.advance(pieces.store, pieces.force);
        state.ResumeTiming();
        pieces.walls.strike(pieces.store, pieces.push.hits());
        pieces.store.remove(pieces.push.hits());
        pieces.cathode.emit(1, pieces.surface, pieces.magnetic[0], pieces.walls.impacts(), pieces.store);
    });
    add("scatter", [](benchmark::State&, Pieces& pieces) { pieces.scatter.deposit(pieces.store); });
    add("field and force", [](benchmark::State&, Pieces& pieces) { pieces.field(); });
    add("self field, due every 32 steps", [](benchmark::State&, Pieces& pieces) {
        std::vector<double> rows(pieces.magnetic.size());
        ElectronSums(pieces.units).add_angular_speed(pieces.store, rows);
        benchmark::DoNotOptimize(rows.data());
    });
    add("sample, due every 16 steps", [](benchmark::State&, Pieces& pieces) {
        Record record(pieces.deck);
        record.add(pieces.space.tally());
        record.sample(pieces.space.view());
    });
    return true;
}();

}  // namespace
}  // namespace spokewright
